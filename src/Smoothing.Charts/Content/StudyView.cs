using Smoothing.Charts.Drawing;
using Smoothing.Estimation;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Charts.Content;

/// <summary>What several figures take from a study: the curve in percent, the stretch of the axis, labels of limits and peaks, the strip of values.</summary>
internal sealed class StudyView
{
    // Peaks lower than this share of the highest, or standing out by less, are ripples that no reader would see.
    private const double Visible = 0.02;
    private const int MostPeaks = 6;

    // A limit is drawn where the picture need not grow by more than this share to reach it; farther ones stand in the notes.
    private const double Reach = 0.35;

    // More ticks than this would run into one bar: values are then counted into as many strips.
    private const int MostTicks = 240;

    public StudyView(DensityStudy study)
    {
        Study = study;
        Share = study.CurveShare;
        X = study.Curve.X;
        Percent = [.. study.Curve.Y.Select(y => 100 * Share * y)];
        Top = Percent.Max() is > 0 and var top && double.IsFinite(top) ? top : 1;
        Range = Stretch(study);
    }

    public DensityStudy Study { get; }

    /// <summary>Share of the values that the curve describes.</summary>
    public double Share { get; }

    public IReadOnlyList<double> X { get; }

    /// <summary>The curve, in percent per unit.</summary>
    public double[] Percent { get; }

    /// <summary>Its highest value.</summary>
    public double Top { get; }

    /// <summary>The stretch of the axis: the study's picture, and limits and single values with a share of their own not far from it.</summary>
    public Interval Range { get; }

    public string Unit => Study.Unit;

    public string Title => Study.Name.Length > 0 ? Study.Name : "Distribution of the values";

    /// <summary>Words under the axis.</summary>
    public string Caption => Unit.Length > 0 ? Unit : Study.Name.Length > 0 ? Study.Name : "value";

    /// <summary>Words above the left axis of a density.</summary>
    public string DensityCaption => "% of the values per " + (Unit.Length > 0 ? Unit : "unit");

    /// <summary>The peaks that deserve a name, left to right.</summary>
    public IReadOnlyList<Peak> Peaks => Study.Peaks is not { } summary ? []
        : [.. summary.Peaks.Where(p => p.Height >= Visible * summary.Highest.Height && p.Prominence >= Visible * summary.Highest.Height && Range.Contains(p.Location))
            .OrderByDescending(p => p.Prominence).Take(MostPeaks).OrderBy(p => p.Location)];

    /// <summary>A place on the axis, to the digits that the bandwidth supports.</summary>
    public string Place(double x) => Words.WithUnit(Words.Rounded(x, Study.Bandwidth), Unit);

    /// <summary>n, kernel and bandwidth.</summary>
    public string Method => Check.Text($"n = {Words.Count(Study.Sample.Count)}; {Study.Options.Kernel.Name} kernel, h = {Words.WithUnit(Words.Three(Study.Bandwidth), Unit)} ({Words.Rule(Study.Bandwidth)}).");

    /// <summary>Words for one limit: its share and interval.</summary>
    public string Beyond(LimitAnswer answer) =>
        Check.Text($"above {Words.WithUnit(Words.AsGiven(answer.Limit), Unit)}: {Words.Percent(answer.Beyond)} ({Words.PercentRange(answer.Beyond)})");

    /// <summary>Notes for limits, and for single values with a share of their own, that lie outside the picture.</summary>
    public IEnumerable<string> FarLimits => Study.Atoms.Where(a => !Range.Contains(a.Value))
        .Select(a => Check.Text($"{100 * a.Share:F0} % of the values are exactly {Words.WithUnit(Words.AsGiven(a.Value), Unit)}, outside the picture.")).Concat(FarLimitsAlone);

    private IEnumerable<string> FarLimitsAlone => Study.Limits.Where(l => !Range.Contains(l.Limit))
        .Select(l => Check.Text($"The limit {Words.WithUnit(Words.AsGiven(l.Limit), Unit)} lies {(l.Limit > Range.Upper ? "right" : "left")} of the picture; {Beyond(l)}."));

    /// <summary>The axis of the values.</summary>
    public AxisScale Axis => AxisScale.Linear(Range.Lower, Range.Upper, 8);

    /// <summary>Vertical lines and labels for the limits inside the picture, up to a height.</summary>
    public void AddLimits(double bottom, double top, List<Mark> marks, List<Label> labels)
    {
        foreach (LimitAnswer answer in Study.Limits.Where(l => Range.Contains(l.Limit)).OrderBy(l => l.Limit))
        {
            marks.Add(LineMark.Straight(answer.Limit, bottom, answer.Limit, top, Tone.Limit, 2, Dash.Long, keepClear: true));
            labels.Add(new Label(Beyond(answer), answer.Limit, top, Standing.Top, Tone.Limit));
        }
    }

    /// <summary>Ticks for the values between two heights; many values become strips whose strength is their number.</summary>
    public Mark Strip(double bottom, double top)
    {
        SortedDictionary<double, double> strips = [];
        ReadOnlySpan<double> x = Study.Sample.SortedValues;
        ReadOnlySpan<double> w = Study.Sample.SortedWeights;
        double width = Range.Length / MostTicks;
        for (int i = 0; i < x.Length; i++)
        {
            if (Range.Contains(x[i]))
            {
                double at = x.Length <= MostTicks ? x[i] : Range.Lower + ((Math.Floor((x[i] - Range.Lower) / width) + 0.5) * width);
                strips[at] = strips.GetValueOrDefault(at) + (w.IsEmpty ? 1 : w[i]);
            }
        }

        double most = strips.Values.DefaultIfEmpty(1).Max();
        return new TickMarks([.. strips.Keys], [.. strips.Values.Select(v => (byte)(70 + (150 * Math.Sqrt(v / most))))], bottom, top, Tone.Strip);
    }

    private static Interval Stretch(DensityStudy study)
    {
        Interval picture = study.Picture;
        double reach = Reach * picture.Length;
        double low = picture.Lower;
        double high = picture.Upper;
        foreach (double limit in study.Limits.Select(l => l.Limit).Concat(study.Atoms.Select(a => a.Value)))
        {
            if (limit < picture.Lower && limit >= picture.Lower - reach)
            {
                low = Math.Min(low, limit - (0.03 * picture.Length));
            }

            if (limit > picture.Upper && limit <= picture.Upper + reach)
            {
                high = Math.Max(high, limit + (0.03 * picture.Length));
            }
        }

        return new Interval(low, high);
    }
}
