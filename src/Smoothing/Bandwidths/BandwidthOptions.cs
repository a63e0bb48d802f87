using Smoothing.Numerics;

namespace Smoothing.Bandwidths;

/// <summary>Settings of the bandwidth rules.</summary>
public sealed record BandwidthOptions
{
    /// <summary>Known limits of the range: the rule then works on the reflected sample. Null (the default): the whole line.</summary>
    public Interval? Support { get; init; }

    /// <summary>r: choose for the r-th derivative of the density, 0 (the default) to 4.</summary>
    public int Derivative { get; init; }

    /// <summary>The measure of spread that pilots and reference rules start from. Default <see cref="BandwidthScale.Robust"/>.</summary>
    public BandwidthScale Scale { get; init; } = BandwidthScale.Robust;

    /// <summary>Smallest bandwidth of the search, in the unit of the data, for the Gaussian kernel. Null: 1/500 of the largest, at least half the rounding step.</summary>
    public double? SmallestBandwidth { get; init; }

    /// <summary>Largest bandwidth of the search, in the unit of the data, for the Gaussian kernel. Null: a multiple of the robust scale times n^(−1/5) that each rule states.</summary>
    public double? LargestBandwidth { get; init; }

    /// <summary>The step the values were rounded to, in the unit of the data; 0 to treat them as not rounded. Null (the default): what the sample noticed, when more than 5 % of the observations are tied.</summary>
    public double? RoundingUnit { get; init; }

    /// <summary>Whether <see cref="BandwidthChoice.Objective"/> is filled, for a figure. Default false.</summary>
    public bool KeepObjective { get; init; }

    /// <summary>Fixed point: the derivative of the density that the recursion starts from, 4 to 10. Default 7, the variant whose error was measured.</summary>
    public int HighestDerivative { get; init; } = 7;

    /// <summary>Direct plug-in: number of estimated functionals, 1 to 3. Default 2.</summary>
    public int PlugInStages { get; init; } = 2;

    /// <summary>Cross-validations: take the global minimum in place of the largest local one. Default false.</summary>
    public bool GlobalMinimum { get; init; }
}
