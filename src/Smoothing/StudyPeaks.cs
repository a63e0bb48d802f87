using Smoothing.Estimation;
using Smoothing.Numerics;

namespace Smoothing;

/// <summary>What the curve's peaks are called in the report.</summary>
internal static class StudyPeaks
{
    /// <summary>A peak below this share of the highest is a ripple that no reader would see.</summary>
    private const double Visible = 0.02;

    /// <summary>The peaks worth naming: at least 2 % as high as the highest, and standing out by as much.</summary>
    public static IReadOnlyList<Peak> Named(DensityStudy study)
    {
        return study.Peaks is { } summary ? Named(summary) : [];
    }

    public static string Sentence(DensityStudy study)
    {
        IReadOnlyList<Peak> peaks = Named(study);
        if (peaks.Count == 0)
        {
            return Guard.Text($"The {study.Options.Kernel.Name} kernel jumps, so the curve is a staircase and no peaks are named. Take a smoother kernel for peaks.");
        }

        if (peaks.Count == 1)
        {
            string place = Place(study, peaks[0].Location);
            string at = peaks[0].AtLimit ? "The curve is highest at its limit, " : "The curve has one peak, at ";
            return Guard.Text($"{at}{place}.");
        }

        var parts = peaks.Select(p => Guard.Text($"{Place(study, p.Location)} (about {100 * p.Mass * study.CurveShare:F0} % of the values lie under it)"));
        string named = Guard.Text($"The curve has {StudyNumbers.CountWord(peaks.Count)} peaks: {string.Join("; ", parts)}.");
        int atHalf = CountAt(study, study.Bandwidth / 2);
        int atDouble = CountAt(study, study.Bandwidth * 2);
        return named + Guard.Text($" With half the smoothing there are {StudyNumbers.CountWord(atHalf)}, with double {StudyNumbers.CountWord(atDouble)}: peaks that double smoothing removes are not established by the curve alone.");
    }

    /// <summary>How many peaks the reader would see at another bandwidth.</summary>
    public static int CountAt(DensityStudy study, double bandwidth)
    {
        Density density = Density.Of(study.CurveSample, study.Options.Kernel, bandwidth, study.Density.Options);
        return Named(density.Peaks()).Length;
    }

    /// <summary>The peaks of a curve; null where the kernel jumps.</summary>
    public static PeakSummary? Of(Density density)
    {
        double radius = density.Kernel.SupportRadius;
        return double.IsFinite(radius) && density.Kernel.Value(radius) != 0 ? null : density.Peaks();
    }

    private static Peak[] Named(PeakSummary summary)
    {
        double highest = summary.Highest.Height;
        return [.. summary.Peaks.Where(p => p.Height >= Visible * highest && p.Prominence >= Visible * highest)];
    }

    /// <summary>A place on the axis, to the digits that a tenth of the bandwidth supports.</summary>
    public static string Place(DensityStudy study, double location) => StudyNumbers.WithUnit(StudyNumbers.Rounded(location, study.Bandwidth), study.Unit);
}
