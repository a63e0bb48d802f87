namespace Smoothing.Samples;

/// <summary>How values are condensed into cell moments.</summary>
public sealed record CondensingOptions
{
    /// <summary>Cell width in the unit of the data, rounded down to a power of two. Null (the default): the smallest at which at most <see cref="MaximumCells"/> cells are occupied.</summary>
    public double? CellWidth { get; init; }

    /// <summary>Sums a cell gets, 2 to 16. Default 16; 8 for sums computed elsewhere; 2 is linear binning.</summary>
    public int Moments { get; init; } = 16;

    /// <summary>Most occupied cells, at least 16. Default 16,384: 2 MB with 16 moments.</summary>
    public int MaximumCells { get; init; } = 16_384;

    /// <summary>One weight per value, or empty (the default) for equal weights. Finite, not negative, not all zero.</summary>
    public ReadOnlyMemory<double> Weights { get; init; }

    /// <summary>What the weights mean. Default <see cref="WeightMeaning.Relative"/>; ignored without weights.</summary>
    public WeightMeaning WeightMeaning { get; init; } = WeightMeaning.Relative;

    /// <summary>What happens to NaN. Default <see cref="MissingValues.Reject"/>.</summary>
    public MissingValues Missing { get; init; } = MissingValues.Reject;

    /// <summary>Limits at which the weight below and at is counted exactly; finite, all different. Empty by default.</summary>
    public IReadOnlyList<double> Limits { get; init; } = [];
}
