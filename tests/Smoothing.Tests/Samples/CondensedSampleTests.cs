using System.Buffers.Binary;
using Smoothing.Samples;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Samples;

/// <summary>Cells against direct sums over the values, and every way to bring cells together against one pass.</summary>
public class CondensedSampleTests
{
    [Theory]
    [InlineData(0.3, 0.25)]
    [InlineData(0.25, 0.25)]
    [InlineData(7.9, 4)]
    public void Of_GivenWidth_HoldsTheMomentsOfEachCell(double asked, double width)
    {
        double[] values = SeededColumns.Draw("two groups", 500, 1);
        CondensedSample sample = CondensedSample.Of(values, new CondensingOptions { CellWidth = asked, Moments = 5 });
        Assert.Equal(width, sample.CellWidth);
        Assert.Equal(values.Select(x => (long)Math.Floor(x / width)).Distinct().Order(), sample.Cells.ToArray());
        for (int i = 0; i < sample.Cells.Length; i++)
        {
            long k = sample.Cells[i];
            for (int j = 0; j < 5; j++)
            {
                double expected = values.Where(x => Math.Floor(x / width) == k).Sum(x => Math.Pow((x / width) - k - 0.5, j));
                Near.Absolute(expected, sample.Sums[(i * 5) + j], 1e-14 * sample.Sums[i * 5]);
            }
        }

        Assert.Equal((500L, 500.0, values.Min(), values.Max()), (sample.Count, sample.TotalWeight, sample.Minimum, sample.Maximum));
    }

    [Fact]
    public void Of_NoWidth_TakesTheSmallestThatFits()
    {
        double[] values = SeededColumns.Draw("skewed", 20_000, 2);
        CondensedSample sample = CondensedSample.Of(values, new CondensingOptions { MaximumCells = 1000 });
        int Occupied(double width) => values.Select(x => Math.Floor(x / width)).Distinct().Count();
        Assert.Equal(Occupied(sample.CellWidth), sample.Cells.Length);
        Assert.InRange(Occupied(sample.CellWidth), 1, 1000);
        Assert.True(Occupied(sample.CellWidth / 2) > 1000);
    }

    [Fact]
    public void Of_OneFarValue_KeepsItAndDoesNotWidenTheCells()
    {
        double[] values = SeededColumns.Draw("normal", 5000, 3);
        var options = new CondensingOptions { MaximumCells = 500 };
        CondensedSample without = CondensedSample.Of(values, options with { MaximumCells = 499 });
        CondensedSample with = CondensedSample.Of([.. values, 1e300], options);
        Assert.Equal(without.CellWidth, with.CellWidth);
        Assert.Equal([1e300], with.Singles.ToArray());
        Assert.Equal(without.Cells.ToArray(), with.Cells.ToArray());
    }

    [Theory]
    [InlineData(1)]
    [InlineData(7)]
    [InlineData(500)]
    public void Merge_AnySplitInAnyOrder_GivesTheCellsOfOnePass(int pieces)
    {
        double[] values = [.. SeededColumns.Draw("peaked", 6000, 4), 1e250, -1e250, 0, 0];
        var options = new CondensingOptions { MaximumCells = 800, Limits = [0, 0.5] };
        CondensedSample whole = CondensedSample.Of(values, options);
        var random = new Random(5);
        var parts = values.GroupBy(_ => random.Next(pieces)).Select(group => CondensedSample.Of(group.ToArray(), options)).ToList();
        while (parts.Count > 1)
        {
            int a = random.Next(parts.Count - 1);
            parts[a] = CondensedSample.Merge(parts[a], parts[^1]);
            parts.RemoveAt(parts.Count - 1);
        }

        Same(whole, parts[0], 1e-12);
    }

