namespace Smoothing.Sql;

/// <summary>One row of the answer to a <see cref="CellQuery"/>, for people who ran the SQL elsewhere.</summary>
public sealed record CellRow
{
    /// <summary>The values of the group columns, then of the split columns; empty where there are none.</summary>
    public IReadOnlyList<object?> Keys { get; init; } = [];

    /// <summary>k: the number of the cell [kδ, (k + 1)δ).</summary>
    public required long Cell { get; init; }

    /// <summary>n: number of rows in the cell, above 0.</summary>
    public required long Count { get; init; }

    /// <summary>m0, m1, …: Σw, Σwb, Σwb², … with b in [−1/2, 1/2).</summary>
    public required IReadOnlyList<double> Sums { get; init; }

    /// <summary>Σw²; the number of rows without weights.</summary>
    public required double SquaredWeights { get; init; }

    /// <summary>Smallest value in the cell.</summary>
    public required double Low { get; init; }

    /// <summary>Largest value in the cell.</summary>
    public required double High { get; init; }

    /// <summary>Weight below each limit; empty without limits.</summary>
    public IReadOnlyList<double> Below { get; init; } = [];

    /// <summary>Weight exactly at each limit; empty without limits.</summary>
    public IReadOnlyList<double> At { get; init; } = [];
}
