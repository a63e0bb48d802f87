using Smoothing.Estimation;
using Smoothing.Inference;
using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing;

/// <summary>Collects what the pictures of a study show.</summary>
internal static class StudyFigure
{
    // More ticks than this would run into one grey bar: values are then counted into as many strips.
    private const int MostTicks = 240;

    // Below this share of the highest point the curve hugs the axis, and a mark on it would say nothing.
    private const double Foot = 0.03;

    /// <summary>The picture of the report: curve, band, limits, peaks, data.</summary>
    public static FigureModel Of(DensityStudy study)
    {
        double share = study.CurveShare;
        return new FigureModel
        {
            X = study.Curve.X,
            Y = [.. study.Curve.Y.Select(y => y * share)],
            Lower = study.Band is null ? [] : [.. study.Band.Lower.Select(y => y * share)],
            Upper = study.Band is null ? [] : [.. study.Band.Upper.Select(y => y * share)],
            BandWords = Guard.Text($"{StudyNumbers.AsGiven(Math.Round(100 * study.Options.Level, 10))} % band"),
            Corrected = study.Band is null ? [] : [.. study.Band.Centre.Select(y => y * share)],
            Biased = [.. Biased(study).Select(b => (b.Lower, b.Upper))],
            Limits = [.. study.Limits.Select(l => (l.Limit, Limit(study, l)))],
            Peaks = [.. Seen(study).Select(p => (p.Location, p.Height * share, Around(study, p.Location)))],
            Atoms = [.. study.Atoms.Select(a => (a.Value, Guard.Text($"{StudyNumbers.WithUnit(StudyNumbers.AsGiven(a.Value), study.Unit)}: {100 * a.Share:F0} % (not to scale)")))],
            Strip = Strip(study.CurveSample, study.Picture),
            Name = study.Name,
            Unit = study.Unit,
            Alternative = Alternative(study),
        };
    }

    /// <summary>The picture of a comparison: both curves as the test smoothed them, and where they differ beyond chance; null without a comparison.</summary>
    public static FigureModel? Compared(DensityStudy study)
    {
        if (study.Comparison is not { } result)
        {
            return null;
        }

        Sample reference = StudyAtoms.TakeOut(study.Reference!).Others;
        Interval other = StudySteps.PictureRange(reference, result.Band.FirstBandwidth, study.Options);
        var range = new Interval(Math.Min(study.Picture.Lower, other.Lower), Math.Max(study.Picture.Upper, other.Upper));
        double[] x = StudySteps.Grid(range, study.Options.Points);
        DensityOptions? limits = study.Options.Support is { } support ? new DensityOptions { Support = support } : null;
        var now = new double[x.Length];
        var before = new double[x.Length];
        Density.Of(study.CurveSample, Kernel.Gaussian, result.Band.SecondBandwidth, limits).Values(x, now);
        Density.Of(reference, Kernel.Gaussian, result.Band.FirstBandwidth, limits).Values(x, before);
        string name = StudyComparison.Name(study);
        (double, double, bool)[] different =
        [
            .. result.Band.Higher.Select(s => (s.Lower, s.Upper, true)),
            .. result.Band.Lesser.Select(s => (s.Lower, s.Upper, false)),
        ];
        return new FigureModel
        {
            X = x,
            Y = now,
            CurveWords = "now",
            Second = before,
            SecondWords = name,
            Different = different,
            Limits = [.. study.Limits.Select(l => (l.Limit, StudyNumbers.WithUnit(StudyNumbers.AsGiven(l.Limit), study.Unit)))],
            Name = study.Name,
            Unit = study.Unit,
            Alternative = Guard.Text($"Two curves, the studied values ({StudyNumbers.Count(StudySteps.Observations(study.Sample))}) as a line and {name} ({StudyNumbers.Count(StudySteps.Observations(study.Reference!))}) dashed{(different.Length == 0 ? "; nowhere do they differ beyond chance." : "; marks under the axis show where they differ beyond chance.")}"),
        };
    }