    [Fact]
    public void Coarsen_Cells_AreThoseOfTheWiderLattice()
    {
        double[] values = SeededColumns.Draw("exponential", 3000, 6);
        var options = new CondensingOptions { CellWidth = 1 / 64.0, Weights = SeededColumns.Draw("uniform", 3000, 7) };
        CondensedSample coarse = CondensedSample.Of(values, options with { CellWidth = 0.5 });
        Same(coarse, CondensedSample.Of(values, options).Coarsen(5), 1e-13);
        Assert.Throws<ArgumentOutOfRangeException>(() => coarse.Coarsen(-1));
    }

    [Fact]
    public void Builder_PiecesAndMerges_EqualOnePass()
    {
        double[] values = SeededColumns.Draw("normal", 4000, 8);
        double[] weights = Array.ConvertAll(SeededColumns.Draw("exponential", 4000, 9), x => Math.Floor(3 * x));
        var options = new CondensingOptions { MaximumCells = 300, WeightMeaning = WeightMeaning.Counts, Limits = [1] };
        var builder = new CondensedSampleBuilder(options);
        builder.Add(values.AsSpan(0, 1000), weights.AsSpan(0, 1000));
        builder.Merge(CondensedSample.Of(values.AsSpan(1000), options with { Weights = weights.AsMemory(1000) }));
        CondensedSample whole = CondensedSample.Of(values, options with { Weights = weights });
        Same(whole, builder.Build(), 1e-12);
        Near.Relative(values.Zip(weights).Where(pair => pair.First < 1).Sum(pair => pair.Second), whole.WeightBelow(1), 1e-14);
        Assert.Equal(weights.Count(w => w > 0), whole.Count);
        Assert.Equal(weights.Sum(), whole.EffectiveCount);
    }

    [Fact]
    public void FromCells_OwnCellsSplitAndShuffled_IsTheSample()
    {
        CondensedSample sample = CondensedSample.Of(SeededColumns.Draw("normal", 900, 10), new CondensingOptions { CellWidth = 0.125, Moments = 8 });
        long[] cells = [.. sample.Cells, .. sample.Cells];
        double[] sums = [.. sample.Sums, .. sample.Sums];
        Array.ConvertAll(sums, x => x / 2).CopyTo(sums, 0);
        CondensedSample again = CondensedSample.FromCells(0.125, 8, cells, sums, new CellTotals { Minimum = sample.Minimum, Maximum = sample.Maximum });
        Same(sample, again, 1e-15);
    }

    [Fact]
    public void FromCells_ImpossibleInput_IsRefused()
    {
        Assert.Throws<ArgumentException>(() => CondensedSample.FromCells(0.3, 2, [1], [1, 0]));
        Assert.Throws<ArgumentException>(() => CondensedSample.FromCells(0.25, 2, [1], [1]));
        Assert.Throws<ArgumentException>(() => CondensedSample.FromCells(0.25, 2, [], []));
        Assert.Throws<ArgumentException>(() => CondensedSample.FromCells(0.25, 2, [1], [1, 0.6]));
        Assert.Throws<ArgumentException>(() => CondensedSample.FromCells(0.25, 2, [1], [double.NaN, 0]));
        Assert.Throws<ArgumentException>(() => CondensedSample.FromCells(0.25, 2, [1], [1.5, 0]));
        Assert.Throws<ArgumentException>(() => CondensedSample.FromCells(0.25, 2, [1], [1, 0], new CellTotals { Minimum = 3 }));
        Assert.Throws<ArgumentOutOfRangeException>(() => CondensedSample.FromCells(0.25, 1, [1], [1]));
    }

    [Fact]
    public void FromBytes_OwnBytes_IsTheSameSample()
    {
        CondensedSample sample = CondensedSample.Of([.. SeededColumns.Draw("normal", 700, 11), 1e280], new CondensingOptions { MaximumCells = 100, Limits = [0.25] });
        byte[] bytes = sample.ToBytes();
        CondensedSample again = CondensedSample.FromBytes(bytes);
        Same(sample, again, 0);
        Assert.Equal(bytes, again.ToBytes());
    }

