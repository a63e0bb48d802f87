using Smoothing.Charts.Drawing;
using Smoothing.Inference;
using Smoothing.Numerics;

namespace Smoothing.Charts.Content;

/// <summary>Two curves above, their difference with its band below.</summary>
internal static class DifferenceContent
{
    private const int FewestValues = 3;

    /// <summary>The comparison of two studies' samples; null where too few values allow none.</summary>
    public static ComparisonResult? Compare(DensityStudy first, DensityStudy second)
    {
        bool enough = Math.Min(first.Sample.Count, second.Sample.Count) >= FewestValues
            && Math.Min(first.Sample.Minimum, second.Sample.Minimum) < Math.Max(first.Sample.Maximum, second.Sample.Maximum);
        return enough
            ? Comparison.Of(first.Sample, second.Sample, second.Options.Seed, new ComparisonOptions { Level = second.Options.Level, Support = second.Options.Support, Cancellation = second.Options.Cancellation })
            : null;
    }

    public static Sheet Of(DensityStudy first, DensityStudy second, ComparisonResult? result)
    {
        var one = new StudyView(first);
        var two = new StudyView(second);
        string firstName = first.Name.Length > 0 ? first.Name : "first";
        string secondName = second.Name.Length > 0 ? second.Name : "second";
        var range = new Interval(Math.Min(one.Range.Lower, two.Range.Lower), Math.Max(one.Range.Upper, two.Range.Upper));
        AxisScale axis = AxisScale.Linear(range.Lower, range.Upper, 8);
        double top = 1.12 * Math.Max(one.Top, two.Top);
        string unit = one.Unit.Length > 0 ? one.Unit : two.Unit;
        var upper = new Panel
        {
            X = axis,
            Y = AxisScale.Linear(0, top, 4),
            YCaption = "% of the values per " + (unit.Length > 0 ? unit : "unit"),
            Share = 1.1,
            SharesX = true,
            Marks =
            [
                new LineMark(one.X, one.Percent, Tone.Second, 2.4f, Dash.Long),
                new LineMark(two.X, two.Percent, Tone.Curve, 2.6f),
            ],
        };
        return new Sheet
        {
            Title = Check.Text($"{firstName} and {secondName}"),
            Alternative = result?.Sentence ?? "Two curves; nothing can be said about their difference.",
            Keys =
            [
                new Key(Check.Text($"{firstName}, n = {Words.Count(first.Sample.Count)}"), Tone.Second, Swatch.Line, Dash.Long, 2.4f),
                new Key(Check.Text($"{secondName}, n = {Words.Count(second.Sample.Count)}"), Tone.Curve, Swatch.Line, Width: 2.6f),
                .. result is null ? Array.Empty<Key>() : [new Key(Check.Text($"{Words.Level(result.Band.Level)} band of the difference"), Tone.Band, Swatch.Area)],
            ],
            Panels = [upper, Lower(result, axis, unit, Check.Text($"{secondName} less {firstName}, % per {(unit.Length > 0 ? unit : "unit")}"))],
            Notes = result is null ? [] : [result.Sentence, .. result.Notes],
        };
    }

    private static Panel Lower(ComparisonResult? result, AxisScale axis, string unit, string words)
    {
        string caption = unit.Length > 0 ? unit : "value";
        if (result is null)
        {
            return new Panel { X = axis, Y = AxisScale.Marked(0, 1, []), XCaption = caption, Statement = "Whether and where the two differ cannot be said: each needs at least three values, not all equal." };
        }

        DifferenceBand band = result.Band;
        double[] low = [.. band.Lower.Select(y => 100 * y)];
        double[] high = [.. band.Upper.Select(y => 100 * y)];
        double bottom = Math.Min(low.Min(), 0);
        double top = Math.Max(high.Max(), 0);
        double margin = 0.3 * (top - bottom);
        List<Mark> marks = [];
        var labels = new List<Label>();
        foreach ((IReadOnlyList<Interval> stretches, Tone tone, string share) in new[] { (band.Higher, Tone.Up, "more"), (band.Lesser, Tone.Down, "fewer") })
        {
            foreach (Interval stretch in stretches)
            {
                int[] inside = [.. Enumerable.Range(0, band.X.Count).Where(i => stretch.Contains(band.X[i]))];
                marks.Add(new AreaMark([.. inside.Select(i => band.X[i])], [.. inside.Select(_ => 0.0)], [.. inside.Select(i => 100 * band.Difference[i])], tone));
                int middle = inside.MaxBy(i => Math.Abs(band.Difference[i]));
                labels.Add(new Label(share, band.X[middle], tone == Tone.Up ? high[middle] : low[middle], tone == Tone.Up ? Standing.Above : Standing.Beside));
            }
        }

        marks.Add(new AreaMark(band.X, low, high, Tone.Band));
        marks.Add(LineMark.Straight(axis.From, 0, axis.To, 0, Tone.Quiet, 1.4f, keepClear: true));
        marks.Add(new LineMark(band.X, [.. band.Difference.Select(y => 100 * y)], Tone.Trace, 2.2f, KeepClear: true));
        return new Panel
        {
            X = axis,
            Y = AxisScale.Linear(bottom - margin, top + margin, 4),
            XCaption = caption,
            YCaption = words,
            Marks = marks,
            Labels = labels,
        };
    }
}
