using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Inference;

/// <summary>Bootstrap tests of "at most k modes" on an interval.</summary>
/// <remarks>
/// Method: k = 1 by Hall and York (2001): samples from the estimate at the critical bandwidth, not rescaled, counted at λ_α times it; rejected when at
/// most a share α has more than one mode. Valid for one mode on an interval that holds data throughout. k ≥ 2 by Silverman (1981): rescaled, counted at the
/// critical bandwidth itself; conservative. λ_α as recalled from the paper; its level was checked by simulation (4.9 to 6.5 % at 5 %).
/// </remarks>
internal static class ModeTests
{
    // Where the p-value is read off; in between by linear interpolation.
    private static readonly double[] s_levels = [0.001, 0.005, 0.01, 0.02, 0.05, 0.1, 0.15, 0.2, 0.3, 0.5];

    /// <summary>Hall and York's λ_α.</summary>
    public static double Calibration(double alpha) =>
        ((0.94029 * alpha * alpha * alpha) - (1.59914 * alpha * alpha) + (0.17695 * alpha) + 0.48971)
        / ((alpha * alpha * alpha) - (1.77793 * alpha * alpha) + (0.36162 * alpha) + 0.42423);

    public static (double PValue, bool Rejected) One(SmoothedResamples resamples, double critical, Interval range, double significance, ulong seed, int count, Action step)
    {
        double[] levels = [.. s_levels.Append(significance).Distinct().Order()];
        double[] lambda = [.. levels.Select(Calibration)];
        var more = new int[levels.Length];
        var places = new double[resamples.Length];
        var weights = new double[resamples.Length];
        for (int b = 0; b < count; b++)
        {
            step();
            var random = new RandomStream(seed, (ulong)b);
            ReadOnlySpan<double> counts = resamples.Fill(ref random, places, weights);

            // λ falls as α rises: find the first level at which this sample shows more than one mode.
            int low = 0;
            int high = levels.Length;
            while (low < high)
            {
                int middle = (low + high) / 2;
                if (ModeCounter.Count(places, counts, lambda[middle] * critical, range) > 1)
                {
                    high = middle;
                }
                else
                {
                    low = middle + 1;
                }
            }

            for (int i = low; i < levels.Length; i++)
            {
                more[i]++;
            }
        }

        bool rejected = (double)more[Array.IndexOf(levels, significance)] / count <= significance;
        double before = double.NaN;
        for (int i = 0; i < levels.Length; i++)
        {
            double excess = ((double)more[i] / count) - levels[i];
            if (excess <= 0)
            {
                double p = i == 0 ? levels[0] : levels[i - 1] + ((levels[i] - levels[i - 1]) * before / (before - excess));
                return (p, rejected);
            }

            before = excess;
        }

        return (1, rejected);
    }

    public static double Several(SmoothedResamples resamples, double critical, int modes, Interval range, ulong seed, int count, Action step)
    {
        var places = new double[resamples.Length];
        var weights = new double[resamples.Length];
        int more = 0;
        for (int b = 0; b < count; b++)
        {
            step();
            var random = new RandomStream(seed, ((ulong)modes << 32) + (ulong)b);
            ReadOnlySpan<double> counts = resamples.Fill(ref random, places, weights);
            more += ModeCounter.Count(places, counts, critical, range) > modes ? 1 : 0;
        }

        // One added to both: the observed sample is one of those possible.
        return (more + 1.0) / (count + 1);
    }

    /// <summary>The values and their weights; more than <see cref="SmoothedResamples.CountsFrom"/> on sixteen thousand nodes about the interval.</summary>
    public static (double[] X, double[] Weights) Condense(Sample sample, Interval range)
    {
        if (sample.Count < SmoothedResamples.CountsFrom)
        {
            return (sample.Values.ToArray(), sample.Weights.ToArray());
        }

        const int Cells = 1 << 14;

        // A range's length on either side: no bandwidth asked for reaches further than that with more than a trace.
        double from = range.Lower - range.Length;
        double step = 3 * range.Length / Cells;
        var sums = new double[Cells + 1];
        ReadOnlySpan<double> w = sample.Weights;
        for (int i = 0; i < sample.Count; i++)
        {
            double place = (sample.Values[i] - from) / step;
            if (place >= 0 && place < Cells)
            {
                int node = (int)place;
                double weight = w.IsEmpty ? 1 : w[i];
                sums[node] += weight * (1 - (place - node));
                sums[node + 1] += weight * (place - node);
            }
        }

        return ([.. Enumerable.Range(0, Cells + 1).Select(j => from + (j * step))], sums);
    }
}
