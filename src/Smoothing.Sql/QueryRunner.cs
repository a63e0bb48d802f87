using System.Data;
using System.Data.Common;

namespace Smoothing.Sql;

/// <summary>Runs the two queries on one connection, synchronously or not, and leaves the connection as it was.</summary>
internal static class QueryRunner
{
    public static async ValueTask<List<ColumnRange>> Ranges(bool async, DbConnection connection, ColumnSource source, TableOptions options, CancellationToken cancellation)
    {
        // SQLite sums text as 0: its types are asked row by row. Other engines type whole columns.
        bool rowTyped = connection.GetType().Name.Contains("Sqlite", StringComparison.OrdinalIgnoreCase);
        IdentifierQuotes quotes = IdentifierQuotes.Of(connection);
        if (!rowTyped)
        {
            await CheckTypes(async, connection, source, options, quotes, cancellation).ConfigureAwait(false);
        }

        var ranges = new List<ColumnRange>();
        string sql = new RangeQuery(source).ToSql(quotes, rowTyped ? "case when typeof({0}) in ('text', 'blob') then 1 else 0 end" : null);
        await Read(async, connection, source, options, sql, CommandBehavior.Default, reader => ranges.Add(Range(reader, source)), cancellation).ConfigureAwait(false);
        return ranges;
    }

    public static async ValueTask Cells(
        bool async, DbConnection connection, ColumnSource source, TableOptions options, CellQuery query, Action<CellRow> add, CancellationToken cancellation) =>
        await Read(
            async, connection, source, options, query.ToSql(IdentifierQuotes.Of(connection)), CommandBehavior.Default, reader => add(Row(reader, query)), cancellation).ConfigureAwait(false);

    public static CellRow Row(DbDataReader reader, CellQuery query)
    {
        int at = query.KeyCount;
        int expected = at + 2 + query.Moments + 3 + (2 * query.Limits.Length);
        if (reader.FieldCount != expected)
        {
            throw new ArgumentException(SourceChecks.Text($"the reader must hold {expected} columns, but holds {reader.FieldCount}: run the SQL as ToSql() gives it."), nameof(reader));
        }

        var keys = new object?[at];
        for (int i = 0; i < at; i++)
        {
            keys[i] = reader.IsDBNull(i) ? null : reader.GetValue(i);
        }

        long cell = RowReading.Long(reader, at);
        long count = RowReading.Long(reader, at + 1);
        var sums = new double[query.Moments];
        for (int j = 0; j < sums.Length; j++)
        {
            sums[j] = RowReading.Double(reader, at + 2 + j);
        }

        at += 2 + query.Moments;
        var below = new double[query.Limits.Length];
        var on = new double[query.Limits.Length];
        for (int i = 0; i < below.Length; i++)
        {
            below[i] = RowReading.Double(reader, at + 3 + (2 * i));
            on[i] = RowReading.Double(reader, at + 4 + (2 * i));
        }

        return new CellRow
        {
            Keys = keys,
            Cell = cell,
            Count = count,
            Sums = sums,
            SquaredWeights = RowReading.Double(reader, at),
            Low = RowReading.Double(reader, at + 1),
            High = RowReading.Double(reader, at + 2),
            Below = below,
            At = on,
        };
    }

    private static ColumnRange Range(DbDataReader reader, ColumnSource source)
    {
        var key = new object?[source.Groups.Count];
        for (int i = 0; i < key.Length; i++)
        {
            key[i] = reader.IsDBNull(i) ? null : reader.GetValue(i);
        }

        int groups = source.Groups.Count + source.SplitBy.Count;
        double weight = RowReading.Double(reader, groups + 8);
        return new ColumnRange
        {
            Group = key,
            Rows = RowReading.Long(reader, groups),
            Missing = RowReading.Long(reader, groups + 1),
            NotFinite = RowReading.Long(reader, groups + 2),
            Kept = RowReading.Long(reader, groups + 3),
            BadWeights = RowReading.Long(reader, groups + 4),
            Weightless = RowReading.Long(reader, groups + 5),
            Low = RowReading.Double(reader, groups + 6),
            High = RowReading.Double(reader, groups + 7),
            Weight = double.IsNaN(weight) ? 0 : weight,
            Mean = weight > 0 ? RowReading.Double(reader, groups + 9) / weight : double.NaN,
            Texts = RowReading.Long(reader, groups + 10),
            TextWeights = RowReading.Long(reader, groups + 11),
        };
    }

