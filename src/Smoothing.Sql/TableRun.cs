using System.Data.Common;
using System.Runtime.ExceptionServices;

namespace Smoothing.Sql;

/// <summary>Both passes over one or several connections.</summary>
internal static class TableRun
{
    /// <summary>Ranges and cells of each group, in the order of the groups; no cells where a group holds no value.</summary>
    public static async ValueTask<List<(ColumnRange Range, CellTable? Cells)>> Run(
        bool async, IReadOnlyList<DbConnection> shards, ColumnSource source, TableOptions? options, bool grouped, CancellationToken cancellation)
    {
        options ??= new TableOptions();
        Checks.Before(shards, source, options, grouped);
        var progress = new ShardProgress(options.Progress, shards.Count);
        var found = new List<ColumnRange>[shards.Count];
        await Each(async, shards, options, progress, async (connection, at, token) =>
            found[at] = await QueryRunner.Ranges(async, connection, source, options, token).ConfigureAwait(false), cancellation).ConfigureAwait(false);
        var ranges = new Dictionary<GroupKey, ColumnRange>();
        foreach (ColumnRange range in found.SelectMany(list => list))
        {
            var key = new GroupKey(range.Group);
            ranges[key] = ranges.TryGetValue(key, out ColumnRange? known) ? known.Add(range) : range;
        }

        Checks.Ranges(ranges.Values, source);
        double width = Widths.Choose(ranges.Values, options);
        Dictionary<GroupKey, CellTable>? cells = await Cells(async, shards, source, options, width, true, progress, cancellation).ConfigureAwait(false);
        for (int round = 0; round < Widths.MostRounds && Widths.Narrower(width, cells!.Values, options, ranges.Values) is double narrower; round++)
        {
            Dictionary<GroupKey, CellTable>? finer = await Cells(async, shards, source, options, narrower, false, null, cancellation).ConfigureAwait(false);
            if (finer is null)
            {
                break;
            }

            (cells, width) = (finer, narrower);
        }

        return [.. ranges.Keys.Concat(cells!.Keys).Distinct().Order().Select(key =>
            (ranges.TryGetValue(key, out ColumnRange? known) ? known : new ColumnRange { Group = key.Values }, cells.GetValueOrDefault(key)))];
    }

    /// <summary>The cells of all groups at one width; null where there are too many and that is no error.</summary>
    private static async ValueTask<Dictionary<GroupKey, CellTable>?> Cells(
        bool async, IReadOnlyList<DbConnection> shards, ColumnSource source, TableOptions options, double width, bool must, ShardProgress? progress, CancellationToken cancellation)
    {
        var query = new CellQuery(source, width, options.Moments, options.Limits);

        // Each shard fills tables of its own, added in the order of the shards: the same sums whichever answers first.
        var parts = new Dictionary<GroupKey, CellTable>[shards.Count];
        try
        {
            await Each(async, shards, options, progress, async (connection, at, token) =>
            {
                var tables = new Dictionary<GroupKey, CellTable>();
                await QueryRunner.Cells(async, connection, source, options, query, row => Collect(tables, query, row, options.MaximumCells), token).ConfigureAwait(false);
                parts[at] = tables;
            }, cancellation).ConfigureAwait(false);
        }
        catch (TooManyCells) when (!must)
        {
            return null;
        }
        catch (TooManyCells)
        {
            throw new ArgumentException(
                SourceChecks.Text($"a group may fill at most {options.MaximumCells} cells, but fills more with cells of {width}: raise MaximumCells, or choose a CellWidth of {2 * width} or more."), nameof(options));
        }

        return Together(parts);
    }

    public static void Collect(Dictionary<GroupKey, CellTable> tables, CellQuery query, CellRow row, int maximum)
    {
        GroupKey key = query.GroupCount == 0 ? GroupKey.None : new GroupKey([.. row.Keys.Take(query.GroupCount)]);
        if (!tables.TryGetValue(key, out CellTable? table))
        {
            tables.Add(key, table = new CellTable(query.CellWidth, query.Moments, query.Limits.Length));
        }

        table.Add(row);
        if (table.Cells > maximum)
        {
            throw new TooManyCells();
        }
    }

    private static Dictionary<GroupKey, CellTable> Together(Dictionary<GroupKey, CellTable>[] parts)
    {
        var tables = new Dictionary<GroupKey, CellTable>();
        foreach ((GroupKey key, CellTable part) in parts.SelectMany(part => part))
        {
            if (tables.TryGetValue(key, out CellTable? table))
            {
                table.Add(part);
            }
            else
            {
                tables.Add(key, part);
            }
        }

        return tables;
    }

    private static async ValueTask Each(
        bool async, IReadOnlyList<DbConnection> shards, TableOptions options, ShardProgress? progress, Func<DbConnection, int, CancellationToken, ValueTask> work, CancellationToken cancellation)
    {
        using var stop = CancellationTokenSource.CreateLinkedTokenSource(cancellation);
        using var free = new SemaphoreSlim(options.ShardsAtOnce);
        Exception? first = null;
        async Task One(int at)
        {
            // The synchronous path runs shard after shard on the caller's thread.
            if (async)
            {
                await free.WaitAsync(stop.Token).ConfigureAwait(false);
            }

            try
            {
                // Some providers block inside their asynchronous calls; a thread each lets their shards run side by side.
                await (async && options.ShardsAtOnce > 1
                    ? Task.Run(async () => await work(shards[at], at, stop.Token).ConfigureAwait(false), stop.Token)
                    : work(shards[at], at, stop.Token).AsTask()).ConfigureAwait(false);
                progress?.Done();
            }
            catch (Exception error)
            {
                if (Interlocked.CompareExchange(ref first, error, null) is null && shards.Count > 1)
                {
                    error.Data["Shard"] = at;
                }

                await stop.CancelAsync().ConfigureAwait(false);
                throw;
            }
            finally
            {
                if (async)
                {
                    free.Release();
                }
            }
        }

        var running = new List<Task>();
        for (int i = 0; i < shards.Count; i++)
        {
            running.Add(One(i));
        }

        try
        {
            await Task.WhenAll(running).ConfigureAwait(false);
        }
        catch (Exception) when (first is not null)
        {
            cancellation.ThrowIfCancellationRequested();
            ExceptionDispatchInfo.Throw(first);
        }
    }

    /// <summary>Stops the reading of a shard; never leaves this class.</summary>
    private sealed class TooManyCells : Exception;
}
