using System.Data.Common;
using Smoothing.Samples;

namespace Smoothing.Sql.Tests;

/// <summary>Bad input gives a clear error, and the connection stays usable.</summary>
public class BadSourceTests
{
    [Theory]
    [InlineData("DuckDB", "nosuch", "x", typeof(DbException), "nosuch")]
    [InlineData("SQLite", "nosuch", "x", typeof(DbException), "nosuch")]
    [InlineData("DuckDB", "obs", "nosuch", typeof(DbException), "nosuch")]
    [InlineData("SQLite", "obs", "nosuch", typeof(DbException), "nosuch")]
    [InlineData("DuckDB", "obs", "g", typeof(ArgumentException), "column 'g' of table 'obs' must be numeric, but is Varchar: name another column")]
    [InlineData("SQLite", "obs", "g", typeof(ArgumentException), "column 'g' of table 'obs' must be numeric, but holds text in 20 of 20 rows: name another column")]
    [InlineData("DuckDB", "hollow", "x", typeof(ArgumentException), "table 'hollow' must hold at least one row that passes the filter, but holds none")]
    [InlineData("SQLite", "hollow", "x", typeof(ArgumentException), "table 'hollow' must hold at least one row that passes the filter, but holds none")]
    [InlineData("DuckDB", "nulls", "x", typeof(ArgumentException), "column 'x' of table 'nulls' must hold at least one finite value, but of 2 rows 2 are NULL and 0 not finite")]
    [InlineData("SQLite", "nulls", "x", typeof(ArgumentException), "column 'x' of table 'nulls' must hold at least one finite value, but of 2 rows 2 are NULL and 0 not finite")]
    public void Condense_UnusableColumn_SaysSo(string engine, string table, string column, Type type, string message)
    {
        using DbConnection connection = Filled(engine);
        Exception error = Assert.ThrowsAny<Exception>(() => TableCondenser.Condense(connection, new ColumnSource { Table = table, Value = column }));
        Assert.IsAssignableFrom(type, error);
        Assert.Contains(message, error.Message, StringComparison.Ordinal);
        Assert.Equal("42", connection.State());
    }

    [Theory]
    [MemberData(nameof(Engines.All), MemberType = typeof(Engines))]
    public void Condense_TextAmongNumbersInSqliteOrBadWeights_IsRefused(string engine)
    {
        using DbConnection connection = Filled(engine);
        connection.Run("create table weights (x double precision, negative double precision, half double precision, hole double precision)");
        connection.Run("insert into weights values (1, 1, 1, 1), (2, -1, 0.5, null), (3, 2, 2, 2)");
        foreach (string weight in new[] { "negative", "hole" })
        {
            ArgumentException error = Assert.Throws<ArgumentException>(() => TableCondenser.Condense(connection, new ColumnSource { Table = "weights", Value = "x", Weight = weight }));
            Assert.StartsWith($"column '{weight}' of table 'weights' must hold weights that are finite and not negative (whole numbers for counts), but 1 of 3 rows do not: mend", error.Message, StringComparison.Ordinal);
        }

        var half = new ColumnSource { Table = "weights", Value = "x", Weight = "half" };
        Assert.Equal(3.5, TableCondenser.Condense(connection, half).Sample.TotalWeight);
        Assert.Throws<ArgumentException>(() => TableCondenser.Condense(connection, half with { WeightMeaning = WeightMeaning.Counts }));
        if (engine == "SQLite")
        {
            connection.Run("insert into weights values ('seven', 1, 1, 1)");
            Assert.Contains("holds text in 1 of 4 rows", Assert.Throws<ArgumentException>(() => TableCondenser.Condense(connection, new ColumnSource { Table = "weights", Value = "x" })).Message, StringComparison.Ordinal);
        }

        Assert.Equal("42", connection.State());
    }

