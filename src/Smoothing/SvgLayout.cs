namespace Smoothing;

/// <summary>Where the parts of a picture stand: axes, rows of labels above the curve, legend. Labels are given rows of their own, so that none lies on the curve or is cut.</summary>
internal sealed class SvgLayout
{
    private const double Row = 18;
    private const double MostOverPeak = 3;

    public SvgLayout(FigureModel figure, double width, double height)
    {
        (Width, Height) = (width, height);
        (From, To) = (figure.X[0], figure.X[^1]);
        Left = 58;
        Right = width - 16;
        Floor = height - 66;
        Top = 24;
        double peak = Math.Max(figure.Y.Max(), figure.Second.Count > 0 ? figure.Second.Max() : 0);
        double highest = peak;
        foreach (double edge in figure.Upper.Concat(figure.Biased.Count > 0 ? figure.Corrected : []))
        {
            // A band that leaves the picture at a point or two must not press the curve flat.
            highest = Math.Max(highest, double.IsFinite(edge) ? Math.Min(edge, MostOverPeak * peak) : MostOverPeak * peak);
        }

        PerUnit = Unit(highest);
        YTitle = Title(figure);
        Legend = PlaceLegend(figure);
        (Marks, int rows) = SvgMarks.Place(figure, this, Top);
        Top += SvgMarks.Row * rows;

        // A peak's mark and label need 32 units above the peak.
        double room = figure.Peaks.Count > 0 ? (Floor - Top) / Math.Max(1, Floor - Top - 32) : 1.04;
        Highest = Math.Max(highest * 1.04, peak * room);
        Highest = Highest > 0 && double.IsFinite(Highest) ? Highest : 1;
    }

    public double Width { get; }

    public double Height { get; }

    public double Left { get; }

    public double Right { get; }

    /// <summary>Top of the stretch where the curve is drawn.</summary>
    public double Top { get; private set; }

    /// <summary>The horizontal axis.</summary>
    public double Floor { get; }

    public double From { get; }

    public double To { get; }

    /// <summary>The density at the top of the stretch.</summary>
    public double Highest { get; }

    /// <summary>The vertical axis counts percent per this many units: 1, or a power of ten where percent per unit would be an unreadable number.</summary>
    public double PerUnit { get; }

    public double PercentTop => 100 * Highest * PerUnit;

    public string YTitle { get; }

    public IReadOnlyList<(double X, double Y, string Sample, string Words)> Legend { get; }

    /// <summary>Limits and point masses with their labels.</summary>
    public IReadOnlyList<SvgMark> Marks { get; }

    public double X(double x) => Left + ((x - From) / (To - From) * (Right - Left));

    public double Y(double y) => Floor - (Math.Clamp(y, 0, Highest) / Highest * (Floor - Top));

    public double YOfPercent(double percent) => Floor - (percent / PercentTop * (Floor - Top));

    private static double Unit(double highest)
    {
        double percent = 100 * highest;
        return percent is >= 0.02 and < 20_000 || !(percent > 0) ? 1 : Math.Clamp(Math.Pow(10, Math.Ceiling(-Math.Log10(percent))), 1e-300, 1e300);
    }

    private string Title(FigureModel figure)
    {
        string per = PerUnit == 1 ? "" : (PerUnit is >= 1 and < 1e15 ? StudyNumbers.Count(PerUnit) : StudyNumbers.AsGiven(PerUnit)) + " ";
        string unit = figure.Unit.Length > 0 ? figure.Unit : PerUnit == 1 ? "unit" : "units";
        return SvgText.Fit("% of the values per " + per + unit, Width - 16);
    }

    private List<(double X, double Y, string Sample, string Words)> PlaceLegend(FigureModel figure)
    {
        var parts = new List<(string Sample, string Words)> { ("<line class=\"sm-c\" x1=\"0\" x2=\"22\" y1=\"-4\" y2=\"-4\"/>", figure.CurveWords) };
        if (figure.Upper.Count > 0)
        {
            parts.Add(("<rect class=\"sm-b\" x=\"0\" y=\"-11\" width=\"22\" height=\"13\"/>", figure.BandWords));
        }

        if (figure.Biased.Count > 0)
        {
            parts.Add(("<line class=\"sm-w\" x1=\"0\" x2=\"22\" y1=\"-4\" y2=\"-4\"/>", "without smoothing bias"));
        }

        if (figure.Second.Count > 0)
        {
            parts.Add(("<line class=\"sm-s\" x1=\"0\" x2=\"22\" y1=\"-4\" y2=\"-4\"/>", SvgText.Fit(figure.SecondWords, 200)));
        }

        if (figure.Different.Any(d => d.FirstHigher))
        {
            parts.Add(("<rect class=\"sm-d\" x=\"4\" y=\"-9\" width=\"14\" height=\"9\"/>", "more now"));
        }

        if (figure.Different.Any(d => !d.FirstHigher))
        {
            parts.Add(("<rect class=\"sm-e\" x=\"4\" y=\"-9\" width=\"14\" height=\"9\"/>", "fewer now"));
        }

        // Beside the title of the vertical axis where there is room, else in rows below it.
        double Length((string Sample, string Words) part) => 40 + SvgText.Width(part.Words);
        double y = 16;
        double start = 8 + SvgText.Width(YTitle) + 20;
        if (start + parts.Sum(Length) > Width)
        {
            (y, start) = (y + Row, 8);
        }
        else
        {
            start = Width - parts.Sum(Length);
        }

        var placed = new List<(double, double, string, string)>();
        double x = start;
        foreach ((string Sample, string Words) part in parts)
        {
            if (x > start && x + Length(part) > Width + 15)
            {
                (x, y) = (8, y + Row);
            }

            placed.Add((x, y, part.Sample, part.Words));
            x += Length(part);
        }

        Top = y + 14;
        return placed;
    }
}
