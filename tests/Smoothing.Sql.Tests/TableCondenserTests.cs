using System.Data.Common;
using Smoothing.Estimation;
using Smoothing.Kernels;
using Smoothing.Samples;

namespace Smoothing.Sql.Tests;

/// <summary>What comes back from a database against condensing the same rows in process.</summary>
public class TableCondenserTests
{
    [Theory]
    [MemberData(nameof(Engines.All), MemberType = typeof(Engines))]
    public void Condense_Column_EqualsInProcessAndTheDirectCurve(string engine)
    {
        using DbConnection connection = Engines.Open(engine);
        var rows = Rows.Draw(4000, 1);
        connection.Fill(rows);
        double[] values = [.. rows.Select(r => r.X!.Value)];
        foreach (int moments in new[] { 2, 8, 16 })
        {
            CondensedColumn column = TableCondenser.Condense(connection, new ColumnSource { Table = "obs", Value = "x" }, new TableOptions { CellWidth = 1 / 64.0, Moments = moments, Limits = [0, values[7]] });
            Same.Sample(CondensedSample.Of(values, new CondensingOptions { CellWidth = 1 / 64.0, Moments = moments, Limits = [0, values[7]] }), column.Sample);
            Assert.Equal(1, column.Sample.WeightAt(values[7]));
            Assert.Empty(column.Group);
        }

        // Eight moments at h = 16 δ: within 1e-12 of the peak of the sum over all values.
        CondensedSample eight = TableCondenser.Condense(connection, new ColumnSource { Table = "obs", Value = "x" }, new TableOptions { Bandwidth = 0.25 }).Sample;
        Assert.Equal(1 / 64.0, eight.CellWidth);
        Density direct = Density.Of(Sample.Of(values), Kernel.Gaussian, 0.25), fromCells = Density.Of(eight, Kernel.Gaussian, 0.25);
        for (double x = -6; x <= 6; x += 0.37)
        {
            Same.Close(direct.Value(x), CellCurve.Value(eight, x, 0.25), 0.3e-12);
            Same.Close(direct.Value(x), fromCells.Value(x), 0.3e-12);
        }
    }

    [Theory]
    [MemberData(nameof(Engines.All), MemberType = typeof(Engines))]
    public void Condense_NoWidth_ChoosesOneFineEnoughForAnyUsualBandwidth(string engine)
    {
        using DbConnection connection = Engines.Open(engine);
        var rows = Rows.Draw(4000, 2);
        connection.Fill(rows);
        CondensedColumn column = TableCondenser.Condense(connection, new ColumnSource { Table = "obs", Value = "x" });
        double span = rows.Max(r => r.X!.Value) - rows.Min(r => r.X!.Value);
        Assert.InRange(span / column.Sample.CellWidth, 8192, 16384);
        Same.Sample(CondensedSample.Of([.. rows.Select(r => r.X!.Value)], new CondensingOptions { CellWidth = column.Sample.CellWidth, Moments = 8 }), column.Sample);
    }

    [Fact]
    public void Condense_HeavyTails_NarrowsTheCellsForTheBulk()
    {
        using DbConnection connection = Engines.Open("DuckDB");
        // Standard Cauchy, by the inverse of its distribution function, at 200,000 evenly spaced probabilities: the extremes lie near ±130,000.
        connection.Run("create table obs as select tan(pi() * ((i + 0.5) / 200000 - 0.5)) as x from range(200000) r(i)");
        CondensedColumn column = TableCondenser.Condense(connection, new ColumnSource { Table = "obs", Value = "x" });
        Assert.True(column.Range.High > 100_000);
        Assert.InRange(column.Sample.CellWidth, 1e-6, 0.05);
        Assert.Equal(200_000, column.Sample.Count);
    }

    [Theory]
    [MemberData(nameof(Engines.All), MemberType = typeof(Engines))]
    public void Condense_MissingAndInfinite_AreCountedAndLeftOut(string engine)
    {
        using DbConnection connection = Engines.Open(engine);
        var rows = Rows.Draw(300, 3);
        connection.Fill([.. rows, (null, 1, "north"), (null, 1, "north"), (double.NaN, 1, "north"), (double.PositiveInfinity, 1, "south"), (double.NegativeInfinity, 2, "south")]);
        CondensedColumn column = TableCondenser.Condense(connection, new ColumnSource { Table = "obs", Value = "x" });

        // SQLite stores NaN as NULL.
        Assert.Equal(engine == "SQLite" ? (3, 2) : (2, 3), (column.Range.Missing, column.Range.NotFinite));
        Assert.Equal((305, 300, 5), (column.Range.Rows, column.Range.Kept, column.Sample.LeftOut));
        Assert.Equal(300, column.Sample.Count);
        Same.Close(rows.Average(r => r.X!.Value), column.Range.Mean, 1e-13);
    }

