using Smoothing.Numerics;

namespace Smoothing.Inference;

/// <summary>Choices for <see cref="Groups"/>.</summary>
public sealed record GroupOptions
{
    /// <summary>Significance level in (0, 1) at which "at most k peaks" is rejected. Default 0.05.</summary>
    public double Significance { get; init; } = 0.05;

    /// <summary>Confidence level in (0, 1) of the intervals for peaks. Default 0.95.</summary>
    public double Level { get; init; } = 0.95;

    /// <summary>Samples drawn for each test, 100 or more. Default 500: a p-value near 0.05 is then known to 0.01.</summary>
    public int Resamples { get; init; } = 500;

    /// <summary>The largest number of peaks that is tested against more, 1 to 20. Default 5.</summary>
    public int LargestTested { get; init; } = 5;

    /// <summary>Bandwidth of the curve whose peaks are described, in the unit of the data, for the Gaussian kernel. Null (the default): the default rule's.</summary>
    public double? Bandwidth { get; init; }

    /// <summary>Known limits of the range; null for the whole line. They matter for the bandwidth and the warnings.</summary>
    public Interval? Support { get; init; }

    /// <summary>Stops long work early with <see cref="OperationCanceledException"/>.</summary>
    public CancellationToken Cancellation { get; init; }

    /// <summary>Told the share of the work done, from 0 to 1; null (the default) for nobody.</summary>
    public IProgress<double>? Progress { get; init; }
}
