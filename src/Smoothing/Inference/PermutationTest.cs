using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Inference;

/// <summary>The permutation test of equal densities by the integrated squared difference at four bandwidths.</summary>
/// <remarks>
/// Method: T_h = ∫(f̂₁ − f̂₂)² = (1/2π)∫|φ₁ − φ₂|² e^(−h²t²) dt (Anderson, Hall and Titterington 1994) at 1, 2, 4 and 8 times the pooled bandwidth; the smallest of the four
/// p-values, itself calibrated within the same permutations, so that the level is exact. Values lie on nodes a quarter of a bandwidth apart; far values are
/// moved to the ends of the grid: any fixed placing of the pooled values keeps the level. Above 10⁵ values, and for counts, cells are relabelled as
/// hypergeometric counts: the cost no longer grows with n.
/// </remarks>
internal static class PermutationTest
{
    private const int CellsFrom = 100_000;
    private const int Smallest = 256;
    private const int Largest = 4096;

    // A relabelling and its reverse have the same statistic up to the rounding of a transform of 4,096 terms.
    private const double Tie = 1e-10;

    /// <summary>Multiples of the pooled bandwidth.</summary>
    private static readonly double[] s_scales = [1, 2, 4, 8];

    public static double Of(Sample a, Sample b, double h, ulong seed, int permutations, Action<int> step)
    {
        var grid = PermutationGrid.Of(a, b, h, Smallest, Largest);
        bool whole = (!a.IsWeighted || a.WeightMeaning == WeightMeaning.Counts) && (!b.IsWeighted || b.WeightMeaning == WeightMeaning.Counts);
        bool cells = whole && (a.IsWeighted || b.IsWeighted || (long)a.Count + b.Count > CellsFrom);
        var statistics = new double[permutations + 1][];
        var difference = new double[grid.Size];
        if (cells)
        {
            (long[] first, long[] all) = grid.Counts(a, b);
            double n1 = first.Sum();
            double total = all.Sum();
            var marked = new double[grid.Size];
            for (int r = 0; r <= permutations; r++)
            {
                step(r);
                var random = new RandomStream(seed, (ulong)r);
                if (r == 0)
                {
                    Array.ConvertAll(first, k => (double)k).CopyTo(marked, 0);
                }
                else
                {
                    HypergeometricDraws.Cells(ref random, all, (long)total, (long)n1, marked);
                }

                for (int j = 0; j < difference.Length; j++)
                {
                    difference[j] = (marked[j] / n1) - ((all[j] - marked[j]) / (total - n1));
                }

                statistics[r] = Statistics(difference, grid.Step, h);
            }
        }
        else
        {
            (int[] nodes, double[] right, double[] weights) = grid.Places(a, b);
            int[] order = [.. Enumerable.Range(0, nodes.Length)];
            for (int r = 0; r <= permutations; r++)
            {
                step(r);
                var random = new RandomStream(seed, (ulong)r);
                for (int i = 0; r > 0 && i < a.Count; i++)
                {
                    // The first part of a shuffle decides who is in the first sample.
                    int k = i + random.NextIndex(order.Length - i);
                    (order[i], order[k]) = (order[k], order[i]);
                }

                Spread(nodes, right, weights, order, a.Count, difference);
                statistics[r] = Statistics(difference, grid.Step, h);
            }
        }

        return Combined(statistics);
    }

    /// <summary>The p-value of the observed row (the first) by the smallest p-value over columns, calibrated over all rows.</summary>
    public static double Combined(double[][] statistics)
    {
        int rows = statistics.Length;
        var smallest = new int[rows];
        Array.Fill(smallest, int.MaxValue);
        for (int k = 0; k < statistics[0].Length; k++)
        {
            double[] sorted = [.. statistics.Select(row => row[k]).Order()];
            for (int r = 0; r < rows; r++)
            {
                // Rows with at least this value; what rounding alone tells apart is a tie.
                int at = Array.BinarySearch(sorted, statistics[r][k] * (1 - Tie));
                at = at >= 0 ? at : ~at;
                while (at > 0 && sorted[at - 1] >= statistics[r][k] * (1 - Tie))
                {
                    at--;
                }

                smallest[r] = Math.Min(smallest[r], rows - at);
            }
        }

        return smallest.Count(s => s <= smallest[0]) / (double)rows;
    }

    private static void Spread(int[] nodes, double[] right, double[] weights, int[] order, int firstCount, double[] difference)
    {
        double first = 0;
        double second = 0;
        for (int i = 0; i < order.Length; i++)
        {
            double w = weights.Length == 0 ? 1 : weights[order[i]];
            (first, second) = i < firstCount ? (first + w, second) : (first, second + w);
        }

        Array.Clear(difference);
        for (int i = 0; i < order.Length; i++)
        {
            int at = order[i];
            double w = (weights.Length == 0 ? 1 : weights[at]) * (i < firstCount ? 1 / first : -1 / second);
            difference[nodes[at]] += w * (1 - right[at]);
            difference[nodes[at] + 1] += w * right[at];
        }
    }

    private static double[] Statistics(double[] difference, double step, double h)
    {
        int size = difference.Length;
        double[] real = [.. difference];
        var imaginary = new double[size];
        FourierPlan.Forward(real, imaginary);
        var result = new double[s_scales.Length];
        double t = 2 * Math.PI / (size * step) * h;
        for (int k = 0; k <= size / 2; k++)
        {
            double square = (real[k] * real[k]) + (imaginary[k] * imaginary[k]);
            double z = k * t * (k * t);
            if (z > 40)
            {
                break;   // e^−40 is nothing
            }

            for (int s = 0; s < s_scales.Length; s++)
            {
                result[s] += square * Math.Exp(-z * s_scales[s] * s_scales[s]);
            }
        }

        return result;
    }
}
