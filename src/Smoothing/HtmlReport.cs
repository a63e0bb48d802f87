using System.Net;
using System.Text;

namespace Smoothing;

/// <summary>Writes a <see cref="ReportModel"/> as one self-contained HTML page: inline SVG, no script, nothing fetched.</summary>
internal static class HtmlReport
{
    private const string Style =
        ":root{color-scheme:light dark}body{font:16px/1.5 system-ui,'Segoe UI','DejaVu Sans',sans-serif;max-width:52rem;margin:0 auto;padding:1rem;color:#20303c;background:#fff}" +
        "h1{font-size:1.5rem;line-height:1.25;overflow-wrap:anywhere}h2{font-size:1.1rem;margin:1.6rem 0 .4rem;border-bottom:1px solid #c9d3da;overflow-wrap:anywhere}figure{margin:1rem 0}" +
        "figcaption,.method{font-size:.92rem;overflow-wrap:anywhere}table{border-collapse:collapse;width:100%;margin:.5rem 0}th,td{text-align:left;vertical-align:top;padding:.3rem .6rem .3rem 0;border-bottom:1px solid #dde4e9}" +
        ".wide{overflow-x:auto}p,li{margin:.3rem 0;overflow-wrap:anywhere}ul{padding-left:1.2rem}.slim{display:none}@media screen and (max-width:36rem){.broad{display:none}.slim{display:block}}@media screen and (prefers-color-scheme:dark){body{color:#d8e2ea;background:#14191d}h2{border-color:#3d4a54}th,td{border-color:#2c363e}}" +
        "@media print{body{max-width:none;color:#000;background:#fff}figure,table{break-inside:avoid}}";

    public static string Write(ReportModel report)
    {
        var html = new StringBuilder();
        html.Append("<!DOCTYPE html>\n<html lang=\"en\">\n<head>\n<meta charset=\"utf-8\">\n<meta name=\"viewport\" content=\"width=device-width, initial-scale=1\">\n<link rel=\"icon\" href=\"data:,\">\n<title>")
            .Append(Text(report.Title)).Append("</title>\n<style>").Append(Style).Append(SvgFigure.Style).Append("</style>\n</head>\n<body>\n<main>\n");
        Body(html, report);
        return html.Append("</main>\n</body>\n</html>\n").ToString();
    }

    private static void Body(StringBuilder html, ReportModel report)
    {
        html.Append("<h1>").Append(Text(report.Title)).Append("</h1>\n");
        if (report.Figure is not null)
        {
            Picture(html, report.Figure);
        }

        foreach (ReportSection section in report.Sections)
        {
            html.Append("<section>\n<h2>").Append(Text(section.Heading)).Append("</h2>\n");
            bool list = false;
            foreach (ReportBlock block in section.Blocks)
            {
                if (block is not ReportBlock.Paragraph)
                {
                    html.Append(list ? "</ul>\n" : "");
                    list = false;
                }

                if (block is ReportBlock.Table table)
                {
                    Table(html, table);
                }
                else if (block is ReportBlock.Picture picture)
                {
                    Picture(html, picture.Figure);
                }
                else if (block is ReportBlock.Paragraph paragraph)
                {
                    if (!section.IsList)
                    {
                        html.Append("<p>").Append(Text(paragraph.Text)).Append("</p>\n");
                        continue;
                    }

                    html.Append(list ? "" : "<ul>\n");
                    list = true;
                    html.Append("<li>").Append(Text(paragraph.Text)).Append("</li>\n");
                }
            }

            html.Append(list ? "</ul>\n" : "").Append("</section>\n");
        }

        html.Append("<section>\n<h2>Method</h2>\n<p class=\"method\">").Append(Text(report.Method)).Append("</p>\n</section>\n");
    }

    // Twice: a wide form, and a narrow one whose letters stay readable on a phone; the style shows one of them.
    private static void Picture(StringBuilder html, FigureModel figure)
    {
        html.Append("<figure>\n<div class=\"broad\">").Append(SvgFigure.Draw(figure, 760, 400, alone: false)).Append("</div>\n<div class=\"slim\">")
            .Append(SvgFigure.Draw(figure, 400, 340, alone: false)).Append("</div>\n<figcaption>").Append(Text(figure.Alternative)).Append("</figcaption>\n</figure>\n");
    }

    private static void Table(StringBuilder html, ReportBlock.Table table)
    {
        html.Append("<div class=\"wide\"><table>\n<thead><tr>");
        foreach (string heading in table.Headings)
        {
            html.Append("<th scope=\"col\">").Append(Text(heading)).Append("</th>");
        }

        html.Append("</tr></thead>\n<tbody>\n");
        foreach (IReadOnlyList<string> row in table.Rows)
        {
            html.Append("<tr>");
            for (int c = 0; c < row.Count; c++)
            {
                html.Append(c == 0 ? "<th scope=\"row\">" : "<td>").Append(Text(row[c])).Append(c == 0 ? "</th>" : "</td>");
            }

            html.Append("</tr>\n");
        }

        html.Append("</tbody>\n</table></div>\n");
    }

    private static string Text(string text) => WebUtility.HtmlEncode(TextCleaner.Visible(text)).Replace(" %", "&#160;%", StringComparison.Ordinal);
}
