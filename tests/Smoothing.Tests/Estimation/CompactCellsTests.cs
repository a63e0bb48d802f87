using Smoothing.Estimation;
using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Estimation;

// Unsorted values, many points: against sums in 31-digit arithmetic.
[Trait("Category", "Widths")]
public class CompactCellsTests
{
    public static TheoryData<string> Samples => [.. HardSamples.Names];

    [Theory]
    [MemberData(nameof(Samples))]
    public void Derivatives_UnsortedValues_Hold13DigitsAndExactZeros(string name)
    {
        double[] values = HardSamples.Make(name, 6000);
        const double width = 0.15;
        double[] x = HardSamples.Points(values, width, 37);
        var actual = new double[x.Length];
        foreach (EdgeKernel kernel in EdgeKernel.All)
        {
            Sample sample = Sample.Of(values);
            var sums = new CompactSums(sample, kernel, width);
            Assert.True(sums.UsesCells(x));
            sums.Derivatives(x, 0, actual);
            Assert.False(sample.IsSorted);
            for (int j = 0; j < x.Length; j += 3)
            {
                double expected = (double)(CompactSumsTests.Sum(values, [], x[j], width, kernel.Formula) / (width * (DoubleDouble)values.Length));
                if (expected == 0)
                {
                    Assert.Equal(0, actual[j]);
                }

                Near.Relative(expected, actual[j], 1e-13, $"{name} {kernel.Name} at {x[j]}");
            }
        }
    }

    // Two ways through the same sums: cells over unsorted values, blocks over sorted ones. Weighted, with points in random order and repeated.
    [Theory]
    [MemberData(nameof(Samples))]
    public void Derivatives_ManyRandomPoints_AgreeWithSortedBlocks(string name)
    {
        double[] values = HardSamples.Make(name, 130_000);
        double[] weights = [.. values.Select((_, i) => 0.5 + (i % 11))];
        var random = new RandomStream(5);
        double low = values.Order().ElementAt(3000), high = values.OrderDescending().ElementAt(3000);
        double[] x = [.. Enumerable.Range(0, 4000).Select(j => j % 10 == 9 ? values[j] : low - 0.2 + ((high - low + 0.4) * random.NextUniform()))];
        Sample unsorted = Sample.Of(values, new SampleOptions { Weights = weights });
        Sample sorted = Sample.Of(values, new SampleOptions { Weights = weights });
        Assert.Equal(values.Length, sorted.SortedValues.Length); // the asking sorts
        foreach (EdgeKernel kernel in new[] { EdgeKernel.Flat, EdgeKernel.Beta1, EdgeKernel.Cubes })
        {
            var cells = new CompactSums(unsorted, kernel, 0.2);
            var blocks = new CompactSums(sorted, kernel, 0.2);
            Assert.True(cells.UsesCells(x));
            Assert.False(blocks.UsesCells(x));
            var a = new double[x.Length];
            var b = new double[x.Length];
            cells.Derivatives(x, 0, a);
            blocks.Derivatives(x, 0, b);
            for (int j = 0; j < x.Length; j++)
            {
                Near.Relative(b[j], a[j], 1e-13, $"{name} {kernel.Name} at {x[j]}");
            }
        }
    }

    [Fact]
    public void Derivatives_AMillionEqualValues_DoNotDrift()
    {
        var values = new double[1_000_000];
        Array.Fill(values, 0.1);
        double[] x = [.. Enumerable.Range(0, 100).Select(j => -0.3 + (0.0081 * j))];
        var actual = new double[x.Length];
        foreach (EdgeKernel kernel in new[] { EdgeKernel.Beta1, EdgeKernel.Cubes })
        {
            var sums = new CompactSums(Sample.Of(values), kernel, 0.3);
            Assert.True(sums.UsesCells(x));
            sums.Derivatives(x, 0, actual);
            for (int j = 0; j < x.Length; j++)
            {
                Near.Relative((double)(CompactSumsTests.Sum([0.1], [], x[j], 0.3, kernel.Formula) / 0.3), actual[j], 1e-13, kernel.Name);
            }
        }
    }

    [Fact]
    public void Derivatives_RepeatedCalls_AllocateNothing()
    {
        double[] values = HardSamples.Make("normal", 20_000);
        double[] x = [.. Enumerable.Range(0, 500).Select(j => -3 + (0.012 * j))];
        var y = new double[x.Length];
        Density unsorted = Density.Of(Sample.Of(values), Kernel.Epanechnikov, 0.2);
        Sample sample = Sample.Of(values);
        Assert.Equal(values.Length, sample.SortedValues.Length);
        Density sorted = Density.Of(sample, Kernel.Epanechnikov, 0.2);
        Density gaussian = Density.Of(Sample.Of(values.AsSpan(0, 500)), Kernel.Gaussian, 0.2);
        foreach (Density density in new[] { unsorted, sorted, gaussian })
        {
            // The runtime itself may allocate once while it recompiles or collects: what the call allocates every time is the least of several.
            long least = long.MaxValue;
            for (int call = 0; call < 6; call++)
            {
                long before = GC.GetAllocatedBytesForCurrentThread();
                density.Values(x, y);
                least = Math.Min(least, GC.GetAllocatedBytesForCurrentThread() - before);
            }

            Assert.Equal(0, least);
        }
    }
}