    [Theory]
    [MemberData(nameof(Engines.All), MemberType = typeof(Engines))]
    public async Task CondenseGroups_WeightsAndFilter_EqualInProcess(string engine)
    {
        using DbConnection connection = Engines.Open(engine);
        var rows = Rows.Draw(2000, 4);
        connection.Fill([.. rows, (null, 1, "empty")]);
        string mark = engine == "DuckDB" ? "$low" : "@low";
        var source = new ColumnSource
        {
            Table = "obs", Value = "x", Weight = "w", WeightMeaning = WeightMeaning.Counts, Groups = ["g"], SplitBy = ["d"],
            Filter = $"x > {mark} or x is null -- the lower part is another machine's", Parameters = new Dictionary<string, object?> { [engine == "DuckDB" ? "low" : "@low"] = -4.0 },
        };
        CondensedGroups groups = await TableCondenser.CondenseGroupsAsync(connection, source, new TableOptions { CellWidth = 0.125 });
        Assert.Equal(["north", "south"], groups.Groups.Select(group => group.Group[0]));
        Assert.Equal("empty", Assert.Single(groups.WithoutValues).Group[0]);
        foreach (CondensedColumn group in groups.Groups)
        {
            var kept = rows.Where(r => r.X > -4 && r.G == (string)group.Group[0]!).ToList();
            CondensedSample expected = CondensedSample.Of(
                kept.Select(r => r.X!.Value).ToArray(),
                new CondensingOptions { CellWidth = 0.125, Moments = 8, Weights = kept.Select(r => r.W).ToArray(), WeightMeaning = WeightMeaning.Counts });
            Same.Sample(expected, group.Sample);
        }
    }

    [Theory]
    [InlineData("DuckDB", "integer")]
    [InlineData("DuckDB", "bigint")]
    [InlineData("DuckDB", "decimal(12,3)")]
    [InlineData("DuckDB", "real")]
    [InlineData("DuckDB", "hugeint")]
    [InlineData("SQLite", "integer")]
    [InlineData("SQLite", "numeric")]
    [InlineData("SQLite", "real")]
    public void Condense_OtherNumericTypes_EqualInProcess(string engine, string type)
    {
        using DbConnection connection = Engines.Open(engine);
        double[] values = [.. Rows.Draw(500, 5).Select(r => Math.Round(10 * r.X!.Value))];
        connection.Run($"create table v (x {type})");
        connection.Run("insert into v values " + string.Join(", ", values.Select(x => FormattableString.Invariant($"({x})"))));
        CondensedColumn column = TableCondenser.Condense(connection, new ColumnSource { Table = "v", Value = "x" }, new TableOptions { CellWidth = 0.5 });
        Same.Sample(CondensedSample.Of(values, new CondensingOptions { CellWidth = 0.5, Moments = 8 }), column.Sample);
    }

    [Fact]
    public void Condense_ParquetInPlace_EqualsInProcess()
    {
        string file = Path.Combine(Path.GetTempPath(), Path.GetRandomFileName() + ".parquet");
        using DbConnection connection = Engines.Open("DuckDB");
        try
        {
            var rows = Rows.Draw(3000, 6);
            connection.Fill(rows);
            connection.Run($"copy obs to '{file}' (format parquet)");
            connection.Run("drop table obs");
            CondensedColumn column = TableCondenser.Condense(connection, new ColumnSource { Query = $"select x from '{file}'", Value = "x" }, new TableOptions { CellWidth = 0.25 });
            Same.Sample(CondensedSample.Of([.. rows.Select(r => r.X!.Value)], new CondensingOptions { CellWidth = 0.25, Moments = 8 }), column.Sample);
        }
        finally
        {
            File.Delete(file);
        }
    }

