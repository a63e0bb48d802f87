using System.Data.Common;
using Smoothing.Samples;

namespace Smoothing.Sql;

/// <summary>Condenses a column inside the database that holds it and brings home cell moments instead of rows.</summary>
/// <remarks>
/// <para>Two queries are run: a first pass for the type, the range and what is missing (<see cref="RangeQuery"/>), and the pass that sums the moments
/// of each cell (<see cref="CellQuery"/>). Lattice and width rule are those of <see cref="CondensedSample"/>, so samples from several
/// databases, several days and from values in process merge.</para>
/// <para>A connection that was closed is closed again; one that was open stays open and usable after an error. An error of the database
/// comes through as the provider's own exception, and nothing half-done is returned. Rows that change between the two passes are taken as
/// the second finds them; open a transaction where that matters.</para>
/// </remarks>
public static partial class TableCondenser
{
    /// <summary>Condenses a whole column.</summary>
    /// <param name="connection">The connection, open or not.</param>
    /// <param name="source">Table or query, columns, filter; no groups.</param>
    /// <param name="options">Cell width, moments, limits, time limit; null for the defaults.</param>
    /// <returns>The condensed sample and what was left out.</returns>
    /// <exception cref="ArgumentException">The source is unusable, a column is not numeric, no value is left, or weights are unusable.</exception>
    /// <exception cref="DbException">The database refuses or fails.</exception>
    /// <remarks>Cost: two scans in the engine; here a few hundred bytes a cell.</remarks>
    public static CondensedColumn Condense(DbConnection connection, ColumnSource source, TableOptions? options = null) =>
        Single(Run(false, [connection], source, options, false, CancellationToken.None).AsTask().GetAwaiter().GetResult());

    /// <summary>Condenses a whole column without blocking.</summary>
    /// <param name="connection">The connection, open or not.</param>
    /// <param name="source">Table or query, columns, filter; no groups.</param>
    /// <param name="options">Cell width, moments, limits, time limit; null for the defaults.</param>
    /// <param name="cancellation">Stops the query that is running.</param>
    /// <returns>The condensed sample and what was left out.</returns>
    /// <exception cref="ArgumentException">The source is unusable, a column is not numeric, no value is left, or weights are unusable.</exception>
    /// <exception cref="DbException">The database refuses or fails.</exception>
    /// <exception cref="OperationCanceledException">The token was cancelled.</exception>
    public static async Task<CondensedColumn> CondenseAsync(DbConnection connection, ColumnSource source, TableOptions? options = null, CancellationToken cancellation = default) =>
        Single(await Run(true, [connection], source, options, false, cancellation).ConfigureAwait(false));

    /// <summary>Condenses a column by the groups of its source: one curve for each.</summary>
    /// <param name="connection">The connection, open or not.</param>
    /// <param name="source">Table or query, columns, groups, filter.</param>
    /// <param name="options">Cell width, moments, limits, time limit; null for the defaults.</param>
    /// <returns>A condensed sample for each group.</returns>
    /// <exception cref="ArgumentException">The source is unusable or names no group, a column is not numeric, or weights are unusable.</exception>
    /// <exception cref="DbException">The database refuses or fails.</exception>
    /// <remarks>All groups share one cell width, from the range of all, so that they can be merged without being coarsened.</remarks>
    public static CondensedGroups CondenseGroups(DbConnection connection, ColumnSource source, TableOptions? options = null) =>
        Run(false, [connection], source, options, true, CancellationToken.None).AsTask().GetAwaiter().GetResult();

