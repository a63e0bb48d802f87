using Smoothing.Charts.Drawing;
using Smoothing.Estimation;

namespace Smoothing.Charts.Content;

/// <summary>The curve with intervals, band, limits, peaks and values.</summary>
internal static class DensityContent
{
    // Limits of the band far above the curve would press it flat; they are cut off at this multiple of its height.
    private const double Highest = 2.2;

    public static Sheet Of(DensityStudy study)
    {
        var view = new StudyView(study);
        var marks = new List<Mark>();
        var labels = new List<Label>();
        var keys = new List<Key>();
        double cap = Highest * view.Top;
        double top = view.Top;
        if (study.Band is { } band)
        {
            double[] upper = [.. band.Upper.Select(y => Math.Min(100 * view.Share * y, cap))];
            marks.Add(new AreaMark(band.X, [.. band.Lower.Select(y => 100 * view.Share * y)], upper, Tone.Band));
            keys.Add(new Key(Check.Text($"{Words.Level(band.Level)} band, whole curve"), Tone.Band, Swatch.Area));
            top = Math.Max(top, upper.Max());
        }

        if (study.Uncertainty is { } trust)
        {
            double[] x = [.. view.X];
            var lower = new double[x.Length];
            var upper = new double[x.Length];
            trust.Intervals(x, lower, upper);
            marks.Add(new AreaMark(x, [.. lower.Select(y => Math.Min(100 * view.Share * y, cap))], [.. upper.Select(y => Math.Min(100 * view.Share * y, cap))], Tone.Interval));
            keys.Add(new Key(Check.Text($"{Words.Level(trust.Level)} interval at each place"), Tone.Interval, Swatch.Area));
            top = Math.Max(top, upper.Max(y => Math.Min(100 * view.Share * y, cap)));
        }

        // Room above the curve for the labels of peaks and limits, and below the axis for the values.
        int rows = 1 + Math.Min(study.Limits.Count, 4);
        double ceiling = Math.Max(top * 1.05, view.Top * (1.1 + (0.07 * rows)));
        double floor = -0.07 * ceiling;
        marks.Add(LineMark.Straight(view.Range.Lower, 0, view.Range.Upper, 0, Tone.Quiet, 1));
        marks.Add(new LineMark(view.X, view.Percent, Tone.Curve, 2.6f, KeepClear: true));
        keys.Insert(0, new Key("estimated density", Tone.Curve, Swatch.Line, Width: 2.6f));
        marks.Add(view.Strip(0.75 * floor, 0.15 * floor));
        keys.Add(new Key(study.Sample.Count == 1 ? "the value" : "the values", Tone.Strip, Swatch.Line, Dash.Dots, 6));
        foreach (Samples.Atom atom in study.Atoms.Where(a => view.Range.Contains(a.Value)))
        {
            marks.Add(LineMark.Straight(atom.Value, 0, atom.Value, 0.8 * view.Top, Tone.Limit, 4, keepClear: true));
            labels.Add(new Label(Check.Text($"exactly {Words.WithUnit(Words.AsGiven(atom.Value), view.Unit)}: {100 * atom.Share:F0} %"), atom.Value, 0.8 * view.Top, Standing.Beside, Tone.Limit));
        }

        view.AddLimits(0, ceiling, marks, labels);
        foreach (Peak peak in view.Peaks)
        {
            double height = 100 * view.Share * peak.Height;
            marks.Add(new PointMark(peak.Location, height, Tone.Curve, Shape.Disc, 8));
            labels.Add(new Label(view.Place(peak.Location), peak.Location, height, Standing.Above));
        }

        return new Sheet
        {
            Title = view.Title,
            Alternative = Alternative(view),
            Keys = keys,
            Panels = [new Panel { X = view.Axis, Y = AxisScale.Linear(floor, ceiling, 5, least: 0), XCaption = view.Caption, YCaption = view.DensityCaption, Marks = marks, Labels = labels }],
            Notes = [view.Method + (study.Uncertainty is null ? " No interval and no band: they take at least three values that are not all equal." : ""), .. view.FarLimits],
        };
    }

    /// <summary>One sentence on the shape and the limits.</summary>
    public static string Alternative(StudyView view)
    {
        string[] places = [.. view.Peaks.Select(p => view.Place(p.Location))];
        string shape = places.Length switch
        {
            0 => "a staircase",
            1 => "one peak, at " + places[0],
            _ => Check.Text($"{places.Length} peaks, at {string.Join(", ", places[..^1])} and {places[^1]}"),
        };
        string limits = string.Concat(view.Study.Limits.Select(l => "; " + view.Beyond(l)));
        return Check.Text($"The curve has {shape}{limits}.");
    }
}
