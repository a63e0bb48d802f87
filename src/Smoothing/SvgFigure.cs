using System.Globalization;
using System.Net;
using System.Text;

namespace Smoothing;

/// <summary>Draws a <see cref="FigureModel"/> as one self-contained SVG element: no script, no outside reference, readable in grey and in dark mode.</summary>
internal static class SvgFigure
{
    private const double Width = 760;
    private const double Height = 400;
    private const double Left = 58;
    private const double Right = 16;
    private const double Top = 40;
    private const double Bottom = 78;

    // Slate blue curve on a pale band, rust limits, all told apart by dash and shape as well as by colour.
    private const string Style =
        ".sm-t{font:13px system-ui,'Segoe UI','DejaVu Sans',sans-serif;fill:#20303c}.sm-a{stroke:#5b6b77;stroke-width:1}.sm-g{stroke:#5b6b77;stroke-opacity:.18}" +
        ".sm-b{fill:#7fa8c9;fill-opacity:.38}.sm-c{fill:none;stroke:#17476f;stroke-width:2.4;stroke-linejoin:round}.sm-l{stroke:#a8431b;stroke-width:1.8;stroke-dasharray:7 4}" +
        ".sm-lt{fill:#a8431b;font-weight:600}.sm-p{fill:#17476f}.sm-r{stroke:#20303c;stroke-opacity:.42}.sm-w{fill:none;stroke:#a8431b;stroke-width:4;stroke-opacity:.75}" +
        "@media(prefers-color-scheme:dark){.sm-t{fill:#d8e2ea}.sm-a{stroke:#9fb0bc}.sm-g{stroke:#9fb0bc}.sm-b{fill:#5d8fb8;fill-opacity:.4}.sm-c{stroke:#a9d3f5}.sm-p{fill:#a9d3f5}.sm-l,.sm-w{stroke:#f0a37e}.sm-lt{fill:#f0a37e}.sm-r{stroke:#d8e2ea}}" +
        "@media print{.sm-t{fill:#000}.sm-c{stroke:#000}.sm-b{fill:#999;fill-opacity:.35}.sm-l{stroke:#000}.sm-lt{fill:#000}}";

    public static string Draw(FigureModel figure)
    {
        double from = figure.X[0];
        double to = figure.X[^1];
        double top = 0;
        for (int i = 0; i < figure.Y.Count; i++)
        {
            top = Math.Max(top, figure.Upper.Count > 0 && double.IsFinite(figure.Upper[i]) ? Math.Max(figure.Y[i], Math.Min(figure.Upper[i], 2.5 * Peak(figure))) : figure.Y[i]);
        }

        top = top > 0 ? top * 1.08 : 1;
        double X(double x) => Left + ((x - from) / (to - from) * (Width - Left - Right));
        double Y(double y) => Height - Bottom - (Math.Clamp(y, 0, top) / top * (Height - Top - Bottom));

        var svg = new StringBuilder();
        svg.Append("<svg xmlns=\"http://www.w3.org/2000/svg\" viewBox=\"0 0 760 400\" width=\"100%\" role=\"img\" aria-labelledby=\"sm-title sm-desc\"><title id=\"sm-title\">")
            .Append(Text(figure.Name.Length > 0 ? "Distribution of " + figure.Name : "Distribution"))
            .Append("</title><desc id=\"sm-desc\">").Append(Text(figure.Alternative)).Append("</desc><style>").Append(Style).Append("</style>\n");
        Axes(svg, figure, from, to, top, X, Y);
        Band(svg, figure, X, Y);
        svg.Append("<path class=\"sm-c\" d=\"").Append(Line(figure.X, figure.Y, X, Y)).Append("\"/>\n");
        foreach ((double a, double b) in figure.Biased)
        {
            var inside = Enumerable.Range(0, figure.X.Count).Where(i => figure.X[i] >= a && figure.X[i] <= b).ToArray();
            if (inside.Length > 1)
            {
                svg.Append("<path class=\"sm-w\" d=\"").Append(Line(inside.Select(i => figure.X[i]).ToArray(), inside.Select(i => figure.Y[i]).ToArray(), X, Y)).Append("\"/>\n");
            }
        }

        Limits(svg, figure, from, to, X);
        Peaks(svg, figure, X, Y);
        Strip(svg, figure, from, to, X);
        Legend(svg, figure);
        return svg.Append("</svg>").ToString();
    }

