using System.Data.Common;

namespace Smoothing.Sql.Tests;

/// <summary>Cells and ranges as the engines compute them, against sums over the same rows here.</summary>
public class CellQueryTests
{
    [Theory]
    [MemberData(nameof(Engines.All), MemberType = typeof(Engines))]
    public async Task Cells_WeightedRows_AreTheMomentsOfEachCell(string engine)
    {
        using DbConnection connection = Engines.Open(engine);
        var rows = Rows.Draw(3000, 1);
        connection.Fill(rows.Concat([(null, 1, "north"), (double.PositiveInfinity, 1, "south"), (double.NegativeInfinity, 1, "south"), (1.0, 0, "north")]));
        var source = new ColumnSource { Table = "obs", Value = "x", Weight = "w" };
        var options = new TableOptions { CellWidth = 0.3, Moments = 9, Limits = [0, 2.5] };
        (ColumnRange range, CellTable? cells) = Assert.Single(await TableRun.Run(false, [connection], source, options, false, default));

        Assert.Equal((3004, 1, 2, 1, 3001), (range.Rows, range.Missing, range.NotFinite, range.Weightless, range.Kept));
        Assert.Equal((rows.Min(r => r.X), rows.Max(r => r.X), rows.Sum(r => r.W)), (range.Low, range.High, range.Weight));
        Assert.Equal(0.25, cells!.CellWidth);
        Assert.Equal((3000L, rows.Sum(r => r.W * r.W), range.Low, range.High), (cells.Count, cells.SquaredWeights, cells.Low, cells.High));
        Assert.Equal([rows.Where(r => r.X < 0).Sum(r => r.W), rows.Where(r => r.X < 2.5).Sum(r => r.W)], cells.Below);
        Assert.Equal([0, 0], cells.At);
        (long[] numbers, double[] sums) = cells.Sorted();
        Assert.Equal(rows.Select(r => (long)Math.Floor(r.X!.Value * 4)).Distinct().Order(), numbers);
        for (int i = 0; i < numbers.Length; i++)
        {
            for (int j = 0; j < 9; j++)
            {
                double expected = rows.Where(r => Math.Floor(r.X!.Value * 4) == numbers[i]).Sum(r => r.W * Math.Pow((r.X!.Value * 4) - numbers[i] - 0.5, j));
                double error = Math.Abs(expected - sums[(i * 9) + j]);
                Assert.True(error <= 1e-13 * sums[i * 9], $"cell {numbers[i]} moment {j}: {expected} {sums[(i * 9) + j]}");
            }
        }
    }
}
