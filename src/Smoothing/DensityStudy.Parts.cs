using Smoothing.Bandwidths;
using Smoothing.Estimation;
using Smoothing.Inference;
using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing;

/// <content>Parts that cost time: each is worked out when it is first asked for, once, also when several threads ask.</content>
public sealed partial class DensityStudy
{
    private readonly StudyProgress _progress;
    private readonly Lazy<GroupEvidence?> _groups;
    private readonly Lazy<ComparisonResult?> _comparison;
    private readonly Lazy<SmoothingVariant?> _half;
    private readonly Lazy<SmoothingVariant?> _double;
    private readonly Lazy<SharpEstimate?> _sharp;

    /// <summary>What the values say about the number of groups, and intervals for each peak of the curve; null where bandwidths lie beyond 10^±60.</summary>
    /// <remarks>Tests at the level 1 − <see cref="StudyOptions.Level"/> (kept within 0.001 to 0.5), 500 resamples each, drawn with <see cref="StudyOptions.Seed"/>. The cost stops growing at ten thousand values.</remarks>
    public GroupEvidence? Groups => _groups.Value;

    /// <summary>The values that the studied ones are compared with; null without a reference.</summary>
    public Sample? Reference { get; }

    /// <summary>Whether and where the studied values differ from the reference (differences are studied less reference); null without a reference, and where either side has fewer than three values or all are equal.</summary>
    /// <remarks>Values with a share of their own are left out on both sides, as they are from the curve. 999 permutations, drawn with <see cref="StudyOptions.Seed"/>.</remarks>
    public ComparisonResult? Comparison => _comparison.Value;

    /// <summary>The change of the share beyond each asked limit against the reference; empty without one.</summary>
    public IReadOnlyList<LimitChange> LimitChanges { get; }

    /// <summary>The curve at half the bandwidth; null where <see cref="Peaks"/> is.</summary>
    public SmoothingVariant? AtHalf => _half.Value;

    /// <summary>The curve at double the bandwidth; null where <see cref="Peaks"/> is.</summary>
    public SmoothingVariant? AtDouble => _double.Value;

    /// <summary>How many values would give twice the precision.</summary>
    public PrecisionPlan Plan { get; }

    /// <summary>
    /// Another estimate of the same density whose error is smaller than any single bandwidth's, with ripples and without intervals: for reading heights and shares off a
    /// curve, not for counting peaks. Null where limits of the range are declared, which it does not know, and where values of one size only carry the curve.
    /// </summary>
    public SharpEstimate? Sharp => _sharp.Value;

    private GroupEvidence? FindGroups()
    {
        if (!StudySteps.IsModerate(Bandwidth))
        {
            return null;
        }

        GroupEvidence evidence = Inference.Groups.Of(CurveSample, Options.Seed, new GroupOptions
        {
            Significance = Math.Clamp(Math.Round(1 - Options.Level, 12), 0.001, 0.5),
            Level = Options.Level,
            Bandwidth = Options.Kernel.Order == 2 ? Bandwidth.EquivalentFor(Kernel.Gaussian) : null,
            Support = Options.Support,
            Cancellation = Options.Cancellation,
            Progress = _progress.For(StudyProgress.Part.Groups),
        });
        _progress.Report(StudyProgress.Part.Groups, 1);
        return evidence;
    }

    private ComparisonResult? Compare()
    {
        ComparisonResult? result = null;
        if (Reference is not null && StudyComparison.Obstacle(this) is null)
        {
            result = Inference.Comparison.Of(StudyAtoms.TakeOut(Reference).Others, CurveSample, Options.Seed, new ComparisonOptions
            {
                Level = Options.Level,
                Probabilities = Options.Probabilities.Count > 0 ? Options.Probabilities : new ComparisonOptions().Probabilities,
                Support = Options.Support,
                FirstName = StudyComparison.Name(this),
                SecondName = Name.Length > 0 ? Name : "the studied values",
                Cancellation = Options.Cancellation,
                Progress = _progress.For(StudyProgress.Part.Comparison),
            });
        }

        _progress.Report(StudyProgress.Part.Comparison, 1);
        return result;
    }

    private SmoothingVariant? Variant(double factor)
    {
        double h = Bandwidth * factor;
        if (Peaks is null)
        {
            return null;
        }

        PeakSummary summary = Density.Of(CurveSample, Options.Kernel, h, Density.Options).Peaks();
        return new SmoothingVariant(h, StudyPeaks.Named(summary).Count, summary.Highest.Location, summary.Highest.Height, summary.Highest.Height / Peaks.Highest.Height);
    }

    private SharpEstimate? Sharpen()
    {
        if (Options.Support is not null || CurveSample.Minimum == CurveSample.Maximum || !StudySteps.IsModerate(Bandwidth))
        {
            return null;
        }

        double h = Options.Kernel.Order == 2 ? Bandwidth.EquivalentFor(Kernel.Gaussian) : BandwidthRules.Automatic(CurveSample, Kernel.Gaussian);
        return SharpEstimate.Of(CurveSample, h, BandwidthRules.BlockSpectrum(CurveSample, Kernel.GaussianOfOrder(4)));
    }
}
