using System.Numerics.Tensors;
using Smoothing.Numerics;

namespace Smoothing.Inference;

/// <summary>Counts the modes of a Gaussian estimate inside an interval.</summary>
/// <remarks>
/// Method: values are shared linearly between nodes, 16 or 64 a bandwidth, and the slope at each node is a weighted sum over six bandwidths either side; a
/// mode is a change of sign from + to −. Linear sharing adds at most a quarter of the squared step to the kernel's variance, h grows by up to
/// 0.05 % with 16 nodes; truncation at 6h leaves 1e-8 of the peak. Cost: n plus 12 products a node and node per bandwidth. Source: Silverman (1981).
/// </remarks>
internal static class ModeCounter
{
    /// <summary>Nodes per bandwidth for resamples, whose own scatter is far larger than the error.</summary>
    public const int Coarse = 16;

    /// <summary>Nodes per bandwidth for the data: h is then off by at most 3e-5.</summary>
    public const int Fine = 64;

    private const double Reach = 6;   // in bandwidths

    // A finer grid than this over one interval serves no test: half a million nodes for an interval of 30,000 bandwidths.
    private const int MostNodes = 1 << 19;

    /// <param name="x">Places, in any order.</param>
    /// <param name="weights">Their weights; empty for equal ones.</param>
    /// <param name="h">Bandwidth.</param>
    /// <param name="range">Modes strictly inside count.</param>
    /// <param name="perBandwidth">Nodes per bandwidth.</param>
    public static int Count(ReadOnlySpan<double> x, ReadOnlySpan<double> weights, double h, Interval range, int perBandwidth = Coarse)
    {
        double[] slope = Slopes(x, weights, h, range, perBandwidth);
        int modes = 0;
        bool rising = false;
        foreach (double s in slope)
        {
            if (s > 0)
            {
                rising = true;
            }
            else if (s < 0)
            {
                modes += rising ? 1 : 0;
                rising = false;
            }
        }

        return modes;
    }

    /// <summary>The slopes, up to a positive factor, at equal steps from one end of the range to the other.</summary>
    public static double[] Slopes(ReadOnlySpan<double> x, ReadOnlySpan<double> weights, double h, Interval range, int perBandwidth = Coarse)
    {
        int steps = (int)Math.Clamp(Math.Ceiling(range.Length / h * perBandwidth), 2, MostNodes);
        double step = range.Length / steps;
        int reach = Math.Min((int)Math.Ceiling(Reach * h / step), MostNodes);
        var counts = new double[steps + 1 + (2 * reach)];
        double origin = range.Lower - (reach * step);
        double inverse = 1 / step;
        for (int i = 0; i < x.Length; i++)
        {
            double place = (x[i] - origin) * inverse;
            if (place >= 0 && place < counts.Length - 1)
            {
                int node = (int)place;
                double w = weights.IsEmpty ? 1 : weights[i];
                double right = (place - node) * w;
                counts[node] += w - right;
                counts[node + 1] += right;
            }
        }

        var taps = new double[(2 * reach) + 1];
        for (int m = 0; m < taps.Length; m++)
        {
            double u = (reach - m) * step / h;
            taps[m] = -u * Math.Exp(-0.5 * u * u);
        }

        var slope = new double[steps + 1];
        for (int j = 0; j < slope.Length; j++)
        {
            slope[j] = TensorPrimitives.Dot<double>(counts.AsSpan(j, taps.Length), taps);
        }

        return slope;
    }
}
