using Smoothing.Estimation;
using Smoothing.Samples;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Estimation;

/// <summary>Cells of columns far longer than a table: the same cells and moments as those of the sorted column, whatever lies in the middle.</summary>
[Trait("Category", "Widths")]
public class SparseCellsTests
{
    private const double Width = 1 / 64.0;

    public static TheoryData<string> Names => ["heavy", "two places", "one place", "scattered", "huge", "low outlier", "crowded"];

    [Theory]
    [MemberData(nameof(Names))]
    public unsafe void Fill_AnyColumn_HasTheCellsAndMomentsOfTheSortedOne(string name)
    {
        double[] values = Make(name);
        foreach (bool weighted in (bool[])[false, true])
        {
            double[] weights = weighted ? [.. values.Select((_, i) => 0.25 + (i % 7))] : [];
            MomentCells cells = MomentCells.Of(Sample.Of(values, new SampleOptions { Weights = weights }), 16 * Width);
            Assert.NotNull(cells.Numbers);
            Assert.Equal(Width, cells.Width);
            ILookup<double, int> expected = Enumerable.Range(0, values.Length).ToLookup(i => Math.Floor(values[i] / Width));
            Assert.Equal(expected.Select(g => g.Key).Order(), cells.Numbers);
            for (int c = 0; c < cells.Count; c++)
            {
                Span<DoubleDouble> sums = new DoubleDouble[MomentCells.Moments];
                foreach (int i in expected[cells.Numbers[c]])
                {
                    DoubleDouble power = weighted ? weights[i] : 1, b = (DoubleDouble)(values[i] / Width) - cells.Numbers[c] - 0.5;
                    for (int r = 0; r < sums.Length; r++, power *= b)
                    {
                        sums[r] += power;
                    }
                }

                for (int r = 0; r < sums.Length; r++)
                {
                    double scale = sums[0].High * Math.Pow(0.5, r);
                    Near.Absolute((double)sums[r], cells.Records[(c * MomentCells.Moments) + r], 4e-15 * scale, $"{name}, weighted {weighted}, cell {cells.Numbers[c]}, moment {r}");
                }
            }

            GC.KeepAlive(cells);
        }
    }

    // Added one after another, 400,000 equal numbers would be off by some 1e-11: emptied every few thousand, by a hundredth of that.
    [Fact]
    public unsafe void Fill_ManyEqualValuesAndFarOnes_AddsWithoutBias()
    {
        double[] values = new double[400_000];
        Array.Fill(values, 0.1);
        (values[0], values[^1]) = (-1e9, 1e9);
        MomentCells cells = MomentCells.Of(Sample.Of(values), 16 * Width);
        double b = (0.1 / Width) - Math.Floor(0.1 / Width) - 0.5;
        Assert.Equal(3, cells.Count);
        for (int r = 0; r < MomentCells.Moments; r++)
        {
            Near.Relative(399_998 * Math.Pow(b, r), cells.Records[MomentCells.Moments + r], 1e-12, $"moment {r}");
        }

        GC.KeepAlive(cells);
    }

    private static double[] Make(string name)
    {
        double[] z = HardSamples.Make(name is "heavy" ? "heavy" : "normal", name is "heavy" ? 60_000 : 9000);
        return name switch
        {
            "two places" => [.. z.Select((v, i) => v + (i % 3 == 0 ? 1e6 : -1e6))],
            "one place" => [.. z.Select((v, i) => i % 1000 == 0 ? v * 1e7 : v)],
            "scattered" => [.. z.Select(v => v * 1e8)],                        // hardly two values in one cell
            "huge" => [.. z.Select((v, i) => i == 5 ? 1e290 : i == 6 ? -1e290 : v)],
            "low outlier" => [-1e12, .. z],
            "crowded" => [.. z.Select((v, i) => i % 4 == 0 ? v * 1e5 : 0.1 + (1e-4 * v))],
            _ => z,
        };
    }
}