    private static async ValueTask CheckTypes(bool async, DbConnection connection, ColumnSource source, TableOptions options, IdentifierQuotes quotes, CancellationToken cancellation)
    {
        string weight = source.Weight is null ? "" : ", t." + quotes.Quote(source.Weight) + " as w";
        string none = string.IsNullOrWhiteSpace(source.Filter) ? "where" : "and";
        string sql = $"select t.{quotes.Quote(source.Value)} as x{weight}\n  {SqlText.From(source, quotes)} {none} 1 = 0";
        (Type? Type, string? Name) value = default, weights = (typeof(double), "");
        await Read(async, connection, source, options, sql, CommandBehavior.Default, _ => { }, cancellation, reader =>
        {
            value = (reader.GetFieldType(0), reader.GetDataTypeName(0));
            weights = source.Weight is null ? weights : (reader.GetFieldType(1), reader.GetDataTypeName(1));
        }).ConfigureAwait(false);
        Numeric(source.Value, value.Type, value.Name ?? "unknown", source);
        Numeric(source.Weight ?? "", weights.Type, weights.Name ?? "unknown", source);
    }

    private static void Numeric(string column, Type? type, string name, ColumnSource source)
    {
        bool numeric = type == typeof(double) || type == typeof(float) || type == typeof(decimal) || type == typeof(long) || type == typeof(int) || type == typeof(short)
            || type == typeof(sbyte) || type == typeof(byte) || type == typeof(ushort) || type == typeof(uint) || type == typeof(ulong) || type == typeof(System.Numerics.BigInteger);
        if (!numeric)
        {
            throw new ArgumentException(
                SourceChecks.Text($"column '{column}' of {SourceChecks.Describe(source)} must be numeric, but is {name}: name another column, or convert it in a Query."), nameof(source));
        }
    }

    private static async ValueTask Read(
        bool async,
        DbConnection connection,
        ColumnSource source,
        TableOptions options,
        string sql,
        CommandBehavior behavior,
        Action<DbDataReader> row,
        CancellationToken cancellation,
        Action<DbDataReader>? header = null)
    {
        bool opened = connection.State != ConnectionState.Open;
        if (opened)
        {
            if (async)
            {
                await connection.OpenAsync(cancellation).ConfigureAwait(false);
            }
            else
            {
                connection.Open();
            }
        }

        try
        {
            using DbCommand command = Command(connection, source, options, sql);
            using DbDataReader reader = async
                ? await command.ExecuteReaderAsync(behavior, cancellation).ConfigureAwait(false)
                : command.ExecuteReader(behavior);
            header?.Invoke(reader);
            while (async ? await reader.ReadAsync(cancellation).ConfigureAwait(false) : reader.Read())
            {
                cancellation.ThrowIfCancellationRequested();
                row(reader);
            }
        }
        finally
        {
            if (opened)
            {
                connection.Close();
            }
        }
    }

    private static DbCommand Command(DbConnection connection, ColumnSource source, TableOptions options, string sql)
    {
        DbCommand command = connection.CreateCommand();
#pragma warning disable CA2100 // Names are quoted; Query and Filter are the caller's own SQL, as their documentation says.
        command.CommandText = sql;
#pragma warning restore CA2100
        command.Transaction = options.Transaction;
        if (options.CommandTimeout is TimeSpan limit)
        {
            command.CommandTimeout = (int)Math.Ceiling(limit.TotalSeconds);
        }

        foreach ((string name, object? value) in source.Parameters)
        {
            DbParameter parameter = command.CreateParameter();
            parameter.ParameterName = name;
            parameter.Value = value ?? DBNull.Value;
            command.Parameters.Add(parameter);
        }

        return command;
    }
}
