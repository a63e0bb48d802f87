using System.Globalization;
using System.Text;

namespace Smoothing;

/// <summary>Writes a <see cref="ReportModel"/> as plain text, 80 columns at most.</summary>
internal static class TextReport
{
    private const int Width = 80;
    private const int Gap = 3;

    public static string Write(ReportModel report)
    {
        var text = new StringBuilder();
        Heading(text, report.Title, '=');
        text.Append('\n');
        if (report.Figure is not null)
        {
            Picture(text, report.Figure);
        }

        foreach (ReportSection section in report.Sections)
        {
            text.Append('\n');
            Heading(text, section.Heading, '-');
            foreach (ReportBlock block in section.Blocks)
            {
                if (block is ReportBlock.Table table)
                {
                    text.Append(ReferenceEquals(block, section.Blocks[0]) || text[^2] == '\n' ? "" : "\n");
                    Table(text, table);
                    text.Append(ReferenceEquals(block, section.Blocks[^1]) ? "" : "\n");
                }
                else if (block is ReportBlock.Picture picture)
                {
                    Picture(text, picture.Figure);
                    text.Append('\n');
                }
                else if (block is ReportBlock.Paragraph paragraph)
                {
                    Paragraph(text, paragraph.Text, section.IsList ? "* " : "");
                }
            }
        }

        text.Append('\n');
        Heading(text, "Method", '-');
        Paragraph(text, report.Method, "");
        return text.ToString();
    }

    private static void Heading(StringBuilder text, string heading, char under)
    {
        List<string> lines = Wrap(heading, Width);
        foreach (string line in lines)
        {
            text.Append(line).Append('\n');
        }

        text.Append(under, lines.Max(Length)).Append('\n');
    }

    private static void Picture(StringBuilder text, FigureModel figure)
    {
        foreach (string line in TextFigure.Draw(figure))
        {
            text.Append(line).Append('\n');
        }

        text.Append('\n');
        Paragraph(text, figure.Alternative, "");
    }

    private static void Paragraph(StringBuilder text, string paragraph, string bullet)
    {
        string indent = new(' ', bullet.Length);
        bool first = true;
        foreach (string line in Wrap(paragraph, Width - bullet.Length))
        {
            text.Append(first ? bullet : indent).Append(line).Append('\n');
            first = false;
        }
    }

    private static void Table(StringBuilder text, ReportBlock.Table table)
    {
        int[] widths = Widths(table);
        foreach (IReadOnlyList<string> row in table.Rows.Prepend(table.Headings))
        {
            List<string>[] cells = [.. row.Select((cell, c) => Wrap(cell, widths[c]))];
            for (int line = 0; line < cells.Max(c => c.Count); line++)
            {
                var written = new StringBuilder("  ");
                for (int c = 0; c < cells.Length; c++)
                {
                    string piece = line < cells[c].Count ? cells[c][line] : "";
                    written.Append(piece).Append(' ', widths[c] - Length(piece) + Gap);
                }

                text.Append(written.ToString().TrimEnd()).Append('\n');
            }

            if (ReferenceEquals(row, table.Headings))
            {
                text.Append("  ").Append('-', widths.Sum() + (Gap * (widths.Length - 1))).Append('\n');
            }
        }
    }

    // As wide as the longest cell; where that is too much for a line, the widest columns give way and their cells wrap.
    private static int[] Widths(ReportBlock.Table table)
    {
        int[] widths = [.. Enumerable.Range(0, table.Headings.Count).Select(c => table.Rows.Prepend(table.Headings).Max(r => Length(r[c])))];
        int room = Width - 2 - (Gap * (widths.Length - 1));
        while (widths.Sum() > room)
        {
            widths[Array.IndexOf(widths, widths.Max())]--;
        }

        return widths;
    }

    private static int Length(string text) => new StringInfo(text).LengthInTextElements;

    private static List<string> Wrap(string text, int width)
    {
        // "13 %" and "p = 0.02" stay on one line.
        text = text.Replace(" %", "\u00A0%", StringComparison.Ordinal).Replace("p = ", "p\u00A0=\u00A0", StringComparison.Ordinal);
        var lines = new List<string>();
        var line = new StringBuilder();
        int used = 0;
        foreach (string given in text.Split(' ', StringSplitOptions.RemoveEmptyEntries))
        {
            string word = given;
            while (Length(word) > width)
            {
                // A word longer than the line, such as a pasted address, is cut.
                if (used > 0)
                {
                    lines.Add(line.ToString());
                    line.Clear();
                    used = 0;
                }

                var elements = new StringInfo(word);
                lines.Add(elements.SubstringByTextElements(0, width));
                word = elements.SubstringByTextElements(width);
            }

            int length = Length(word);
            if (used > 0 && used + 1 + length > width)
            {
                lines.Add(line.ToString());
                line.Clear();
                used = 0;
            }

            line.Append(used > 0 ? " " : "").Append(word);
            used += (used > 0 ? 1 : 0) + length;
        }

        if (used > 0 || lines.Count == 0)
        {
            lines.Add(line.ToString());
        }

        return [.. lines.Select(l => l.Replace('\u00A0', ' '))];
    }
}
