namespace Smoothing.Samples;

/// <summary>How a <see cref="Sample"/> is read from a column of values.</summary>
public sealed record SampleOptions
{
    /// <summary>One weight per value, or empty (the default) for equal weights. Finite, not negative, not all zero.</summary>
    public ReadOnlyMemory<double> Weights { get; init; }

    /// <summary>What the weights mean. Default <see cref="WeightMeaning.Relative"/>; ignored without weights.</summary>
    public WeightMeaning WeightMeaning { get; init; } = WeightMeaning.Relative;

    /// <summary>What happens to NaN. Default <see cref="MissingValues.Reject"/>: nothing is lost without being said.</summary>
    public MissingValues Missing { get; init; } = MissingValues.Reject;

    /// <summary>Name of the quantity, for reports; empty when not given.</summary>
    public string Name { get; init; } = "";

    /// <summary>Unit of the values, for reports; empty when not given.</summary>
    public string Unit { get; init; } = "";
}
