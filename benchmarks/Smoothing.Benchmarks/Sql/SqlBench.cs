using System.Data.Common;
using System.Diagnostics;
using System.Globalization;
using DuckDB.NET.Data;
using Smoothing.Samples;
using Smoothing.Sql;

namespace Smoothing.Benchmarks.Sql;

/// <summary>"-- sql [rows] [rounds]": a table in DuckDB condensed by the library against the same SQL run bare. Medians of interleaved rounds, in Markdown.</summary>
internal static class SqlBench
{
    public static int Run(string[] args)
    {
        CultureInfo.CurrentCulture = CultureInfo.InvariantCulture;
        int rows = args.Length > 0 ? int.Parse(args[0], CultureInfo.InvariantCulture) : 10_000_000;
        int rounds = args.Length > 1 ? int.Parse(args[1], CultureInfo.InvariantCulture) : 7;
        string folder = Directory.CreateTempSubdirectory("smoothing-sql-").FullName;
        try
        {
            using DbConnection whole = Table(folder, "whole", rows, 0.1), first = Table(folder, "first", rows / 2, 0.2), second = Table(folder, "second", rows / 2, 0.3);
            var source = new ColumnSource { Table = "obs", Value = "x" };
            var weighted = source with { Weight = "w" };
            double width = TableCondenser.Condense(whole, source).Sample.CellWidth;
            TableOptions eight = new() { CellWidth = width }, two = eight with { Moments = 2 }, both = eight with { ShardsAtOnce = 2 };
            (string Name, Action Work)[] cases =
            [
                ("bare SQL, both passes, eight moments", () => Bare(whole, source, width, 8)),
                ("library call, eight moments", () => TableCondenser.Condense(whole, source, eight)),
                ("bare SQL, both passes, two moments", () => Bare(whole, source, width, 2)),
                ("library call, two moments", () => TableCondenser.Condense(whole, source, two)),
                ("bare SQL, weighted, eight moments", () => Bare(whole, weighted, width, 8)),
                ("library call, weighted, eight moments", () => TableCondenser.Condense(whole, weighted, eight)),
                ("library call, two shards of half the rows, one at a time", () => TableCondenser.CondenseShardsAsync([first, second], source, eight).Wait()),
                ("library call, two shards of half the rows, both at once", () => TableCondenser.CondenseShardsAsync([first, second], source, both).Wait()),
                ("in process: the rows through a reader, then CondensedSampleBuilder", () => Streamed(whole, width)),
            ];
            var times = cases.Select(_ => new List<double>()).ToArray();
            for (int round = 0; round <= rounds; round++)
            {
                for (int i = 0; i < cases.Length; i++)
                {
                    long start = Stopwatch.GetTimestamp();
                    cases[i].Work();
                    if (round > 0)
                    {
                        times[i].Add(Stopwatch.GetElapsedTime(start).TotalMilliseconds);
                    }
                }
            }

            Report(cases, times, rows, rounds, width);
            Memory(whole, source, eight);
            Agreement(whole, source, width);
            return 0;
        }
        finally
        {
            Directory.Delete(folder, true);
        }
    }

    private static void Report((string Name, Action Work)[] cases, List<double>[] times, int rows, int rounds, double width)
    {
        double Median(int i) => times[i].Order().ElementAt(times[i].Count / 2);
        Console.WriteLine($"{rows:N0} rows, cells of {width}, one engine thread a connection, medians of {rounds} interleaved rounds after one warm-up.");
        Console.WriteLine();
        Console.WriteLine("| case | ms | ns a row | against the bare SQL of eight moments |");
        Console.WriteLine("|---|---|---|---|");
        for (int i = 0; i < cases.Length; i++)
        {
            Console.WriteLine($"| {cases[i].Name} | {Median(i):F0} | {Median(i) * 1e6 / rows:F1} | {Median(i) / Median(0):F2} |");
        }

        Console.WriteLine();
        double Ratio(int a, int b) => times[a].Zip(times[b], (x, y) => x / y).Order().ElementAt(rounds / 2);
        Console.WriteLine($"Library call / bare SQL, median of the ratios of one round: {Ratio(1, 0):F3} with eight moments, {Ratio(3, 2):F3} with two, {Ratio(5, 4):F3} weighted.");
        Console.WriteLine($"Eight moments / two, library call: {Ratio(1, 3):F2}. Two shards at once / one table: {Ratio(7, 1):F2}; one at a time: {Ratio(6, 1):F2}.");
    }

    private static void Memory(DbConnection whole, ColumnSource source, TableOptions options)
    {
        TableCondenser.Condense(whole, source, options);
        long before = GC.GetAllocatedBytesForCurrentThread();
        CondensedColumn column = TableCondenser.Condense(whole, source, options);
        long allocated = GC.GetAllocatedBytesForCurrentThread() - before;
        Console.WriteLine($"One call allocates {allocated / 1e6:F1} MB of managed memory in all, for {column.Sample.Cells.Length:N0} cells; the sample as bytes is {column.Sample.ToBytes().Length / 1e6:F2} MB.");
    }

    private static void Agreement(DbConnection whole, ColumnSource source, double width)
    {
        CondensedSample there = TableCondenser.Condense(whole, source, new TableOptions { CellWidth = width }).Sample, here = Streamed(whole, width);
        double worst = 0;
        for (int i = 0; i < here.Sums.Length; i++)
        {
            worst = Math.Max(worst, Math.Abs(there.Sums[i] - here.Sums[i]) / here.Sums[i - (i % here.Moments)]);
        }

        Console.WriteLine($"Same cells as in process: {there.Cells.SequenceEqual(here.Cells)}; largest difference of a moment over its cell's weight: {worst:E1}.");
    }

    private static void Bare(DbConnection connection, ColumnSource source, double width, int moments)
    {
        foreach (string sql in new[] { new RangeQuery(source).ToSql(), new CellQuery(source, width, moments).ToSql() })
        {
            using DbCommand command = connection.CreateCommand();
            command.CommandText = sql;
            using DbDataReader reader = command.ExecuteReader();
            while (reader.Read())
            {
                for (int i = 0; i < reader.FieldCount; i++)
                {
                    reader.GetValue(i);
                }
            }
        }
    }

    private static CondensedSample Streamed(DbConnection connection, double width)
    {
        var builder = new CondensedSampleBuilder(new CondensingOptions { CellWidth = width, Moments = 8 });
        var buffer = new double[4096];
        int filled = 0;
        using DbCommand command = connection.CreateCommand();
        command.CommandText = "select x from obs";
        using DbDataReader reader = command.ExecuteReader();
        while (reader.Read())
        {
            buffer[filled++] = reader.GetDouble(0);
            if (filled == buffer.Length)
            {
                builder.Add(buffer);
                filled = 0;
            }
        }

        builder.Add(buffer.AsSpan(0, filled));
        return builder.Build();
    }

    /// <summary>Two seeded groups of normal values, by the engine's own generator.</summary>
    private static DuckDBConnection Table(string folder, string name, int rows, double seed)
    {
        var connection = new DuckDBConnection($"DataSource={Path.Combine(folder, name)}.duckdb;threads=1");
        connection.Open();
        foreach (string sql in new[]
        {
            $"select setseed({seed})",
            $"create table obs as select case when random() < 0.4 then -3 + 0.7 * z else 2 + z end as x, 1 + i % 4 as w from (select i, sqrt(-2 * ln(1 - random())) * cos(2 * pi() * random()) as z from range({rows}) r(i))",
        })
        {
            using DbCommand command = connection.CreateCommand();
            command.CommandText = sql;
            command.ExecuteNonQuery();
        }

        return connection;
    }
}