    /// <summary>Condenses a column by the groups of its source without blocking.</summary>
    /// <param name="connection">The connection, open or not.</param>
    /// <param name="source">Table or query, columns, groups, filter.</param>
    /// <param name="options">Cell width, moments, limits, time limit; null for the defaults.</param>
    /// <param name="cancellation">Stops the query that is running.</param>
    /// <returns>A condensed sample for each group.</returns>
    /// <exception cref="ArgumentException">The source is unusable or names no group, a column is not numeric, or weights are unusable.</exception>
    /// <exception cref="DbException">The database refuses or fails.</exception>
    /// <exception cref="OperationCanceledException">The token was cancelled.</exception>
    public static async Task<CondensedGroups> CondenseGroupsAsync(DbConnection connection, ColumnSource source, TableOptions? options = null, CancellationToken cancellation = default) =>
        await Run(true, [connection], source, options, true, cancellation).ConfigureAwait(false);

    /// <summary>Condenses a column that is spread over several databases, as if it lay in one.</summary>
    /// <param name="shards">One connection for each part, open or not.</param>
    /// <param name="source">Table or query, columns, filter; the same on each shard; no groups.</param>
    /// <param name="options">Cell width, moments, limits, time limit, progress, how many shards at once; null for the defaults.</param>
    /// <param name="cancellation">Stops all queries that are running.</param>
    /// <returns>The condensed sample of all parts and what was left out.</returns>
    /// <exception cref="ArgumentException">As for one connection, of all shards together.</exception>
    /// <exception cref="DbException">A shard refuses or fails: the others are stopped, nothing is returned, and <c>Data["Shard"]</c> holds the index of the shard.</exception>
    /// <exception cref="OperationCanceledException">The token was cancelled.</exception>
    public static async Task<CondensedColumn> CondenseShardsAsync(
        IReadOnlyList<DbConnection> shards, ColumnSource source, TableOptions? options = null, CancellationToken cancellation = default) =>
        Single(await Run(true, shards, source, options, false, cancellation).ConfigureAwait(false));

    /// <summary>Condenses, by groups, a column that is spread over several databases.</summary>
    /// <param name="shards">One connection for each part, open or not.</param>
    /// <param name="source">Table or query, columns, groups, filter; the same on each shard.</param>
    /// <param name="options">Cell width, moments, limits, time limit, progress, how many shards at once; null for the defaults.</param>
    /// <param name="cancellation">Stops all queries that are running.</param>
    /// <returns>A condensed sample for each group, over all parts.</returns>
    /// <exception cref="ArgumentException">As for one connection, of all shards together.</exception>
    /// <exception cref="DbException">A shard refuses or fails: the others are stopped, nothing is returned, and <c>Data["Shard"]</c> holds the index of the shard.</exception>
    /// <exception cref="OperationCanceledException">The token was cancelled.</exception>
    public static async Task<CondensedGroups> CondenseShardGroupsAsync(
        IReadOnlyList<DbConnection> shards, ColumnSource source, TableOptions? options = null, CancellationToken cancellation = default) =>
        await Run(true, shards, source, options, true, cancellation).ConfigureAwait(false);

    private static CondensedColumn Single(CondensedGroups groups) => groups.Groups[0];

    private static async ValueTask<CondensedGroups> Run(
        bool async, IReadOnlyList<DbConnection> shards, ColumnSource source, TableOptions? options, bool grouped, CancellationToken cancellation)
    {
        options ??= new TableOptions();
        return Wrapped(source, options.Limits, await TableRun.Run(async, shards, source, options, grouped, cancellation).ConfigureAwait(false));
    }

    private static CondensedGroups Wrapped(ColumnSource source, IReadOnlyList<double> limits, IEnumerable<(ColumnRange Range, CellTable? Cells)> parts)
    {
        var columns = new List<CondensedColumn>();
        var without = new List<ColumnRange>();
        foreach ((ColumnRange range, CellTable? cells) in parts)
        {
            if (cells is null)
            {
                without.Add(range);
            }
            else
            {
                columns.Add(new CondensedColumn(range, cells.ToSample(range, source.Weight is not null, source.WeightMeaning, limits)));
            }
        }

        return new CondensedGroups(columns.AsReadOnly(), without.AsReadOnly());
    }
}