    [Theory]
    [InlineData(1)]
    [InlineData(3)]
    public async Task CondenseShards_ThreeParts_EqualOneTable(int atOnce)
    {
        var rows = Rows.Draw(3000, 7);
        DbConnection[] shards = [Engines.Open("DuckDB"), Engines.Open("SQLite"), Engines.Open("SQLite")];
        for (int i = 0; i < 3; i++)
        {
            shards[i].Fill(rows.Where((_, row) => row % 3 == i));
        }

        var heard = new List<double>();
        CondensedColumn column = await TableCondenser.CondenseShardsAsync(
            shards, new ColumnSource { Table = "obs", Value = "x", Weight = "w" }, new TableOptions { CellWidth = 0.25, Limits = [1], ShardsAtOnce = atOnce, Progress = new Listener(heard) });
        Same.Sample(
            CondensedSample.Of([.. rows.Select(r => r.X!.Value)], new CondensingOptions { CellWidth = 0.25, Moments = 8, Limits = [1], Weights = rows.Select(r => r.W).ToArray() }),
            column.Sample);
        Assert.Equal([1 / 6.0, 2 / 6.0, 3 / 6.0, 4 / 6.0, 5 / 6.0, 1], heard);
        Assert.Equal(3000, column.Range.Rows);
        Array.ForEach(shards, shard => shard.Dispose());
    }

    [Fact]
    public async Task CondenseShards_OneWithoutTheTable_SaysWhichAndReturnsNothing()
    {
        using DbConnection good = Engines.Open("DuckDB"), bad = Engines.Open("SQLite");
        good.Fill(Rows.Draw(100, 8));
        DbException error = await Assert.ThrowsAnyAsync<DbException>(() => TableCondenser.CondenseShardsAsync([good, bad], new ColumnSource { Table = "obs", Value = "x" }));
        Assert.Equal(1, error.Data["Shard"]);
        Assert.Contains("obs", error.Message, StringComparison.Ordinal);
        Assert.Equal(("42", "42"), (good.State(), bad.State()));
    }

    [Theory]
    [MemberData(nameof(Engines.All), MemberType = typeof(Engines))]
    public void FromReader_SqlRunByHandTwice_AddsUp(string engine)
    {
        using DbConnection connection = Engines.Open(engine);
        var rows = Rows.Draw(800, 9);
        connection.Fill(rows);
        var query = new CellQuery(new ColumnSource { Table = "obs", Value = "x", Groups = ["g"] }, 0.25, 6, [0.5]);
        using DbCommand command = connection.CreateCommand();
        command.CommandText = query.ToSql() + "\nunion all\n" + query.ToSql();
        using DbDataReader reader = command.ExecuteReader();
        CondensedGroups groups = TableCondenser.FromReader(reader, query);
        double[] north = [.. rows.Where(r => r.G == "north").Select(r => r.X!.Value)];
        Same.Sample(CondensedSample.Of([.. north, .. north], new CondensingOptions { CellWidth = 0.25, Moments = 6, Limits = [0.5] }), groups.Groups[0].Sample);
        Same.Close(north.Average(), groups.Groups[0].Range.Mean, 1e-13);
    }

    [Fact]
    public void FromBytes_DaysKeptInATable_MergeOnDemandAndDropOut()
    {
        using DbConnection connection = Engines.Open("SQLite");
        connection.Fill(Rows.Draw(2100, 10));
        connection.Run("create table days (day integer primary key, condensed blob)");
        var source = new ColumnSource { Table = "obs", Value = "x", Filter = "d = @day" };
        for (int day = 0; day < 7; day++)
        {
            CondensedColumn column = TableCondenser.Condense(connection, source with { Parameters = new Dictionary<string, object?> { ["@day"] = day } }, new TableOptions { CellWidth = 0.25 });
            connection.Run("insert into days values (@p0, @p1)", day, column.Sample.ToBytes());
        }

        connection.Run("delete from days where day < 2");
        using DbCommand command = connection.CreateCommand();
        command.CommandText = "select condensed from days";
        using DbDataReader reader = command.ExecuteReader();
        CondensedSample? merged = null;
        while (reader.Read())
        {
            CondensedSample day = CondensedSample.FromBytes((byte[])reader[0]);
            merged = merged is null ? day : CondensedSample.Merge(merged, day);
        }

        Same.Sample(TableCondenser.Condense(connection, new ColumnSource { Table = "obs", Value = "x", Filter = "d >= 2" }, new TableOptions { CellWidth = 0.25 }).Sample, merged!);
    }

    private sealed class Listener(List<double> heard) : IProgress<double>
    {
        public void Report(double value) => heard.Add(value);
    }
}
