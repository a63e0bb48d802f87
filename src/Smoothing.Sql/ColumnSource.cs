using Smoothing.Samples;

namespace Smoothing.Sql;

/// <summary>Where the values are: a table or a query, its value column, and what goes with it.</summary>
/// <remarks>
/// Names of tables and columns are quoted and may hold anything but a NUL character. <see cref="Query"/> and <see cref="Filter"/> are
/// SQL of yours that is run as it stands: never build them from what a user typed; pass such things as <see cref="Parameters"/>.
/// </remarks>
public sealed record ColumnSource
{
    /// <summary>Name of the table or view, unquoted. Either this or <see cref="Query"/>.</summary>
    public string? Table { get; init; }

    /// <summary>Schema of <see cref="Table"/>, unquoted; null for the connection's own.</summary>
    public string? Schema { get; init; }

    /// <summary>A SELECT of yours, without a closing semicolon. Trusted: it is run as it stands. Either this or <see cref="Table"/>.</summary>
    public string? Query { get; init; }

    /// <summary>Name of the column of values, unquoted. It must be numeric; NULL, NaN and infinite values are left out and counted.</summary>
    public required string Value { get; init; }

    /// <summary>Name of the column of weights, unquoted; null (the default) for equal weights. Finite, not negative, not NULL beside a value.</summary>
    public string? Weight { get; init; }

    /// <summary>What the weights mean. Default <see cref="WeightMeaning.Relative"/>; ignored without weights.</summary>
    public WeightMeaning WeightMeaning { get; init; } = WeightMeaning.Relative;

    /// <summary>Names of the columns to group by, unquoted: one condensed sample for each combination. Empty by default.</summary>
    public IReadOnlyList<string> Groups { get; init; } = [];

    /// <summary>
    /// Further columns to group by whose cells are then added together, unquoted: with the partition key among them an
    /// engine can aggregate on the nodes that hold the partitions. Empty by default; never changes the result.
    /// </summary>
    public IReadOnlyList<string> SplitBy { get; init; } = [];

    /// <summary>A condition of yours, such as <c>day &gt;= @from</c>. Trusted: it is run as it stands. Null for all rows.</summary>
    public string? Filter { get; init; }

    /// <summary>Parameters that <see cref="Query"/> and <see cref="Filter"/> use, by name as the provider wants it.</summary>
    public IReadOnlyDictionary<string, object?> Parameters { get; init; } = new Dictionary<string, object?>();
}
