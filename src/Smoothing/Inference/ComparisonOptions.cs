using Smoothing.Numerics;

namespace Smoothing.Inference;

/// <summary>Choices for <see cref="Comparison"/>.</summary>
public sealed record ComparisonOptions
{
    /// <summary>Confidence level in (0, 1) of bands and shifts; 1 less it is the significance level in words. Default 0.95.</summary>
    public double Level { get; init; } = 0.95;

    /// <summary>Permutations, 99 or more. Default 999: the smallest p-value is then 0.001.</summary>
    public int Permutations { get; init; } = 999;

    /// <summary>Probabilities in (0, 1) of the quantiles whose shift is stated. Default 0.1, 0.25, 0.5, 0.75, 0.9.</summary>
    public IReadOnlyList<double> Probabilities { get; init; } = [0.1, 0.25, 0.5, 0.75, 0.9];

    /// <summary>Stretch that the bands cover; null (the default) for the central 95 % of both samples together.</summary>
    public Interval? Range { get; init; }

    /// <summary>Places of the bands, 2 or more. Default 201.</summary>
    public int Points { get; init; } = 201;

    /// <summary>Known limits of both ranges; null for the whole line.</summary>
    public Interval? Support { get; init; }

    /// <summary>What the first sample is called in sentences; empty (the default) for its own name.</summary>
    public string FirstName { get; init; } = "";

    /// <summary>What the second sample is called in sentences; empty (the default) for its own name.</summary>
    public string SecondName { get; init; } = "";

    /// <summary>Stops long work early with <see cref="OperationCanceledException"/>.</summary>
    public CancellationToken Cancellation { get; init; }

    /// <summary>Told the share of the permutations done, from 0 to 1; null (the default) for nobody.</summary>
    public IProgress<double>? Progress { get; init; }
}
