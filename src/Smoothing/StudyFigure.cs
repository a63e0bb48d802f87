using Smoothing.Estimation;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing;

/// <summary>Collects what the picture of a study shows.</summary>
internal static class StudyFigure
{
    // More ticks than this would run into one grey bar: values are then counted into as many strips.
    private const int MostTicks = 240;

    // Below this share of the highest point the curve hugs the axis, and a mark on it would say nothing.
    private const double Foot = 0.03;

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
            Biased = Biased(study),
            Limits = [.. study.Limits.Select(l => (l.Limit, Limit(study, l)))],
            Peaks = [.. StudyPeaks.Named(study).Where(p => study.Picture.Contains(p.Location)).Select(p => (p.Location, p.Height * share, StudyPeaks.Place(study, p.Location)))],
            Atoms = [.. study.Atoms.Select(a => (a.Value, Guard.Text($"{StudyNumbers.AsGiven(a.Value)}: {100 * a.Share:F0} %")))],
            Strip = Strip(study.CurveSample, study.Picture),
            Name = study.Name,
            Unit = study.Unit,
            Alternative = Alternative(study),
        };
    }

    // Stretches where the estimated bias is larger than half the width of the band.
    private static List<(double From, double To)> Biased(DensityStudy study)
    {
        var stretches = new List<(double, double)>();
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
                stretches.Add((x[start], x[i - 1]));
                start = -1;
            }
        }

        return stretches;
    }

    private static string Limit(DensityStudy study, LimitAnswer answer) =>
        Guard.Text($"above {StudyNumbers.WithUnit(StudyNumbers.AsGiven(answer.Limit), study.Unit)}: {StudyNumbers.Percent(answer.Beyond.Estimate, answer.Beyond.Interval.Length / 2)}");

    private static string Alternative(DensityStudy study)
    {
        IReadOnlyList<Peak> peaks = [.. StudyPeaks.Named(study).Where(p => study.Picture.Contains(p.Location))];
        string shape = peaks.Count == 0 ? "steps" : peaks.Count == 1
            ? Guard.Text($"one hump, highest near {StudyPeaks.Place(study, peaks[0].Location)}")
            : Guard.Text($"{StudyNumbers.CountWord(peaks.Count)} humps, near {string.Join(" and ", peaks.Take(4).Select(p => StudyPeaks.Place(study, p.Location)))}{(peaks.Count > 4 ? " and further on" : "")}");
        string limits = string.Concat(study.Limits.Select(l => Guard.Text($"; {StudyNumbers.Percent(l.Beyond.Estimate, l.Beyond.Interval.Length / 2)} of the values lie beyond {StudyNumbers.WithUnit(StudyNumbers.AsGiven(l.Limit), study.Unit)}")));
        return Guard.Text($"A curve with {shape}, between {StudyPeaks.Place(study, study.Picture.Lower)} and {StudyPeaks.Place(study, study.Picture.Upper)}{limits}.");
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