    /// <summary>Stretches where the estimated bias is larger than half the width of the band.</summary>
    public static IReadOnlyList<Interval> Biased(DensityStudy study)
    {
        var stretches = new List<Interval>();
        if (study.Band is not { } band || study.Uncertainty is not { } trust)
        {
            return stretches;
        }

        double[] x = [.. band.X];
        var bias = new double[x.Length];
        trust.Biases(x, bias);
        double top = study.Curve.Y.Max();
        int start = -1;
        for (int i = 0; i <= x.Length; i++)
        {
            bool beyond = i < x.Length && study.Curve.Y[i] > Foot * top && Math.Abs(bias[i]) > (band.Upper[i] - band.Lower[i]) / 2;
            if (beyond && start < 0)
            {
                start = i;
            }
            else if (!beyond && start >= 0)
            {
                // Shorter than half a bandwidth it is too short to see or to say.
                if (x[i - 1] - x[start] >= study.Bandwidth / 2)
                {
                    stretches.Add(new Interval(x[start], x[i - 1]));
                }

                start = -1;
            }
        }

        return stretches;
    }

    // More marks than the table has rows would hide the curve.
    private static IEnumerable<Peak> Seen(DensityStudy study) =>
        StudyGroups.Outstanding(StudyPeaks.Named(study), StudyGroups.MostListed).Where(p => study.Picture.Contains(p.Location)).OrderBy(p => p.Location);

    private static string Around(DensityStudy study, double place) => StudyNumbers.WithUnit(StudyPeaks.Around(study, place), study.Unit);

    private static string Limit(DensityStudy study, LimitAnswer answer) =>
        Guard.Text($"above {StudyNumbers.WithUnit(StudyNumbers.AsGiven(answer.Limit), study.Unit)}: {StudyNumbers.Percent(answer.Beyond.Estimate, answer.Beyond.Interval.Length / 2)}");

    private static string Alternative(DensityStudy study)
    {
        Peak[] peaks = [.. StudyPeaks.Named(study).Where(p => study.Picture.Contains(p.Location))];
        string[] places = [.. peaks.Take(4).Select(p => StudyPeaks.Around(study, p.Location))];
        string shape = peaks.Length == 0 ? "steps" : peaks.Length == 1
            ? Guard.Text($"one hump, highest near {Around(study, peaks[0].Location)}")
            : Guard.Text($"{StudyNumbers.CountWord(peaks.Length)} humps, near {StudyNumbers.WithUnit(StudyNumbers.Listed(places), study.Unit)}{(peaks.Length > 4 ? " and further on" : "")}");
        string limits = string.Concat(study.Limits.Take(4).Select(l => Guard.Text($"; {StudyNumbers.Percent(l.Beyond.Estimate, l.Beyond.Interval.Length / 2)} of the values lie above {StudyNumbers.WithUnit(StudyNumbers.AsGiven(l.Limit), study.Unit)}")));
        return Guard.Text($"A curve with {shape}, drawn from {StudyPeaks.Around(study, study.Picture.Lower)} to {Around(study, study.Picture.Upper)}{limits}.");
    }

    private static List<(double X, double Weight)> Strip(Sample sample, Interval picture)
    {
        ReadOnlySpan<double> x = sample.SortedValues;
        ReadOnlySpan<double> w = sample.SortedWeights;
        double width = picture.Length / MostTicks;
        var strips = new SortedDictionary<double, double>();
        for (int i = 0; i < x.Length; i++)
        {
            if (picture.Contains(x[i]) && width > 0)
            {
                double at = sample.Count <= MostTicks ? x[i] : picture.Lower + ((Math.Floor((x[i] - picture.Lower) / width) + 0.5) * width);
                strips[at] = strips.GetValueOrDefault(at) + (w.IsEmpty ? 1 : w[i]);
            }
        }

        return [.. strips.Select(s => (s.Key, s.Value))];
    }
}