    private static double Peak(FigureModel figure) => figure.Y.Max();

    private static void Axes(StringBuilder svg, FigureModel figure, double from, double to, double top, Func<double, double> mapX, Func<double, double> mapY)
    {
        (double[] xs, int xDecimals) = AxisTicks.Between(from, to, 8);
        foreach (double tick in xs)
        {
            string x = N(mapX(tick));
            svg.Append("<line class=\"sm-a\" x1=\"").Append(x).Append("\" x2=\"").Append(x).Append("\" y1=\"").Append(N(Height - Bottom)).Append("\" y2=\"").Append(N(Height - Bottom + 5)).Append("\"/>");
            Label(svg, mapX(tick), Height - Bottom + 19, "middle", Tick(tick, xDecimals));
        }

        (double[] ys, int yDecimals) = AxisTicks.Between(0, 100 * top, 5);
        foreach (double tick in ys)
        {
            string y = N(mapY(tick / 100));
            svg.Append("<line class=\"sm-g\" x1=\"").Append(N(Left)).Append("\" x2=\"").Append(N(Width - Right)).Append("\" y1=\"").Append(y).Append("\" y2=\"").Append(y).Append("\"/>");
            Label(svg, Left - 7, mapY(tick / 100) + 4.5, "end", Tick(tick, yDecimals));
        }

        svg.Append("<line class=\"sm-a\" x1=\"").Append(N(Left)).Append("\" x2=\"").Append(N(Width - Right)).Append("\" y1=\"").Append(N(Height - Bottom)).Append("\" y2=\"").Append(N(Height - Bottom)).Append("\"/>\n");
        string unit = figure.Unit.Length > 0 ? figure.Unit : "unit";
        Label(svg, Left - 48, 16, "start", Short("% of the values per " + unit, 44));
        Label(svg, (Left + Width - Right) / 2, Height - 22, "middle", Short(figure.Unit.Length > 0 ? (figure.Name.Length > 0 ? figure.Name + ", " : "") + figure.Unit : figure.Name, 90));
    }

    private static void Band(StringBuilder svg, FigureModel figure, Func<double, double> mapX, Func<double, double> mapY)
    {
        if (figure.Upper.Count == 0)
        {
            return;
        }

        svg.Append("<path class=\"sm-b\" d=\"").Append(Line(figure.X, figure.Upper, mapX, mapY));
        for (int i = figure.X.Count - 1; i >= 0; i--)
        {
            svg.Append('L').Append(N(mapX(figure.X[i]))).Append(' ').Append(N(mapY(figure.Lower[i])));
        }

        svg.Append("Z\"/>\n");
    }

    private static void Limits(StringBuilder svg, FigureModel figure, double from, double to, Func<double, double> mapX)
    {
        int row = 0;
        foreach ((double limit, string label) in figure.Limits)
        {
            if (limit < from || limit > to)
            {
                continue;
            }

            string x = N(mapX(limit));
            svg.Append("<line class=\"sm-l\" x1=\"").Append(x).Append("\" x2=\"").Append(x).Append("\" y1=\"").Append(N(Top - 4)).Append("\" y2=\"").Append(N(Height - Bottom)).Append("\"/>");
            bool right = mapX(limit) < Width - 230;
            Label(svg, mapX(limit) + (right ? 6 : -6), Top + 10 + (17 * (row++ % 6)), right ? "start" : "end", Short(label, 48), "sm-t sm-lt");
        }
    }

