using Smoothing.Charts.Drawing;
using Smoothing.Numerics;

namespace Smoothing.Charts.Content;

/// <summary>Over a range of bandwidths: where the curve rises and falls beyond chance, and where its peaks run.</summary>
internal static class PeakEvidenceContent
{
    private const int Rows = 64;
    private const int Columns = 240;

    // The picture reaches from a sixth of the chosen bandwidth to eight times it.
    private const double Below = 6;
    private const double Above = 8;

    public static Sheet Of(DensityStudy study)
    {
        var view = new StudyView(study);
        string title = Check.Text($"{view.Title}: evidence for peaks");
        string caption = "bandwidth h" + (view.Unit.Length > 0 ? ", " + view.Unit : "") + ": more smoothing upwards";
        if (study.Uncertainty is null)
        {
            const string Why = "Nothing can be said about peaks: that takes at least three values that are not all equal.";
            return new Sheet
            {
                Title = title,
                Alternative = Why,
                Panels = [new Panel { X = view.Axis, Y = AxisScale.Marked(0, 1, []), XCaption = view.Caption, YCaption = caption, Statement = Why }],
                Notes = [view.Method],
            };
        }

        double chosen = study.Density.Bandwidth * Kernels.Kernel.Gaussian.CanonicalBandwidth / study.Options.Kernel.CanonicalBandwidth;
        SlopeMap map = Map(study, view.Range, chosen);
        List<Mark> marks = [Cells(map, view.Range)];
        foreach (bool established in new[] { false, true })
        {
            (double X, double H)[] ridge = [.. map.Peaks.SelectMany((peaks, r) => peaks.Where(p => p.Established == established).Select(p => (p.X, map.Bandwidths[r])))];
            if (ridge.Length > 0)
            {
                marks.Add(new DotMarks([.. ridge.Select(p => p.X)], [.. ridge.Select(p => p.H)], Tone.Trace, established ? Shape.Disc : Shape.Ring, established ? 5 : 4));
            }
        }

        marks.Add(LineMark.Straight(view.Range.Lower, chosen, view.Range.Upper, chosen, Tone.Limit, 2, Dash.Long));
        int row = Array.IndexOf(map.Bandwidths, map.Bandwidths.MinBy(h => Math.Abs(Math.Log(h / chosen))));
        Ridge[] shown = map.Peaks[row];
        return new Sheet
        {
            Title = title,
            Alternative = Alternative(view, shown, chosen),
            Keys =
            [
                new Key("curve rises", Tone.Up, Swatch.Area),
                new Key("curve falls", Tone.Down, Swatch.Area),
                new Key("cannot be told", Tone.Open, Swatch.Area),
                new Key("too few values", Tone.Sparse, Swatch.Area),
                new Key("peak, stands by itself", Tone.Trace, Swatch.Point),
                new Key("peak, may be chance", Tone.Trace, Swatch.Point, Shape: Shape.Ring),
            ],
            Panels =
            [
                new Panel
                {
                    X = view.Axis,
                    Y = AxisScale.Logarithmic(map.Bandwidths[0], map.Bandwidths[^1]),
                    XCaption = view.Caption,
                    YCaption = caption,
                    Marks = marks,
                    Beside = [(chosen, "h = " + Words.Three(chosen))],
                    Grid = false,
                },
            ],
            Notes = [Check.Text($"n = {Words.Count(study.Sample.Count)}; each row as a whole at the {Words.Level(study.Options.Level)} level (Chaudhuri and Marron 1999). {Alternative(view, shown, chosen)}")],
        };
    }

    internal static SlopeMap Map(DensityStudy study, Interval range, double chosen)
    {
        // Finer than half a rounding step every mark of the scale is a peak of its own.
        double step = study.CurveSample.RoundingUnit?.Step ?? 0;
        double low = Math.Min(Math.Max(chosen / Below, step / 2), chosen);
        double high = chosen * Above;
        double[] bandwidths = [.. Enumerable.Range(0, Rows).Select(r => low * Math.Pow(high / low, r / (Rows - 1.0)))];
        Interval inside = study.Options.Support is { } s ? new Interval(Math.Max(range.Lower, s.Lower), Math.Min(range.Upper, s.Upper)) : range;
        double[] x = [.. Enumerable.Range(0, Columns).Select(i => inside.Lower + (inside.Length * (i + 0.5) / Columns))];
        return SlopeMap.Of(study.CurveSample, x, bandwidths, study.Options.Level, study.Options.Support);
    }

    // Neighbouring places of one state make one cell.
    private static CellMarks Cells(SlopeMap map, Interval range)
    {
        double half = (map.X[1] - map.X[0]) / 2;
        double factor = Math.Sqrt(map.Bandwidths[1] / map.Bandwidths[0]);
        var cells = new List<(double, double, double, double, Tone)>();
        for (int r = 0; r < map.Rows.Length; r++)
        {
            Slope[] row = map.Rows[r];
            for (int start = 0, i = 1; i <= row.Length; i++)
            {
                if (i == row.Length || row[i] != row[start])
                {
                    cells.Add((map.X[start] - half, map.X[i - 1] + half, map.Bandwidths[r] / factor, map.Bandwidths[r] * factor, row[start] switch
                    {
                        Slope.Rising => Tone.Up,
                        Slope.Falling => Tone.Down,
                        Slope.Sparse => Tone.Sparse,
                        _ => Tone.Open,
                    }));
                    start = i;
                }
            }
        }

        return new CellMarks(cells);
    }

    private static string Alternative(StudyView view, Ridge[] peaks, double chosen)
    {
        string h = Words.WithUnit(Words.Three(chosen), view.Unit);
        string[] sure = [.. peaks.Where(p => p.Established).Select(p => view.Place(p.X))];
        int open = peaks.Length - sure.Length;
        string standing = sure.Length switch
        {
            0 => "no peak stands by itself",
            1 => "one peak stands by itself, at " + sure[0],
            _ => Check.Text($"{sure.Length} peaks stand by themselves, at {string.Join(", ", sure[..^1])} and {sure[^1]}"),
        };
        return Check.Text($"With h = {h} {standing}{(open > 0 ? Check.Text($"; {open} more may be chance") : "")}.");
    }
}
