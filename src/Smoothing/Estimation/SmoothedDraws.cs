using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Estimation;

/// <summary>Smoothed resampling: a value picked by weight, moved by its bandwidth times a draw from K.</summary>
/// <remarks>
/// Method: the mixture form of the estimate (Silverman 1986, §6.4.1). K is drawn by inverting its distribution function in the lower half,
/// where it keeps relative accuracy, and mirrored; the Gaussian by the polar method. Exact but for rounding.
/// </remarks>
internal sealed class SmoothedDraws(Sample sample, Kernel kernel, double bandwidth, double[]? factors = null)
{
    private readonly double[] _cumulative = Accumulate(sample);

    public Sample Sample => sample;

    /// <summary>Fills the destination with independent draws from the plain curve.</summary>
    public void Fill(ref RandomStream random, Span<double> destination)
    {
        for (int i = 0; i < destination.Length; i++)
        {
            int pick = _cumulative.Length == 0 ? random.NextIndex(sample.Count) : Pick(random.NextUniform());
            double width = factors is null ? bandwidth : bandwidth * factors[pick];
            destination[i] = sample.Values[pick] + (width * FromKernel(ref random));
        }
    }

    private static double[] Accumulate(Sample sample)
    {
        if (!sample.IsWeighted)
        {
            return [];
        }

        var sums = new double[sample.Count];
        CompensatedSum sum = default;
        for (int i = 0; i < sums.Length; i++)
        {
            sum.Add(sample.Weights[i]);
            sums[i] = sum.Value;
        }

        return sums;
    }

    // The first index whose running weight exceeds u Σw: values of weight 0 are never picked, as u lies strictly inside (0, 1).
    private int Pick(double u)
    {
        double target = u * _cumulative[^1];
        int low = 0;
        int high = _cumulative.Length - 1;
        while (low < high)
        {
            int middle = (low + high) / 2;
            if (_cumulative[middle] > target)
            {
                high = middle;
            }
            else
            {
                low = middle + 1;
            }
        }

        return low;
    }

    private double FromKernel(ref RandomStream random)
    {
        if (ReferenceEquals(kernel, Kernel.Gaussian))
        {
            return random.NextNormal();
        }

        double u = random.NextUniform();
        double p = Math.Min(u, 1 - u);
        double reach = kernel.SupportRadius;
        if (double.IsInfinity(reach))
        {
            reach = 1;
            while (kernel.CumulativeCore(-reach) > p)
            {
                reach *= 2;
            }
        }

        double below = Roots.Between(v => kernel.CumulativeCore(v) - p, -reach, 0);
        return u < 0.5 ? below : -below;
    }
}
