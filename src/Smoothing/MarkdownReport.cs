using System.Text;

namespace Smoothing;

/// <summary>Writes a <see cref="ReportModel"/> as Markdown (the CommonMark core and pipe tables).</summary>
internal static class MarkdownReport
{
    public static string Write(ReportModel report)
    {
        var text = new StringBuilder();
        text.Append("# ").Append(Escape(report.Title)).Append("\n\n");
        if (report.Figure is not null)
        {
            Picture(text, report.Figure);
        }

        foreach (ReportSection section in report.Sections)
        {
            text.Append("## ").Append(Escape(section.Heading)).Append("\n\n");
            bool bullets = section.IsList;
            bool afterBullet = false;
            foreach (ReportBlock block in section.Blocks)
            {
                if (block is ReportBlock.Picture picture)
                {
                    text.Append(afterBullet ? "\n" : "");
                    Picture(text, picture.Figure);
                    afterBullet = false;
                }
                else if (block is ReportBlock.Table table)
                {
                    text.Append(afterBullet ? "\n" : "");
                    Row(text, table.Headings);
                    text.Append('|').Insert(text.Length, " --- |", table.Headings.Count).Append('\n');
                    foreach (IReadOnlyList<string> row in table.Rows)
                    {
                        Row(text, row);
                    }

                    text.Append('\n');
                    afterBullet = false;
                }
                else if (block is ReportBlock.Paragraph paragraph)
                {
                    text.Append(bullets ? "- " : "").Append(Escape(paragraph.Text)).Append(bullets ? "\n" : "\n\n");
                    afterBullet = bullets;
                }
            }

            text.Append(afterBullet ? "\n" : "");
        }

        return text.Append("## Method\n\n").Append(Escape(report.Method)).Append('\n').ToString();
    }

    private static void Picture(StringBuilder text, FigureModel figure)
    {
        text.Append("```text\n");
        foreach (string line in TextFigure.Draw(figure))
        {
            // Three backticks in a name would end the block.
            text.Append(line.Replace('`', '\'')).Append('\n');
        }

        text.Append("```\n\n").Append(Escape(figure.Alternative)).Append("\n\n");
    }

    private static void Row(StringBuilder text, IReadOnlyList<string> cells)
    {
        text.Append('|');
        foreach (string cell in cells)
        {
            text.Append(' ').Append(Escape(cell)).Append(" |");
        }

        text.Append('\n');
    }

    private static string Escape(string text)
    {
        var escaped = new StringBuilder(text.Length + 8);
        foreach (char c in text)
        {
            if ("\\`*_[]<>|#~&$!".Contains(c, StringComparison.Ordinal))
            {
                escaped.Append(c switch { '<' => "&lt;", '>' => "&gt;", '&' => "&amp;", _ => "\\" + c });
            }
            else
            {
                escaped.Append(c);
            }
        }

        return escaped.ToString();
    }
}
