using System.Globalization;
using System.Text;

namespace Smoothing;

/// <summary>Writes a <see cref="ReportModel"/> as plain text, 80 columns at most.</summary>
internal static class TextReport
{
    private const int Width = 80;

    public static string Write(ReportModel report)
    {
        var text = new StringBuilder();
        foreach (string line in Wrap(report.Title, Width))
        {
            text.Append(line).Append('\n');
        }

        text.Append(new string('=', Math.Min(Width, Length(report.Title)))).Append("\n\n");
        if (report.Figure is not null)
        {
            foreach (string line in TextFigure.Draw(report.Figure))
            {
                text.Append(line).Append('\n');
            }

            text.Append('\n');
            Paragraph(text, report.Figure.Alternative, "");
        }

        foreach (ReportSection section in report.Sections)
        {
            text.Append('\n').Append(section.Heading).Append('\n').Append(new string('-', Math.Min(Width, Length(section.Heading)))).Append('\n');
            foreach (ReportBlock block in section.Blocks)
            {
                if (block is ReportBlock.Table table)
                {
                    Table(text, table);
                }
                else if (block is ReportBlock.Paragraph paragraph)
                {
                    Paragraph(text, paragraph.Text, section.Blocks.Count > 1 ? "* " : "");
                }
            }
        }

        text.Append("\nMethod\n------\n");
        Paragraph(text, report.Method, "");
        return text.ToString();
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
        int columns = table.Headings.Count;
        int[] widths = Enumerable.Range(0, columns).Select(c => Math.Max(Length(table.Headings[c]), table.Rows.Max(r => Length(r[c])))).ToArray();

        // The last column may be long words: it wraps under itself.
        int before = widths.Take(columns - 1).Sum() + (3 * (columns - 1)) + 2;
        int last = Math.Max(16, Width - before);
        foreach (IReadOnlyList<string> row in table.Rows.Prepend(table.Headings))
        {
            var line = new StringBuilder("  ");
            for (int c = 0; c < columns - 1; c++)
            {
                int pad = widths[c] - Length(row[c]);
                line.Append(row[c]).Append(' ', pad + 3);
            }

            bool first = true;
            foreach (string piece in Wrap(row[columns - 1], last))
            {
                text.Append((first ? line.ToString() + piece : new string(' ', before) + piece).TrimEnd()).Append('\n');
                first = false;
            }

            if (ReferenceEquals(row, table.Headings))
            {
                text.Append("  ").Append(new string('-', Math.Min(Width - 2, before - 2 + Math.Min(last, widths[columns - 1])))).Append('\n');
            }
        }
    }

    private static int Length(string text) => new StringInfo(text).LengthInTextElements;

    private static List<string> Wrap(string text, int width)
    {
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

        return lines;
    }
}
