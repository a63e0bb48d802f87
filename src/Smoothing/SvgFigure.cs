using System.Globalization;
using System.Net;
using System.Text;

namespace Smoothing;

/// <summary>Draws a <see cref="FigureModel"/> as one self-contained SVG element: no script, no outside reference, readable in grey and in dark mode.</summary>
internal static class SvgFigure
{
    // Slate blue curve on a pale band, rust limits, all told apart by dash and shape as well as by colour.
    internal const string Style =
        ".sm-t{font:13px system-ui,'Segoe UI','DejaVu Sans',sans-serif;fill:#20303c;paint-order:stroke;stroke:#fff;stroke-width:3;stroke-linejoin:round}.sm-bg{fill:#fff}" +
        ".sm-a{stroke:#5b6b77;stroke-width:1;fill:none}.sm-g{stroke:#5b6b77;stroke-opacity:.18;fill:none}.sm-b{fill:#7fa8c9;fill-opacity:.38}" +
        ".sm-c{fill:none;stroke:#17476f;stroke-width:2.4;stroke-linejoin:round}.sm-s{fill:none;stroke:#5b6b77;stroke-width:2;stroke-dasharray:9 5}" +
        ".sm-l{stroke:#a8431b;stroke-width:1.8;stroke-dasharray:7 4}.sm-lt{fill:#a8431b;font-weight:600}.sm-p{fill:#17476f}.sm-r{stroke:#20303c;stroke-opacity:.42;fill:none}" +
        ".sm-w{fill:none;stroke:#a8431b;stroke-width:2.4;stroke-dasharray:2 3}.sm-d{fill:#17476f}.sm-e{fill:#fff;stroke:#17476f;stroke-width:1.4}" +
        "@media screen and (prefers-color-scheme:dark){.sm-bg{fill:#14191d}.sm-t{fill:#d8e2ea;stroke:#14191d}.sm-a{stroke:#9fb0bc}.sm-g{stroke:#9fb0bc}.sm-b{fill:#5d8fb8;fill-opacity:.4}" +
        ".sm-c{stroke:#a9d3f5}.sm-s{stroke:#b9c4cc}.sm-p,.sm-d{fill:#a9d3f5}.sm-e{fill:#14191d;stroke:#a9d3f5}.sm-l,.sm-w{stroke:#f0a37e}.sm-lt{fill:#f0a37e}.sm-r{stroke:#d8e2ea}}" +
        "@media print{.sm-t{fill:#000}.sm-c{stroke:#000}.sm-b{fill:#999;fill-opacity:.35}.sm-l,.sm-w{stroke:#000}.sm-lt,.sm-p,.sm-d{fill:#000}}";

    /// <summary>The wide form, for a page or a screen.</summary>
    public static string Draw(FigureModel figure) => Draw(figure, 760, 400, alone: true);

    /// <summary>A picture of a size in its own units; inside a page the style stands in the page.</summary>
    public static string Draw(FigureModel figure, double width, double height, bool alone)
    {
        var svg = new StringBuilder();
        var layout = new SvgLayout(figure, width, height);
        svg.Append("<svg xmlns=\"http://www.w3.org/2000/svg\" viewBox=\"0 0 ").Append(N(width)).Append(' ').Append(N(height)).Append("\" width=\"100%\" role=\"img\" aria-label=\"")
            .Append(Text(figure.Alternative)).Append("\"><title>").Append(Text(figure.Name.Length > 0 ? "Distribution of " + figure.Name : "Distribution"))
            .Append("</title><desc>").Append(Text(figure.Alternative)).Append("</desc>");
        if (alone)
        {
            svg.Append("<style>").Append(Style).Append("</style>\n<rect class=\"sm-bg\" width=\"").Append(N(width)).Append("\" height=\"").Append(N(height)).Append("\"/>");
        }

        svg.Append('\n');
        Axes(svg, figure, layout);
        Band(svg, figure, layout);
        if (figure.Second.Count > 0)
        {
            svg.Append("<path class=\"sm-s\" d=\"").Append(Line(figure.X, figure.Second, layout)).Append("\"/>\n");
        }

        svg.Append("<path class=\"sm-c\" d=\"").Append(Line(figure.X, figure.Y, layout)).Append("\"/>\n");
        Corrected(svg, figure, layout);
        Marks(svg, layout);
        Peaks(svg, figure, layout);
        Strip(svg, figure, layout);
        Legend(svg, layout);
        return svg.Append("</svg>").ToString();
    }

