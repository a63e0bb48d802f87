using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Estimation;

/// <summary>Smoothed resampling: a value picked by weight, moved by its bandwidth times a draw from K.</summary>
/// <remarks>
/// Method: the mixture form of the estimate (Silverman 1986, §6.4.1). K is drawn by inverting its distribution function in the lower half,
/// where it keeps relative accuracy, and mirrored; the Gaussian by the polar method. Exact but for rounding.
/// </remarks>
internal sealed class SmoothedDraws
{
    private readonly Sample _sample;
    private readonly Kernel _kernel;
    private readonly double[] _widths;
    private readonly Lazy<double[]> _cumulative;

    /// <summary>One bandwidth for all values.</summary>
    public SmoothedDraws(Sample sample, Kernel kernel, double bandwidth)
        : this(sample, kernel, [bandwidth])
    {
    }

    /// <summary>A bandwidth for each value.</summary>
    public SmoothedDraws(Sample sample, Kernel kernel, double[] widths)
    {
        _sample = sample;
        _kernel = kernel;
        _widths = widths;
        _cumulative = new Lazy<double[]>(() => Accumulate(sample));
    }

    public Sample Sample => _sample;

    /// <summary>Fills the destination with independent draws from the plain curve.</summary>
    public void Fill(ref RandomStream random, Span<double> destination)
    {
        double[] cumulative = _cumulative.Value;
        for (int i = 0; i < destination.Length; i++)
        {
            int pick = cumulative.Length == 0 ? random.NextIndex(_sample.Count) : Pick(cumulative, random.NextUniform());
            double width = _widths.Length == 1 ? _widths[0] : _widths[pick];
            destination[i] = _sample.Values[pick] + (width * FromKernel(ref random));
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
    private static int Pick(double[] cumulative, double u)
    {
        double target = u * cumulative[^1];
        int low = 0;
        int high = cumulative.Length - 1;
        while (low < high)
        {
            int middle = (low + high) / 2;
            if (cumulative[middle] > target)
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
        Kernel kernel = _kernel;
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
