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

    /// <summary>Why no peaks are named; null where they are.</summary>
    public static string? Obstacle(DensityStudy study) => study.Peaks is null
        ? Guard.Text($"The {study.Options.Kernel.Name} kernel jumps, so the curve is a staircase and no peaks are named. Take a smoother kernel for peaks.")
        : null;

    /// <summary>The peaks of a curve; null where the kernel jumps.</summary>
    public static PeakSummary? Of(Density density)
    {
        double radius = density.Kernel.SupportRadius;
        return double.IsFinite(radius) && density.Kernel.Value(radius) != 0 ? null : density.Peaks();
    }

    public static IReadOnlyList<Peak> Named(PeakSummary summary)
    {
        double highest = summary.Highest.Height;
        return [.. summary.Peaks.Where(p => p.Height >= Visible * highest && p.Prominence >= Visible * highest)];
    }

    /// <summary>A place on the axis, to two digits of the bandwidth.</summary>
    public static string Place(DensityStudy study, double location) => StudyNumbers.WithUnit(StudyNumbers.Rounded(location, study.Bandwidth), study.Unit);

    /// <summary>A stretch of the axis as one says it, to the first digit that the bandwidth supports; one place where both ends are the same then.</summary>
    public static string Stretch(DensityStudy study, Interval stretch, string before, string middle)
    {
        string low = Around(study, stretch.Lower);
        string high = Around(study, stretch.Upper);
        return low == high ? "near " + StudyNumbers.WithUnit(low, study.Unit) : before + low + middle + StudyNumbers.WithUnit(high, study.Unit);
    }

    /// <summary>A place as one says it, to the first digit that the bandwidth supports, without unit.</summary>
    public static string Around(DensityStudy study, double location) => StudyNumbers.Rounded(location, 10 * study.Bandwidth);
}
