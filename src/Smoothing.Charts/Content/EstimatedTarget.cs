using Smoothing.Numerics;
using Smoothing.Samples;
using Smoothing.Theory;

namespace Smoothing.Charts.Content;

/// <summary>A stand-in for the unknown density, made of the values: what the error of the estimate is worked out for.</summary>
/// <remarks>
/// Method: the normal mixture (1/n)Σφ_g(x − Xᵢ) at the pilot bandwidth g of the bias statement, as in the smoothed bootstrap choice of bandwidth
/// (Faraway and Jhun 1990). Values are counted into cells of g/4 and stand at their mean: the second derivative then changes by less than
/// (1/8)²·3/2 of its size, 2.4 %, far below its own error. Known limits of the range are ignored.
/// </remarks>
internal static class EstimatedTarget
{
    private const double CellsPerBandwidth = 4;

    // The closed forms take the square of this many terms for each bandwidth.
    private const int MostTerms = 300;

    public static NormalMixture Of(Sample sample, double pilot)
    {
        double width = pilot / CellsPerBandwidth;
        while (true)
        {
            (double[] weights, double[] centres) = Condense(sample, width);
            if (weights.Length <= MostTerms)
            {
                double total = weights.Sum();
                double[] deviations = [.. Enumerable.Repeat(pilot, weights.Length)];
                return new NormalMixture([.. weights.Select(w => w / total)], centres, deviations);
            }

            width *= 2;
        }
    }

    private static (double[] Weights, double[] Centres) Condense(Sample sample, double width)
    {
        var weights = new List<double>();
        var sums = new List<double>();
        double last = double.NaN;
        ReadOnlySpan<double> x = sample.SortedValues;
        ReadOnlySpan<double> w = sample.SortedWeights;
        for (int i = 0; i < x.Length; i++)
        {
            double cell = Math.Floor((x[i] - x[0]) / width);
            double weight = w.IsEmpty ? 1 : w[i];
            if (cell != last)
            {
                weights.Add(0);
                sums.Add(0);
                last = cell;
            }

            weights[^1] += weight;
            sums[^1] += weight * (x[i] - x[0]);
        }

        double origin = x[0];
        return ([.. weights], [.. sums.Select((s, i) => origin + (s / weights[i]))]);
    }
}