    private static void Axes(StringBuilder svg, FigureModel figure, SvgLayout layout)
    {
        (double[] xs, int xDecimals) = AxisTicks.Fitting(layout.From, layout.To, layout.Right - layout.Left, SvgText.Character);
        (double[] ys, int yDecimals) = AxisTicks.Between(0, layout.PercentTop, layout.Height < 380 ? 4 : 5);
        svg.Append("<path class=\"sm-g\" d=\"");
        foreach (double tick in ys)
        {
            svg.Append('M').Append(N(layout.Left)).Append(' ').Append(N(layout.YOfPercent(tick))).Append('H').Append(N(layout.Right));
        }

        svg.Append("\"/><path class=\"sm-a\" d=\"M").Append(N(layout.Left)).Append(' ').Append(N(layout.Floor)).Append('H').Append(N(layout.Right));
        foreach (double tick in xs)
        {
            svg.Append('M').Append(N(layout.X(tick))).Append(' ').Append(N(layout.Floor)).Append("v5");
        }

        svg.Append("\"/>\n");
        foreach (double tick in xs)
        {
            string label = AxisTicks.Label(tick, xDecimals);
            double half = SvgText.Width(label) / 2;
            Label(svg, Math.Clamp(layout.X(tick), half, Math.Max(half, layout.Width - half)), layout.Floor + 19, "middle", label);
        }

        foreach (double tick in ys)
        {
            Label(svg, layout.Left - 7, layout.YOfPercent(tick) + 4.5, "end", AxisTicks.Label(tick, yDecimals));
        }

        Label(svg, 8, 16, "start", layout.YTitle);
        string title = figure.Unit.Length > 0 ? (figure.Name.Length > 0 ? figure.Name + ", " : "") + figure.Unit : figure.Name;
        Label(svg, layout.Width / 2, layout.Height - 10, "middle", SvgText.Fit(title, layout.Width - 16));
    }

    private static void Band(StringBuilder svg, FigureModel figure, SvgLayout layout)
    {
        if (figure.Upper.Count == 0)
        {
            return;
        }

        svg.Append("<path class=\"sm-b\" d=\"").Append(Line(figure.X, figure.Upper, layout));
        for (int i = figure.X.Count - 1; i >= 0; i--)
        {
            svg.Append('L').Append(N(layout.X(figure.X[i]))).Append(' ').Append(N(layout.Y(figure.Lower[i])));
        }

        svg.Append("Z\"/>\n");
    }

    private static void Corrected(StringBuilder svg, FigureModel figure, SvgLayout layout)
    {
        foreach ((double from, double to) in figure.Biased)
        {
            int[] inside = [.. Enumerable.Range(0, figure.X.Count).Where(i => figure.X[i] >= from && figure.X[i] <= to)];
            svg.Append("<path class=\"sm-w\" d=\"").Append(Line([.. inside.Select(i => figure.X[i])], [.. inside.Select(i => figure.Corrected[i])], layout)).Append("\"/>\n");
        }

        // Filled where the studied values are more, hollow where they are fewer: told apart without colour.
        foreach ((double from, double to, bool higher) in figure.Different)
        {
            double left = layout.X(Math.Max(from, layout.From));
            double right = layout.X(Math.Min(to, layout.To));
            svg.Append("<rect class=\"").Append(higher ? "sm-d" : "sm-e").Append("\" x=\"").Append(N(left)).Append("\" width=\"").Append(N(Math.Max(2, right - left)))
                .Append("\" y=\"").Append(N(layout.Floor + 27)).Append("\" height=\"9\"/>\n");
        }
    }

