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
            : (p >= Reach ? _kernel.Moment(l) : Incomplete(_kernel, l, p)) - (q >= Reach ? 0 : Incomplete(_kernel, l, -q));
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

    /// <summary>∫ uˡ K up to <paramref name="u"/>: in closed form for the Gaussian, the exponential and polynomials on [−1, 1], the kernel's own otherwise.</summary>
    public static double Incomplete(Kernel kernel, int l, double u)
    {
        if (u > 0)
        {
            return kernel.Moment(l) - ((l % 2 == 0 ? 1 : -1) * Incomplete(kernel, l, -u));
        }

        if (l == 0)
        {
            return kernel.CumulativeCore(u);
        }

        if (ReferenceEquals(kernel, Kernel.Gaussian))
        {
            double phi = NormalLaw.Density(u);
            return l == 1 ? -phi : NormalLaw.Cumulative(u) - (u * phi);
        }

        if (kernel.ExponentialRate > 0)
        {
            // ½ ∫ v^l e^v up to u, in units of 1/λ.
            double v = kernel.ExponentialRate * u;
            return Math.Exp(v) / 2 * (l == 1 ? v - 1 : (v * v) - (2 * v) + 2) / Math.Pow(kernel.ExponentialRate, l);
        }

        return kernel.EdgePolynomial.IsEmpty ? (u <= -kernel.SupportRadius ? 0 : kernel.IncompleteMomentCore(l, u)) : OfPolynomial(kernel.EdgePolynomial, l, u);
    }

    /// <summary>The same by quadrature, u ≤ 0: every kernel is smooth on the negative half of its support.</summary>
    public static double ByQuadrature(Kernel kernel, int l, double u)
    {
        // ∫ v^l K = u^l C − l ∫ v^{l−1} C with C the distribution function: a sum over panels no wider than the kernel's own unit, an eighth of it
        // where K ends; the stretch left out has a share of C below 1e-17.
        double from = double.IsFinite(kernel.SupportRadius) ? -kernel.SupportRadius : u - ReachOf(kernel);
        if (u <= from)
        {
            return 0;
        }

        double widest = double.IsFinite(kernel.SupportRadius) ? kernel.SupportRadius * GaussRule.ShortStretch : 1;
        int panels = (int)Math.Ceiling((u - from) / widest);
        double width = (u - from) / panels;
        Span<double> x = stackalloc double[GaussRule.Nodes];
        Span<double> y = stackalloc double[GaussRule.Nodes];
        double integral = 0;
        for (int k = 0; k < panels; k++)
        {
            GaussRule.Place(from + (k * width), from + ((k + 1) * width), x);
            for (int i = 0; i < x.Length; i++)
            {
                y[i] = (l == 1 ? 1 : x[i]) * kernel.CumulativeCore(x[i]);
            }

            integral += GaussRule.Sum(y, width);
        }

        return (Math.Pow(u, l) * kernel.CumulativeCore(u)) - (l * integral);
    }

    // With s = 1 + u: ∫ (σ − 1)ˡ P(σ) dσ over [0, s], term by term.
    private static double OfPolynomial(ReadOnlySpan<double> polynomial, int l, double u)
    {
        double s = 1 + u;
        double sum = 0;
        for (int i = 0; s > 0 && i < polynomial.Length; i++)
        {
            double power = Math.Pow(s, i + 1);
            sum += polynomial[i] * power * (l == 1 ? (s / (i + 2)) - (1.0 / (i + 1)) : (s * s / (i + 3)) - (2 * s / (i + 2)) + (1.0 / (i + 1)));
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
