using Npgsql;
using Smoothing.Samples;

namespace Smoothing.Sql.Outside;

/// <summary>PostgreSQL against condensing the same rows in process: a plain table, a table spread over two servers, failures in mid-query.</summary>
public sealed class PostgreSqlTests(Servers servers) : IClassFixture<Servers>
{
    private static readonly TableOptions Cells = new() { CellWidth = 1 / 64.0, Limits = [0, 2.5] };

    [Fact]
    public void Condense_PlainTable_EqualsInProcess()
    {
        using NpgsqlConnection connection = servers.Open(1);
        CondensedColumn column = TableCondenser.Condense(connection, new ColumnSource { Table = "obs_1", Schema = "public", Value = "x", Weight = "w" }, Cells);
        Assert.Equal((20_004, 1, 3, 20_000), (column.Range.Rows, column.Range.Missing, column.Range.NotFinite, column.Range.Kept));
        Assert.Equal(servers.Rows[1].Count(r => r.W == 0), column.Range.Weightless);
        Equal(InProcess(servers.Rows[1], 1 / 64.0, Cells.Limits), column.Sample);
    }

    [Theory]
    [InlineData("whole", 0.5)]
    [InlineData("price", 0.0625)]
    public void Condense_IntegersAndDecimals_EqualInProcess(string name, double width)
    {
        using NpgsqlConnection connection = servers.Open(1);
        CondensedColumn column = TableCondenser.Condense(connection, new ColumnSource { Table = "obs_1", Value = name, Filter = "x = x and abs(x) < 'Infinity' and x <> 'NaN'" }, new TableOptions { CellWidth = width });
        double[] finite = [.. servers.Rows[1].Where(r => double.IsFinite(r.X ?? double.NaN)).Select(r => r.X!.Value)];
        double[] values = Array.ConvertAll(finite, x => name == "whole" ? Math.Round(x * 10) : (double)Math.Round((decimal)x, 4));
        Equal(CondensedSample.Of(values, new CondensingOptions { CellWidth = width, Moments = 8 }), column.Sample);
    }

    [Fact]
    public async Task CondenseGroups_SplitByThePartitionKey_AggregatesOnTheServersThatHoldTheParts()
    {
        using NpgsqlConnection coordinator = servers.Open(0);
        var source = new ColumnSource { Table = "obs", Value = "x", Weight = "w", Groups = ["g"], SplitBy = ["shard"] };
        foreach (string sql in new[] { new CellQuery(source, 1 / 64.0, 8, Cells.Limits).ToSql(), new RangeQuery(source).ToSql() })
        {
            string plan = Plan(coordinator, sql);
            Assert.Contains("Relations: Aggregate on (public.obs_1 t", plan, StringComparison.Ordinal);
            Assert.Contains("Relations: Aggregate on (public.obs_2 t", plan, StringComparison.Ordinal);
            Assert.Contains("GROUP BY", plan, StringComparison.Ordinal);
            Assert.DoesNotContain("GroupAggregate", plan, StringComparison.Ordinal);
            Assert.DoesNotContain("HashAggregate", plan, StringComparison.Ordinal);
        }

        // Without the key the coordinator fetches the rows and aggregates itself: this is what SplitBy is for.
        Assert.DoesNotContain("Relations: Aggregate", Plan(coordinator, new CellQuery(source with { SplitBy = [] }, 1 / 64.0).ToSql()), StringComparison.Ordinal);

        CondensedGroups groups = await TableCondenser.CondenseGroupsAsync(coordinator, source, Cells);
        Assert.Equal(["north", "south"], groups.Groups.Select(group => group.Group[0]));
        foreach (CondensedColumn group in groups.Groups)
        {
            Equal(InProcess(servers.All.Where(r => r.G == (string)group.Group[0]!), 1 / 64.0, Cells.Limits), group.Sample);
        }
    }

