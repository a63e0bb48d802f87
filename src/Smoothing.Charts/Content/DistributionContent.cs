using Smoothing.Charts.Drawing;
using Smoothing.Inference;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Charts.Content;

/// <summary>The distribution function, smoothed and counted, with limits and quantiles and their intervals.</summary>
internal static class DistributionContent
{
    // More distinct values than this make a staircase that no eye resolves: it is then drawn through this many places.
    private const int MostSteps = 600;

    public static Sheet Of(DensityStudy study)
    {
        var view = new StudyView(study);
        List<Mark> marks = [LineMark.Straight(view.Range.Lower, 0, view.Range.Upper, 0, Tone.Quiet, 1)];
        var labels = new List<Label>();
        List<Key> keys = [new("share of the values up to here, smoothed", Tone.Curve, Swatch.Line, Width: 2.6f), new("counted", Tone.Third, Swatch.Line, Width: 1.2f)];
        (double[] stepX, double[] stepY) = Counted(study.Sample, view.Range);
        marks.Add(new LineMark(stepX, stepY, Tone.Third, 1.2f));
        (double[] x, double[] y) = Smoothed(view);
        marks.Add(new LineMark(x, y, Tone.Curve, 2.6f, KeepClear: true));
        foreach (LimitAnswer answer in study.Limits.Where(l => view.Range.Contains(l.Limit)).OrderBy(l => l.Limit))
        {
            // What lies beyond is counted from above: the interval of the share below mirrors it.
            double low = 100 * (1 - answer.Beyond.Interval.Upper);
            double high = 100 * (1 - answer.Beyond.Interval.Lower);
            marks.Add(LineMark.Straight(answer.Limit, 0, answer.Limit, 112, Tone.Limit, 1.8f, Dash.Long, keepClear: true));
            marks.Add(LineMark.Straight(answer.Limit, low, answer.Limit, high, Tone.Limit, 6));
            marks.Add(new PointMark(answer.Limit, 100 * (1 - answer.Beyond.Estimate), Tone.Limit, Shape.Diamond, 11));
            labels.Add(new Label(view.Beyond(answer), answer.Limit, 112, Standing.Top, Tone.Limit));
        }

        if (study.Limits.Count > 0)
        {
            keys.Add(new Key(Check.Text($"limit with {Words.Level(study.Options.Level)} interval"), Tone.Limit, Swatch.Point, Shape: Shape.Diamond));
        }

        foreach (QuantileEstimate quantile in study.Quantiles.Where(q => view.Range.Contains(q.Estimate)))
        {
            double height = 100 * quantile.Probability;
            double from = Math.Max(quantile.Interval.Lower, view.Range.Lower);
            double to = Math.Min(quantile.Interval.Upper, view.Range.Upper);
            marks.Add(LineMark.Straight(from, height, to, height, Tone.Second, 3.5f));
            marks.Add(new PointMark(quantile.Estimate, height, Tone.Second, Shape.Disc, 8));
        }

        if (study.Quantiles.Count > 0)
        {
            keys.Add(new Key("quantile with interval", Tone.Second, Swatch.Point));
        }

        return new Sheet
        {
            Title = Check.Text($"{view.Title}: distribution function"),
            Alternative = Alternative(view),
            Keys = keys,
            Panels = [new Panel { X = view.Axis, Y = AxisScale.Marked(-2, 113, [.. Enumerable.Range(0, 6).Select(i => (20.0 * i, Check.Text($"{20 * i}")))]), XCaption = view.Caption, YCaption = "% of the values up to here", Marks = marks, Labels = labels }],
            Notes = [view.Method + (study.Quantiles.Count > 0 ? " " + Words.Sentence(string.Join("; ", study.Quantiles.Select(q => Quantile(view, q)))) + "." : ""), .. view.FarLimits, .. study.Quantiles.Where(q => double.IsInfinity(q.Interval.Length)).Select(q => Check.Text($"{100 * q.Probability:0.###} %: {Words.Count(study.Sample.Count)} values set no {(double.IsPositiveInfinity(q.Interval.Upper) ? "upper" : "lower")} limit to it."))],
        };
    }

    /// <summary>Smoothed share up to each place, with the jumps of single values that hold a share of their own; in percent.</summary>
    internal static (double[] X, double[] Y) Smoothed(StudyView view)
    {
        DensityStudy study = view.Study;
        Interval support = study.Options.Support ?? Interval.WholeLine;
        Atom[] atoms = [.. study.Atoms.Where(a => view.Range.Contains(a.Value))];
        double[] places = [.. view.X.Prepend(view.Range.Lower).Append(view.Range.Upper).Concat(atoms.Select(a => a.Value)).Distinct().Order()];
        var smooth = new double[places.Length];
        study.Density.Cumulatives([.. places.Select(p => Math.Clamp(p, support.Lower, support.Upper))], smooth);
        var x = new List<double>();
        var y = new List<double>();
        for (int i = 0; i < places.Length; i++)
        {
            double below = (view.Share * smooth[i]) + study.Atoms.Where(a => a.Value < places[i]).Sum(a => a.Share);
            double at = study.Atoms.Where(a => a.Value == places[i]).Sum(a => a.Share);
            x.Add(places[i]);
            y.Add(100 * below);
            if (at > 0)
            {
                x.Add(places[i]);
                y.Add(100 * (below + at));
            }
        }

        return ([.. x], [.. y]);
    }

    /// <summary>The counted share up to each place, in percent, as a staircase.</summary>
    internal static (double[] X, double[] Y) Counted(Sample sample, Interval range)
    {
        ReadOnlySpan<double> values = sample.SortedValues;
        ReadOnlySpan<double> weights = sample.SortedWeights;
        List<double> x = [range.Lower];
        List<double> y = [0];
        double sum = 0;
        double step = range.Length / MostSteps;
        for (int i = 0; i < values.Length; i++)
        {
            sum += weights.IsEmpty ? 1 : weights[i];

            // Ties rise in one step; so do values closer than the eye could part.
            if (i + 1 < values.Length && (values[i + 1] == values[i] || values[i + 1] < x[^1] + step))
            {
                continue;
            }

            if (values[i] > range.Upper)
            {
                break;
            }

            double share = 100 * sum / sample.TotalWeight;
            if (values[i] >= range.Lower)
            {
                x.Add(values[i]);
                y.Add(y[^1]);
                x.Add(values[i]);
            }
            else
            {
                y.RemoveAt(y.Count - 1);
            }

            y.Add(share);
        }

        x.Add(range.Upper);
        y.Add(y[^1]);
        return ([.. x], [.. y]);
    }

    private static string Quantile(StudyView view, QuantileEstimate quantile)
    {
        double error = double.IsFinite(quantile.Interval.Length) ? quantile.Interval.Length / 2 : view.Study.Bandwidth;
        string Edge(double end) => double.IsInfinity(end) ? "no limit" : Words.Rounded(end, error);
        return Check.Text($"{100 * quantile.Probability:0.###} % up to {Words.WithUnit(Words.Rounded(quantile.Estimate, error), view.Unit)} ({Edge(quantile.Interval.Lower)} to {Edge(quantile.Interval.Upper)})");
    }

    private static string Alternative(StudyView view)
    {
        string[] parts = [.. view.Study.Quantiles.Select(q => Quantile(view, q)), .. view.Study.Limits.Select(view.Beyond)];
        return parts.Length == 0 ? "The share of the values up to each place." : Words.Sentence(string.Join("; ", parts)) + ".";
    }
}
