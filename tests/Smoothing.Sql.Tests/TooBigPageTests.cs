using System.Data.Common;
using DuckDB.NET.Data;
using Microsoft.Data.Sqlite;
using Smoothing.Estimation;
using Smoothing.Kernels;
using Smoothing.Samples;

namespace Smoothing.Sql.Tests;

/// <summary>The examples of docs/too-big.md, run; and a check that the page shows just these.</summary>
public class TooBigPageTests
{
    [Fact]
    public void Page_EveryBlock_IsCodeThatRunsHere()
    {
        string[] code = Trimmed(File.ReadAllLines(Path.Combine(AppContext.BaseDirectory, "TooBigPageTests.cs")));
        string[] page = File.ReadAllLines(Path.Combine(AppContext.BaseDirectory, "too-big.md"));
        int blocks = 0;
        for (int i = 0; i < page.Length; i++)
        {
            if (page[i] != "```csharp")
            {
                continue;
            }

            string[] block = Trimmed(page.Skip(i + 1).TakeWhile(line => line != "```"));
            Assert.Contains(Enumerable.Range(0, code.Length), at => code.Skip(at).Take(block.Length).SequenceEqual(block));
            blocks++;
        }

        Assert.Equal(7, blocks);
    }

    [Fact]
    public void Parquet_InAFolder_IsCondensedInPlace()
    {
        string folder = Directory.CreateTempSubdirectory().FullName;
        try
        {
            using (DbConnection writer = Engines.Open("DuckDB"))
            {
                writer.Run($"copy (select 20 + i % 30 as minutes, date '2024-12-31' + (i % 3)::integer as day from range(3000) r(i)) to '{folder}/a.parquet' (format parquet)");
            }

            using DbConnection connection = new DuckDBConnection("DataSource=:memory:");
            CondensedColumn stays = TableCondenser.Condense(connection, new ColumnSource
            {
                Query = $"select minutes, day from '{folder}/*.parquet'",
                Value = "minutes",
                Filter = "day >= date '2025-01-01'",
            });
            Console.WriteLine($"{stays.Sample.Count} values, {stays.Range.Missing} missing, {stays.Sample.Cells.Length} cells");
            Assert.Equal((2000, 20), (stays.Sample.Count, stays.Sample.Cells.Length));
        }
        finally
        {
            Directory.Delete(folder, true);
        }
    }

    [Fact]
    public async Task Sqlite_DepotsShardsAndDays_AreCondensed()
    {
        string file = Path.Combine(Path.GetTempPath(), Path.GetRandomFileName() + ".db");
        try
        {
            Depots(file);
            Days(file);
            await Shards();
        }
        finally
        {
            File.Delete(file);
        }
    }

    [Fact]
    public void CellQuery_ToSql_IsTheTextOfThePage()
    {
        var query = new CellQuery(new ColumnSource { Table = "stays", Value = "minutes" }, cellWidth: 0.25);
        Console.WriteLine(query.ToSql());
        Assert.StartsWith("select k, count(*) as n,\n  sum(1) as m0, sum(b) as m1, sum(b2) as m2, sum(b2 * b) as m3,", query.ToSql(), StringComparison.Ordinal);
        Assert.Contains("x * cast(4.0000000000000000E+000 as double precision) as u", query.ToSql(), StringComparison.Ordinal);
        Assert.EndsWith("group by k", query.ToSql(), StringComparison.Ordinal);
    }

    private static void Depots(string file)
    {
        using (var writer = new SqliteConnection($"Data Source={file};Pooling=False"))
        {
            writer.Open();
            writer.Run("create table stays (depot text, minutes real, lorries integer, day integer)");
            writer.Run("insert into stays values ('A', 30, 3, 1), ('A', 60, 1, 2), ('B', 45, 2, 1), ('B', 46, 2, 2)");
        }

        using DbConnection connection = new SqliteConnection($"Data Source={file};Pooling=False");
        CondensedGroups depots = TableCondenser.CondenseGroups(connection, new ColumnSource
        {
            Table = "stays",
            Value = "minutes",
            Weight = "lorries",
            WeightMeaning = WeightMeaning.Counts,
            Groups = ["depot"],
        }, new TableOptions { Limits = [45] });
        foreach (CondensedColumn depot in depots.Groups)
        {
            double beyond = 1 - ((depot.Sample.WeightBelow(45) + depot.Sample.WeightAt(45)) / depot.Sample.TotalWeight);
            Console.WriteLine($"{depot.Group[0]}: {beyond:P1} of {depot.Sample.TotalWeight} stays over 45 minutes");
        }

        Assert.Equal([0.25, 0.5], depots.Groups.Select(group => 1 - ((group.Sample.WeightBelow(45) + group.Sample.WeightAt(45)) / group.Sample.TotalWeight)));
    }

    private static void Days(string file)
    {
        using DbConnection connection = new SqliteConnection($"Data Source={file};Pooling=False");
        var days = new List<byte[]>();
        foreach (int day in new[] { 1, 2 })
        {
            byte[] today = TableCondenser.Condense(connection, new ColumnSource { Table = "stays", Value = "minutes", Filter = "day = @day", Parameters = new Dictionary<string, object?> { ["@day"] = day } },
                new TableOptions { CellWidth = 1 / 64.0 }).Sample.ToBytes();
            days.Add(today);
        }

        CondensedSample month = days.Select(bytes => CondensedSample.FromBytes(bytes)).Aggregate(CondensedSample.Merge);
        Assert.Equal((4L, 30.0, 60.0), (month.Count, month.Minimum, month.Maximum));
    }

    private static async Task Shards()
    {
        using DbConnection north = Engines.Open("SQLite"), south = Engines.Open("DuckDB");
        north.Run("create table stays (minutes double precision)");
        north.Run("insert into stays values (20), (25)");
        south.Run("create table stays (minutes double precision)");
        south.Run("insert into stays values (30), (null)");
        IProgress<double> progress = new Progress<double>();
        CancellationToken cancellation = TestContext.Current.CancellationToken;
        CondensedColumn all = await TableCondenser.CondenseShardsAsync([north, south], new ColumnSource { Table = "stays", Value = "minutes" },
            new TableOptions { ShardsAtOnce = 2, Progress = progress }, cancellation);
        Density curve = Density.Of(all.Sample, Kernel.Gaussian, bandwidth: 2);
        double beyond = curve.Survival(45);

        // The nearest of the three values lies 7.5 standard deviations below: (1 − Φ(7.5))/3 = 1.06e-14.
        Assert.InRange(beyond, 1.0e-14, 1.1e-14);
        Assert.Equal((3L, 1L, 20.0, 30.0), (all.Sample.Count, all.Range.Missing, all.Sample.Minimum, all.Sample.Maximum));
    }

    private static string[] Trimmed(IEnumerable<string> lines) => [.. lines.Select(line => line.Trim()).Where(line => line.Length > 0)];
}
