namespace Smoothing.Samples;

/// <summary>What travels beside cells that were computed elsewhere. Everything that is left out is worked out from the cells.</summary>
public sealed record CellTotals
{
    /// <summary>Number of values, weights aside. Null: Σw, which must then be whole.</summary>
    public long? Count { get; init; }

    /// <summary>Σw². Null: Σw, as without weights.</summary>
    public double? SquaredWeight { get; init; }

    /// <summary>Smallest value. Null: the lower edge of the first cell.</summary>
    public double? Minimum { get; init; }

    /// <summary>Largest value. Null: the upper edge of the last cell.</summary>
    public double? Maximum { get; init; }

    /// <summary>Number of missing values left out. Default 0.</summary>
    public long LeftOut { get; init; }

    /// <summary>Whether values had weights. Default false.</summary>
    public bool IsWeighted { get; init; }

    /// <summary>What the weights mean. Default <see cref="WeightMeaning.Relative"/>.</summary>
    public WeightMeaning WeightMeaning { get; init; } = WeightMeaning.Relative;

    /// <summary>Limits at which weights were counted. Empty by default.</summary>
    public IReadOnlyList<double> Limits { get; init; } = [];

    /// <summary>Weight below each limit.</summary>
    public IReadOnlyList<double> Below { get; init; } = [];

    /// <summary>Weight exactly at each limit.</summary>
    public IReadOnlyList<double> At { get; init; } = [];
}