    [Theory]
    [MemberData(nameof(Engines.All), MemberType = typeof(Engines))]
    public void Condense_HostileNames_AreOnlyNames(string engine)
    {
        using DbConnection connection = Engines.Open(engine);
        const string Table = "obs\"; drop table obs; --", Column = "x\" from obs; --";
        connection.Run("create table obs (y double precision)");
        connection.Run($"create table \"{Table.Replace("\"", "\"\"")}\" (\"{Column.Replace("\"", "\"\"")}\" double precision, \"select\" text)");
        connection.Run($"insert into \"{Table.Replace("\"", "\"\"")}\" values (1.5, 'a'), (2.5, 'b')");
        CondensedGroups groups = TableCondenser.CondenseGroups(connection, new ColumnSource { Table = Table, Value = Column, Groups = ["select"] });
        Assert.Equal([1.5, 2.5], groups.Groups.Select(group => group.Sample.Minimum));
        Assert.ThrowsAny<DbException>(() => TableCondenser.Condense(connection, new ColumnSource { Table = "obs; drop table obs", Value = "y" }));
        Assert.Contains("holds none", Assert.Throws<ArgumentException>(() => TableCondenser.Condense(connection, new ColumnSource { Table = "obs", Value = "y" })).Message, StringComparison.Ordinal);
        Assert.Throws<ArgumentException>(() => TableCondenser.Condense(connection, new ColumnSource { Table = "obs\0", Value = "y" }));
    }

    [Theory]
    [InlineData("DuckDB", 7.25)]
    [InlineData("SQLite", 0.0)]
    public void Condense_OneDistinctValue_IsOneCell(string engine, double value)
    {
        using DbConnection connection = Engines.Open(engine);
        connection.Run("create table obs (x double precision)");
        connection.Run("insert into obs values (@p0), (@p0), (@p0)".Replace("@", engine == "DuckDB" ? "$" : "@"), value);
        CondensedSample sample = TableCondenser.Condense(connection, new ColumnSource { Table = "obs", Value = "x" }).Sample;
        Assert.Equal((3L, value, value, 1), (sample.Count, sample.Minimum, sample.Maximum, sample.Cells.Length));
    }

    [Fact]
    public void Condense_CellsTooWideOrTooMany_SaysWhichWidthItTakes()
    {
        using DbConnection connection = Filled("DuckDB");
        var source = new ColumnSource { Table = "obs", Value = "x" };
        Assert.StartsWith(
            "CellWidth must be at most 0.015625 for a bandwidth of 0.3 with 8 moments, but is 0.1: pass 0.015625 or less",
            Assert.Throws<ArgumentException>(() => TableCondenser.Condense(connection, source, new TableOptions { CellWidth = 0.1, Bandwidth = 0.3 })).Message, StringComparison.Ordinal);
        Assert.Equal(0.0625, TableCondenser.Condense(connection, source, new TableOptions { CellWidth = 0.1, Bandwidth = 0.3, Moments = 2 }).Sample.CellWidth);
        Assert.StartsWith(
            "a group may fill at most 5 cells, but fills more with cells of 0.25: raise MaximumCells, or choose a CellWidth of 0.5 or more.",
            Assert.Throws<ArgumentException>(() => TableCondenser.Condense(connection, source, new TableOptions { CellWidth = 0.25, MaximumCells = 5 })).Message, StringComparison.Ordinal);
        Assert.Equal("42", connection.State());
    }

    [Fact]
    public void Condense_UnusableOptions_AreRefused()
    {
        using DbConnection connection = Filled("SQLite");
        var source = new ColumnSource { Table = "obs", Value = "x" };
        foreach (TableOptions options in new TableOptions[]
        {
            new() { CellWidth = double.NaN }, new() { CellWidth = -1 }, new() { Bandwidth = 0 }, new() { MaximumCells = 0 }, new() { ShardsAtOnce = 0 },
            new() { CommandTimeout = TimeSpan.Zero }, new() { Limits = [double.NaN] },
        })
        {
            Assert.ThrowsAny<ArgumentException>(() => TableCondenser.Condense(connection, source, options));
        }

        Assert.Throws<ArgumentOutOfRangeException>(() => TableCondenser.Condense(connection, source, new TableOptions { Moments = 17 }));
        Assert.Throws<ArgumentException>(() => TableCondenser.Condense(connection, source with { Groups = ["g"] }));
        Assert.Throws<ArgumentException>(() => TableCondenser.CondenseGroups(connection, source));
        Assert.Throws<ArgumentException>(() => TableCondenser.Condense(connection, source with { Query = "select 1" }));
        Assert.Throws<ArgumentException>(() => TableCondenser.Condense(connection, new ColumnSource { Value = "x" }));
        Assert.Throws<ArgumentNullException>(() => TableCondenser.Condense(null!, source));
        Assert.Throws<ArgumentException>(() => new CellQuery(source, 0.3));
    }

    [Fact]
    public void FromRows_RowsOfAnotherQuery_AreRefused()
    {
        var query = new CellQuery(new ColumnSource { Table = "obs", Value = "x" }, 0.5, 3);
        var row = new CellRow { Cell = 2, Count = 1, Sums = [1, 0.1, 0.01], SquaredWeights = 1, Low = 1.3, High = 1.3 };
        Assert.Equal(1.3, TableCondenser.FromRows([row], query).Groups[0].Sample.Minimum);
        foreach (CellRow bad in new[] { row with { Cell = 3 }, row with { Sums = [1, 0.1] }, row with { Sums = [1, 0.6, 0.01] }, row with { Count = 0 }, row with { Low = double.NaN }, row with { Below = [1] }, row with { Keys = [1] } })
        {
            Assert.Throws<ArgumentException>(() => TableCondenser.FromRows([bad], query));
        }

        Assert.StartsWith("rows must hold at least one cell", Assert.Throws<ArgumentException>(() => TableCondenser.FromRows([], query)).Message, StringComparison.Ordinal);
    }

    [Fact]
    public async Task CondenseAsync_Cancelled_StopsTheQueryAndLeavesTheConnection()
    {
        using DbConnection connection = Engines.Open("DuckDB");
        // Ten thousand million rows: only cancelling ends it.
        var source = new ColumnSource { Query = "select sin(i) as x from range(10000000000) r(i)", Value = "x" };
        using var cancel = new CancellationTokenSource(TimeSpan.FromMilliseconds(300));
        await Assert.ThrowsAnyAsync<OperationCanceledException>(() => TableCondenser.CondenseAsync(connection, source, cancellation: cancel.Token));
        Assert.Equal("42", connection.State());
        await Assert.ThrowsAnyAsync<OperationCanceledException>(() => TableCondenser.CondenseAsync(connection, source, cancellation: new CancellationToken(true)));
    }

    [Fact]
    public void Condense_ClosedConnection_IsClosedAgain()
    {
        string file = Path.Combine(Path.GetTempPath(), Path.GetRandomFileName() + ".db");
        try
        {
            using var connection = new Microsoft.Data.Sqlite.SqliteConnection($"Data Source={file};Pooling=False");
            connection.Open();
            connection.Fill(Rows.Draw(50, 2));
            connection.Close();
            Assert.Equal(50, TableCondenser.Condense(connection, new ColumnSource { Table = "obs", Value = "x" }).Sample.Count);
            Assert.Equal(System.Data.ConnectionState.Closed, ((DbConnection)connection).State);
        }
        finally
        {
            File.Delete(file);
        }
    }

    [Fact]
    public void Condense_OpenTransaction_IsUsed()
    {
        using DbConnection connection = Engines.Open("SQLite");
        connection.Fill(Rows.Draw(50, 2));
        using DbTransaction transaction = connection.BeginTransaction();
        CondensedColumn column = TableCondenser.Condense(connection, new ColumnSource { Table = "obs", Value = "x" }, new TableOptions { Transaction = transaction, CommandTimeout = TimeSpan.FromSeconds(20) });
        Assert.Equal(50, column.Sample.Count);
    }

    private static DbConnection Filled(string engine)
    {
        DbConnection connection = Engines.Open(engine);
        connection.Fill(Rows.Draw(20, 1));
        connection.Run("create table hollow (x double precision)");
        connection.Run("create table nulls (x double precision)");
        connection.Run("insert into nulls values (null), (null)");
        return connection;
    }
}
