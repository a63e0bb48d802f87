namespace Smoothing;

/// <summary>The report before it has a format: a title, a picture and sections of sentences and tables, in reading order.</summary>
internal sealed record ReportModel(string Title, FigureModel? Figure, IReadOnlyList<ReportSection> Sections, string Method);

/// <summary>One heading and what stands under it.</summary>
internal sealed record ReportSection(string Heading, IReadOnlyList<ReportBlock> Blocks)
{
    /// <summary>Whether the section is a list of points; sentences beside a table or a picture stand by themselves.</summary>
    public bool IsList => Blocks.Count > 1 && Blocks.All(block => block is ReportBlock.Paragraph);
}

/// <summary>A paragraph, a picture, or a table with a header row.</summary>
internal abstract record ReportBlock
{
    private ReportBlock()
    {
    }

    /// <summary>One or more sentences.</summary>
    public sealed record Paragraph(string Text) : ReportBlock;

    /// <summary>A further picture.</summary>
    public sealed record Picture(FigureModel Figure) : ReportBlock;

    /// <summary>Columns with headings; the first column names the row.</summary>
    public sealed record Table(IReadOnlyList<string> Headings, IReadOnlyList<IReadOnlyList<string>> Rows) : ReportBlock;
}