    private static void Peaks(StringBuilder svg, FigureModel figure, Func<double, double> mapX, Func<double, double> mapY)
    {
        foreach ((double x, double y, string label) in figure.Peaks)
        {
            double px = mapX(x);
            double py = mapY(y);
            svg.Append("<path class=\"sm-p\" d=\"M").Append(N(px - 5)).Append(' ').Append(N(py - 11)).Append("h10l-5 8z\"/>");
            Label(svg, Math.Clamp(px, Left + 20, Width - Right - 20), py - 15, "middle", Short(label, 24));
        }

        foreach ((double x, string label) in figure.Atoms)
        {
            double px = mapX(x);
            svg.Append("<path class=\"sm-p\" d=\"M").Append(N(px - 3)).Append(' ').Append(N(Height - Bottom)).Append("v-").Append(N(Height - Top - Bottom - 20)).Append("h6v").Append(N(Height - Top - Bottom - 20)).Append("z\"/>");
            Label(svg, px + 8, Top + 30, "start", Short(label, 40));
        }
    }

    private static void Strip(StringBuilder svg, FigureModel figure, double from, double to, Func<double, double> mapX)
    {
        double most = figure.Strip.Count == 0 ? 1 : figure.Strip.Max(s => s.Weight);
        foreach ((double x, double weight) in figure.Strip)
        {
            if (x >= from && x <= to)
            {
                string at = N(mapX(x));
                svg.Append("<line class=\"sm-r\" x1=\"").Append(at).Append("\" x2=\"").Append(at).Append("\" y1=\"").Append(N(Height - Bottom + 27)).Append("\" y2=\"").Append(N(Height - Bottom + 29 + (9 * weight / most))).Append("\"/>");
            }
        }
    }

    private static void Legend(StringBuilder svg, FigureModel figure)
    {
        double x = Width - Right;
        const double y = 16;
        var parts = new List<(string Sample, string Words)> { ("<line class=\"sm-c\" x1=\"0\" x2=\"22\" y1=\"-4\" y2=\"-4\"/>", "curve") };
        if (figure.Upper.Count > 0)
        {
            parts.Add(("<rect class=\"sm-b\" x=\"0\" y=\"-11\" width=\"22\" height=\"13\"/>", figure.BandWords));
        }

        if (figure.Biased.Count > 0)
        {
            parts.Add(("<line class=\"sm-w\" x1=\"0\" x2=\"22\" y1=\"-4\" y2=\"-4\"/>", "bias beyond the band"));
        }

        for (int i = parts.Count - 1; i >= 0; i--)
        {
            x -= 40 + (7.3 * parts[i].Words.Length);
            svg.Append("<g transform=\"translate(").Append(N(x)).Append(' ').Append(N(y)).Append(")\">").Append(parts[i].Sample);
            Label(svg, 27, 0, "start", parts[i].Words);
            svg.Append("</g>");
        }

        svg.Append('\n');
    }

    private static string Line(IReadOnlyList<double> x, IReadOnlyList<double> y, Func<double, double> mapX, Func<double, double> mapY)
    {
        var path = new StringBuilder();
        for (int i = 0; i < x.Count; i++)
        {
            path.Append(i == 0 ? 'M' : 'L').Append(N(mapX(x[i]))).Append(' ').Append(N(mapY(double.IsFinite(y[i]) ? y[i] : double.MaxValue)));
        }

        return path.ToString();
    }

    private static void Label(StringBuilder svg, double x, double y, string anchor, string text, string style = "sm-t") =>
        svg.Append("<text class=\"").Append(style).Append("\" x=\"").Append(N(x)).Append("\" y=\"").Append(N(y)).Append("\" text-anchor=\"").Append(anchor).Append("\">").Append(Text(text)).Append("</text>\n");

    private static string Short(string text, int most) => text.Length <= most ? text : text[..(most - 1)] + "…";

    private static string Tick(double value, int decimals) =>
        Math.Abs(value) >= 1e7 || (value != 0 && Math.Abs(value) < 1e-5)
            ? value.ToString("G5", CultureInfo.InvariantCulture)
            : value.ToString("F" + decimals.ToString(CultureInfo.InvariantCulture), CultureInfo.InvariantCulture);

    private static string N(double value) => value.ToString("0.##", CultureInfo.InvariantCulture);

    private static string Text(string text) => WebUtility.HtmlEncode(TextCleaner.Visible(text));
}