    [Theory]
    [InlineData(1)]
    [InlineData(2)]
    public async Task CondenseShards_OneConnectionEach_EqualsInProcess(int atOnce)
    {
        using NpgsqlConnection first = servers.Open(1), second = servers.Open(2);
        ColumnSource source = new() { Query = "select x, w from obs_1", Value = "x", Weight = "w" };
        Servers.Run(second, "create or replace view its_part as select * from obs_2");
        Servers.Run(first, "create or replace view its_part as select * from obs_1");
        CondensedColumn column = await TableCondenser.CondenseShardsAsync(
            [first, second], new ColumnSource { Table = "its_part", Value = "x", Weight = "w" }, Cells with { ShardsAtOnce = atOnce });
        Equal(InProcess(servers.All, 1 / 64.0, Cells.Limits), column.Sample);
        Assert.Equal(column.Sample.WeightBelow(0), TableCondenser.Condense(first, source, Cells).Sample.WeightBelow(0) + TableCondenser.Condense(second, source with { Query = "select x, w from obs_2" }, Cells).Sample.WeightBelow(0));
    }

    [Fact(Timeout = 60_000)]
    public async Task CondenseShards_OneKilledInMidQuery_GivesItsErrorAndNothingElse()
    {
        using NpgsqlConnection first = servers.Open(1), second = servers.Open(2), witness = servers.Open(2);
        Servers.Run(first, "create or replace view slow as select x from obs_1 limit 500");
        Servers.Run(second, "create or replace view slow as select x from obs_2 limit 500");

        // A filter that takes 20 ms a row: the query lasts long enough to be found at work.
        var source = new ColumnSource { Table = "slow", Value = "x", Filter = "pg_sleep(0.02)::text = ''" };
        Task<CondensedColumn> running = TableCondenser.CondenseShardsAsync([first, second], source, new TableOptions { ShardsAtOnce = 2, CellWidth = 0.25 });
        string killed = await Kill(witness, "state = 'active' and query like '%\"slow\"%'", running);
        Assert.Equal("true", killed);
        NpgsqlException error = await Assert.ThrowsAnyAsync<NpgsqlException>(() => running);
        Assert.Equal(1, error.Data["Shard"]);
        Assert.Equal("57P01", error.SqlState);
        Assert.Equal("2", Servers.Scalar(first, "select 1 + 1"));

        // Nothing is lost: a new connection to the same part gives the whole.
        using NpgsqlConnection again = servers.Open(2);
        CondensedColumn column = await TableCondenser.CondenseShardsAsync([first, again], source with { Filter = null }, new TableOptions { CellWidth = 0.25 });
        Assert.Equal(1000, column.Range.Rows);
    }

    [Fact(Timeout = 60_000)]
    public async Task Condense_PartKilledBehindTheCoordinator_GivesTheErrorAndTheConnectionGoesOn()
    {
        using NpgsqlConnection coordinator = servers.Open(0), part = servers.Open(2);
        Servers.Run(part, "create view dragging as select x from obs_2 where pg_sleep(0.02)::text = '' limit 500");
        Servers.Run(coordinator, "create foreign table dragging (x double precision) server part_2");
        Task<CondensedColumn> running = TableCondenser.CondenseAsync(coordinator, new ColumnSource { Table = "dragging", Value = "x" }, Cells);
        string killed = await Kill(part, "application_name = 'postgres_fdw' and state = 'active'", running);
        Assert.Equal("true", killed);
        NpgsqlException error = await Assert.ThrowsAnyAsync<NpgsqlException>(() => running);
        Assert.NotNull(error.SqlState);

        CondensedColumn column = TableCondenser.Condense(coordinator, new ColumnSource { Table = "obs", Value = "x", SplitBy = ["shard"] }, Cells);
        Equal(InProcess(servers.All, 1 / 64.0, Cells.Limits, weighted: false), column.Sample);
    }

    [Fact(Timeout = 60_000)]
    public async Task CondenseAsync_Cancelled_StopsTheQueryAndLeavesTheConnection()
    {
        using NpgsqlConnection connection = servers.Open(1);
        using var cancel = new CancellationTokenSource(TimeSpan.FromMilliseconds(300));
        var source = new ColumnSource { Table = "obs_1", Value = "x", Filter = "pg_sleep(1)::text = ''" };
        await Assert.ThrowsAnyAsync<OperationCanceledException>(() => TableCondenser.CondenseAsync(connection, source, Cells, cancel.Token));
        Assert.Equal("2", Servers.Scalar(connection, "select 1 + 1"));
        NpgsqlException late = Assert.ThrowsAny<NpgsqlException>(() => TableCondenser.Condense(connection, source, Cells with { CommandTimeout = TimeSpan.FromSeconds(1) }));
        Assert.Contains("imeout", late.ToString(), StringComparison.Ordinal);
    }

