using System.Globalization;
using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;
using System.Runtime.Intrinsics.X86;
using Smoothing.Estimation;

namespace Smoothing.Tests.Numerics;

/// <summary>
/// Everything marked with this category is run again by <c>.ci/run</c> with narrower vectors: the same accuracy is asked of each width, and the same bits of moments,
/// which are compared with plain scalar arithmetic here.
/// </summary>
[Trait("Category", "Widths")]
public class VectorWidthTests
{
    /// <summary>Set by <c>.ci/run</c>: the most bits a vector may have in this run.</summary>
    private const string Variable = "SMOOTHING_WIDEST_VECTOR";

    private const int Moments = 16;

    // A rerun that does not switch anything off would prove nothing.
    [Fact]
    public void HardwareWidth_OfThisRun_IsTheOneAskedFor()
    {
        int width = Vector512.IsHardwareAccelerated ? 512 : Vector256.IsHardwareAccelerated ? 256 : 128;
        string asked = Environment.GetEnvironmentVariable(Variable) ?? "";
        if (asked.Length > 0)
        {
            int widest = int.Parse(asked, CultureInfo.InvariantCulture);
            Assert.True(width <= widest, $"vectors of {width} bits are on, though {Variable} = {asked}");
            Assert.True(widest > 256 || !Avx512F.IsSupported, $"AVX-512 is on, though {Variable} = {asked}");
            Assert.True(widest > 128 || !Avx2.IsSupported, $"AVX2 is on, though {Variable} = {asked}");
        }
        else
        {
            Assert.Equal(Avx2.IsSupported, width >= 256);
        }
    }

    [Theory]
    [InlineData(1)]
    [InlineData(1003)]
    [InlineData(70_001)] // more than one stretch between which full cells are emptied
    public unsafe void Moments_OfUnsortedValues_HaveTheBitsOfScalarArithmetic(int count)
    {
        const int cells = 2048;
        const double inverse = 256, first = -1024;
        double[] values = Values(count), actual = new double[cells * Moments];
        fixed (double* from = values, to = actual)
        {
            MomentScatter.Add(from, null, count, inverse, first, cells, to);
        }

        // Long columns are added in stretches of twelve values a cell, then moved to a second table: all of it, after the last stretch, else cells of more than 4,096.
        int stretch = Math.Max(1 << 13, 12 * cells);
        double[] expected = new double[actual.Length], part = new double[actual.Length];
        for (int i = 0; i < count; i++)
        {
            AddOne(values[i] * inverse, first, part);
            if ((i + 1) % stretch == 0 || i + 1 == count)
            {
                for (int c = 0; c < cells; c++)
                {
                    Span<double> record = part.AsSpan(c * Moments, Moments);
                    for (int r = 0; r < Moments && (i + 1 == count || record[0] > 4096); r++)
                    {
                        expected[(c * Moments) + r] += record[r];
                    }

                    if (record[0] > 4096)
                    {
                        record.Clear();
                    }
                }
            }
        }

        AssertBits(expected, actual);
    }

    [Fact]
    public unsafe void Moments_OfSortedValues_HaveTheBitsOfScalarArithmetic()
    {
        const double inverse = 64;
        double[] values = [.. Values(3001).Order()];
        fixed (double* from = values)
        {
            int count = MomentScatter.AddSorted(from, null, values.Length, inverse, null, null);
            double[] numbers = new double[count], actual = new double[count * Moments], expected = new double[count * Moments];
            fixed (double* cell = numbers, to = actual)
            {
                Assert.Equal(count, MomentScatter.AddSorted(from, null, values.Length, inverse, cell, to));
            }

            foreach (double value in values)
            {
                int at = Array.BinarySearch(numbers, Math.Floor(value * inverse));
                AddPowers((value * inverse) - numbers[at] - 0.5, expected.AsSpan(at * Moments, Moments));
            }

            AssertBits(expected, actual);
        }
    }

    // m'ᵣ = 2⁻ʳ Σ C(r, q)(∓1/2)ʳ⁻ᵠ m_q, both halves of a cell in turn, lowest power first.
    [Fact]
    public unsafe void Moments_OfCellsTwiceAsWide_HaveTheBitsOfScalarArithmetic()
    {
        const double width = 1 / 64.0;
        MomentCells cells = MomentCells.Of(Smoothing.Samples.Sample.Of(Values(5000)), 16 * width);
        var fine = new MomentLevel(cells);
        var coarse = new MomentLevel(fine);
        Assert.Equal(2 * width, coarse.Width);
        double[] expected = new double[coarse.Count * Moments], actual = new Span<double>(coarse.Records, coarse.Count * Moments).ToArray();
        for (int c = 0; c < coarse.Count; c++)
        {
            for (int r = 0; r < Moments; r++)
            {
                for (int q = 0; q < Moments; q++)
                {
                    double left = fine.Records[(2 * c * Moments) + q] * Shift(r, q, -0.5), right = fine.Records[(((2 * c) + 1) * Moments) + q] * Shift(r, q, 0.5);
                    expected[(c * Moments) + r] += left + right;
                }
            }
        }

        AssertBits(expected, actual);
    }

    private static double Shift(int r, int q, double by)
    {
        double binomial = 1;
        for (int k = 1; k <= q; k++)
        {
            binomial = binomial * (r - k + 1) / k;
        }

        return q > r ? 0 : Math.ScaleB(binomial * Math.Pow(by, r - q), -r);
    }

    // Values by whole-number arithmetic alone, so that they have the same bits everywhere; two in five in one narrow place.
    private static double[] Values(int count)
    {
        var values = new double[count];
        ulong state = 20260101;
        for (int i = 0; i < count; i++)
        {
            state = (state * 6364136223846793005) + 1442695040888963407;
            double uniform = (state >> 11) * (1 / 9007199254740992.0);
            values[i] = i % 5 < 2 ? 0.1 + (uniform / 1024) : (8 * uniform) - 4;
        }

        return values;
    }

    private static void AddOne(double place, double first, double[] records)
    {
        double cell = Math.Floor(place);
        AddPowers(place - cell - 0.5, records.AsSpan((int)(cell - first) * Moments, Moments));
    }

    // Not inlined and without fused products: the tree b^{r&1} (b²)^{r>>1&1} (b⁴)^{r>>2&1} (b⁸)^{r>>3}.
    [MethodImpl(MethodImplOptions.NoInlining)]
    private static void AddPowers(double b, Span<double> record)
    {
        double b2 = b * b, b4 = b2 * b2, b8 = b4 * b4;
        for (int r = 0; r < Moments; r++)
        {
            double low = ((r & 1) != 0 ? b : 1) * ((r & 2) != 0 ? b2 : 1);
            double middle = low * ((r & 4) != 0 ? b4 : 1);
            record[r] += middle * ((r & 8) != 0 ? b8 : 1);
        }
    }

    private static void AssertBits(double[] expected, double[] actual)
    {
        Assert.Contains(expected, v => v != 0);
        for (int i = 0; i < expected.Length; i++)
        {
            Assert.True(
                BitConverter.DoubleToInt64Bits(expected[i]) == BitConverter.DoubleToInt64Bits(actual[i]),
                FormattableString.Invariant($"moment {i % Moments} of cell {i / Moments}: expected {expected[i]:R}, got {actual[i]:R}"));
        }
    }
}
