using System.Data.Common;

namespace Smoothing.Sql;

/// <content>Rows of people who ran the SQL themselves.</content>
public static partial class TableCondenser
{
    /// <summary>Condensed samples from a reader over the answer to a query's SQL.</summary>
    /// <param name="reader">A reader before its first row; its columns in the order of <see cref="CellQuery.ToSql"/>. It is read to its end and left open.</param>
    /// <param name="query">The query whose SQL was run.</param>
    /// <returns>One sample a group; one with an empty key where there are no groups.</returns>
    /// <exception cref="ArgumentNullException">An argument is null.</exception>
    /// <exception cref="ArgumentException">There is no row, or a row can't be an answer to this query.</exception>
    /// <remarks>The same cell may come more than once, from several runs or partitions: such rows add up. What was missing is not known here.</remarks>
    public static CondensedGroups FromReader(DbDataReader reader, CellQuery query)
    {
        ArgumentNullException.ThrowIfNull(reader);
        ArgumentNullException.ThrowIfNull(query);
        return FromRows(Read(reader, query), query);
    }

    /// <summary>Condensed samples from the rows of the answer to a query's SQL.</summary>
    /// <param name="rows">The rows, in any order.</param>
    /// <param name="query">The query whose SQL was run.</param>
    /// <returns>One sample a group; one with an empty key where there are no groups.</returns>
    /// <exception cref="ArgumentNullException">An argument is null.</exception>
    /// <exception cref="ArgumentException">There is no row, or a row can't be an answer to this query.</exception>
    public static CondensedGroups FromRows(IEnumerable<CellRow> rows, CellQuery query)
    {
        ArgumentNullException.ThrowIfNull(rows);
        ArgumentNullException.ThrowIfNull(query);
        var tables = new Dictionary<GroupKey, CellTable>();
        foreach (CellRow row in rows)
        {
            if (row.Keys.Count != query.KeyCount)
            {
                throw new ArgumentException(SourceChecks.Text($"a row must hold {query.KeyCount} keys, but holds {row.Keys.Count}: groups come first, then splits."), nameof(rows));
            }

            TableRun.Collect(tables, query, row, int.MaxValue);
        }

        if (tables.Count == 0)
        {
            throw new ArgumentException("rows must hold at least one cell, but are empty: the table holds no usable value, or the reader was read before.", nameof(rows));
        }

        return Wrapped(query.Source, query.Limits, tables.OrderBy(pair => pair.Key).Select(pair => (Range(pair.Key, pair.Value), (CellTable?)pair.Value)));
    }

    private static ColumnRange Range(GroupKey key, CellTable cells) =>
        new() { Group = key.Values, Rows = cells.Count, Kept = cells.Count, Low = cells.Low, High = cells.High, Weight = cells.Weight, Mean = cells.Mean };

    private static IEnumerable<CellRow> Read(DbDataReader reader, CellQuery query)
    {
        while (reader.Read())
        {
            yield return QueryRunner.Row(reader, query);
        }
    }
}
