using System.Data.Common;

namespace Smoothing.Sql;

/// <summary>How a table is condensed.</summary>
public sealed record TableOptions
{
    /// <summary>
    /// Cell width in the unit of the data, rounded down to a power of two. Null (the default): from the range found in the first pass, into at most a quarter of
    /// <see cref="MaximumCells"/>; narrower, with further passes, where heavy tails would put the bulk into a few cells.
    /// </summary>
    public double? CellWidth { get; init; }

    /// <summary>Sums a cell gets, 2 to 16. Default 8: the curve to about 1e-14 for usual bandwidths; 2 is linear binning.</summary>
    public int Moments { get; init; } = 8;

    /// <summary>Limits at which values below and at are counted exactly, in the same query. Empty by default.</summary>
    public IReadOnlyList<double> Limits { get; init; } = [];

    /// <summary>The bandwidth you mean to use, in the unit of the data: with it, cells are 1/16 of it (1/4 with fewer than four moments), and a wider <see cref="CellWidth"/> is refused. Null: no check.</summary>
    public double? Bandwidth { get; init; }

    /// <summary>Most cells one group may bring home. Default 65,536, about 5 MB; above it an error asks for wider cells.</summary>
    public int MaximumCells { get; init; } = 65_536;

    /// <summary>Time limit of each query, in whole seconds rounded up; null for the provider's own.</summary>
    public TimeSpan? CommandTimeout { get; init; }

    /// <summary>A transaction that is open on the connection; only for a single connection.</summary>
    public DbTransaction? Transaction { get; init; }

    /// <summary>Hears the share of the work done, from 0 to 1: half of it after the first pass, each shard the same part of each pass.</summary>
    public IProgress<double>? Progress { get; init; }

    /// <summary>How many shards are asked at once. Default 1.</summary>
    public int ShardsAtOnce { get; init; } = 1;
}
