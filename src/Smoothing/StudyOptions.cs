using Smoothing.Bandwidths;
using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing;

/// <summary>What a <see cref="DensityStudy"/> is asked, beyond the values. Every default is usable.</summary>
public sealed record StudyOptions
{
    /// <summary>Name of the quantity in the report, such as "Turnaround time"; default: the sample's, or "values".</summary>
    public string Name { get; init; } = "";

    /// <summary>Unit of the values, such as "min"; default: the sample's, or none.</summary>
    public string Unit { get; init; } = "";

    /// <summary>The kernel. Default <see cref="Kernel.Gaussian"/>: smooth curves, and the one whose intervals were tested most.</summary>
    public Kernel Kernel { get; init; } = Kernel.Gaussian;

    /// <summary>Which rule chooses the bandwidth. Default <see cref="BandwidthRule.Automatic"/>; ignored when <see cref="Bandwidth"/> is given.</summary>
    public BandwidthRule Rule { get; init; } = BandwidthRule.Automatic;

    /// <summary>A bandwidth of the caller's own, positive and finite, in the unit of the data; null (the default) lets <see cref="Rule"/> choose.</summary>
    public double? Bandwidth { get; init; }

    /// <summary>Known limits of the range, such as [0, ∞) for durations; null (the default) for none.</summary>
    public Interval? Support { get; init; }

    /// <summary>How the curve is mended near a limit. Default <see cref="BoundaryCorrection.LinearKernel"/>; ignored without <see cref="Support"/>.</summary>
    public BoundaryCorrection Boundary { get; init; } = BoundaryCorrection.LinearKernel;

    /// <summary>Confidence level of intervals and bands, in (0, 1). Default 0.95.</summary>
    public double Level { get; init; } = 0.95;

    /// <summary>Limits the reader asks about: the share of values beyond each is reported. Finite; default none.</summary>
    public IReadOnlyList<double> Limits { get; init; } = [];

    /// <summary>Probabilities whose quantiles are reported, each in (0, 1). Default 0.5, 0.9 and 0.95.</summary>
    public IReadOnlyList<double> Probabilities { get; init; } = [0.5, 0.9, 0.95];

    /// <summary>One weight per value, or empty (the default).</summary>
    public ReadOnlyMemory<double> Weights { get; init; }

    /// <summary>What the weights mean. Default <see cref="WeightMeaning.Relative"/>.</summary>
    public WeightMeaning WeightMeaning { get; init; } = WeightMeaning.Relative;

    /// <summary>What happens to NaN. Default <see cref="MissingValues.Reject"/>.</summary>
    public MissingValues Missing { get; init; } = MissingValues.Reject;

    /// <summary>Whether the values stand in the order of time: dependence between neighbours is then looked for and allowed for. Default false.</summary>
    public bool TimeOrdered { get; init; }

    /// <summary>An earlier period, another site: values that the studied ones are compared with, in the same unit; null (the default) for no comparison.</summary>
    public Sample? Reference { get; init; }

    /// <summary>The same as plain values, read as <see cref="Missing"/> says; empty (the default) for no comparison. Give this or <see cref="Reference"/>, not both.</summary>
    public ReadOnlyMemory<double> ReferenceValues { get; init; }

    /// <summary>What the reference is called in the report, such as "last quarter". Default "the reference".</summary>
    public string ReferenceName { get; init; } = "";

    /// <summary>Seed of every random step (groups, comparison): the same seed gives the same report. Default 1.</summary>
    public ulong Seed { get; init; } = 1;

    /// <summary>Points at which the curve and its band are tabulated, 51 to 10,001. Default 401.</summary>
    public int Points { get; init; } = 401;

    /// <summary>
    /// Told the share of the work done, never falling: to 0.3 while the study is made, to 1 as its costly parts (groups, comparison) are first asked for, by a report
    /// or by name. Null (the default) for nobody.
    /// </summary>
    public IProgress<double>? Progress { get; init; }

    /// <summary>Stops long steps early with <see cref="OperationCanceledException"/>, also those that run when a part is first asked for.</summary>
    public CancellationToken Cancellation { get; init; }
}
