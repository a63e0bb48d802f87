using System.Numerics.Tensors;

namespace Smoothing.Samples;

/// <summary>Dependence between neighbouring rows.</summary>
internal static class LagCorrelation
{
    /// <summary>The lag-1 autocorrelation, on values halved and scaled by a power of two so that nothing overflows.</summary>
    public static double LagOne(double[] values)
    {
        double low = TensorPrimitives.Min<double>(values), high = TensorPrimitives.Max<double>(values);
        double half = (high / 2) - (low / 2);
        if (values.Length < 3 || !(half > 0))
        {
            return 0;
        }

        double sum = 0;
        foreach (double x in values)
        {
            sum += ((x / 2) - (low / 2)) / half;
        }

        double mean = sum / values.Length;
        double previous = 0, product = 0, square = 0;
        for (int i = 0; i < values.Length; i++)
        {
            double d = (((values[i] / 2) - (low / 2)) / half) - mean;
            product += i > 0 ? d * previous : 0;
            square += d * d;
            previous = d;
        }

        return square > 0 ? Math.Clamp(product / square, -1, 1) : 0;
    }
}