    [Fact]
    public void Condense_BadSource_SaysSoAndLeavesTheConnection()
    {
        using NpgsqlConnection connection = servers.Open(1);
        Assert.Equal("42P01", Assert.Throws<PostgresException>(() => TableCondenser.Condense(connection, new ColumnSource { Table = "nosuch", Value = "x" })).SqlState);
        Assert.Equal("42703", Assert.Throws<PostgresException>(() => TableCondenser.Condense(connection, new ColumnSource { Table = "obs_1", Value = "nosuch" })).SqlState);
        Assert.StartsWith(
            "column 'g' of table 'obs_1' must be numeric, but is text: name another column",
            Assert.Throws<ArgumentException>(() => TableCondenser.Condense(connection, new ColumnSource { Table = "obs_1", Value = "g" })).Message, StringComparison.Ordinal);
        const string Table = "t\"; drop table obs_1; --";
        Servers.Run(connection, $"create table if not exists \"{Table.Replace("\"", "\"\"", StringComparison.Ordinal)}\" (\"a\"\"b\" double precision)");
        Assert.Contains("holds none", Assert.Throws<ArgumentException>(() => TableCondenser.Condense(connection, new ColumnSource { Table = Table, Value = "a\"b" })).Message, StringComparison.Ordinal);
        Assert.Equal("20004", Servers.Scalar(connection, "select count(*) from obs_1"));
    }

    /// <summary>Ends the first backend that a condition on pg_stat_activity finds; empty where the work ended before.</summary>
    private static async Task<string> Kill(NpgsqlConnection witness, string condition, Task running)
    {
        string killed = "";
        while (killed.Length == 0 && !running.IsCompleted)
        {
            killed = Servers.Scalar(witness, $"select coalesce(max(pg_terminate_backend(pid)::text), '') from pg_stat_activity where pid <> pg_backend_pid() and {condition}");
            await Task.Delay(20);
        }

        return killed;
    }

    private static string Plan(NpgsqlConnection connection, string sql)
    {
        using var command = new NpgsqlCommand("explain (verbose, costs off) " + sql, connection);
        using NpgsqlDataReader reader = command.ExecuteReader();
        var lines = new List<string>();
        while (reader.Read())
        {
            lines.Add(reader.GetString(0));
        }

        return string.Join('\n', lines);
    }

    private static CondensedSample InProcess(IEnumerable<(double? X, double W, string G)> rows, double width, IReadOnlyList<double> limits, bool weighted = true)
    {
        var finite = rows.Where(r => double.IsFinite(r.X ?? double.NaN)).ToList();
        double[] weights = weighted ? [.. finite.Select(r => r.W)] : [];
        return CondensedSample.Of(finite.Select(r => r.X!.Value).ToArray(), new CondensingOptions { CellWidth = width, Moments = 8, Limits = limits, Weights = weights });
    }

    private static void Equal(CondensedSample expected, CondensedSample actual)
    {
        Assert.Equal(expected.CellWidth, actual.CellWidth);
        Assert.Equal(expected.Cells.ToArray(), actual.Cells.ToArray());
        Assert.Equal((expected.Count, expected.Minimum, expected.Maximum), (actual.Count, actual.Minimum, actual.Maximum));
        for (int i = 0; i < expected.Sums.Length; i++)
        {
            double weight = expected.Sums[i - (i % expected.Moments)];
            Assert.True(Math.Abs(expected.Sums[i] - actual.Sums[i]) <= 1e-13 * weight, FormattableString.Invariant($"sum {i}: {expected.Sums[i]:R} and {actual.Sums[i]:R}"));
        }

        foreach (double limit in expected.Limits)
        {
            Assert.Equal((expected.WeightBelow(limit), expected.WeightAt(limit)), (actual.WeightBelow(limit), actual.WeightAt(limit)));
        }
    }
}
