using System.Numerics.Tensors;
using Smoothing.Numerics;

namespace Smoothing.Samples;

/// <summary>Total weight, effective count, mean and standard deviation in few vectorised passes.</summary>
/// <remarks>
/// Method: blocks are summed by vector instructions and their sums added with compensation; the mean is corrected by the mean of
/// the residuals, and the spread is the sum of squared residuals about it. Values and weights are first scaled by a power of two where
/// sums or squares would leave the range of a double. Dominant error: the rounding of one block, about 1e-15 of the block's magnitudes.
/// </remarks>
internal static class SampleSummary
{
    /// <summary>Long enough for vector instructions to pay, short enough for the stack and the first-level cache (16 kB).</summary>
    private const int Block = 2048;

    public static (double Total, double Effective, double Mean, double Deviation) Of(double[] values, double[] weights, WeightMeaning meaning)
    {
        // Exponents are brought near 0 only where the largest one is beyond 2^±400, so that ordinary data see no scaling at all.
        double valueScale = Scale(Math.Abs(TensorPrimitives.MaxMagnitude<double>(values)));
        double weightScale = weights.Length == 0 ? 1 : Scale(TensorPrimitives.Max<double>(weights));
        Sums(values, weights, valueScale, weightScale, 0, out double total, out double squares, out double first, out _);
        double rough = first / total;
        Sums(values, weights, valueScale, weightScale, rough, out _, out _, out double residual, out double spread);
        double shift = residual / total;
        double mean = rough + shift;
        double variance = Math.Max(0, (spread / total) - (shift * shift));
        if (variance <= 1e-30 * rough * rough && TensorPrimitives.Min<double>(values) == TensorPrimitives.Max<double>(values))
        {
            // Equal values: what is left of the variance is rounding.
            (mean, variance) = (values[0] * valueScale, 0);
        }

        double effective = weights.Length == 0 ? values.Length
            : meaning == WeightMeaning.Counts ? total / weightScale
            : Math.Min(Math.Max(total / squares * total, 1), values.Length);
        double deviation = effective > 1 ? Math.Sqrt(variance * (effective / (effective - 1))) / valueScale : 0;
        return (total / weightScale, effective, mean / valueScale, deviation);
    }

    private static double Scale(double largest)
    {
        int exponent = largest > 0 ? Math.ILogB(largest) : 0;
        return Math.Abs(exponent) > 400 ? Math.ScaleB(1, -Math.Clamp(exponent, -1000, 1000)) : 1;
    }

    private static void Sums(
        double[] values, double[] weights, double valueScale, double weightScale, double centre, out double total, out double squares, out double first, out double spread)
    {
        CompensatedSum all = default, allSquares = default, allFirst = default, allSpread = default;
        Span<double> deviations = stackalloc double[Block];
        Span<double> scaled = stackalloc double[Block];
        for (int start = 0; start < values.Length; start += Block)
        {
            ReadOnlySpan<double> x = values.AsSpan(start, Math.Min(Block, values.Length - start));
            Span<double> d = deviations[..x.Length];
            TensorPrimitives.Multiply(x, valueScale, d);
            TensorPrimitives.Subtract(d, centre, d);
            if (weights.Length == 0)
            {
                all.Add(x.Length);
                allFirst.Add(TensorPrimitives.Sum<double>(d));
                allSpread.Add(TensorPrimitives.SumOfSquares<double>(d));
                continue;
            }

            Span<double> w = scaled[..x.Length];
            TensorPrimitives.Multiply(weights.AsSpan(start, x.Length), weightScale, w);
            all.Add(TensorPrimitives.Sum<double>(w));
            allSquares.Add(TensorPrimitives.SumOfSquares<double>(w));
            allFirst.Add(TensorPrimitives.Dot<double>(w, d));
            TensorPrimitives.Multiply(d, d, d);
            allSpread.Add(TensorPrimitives.Dot<double>(w, d));
        }

        (total, squares, first, spread) = (all.Value, allSquares.Value, allFirst.Value, allSpread.Value);
    }
}