    [Fact]
    public void FromBytes_HostileBytes_AreRefusedOrHarmless()
    {
        byte[] good = CondensedSample.Of(SeededColumns.Draw("normal", 300, 12), new CondensingOptions { MaximumCells = 40, Limits = [0.25] }).ToBytes();
        for (int length = 0; length < good.Length; length += 7)
        {
            Assert.Throws<ArgumentException>(() => CondensedSample.FromBytes(good.AsSpan(0, length)));
        }

        var random = new Random(13);
        for (int trial = 0; trial < 3000; trial++)
        {
            byte[] bad = [.. good];
            bad[random.Next(trial % 2 == 0 ? 96 : bad.Length)] = (byte)random.Next(256);
            if (trial % 3 != 0)
            {
                Seal(bad);
            }

            try
            {
                CondensedSample read = CondensedSample.FromBytes(bad);
                Assert.True(read.TotalWeight > 0 && read.Count > 0);
                read.Coarsen(1);
            }
            catch (ArgumentException)
            {
            }
        }
    }

    [Fact]
    public void Of_BadInput_SaysWhatAndWhere()
    {
        Assert.StartsWith("values[1] is NaN", Assert.Throws<ArgumentException>(() => CondensedSample.Of([1, double.NaN])).Message, StringComparison.Ordinal);
        Assert.Equal(1, CondensedSample.Of([1, double.NaN], new CondensingOptions { Missing = MissingValues.LeaveOut }).LeftOut);
        Assert.Throws<ArgumentOutOfRangeException>(() => CondensedSample.Of([1], new CondensingOptions { CellWidth = double.NaN }));
        Assert.Throws<ArgumentException>(() => CondensedSample.Of([1], new CondensingOptions { Limits = [1, 1] }));
        Assert.Throws<ArgumentException>(() => CondensedSample.Merge(CondensedSample.Of([1]), CondensedSample.Of([1], new CondensingOptions { Moments = 8 })));
        Assert.Throws<InvalidOperationException>(() => new CondensedSampleBuilder().Build());
        var builder = new CondensedSampleBuilder();
        Assert.Throws<ArgumentException>(() => builder.Add([1, 2, double.PositiveInfinity]));
        Assert.Equal(0, builder.Count);
        Assert.Throws<ArgumentException>(() => CondensedSample.Of([1]).WeightBelow(3));
    }

    private static void Same(CondensedSample expected, CondensedSample actual, double tolerance)
    {
        Assert.Equal(expected.CellWidth, actual.CellWidth);
        Assert.Equal(expected.Cells.ToArray(), actual.Cells.ToArray());
        Assert.Equal(expected.Singles.ToArray(), actual.Singles.ToArray());
        Assert.Equal((expected.Count, expected.Minimum, expected.Maximum, expected.IsWeighted), (actual.Count, actual.Minimum, actual.Maximum, actual.IsWeighted));
        Near.Relative(expected.TotalWeight, actual.TotalWeight, tolerance + 1e-15);
        Near.Relative(expected.EffectiveCount, actual.EffectiveCount, tolerance + 1e-14);
        for (int i = 0; i < expected.Sums.Length; i++)
        {
            Near.Absolute(expected.Sums[i], actual.Sums[i], tolerance * expected.Sums[i - (i % expected.Moments)], $"sum {i}");
        }

        foreach (double limit in expected.Limits)
        {
            Near.Relative(expected.WeightBelow(limit), actual.WeightBelow(limit), tolerance);
        }
    }

    /// <summary>A matching check sum, as an attacker would make it: FNV-1a, 64 bits.</summary>
    private static void Seal(byte[] bytes)
    {
        ulong hash = 14695981039346656037;
        foreach (byte b in bytes.AsSpan(0, bytes.Length - 8))
        {
            hash = (hash ^ b) * 1099511628211;
        }

        BinaryPrimitives.WriteUInt64LittleEndian(bytes.AsSpan(bytes.Length - 8), hash);
    }
}
