using System.Data;
using System.Data.Common;
using System.Globalization;
using DuckDB.NET.Data;
using Microsoft.Data.Sqlite;

namespace Smoothing.Sql.Tests;

/// <summary>The two engines that run inside the test process, each with an empty database in memory.</summary>
internal static class Engines
{
    public static TheoryData<string> All => ["DuckDB", "SQLite"];

    public static DbConnection Open(string engine)
    {
        DbConnection connection = engine == "DuckDB" ? new DuckDBConnection("DataSource=:memory:") : new SqliteConnection("Data Source=:memory:");
        connection.Open();
        return connection;
    }

    public static void Run(this DbConnection connection, string sql, params object?[] values)
    {
        using DbCommand command = connection.CreateCommand();
        command.CommandText = sql;
        for (int i = 0; i < values.Length; i++)
        {
            DbParameter parameter = command.CreateParameter();
            parameter.ParameterName = string.Create(CultureInfo.InvariantCulture, $"p{i}");
            parameter.Value = values[i] ?? DBNull.Value;
            command.Parameters.Add(parameter);
        }

        command.ExecuteNonQuery();
    }

    /// <summary>A table "obs" with columns x, w (a whole number), g (text) and d (integer), filled in one transaction.</summary>
    public static void Fill(this DbConnection connection, IEnumerable<(double? X, double W, string G)> rows, string table = "obs")
    {
        connection.Run($"create table {table} (x double precision, w double precision, g text, d integer)");
        using DbTransaction transaction = connection.BeginTransaction();
        using DbCommand command = connection.CreateCommand();
        command.Transaction = transaction;
        int row = 0;
        foreach ((double? x, double w, string g)[] chunk in rows.Chunk(500))
        {
            command.CommandText = $"insert into {table} values " + string.Join(", ", chunk.Select(r =>
                string.Create(CultureInfo.InvariantCulture, $"({Literal(r.x, connection)}, {Literal(r.w, connection)}, '{r.g}', {row++ % 7})")));
            command.ExecuteNonQuery();
        }

        transaction.Commit();
    }

    public static string State(this DbConnection connection)
    {
        using DbCommand command = connection.CreateCommand();
        command.CommandText = "select 41 + 1";
        return connection.State == ConnectionState.Open ? Convert.ToString(command.ExecuteScalar(), CultureInfo.InvariantCulture)! : "closed";
    }

    private static string Literal(double? value, DbConnection connection) => value switch
    {
        null => "null",
        double.NaN => connection is DuckDBConnection ? "'NaN'::double" : "null",
        double.PositiveInfinity => connection is DuckDBConnection ? "'Infinity'::double" : "9e999",
        double.NegativeInfinity => connection is DuckDBConnection ? "'-Infinity'::double" : "-9e999",
        double number => number.ToString("E16", CultureInfo.InvariantCulture),
    };
}
