using Smoothing.Kernels;
using Smoothing.Numerics;

namespace Smoothing.Estimation;

/// <summary>What a kernel keeps of its moments when the support ends at a distance: a_l = ∫ uˡ K(u) du over [−q, p] with p = (x − lower)/h, q = (upper − x)/h.</summary>
/// <remarks>Source: Jones (1993), with both limits in reach at once.</remarks>
internal sealed class BoundaryMoments
{
    // A tail of K, weighted with 1 + u², below this is lost in the rounding of a moment near 1.
    private const double Negligible = 1e-17;

    // A support shorter than this many bandwidths: the difference of two incomplete moments would lose digits, a Gauss rule on either side of 0 does not.
    private const double ShortSupport = 0.25;

    private readonly Kernel _kernel;
    private readonly double _bandwidth;
    private readonly Interval _support;

    public BoundaryMoments(Kernel kernel, double bandwidth, Interval support)
    {
        _kernel = kernel;
        _bandwidth = bandwidth;
        _support = support;
        Reach = ReachOf(kernel);
    }

    /// <summary>In bandwidths: a limit farther away than this is not felt.</summary>
    public double Reach { get; }

    /// <summary>The radius of K, or where its tail has become negligible.</summary>
    public static double ReachOf(Kernel kernel)
    {
        if (double.IsFinite(kernel.SupportRadius))
        {
            return kernel.SupportRadius;
        }

        double reach = 4;
        while (Math.Abs(kernel.CumulativeCore(-reach)) * (1 + (reach * reach)) > Negligible)
        {
            reach *= 1.0625;
        }

        return reach;
    }

    /// <summary>Taylor coefficients in x of a_l about a point of the support, up to <paramref name="order"/>.</summary>
    public double[] Series(double x, int l, int order)
    {
        double p = (x - _support.Lower) / _bandwidth;
        double q = (_support.Upper - x) / _bandwidth;
        var series = new double[order + 1];
        series[0] = p + q <= ShortSupport
            ? Quadratured(l, p, q)
            : (p >= Reach ? _kernel.Moment(l) : _kernel.IncompleteMoment(l, p)) - (q >= Reach ? 0 : _kernel.IncompleteMoment(l, -q));
        double scale = 1;
        for (int j = 1; j <= order; j++)
        {
            scale /= _bandwidth * j;
            double atP = p >= Reach ? 0 : Integrand(p, l, j - 1);
            double atQ = q >= Reach ? 0 : Integrand(-q, l, j - 1);
            series[j] = (atP - atQ) * scale;
        }

        return series;
    }

    /// <summary>The m-th derivative of uˡ K(u).</summary>
    public static double WeightedDerivative(Kernel kernel, double u, int l, int m)
    {
        // Leibniz: Σ C(m, i) l!/(l − i)! u^{l−i} K^{(m−i)}(u); a factor that is exactly 0 keeps a missing derivative out.
        double sum = 0;
        double factor = 1;
        for (int i = 0; i <= Math.Min(l, m); i++)
        {
            double weight = factor * Math.Pow(u, l - i);
            sum += weight == 0 ? 0 : weight * (m == i ? kernel.ValueCore(u) : kernel.DerivativeCore(u, m - i));
            factor *= (double)(l - i) * (m - i) / (i + 1);
        }

        return sum;
    }

    private double Quadratured(int l, double p, double q)
    {
        Span<double> x = stackalloc double[GaussRule.Nodes];
        Span<double> y = stackalloc double[GaussRule.Nodes];
        double sum = 0;
        foreach ((double from, double to) in new[] { (-q, 0.0), (0.0, p) })
        {
            GaussRule.Place(from, to, x);
            for (int i = 0; i < x.Length; i++)
            {
                y[i] = WeightedDerivative(_kernel, x[i], l, 0);
            }

            sum += GaussRule.Sum(y, to - from);
        }

        return sum;
    }

    private double Integrand(double u, int l, int m) => WeightedDerivative(_kernel, u, l, m);
}