    private static void Marks(StringBuilder svg, SvgLayout layout)
    {
        foreach (SvgMark mark in layout.Marks)
        {
            string style = mark.IsAtom ? "sm-p" : "sm-l";
            double width = mark.IsAtom ? 6 : 0;
            if (mark.IsAtom)
            {
                svg.Append("<rect class=\"").Append(style).Append("\" x=\"").Append(N(mark.X - (width / 2))).Append("\" width=\"").Append(N(width)).Append("\" y=\"").Append(N(mark.Y - 9)).Append("\" height=\"").Append(N(layout.Floor - mark.Y + 9)).Append("\"/>");
            }
            else
            {
                svg.Append("<line class=\"").Append(style).Append("\" x1=\"").Append(N(mark.X)).Append("\" x2=\"").Append(N(mark.X)).Append("\" y1=\"").Append(N(mark.Y - 10)).Append("\" y2=\"").Append(N(layout.Floor)).Append("\"/>");
            }
        }

        foreach (SvgMark mark in layout.Marks.Where(m => m.Label.Length > 0))
        {
            Label(svg, mark.LabelX, mark.Y, mark.Anchor, mark.Label, mark.IsAtom ? "sm-t" : "sm-t sm-lt");
        }
    }

    // The highest first: a label that would run into one already there is left out, its mark stays.
    private static void Peaks(StringBuilder svg, FigureModel figure, SvgLayout layout)
    {
        var taken = new List<(double Left, double Right, double Y)>();
        foreach ((double x, double y, string label) in figure.Peaks.OrderByDescending(p => p.Y))
        {
            double px = layout.X(x);
            double py = layout.Y(y);
            svg.Append("<path class=\"sm-p\" d=\"M").Append(N(px - 5)).Append(' ').Append(N(py - 11)).Append("h10l-5 8z\"/>");
            string words = SvgText.Fit(label, 180);
            double half = SvgText.Width(words) / 2;
            double at = Math.Clamp(px, layout.Left + half, Math.Max(layout.Left + half, layout.Right - half));
            if (!taken.Any(t => Math.Abs(t.Y - py) < 17 && t.Left < at + half && t.Right > at - half))
            {
                taken.Add((at - half - 4, at + half + 4, py));
                Label(svg, at, py - 15, "middle", words);
            }
        }
    }

    private static void Strip(StringBuilder svg, FigureModel figure, SvgLayout layout)
    {
        if (figure.Strip.Count == 0)
        {
            return;
        }

        double most = figure.Strip.Max(s => s.Weight);
        svg.Append("<path class=\"sm-r\" d=\"");
        foreach ((double x, double weight) in figure.Strip)
        {
            svg.Append('M').Append(N(layout.X(x))).Append(' ').Append(N(layout.Floor + 27)).Append('v').Append(N(2 + (9 * weight / most)));
        }

        svg.Append("\"/>\n");
    }

    private static void Legend(StringBuilder svg, SvgLayout layout)
    {
        foreach ((double x, double y, string sample, string words) in layout.Legend)
        {
            svg.Append("<g transform=\"translate(").Append(N(x)).Append(' ').Append(N(y)).Append(")\">").Append(sample);
            Label(svg, 27, 0, "start", words);
            svg.Append("</g>");
        }

        svg.Append('\n');
    }

    private static string Line(IReadOnlyList<double> x, IReadOnlyList<double> y, SvgLayout layout)
    {
        var path = new StringBuilder();
        for (int i = 0; i < x.Count; i++)
        {
            path.Append(i == 0 ? 'M' : 'L').Append(N(layout.X(x[i]))).Append(' ').Append(N(layout.Y(double.IsFinite(y[i]) ? y[i] : double.MaxValue)));
        }

        return path.ToString();
    }

    private static void Label(StringBuilder svg, double x, double y, string anchor, string text, string style = "sm-t") =>
        svg.Append("<text class=\"").Append(style).Append("\" x=\"").Append(N(x)).Append("\" y=\"").Append(N(y)).Append("\" text-anchor=\"").Append(anchor).Append("\">").Append(Text(text)).Append("</text>\n");

    private static string N(double value) => (value == 0 ? 0 : value).ToString("0.##", CultureInfo.InvariantCulture);

    private static string Text(string text) => WebUtility.HtmlEncode(TextCleaner.Visible(text));
}
