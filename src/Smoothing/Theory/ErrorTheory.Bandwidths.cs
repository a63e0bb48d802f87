using Smoothing.Kernels;
using Smoothing.Numerics;

namespace Smoothing.Theory;

/// <content>Optimal bandwidths.</content>
public sealed partial class ErrorTheory
{
    /// <summary>The h of least MISE: the best of all local minima.</summary>
    /// <remarks>Method: sign changes of the derivative on a logarithmic scan, each refined as a root; the minimum with the least MISE wins.</remarks>
    /// <param name="n">Number of observations, at least 1.</param>
    /// <returns>The global minimiser.</returns>
    /// <exception cref="InvalidOperationException">No minimum was found.</exception>
    public double OptimalBandwidth(long n)
    {
        IReadOnlyList<double> minima = LocallyOptimalBandwidths(n);
        return minima.Count == 1 ? minima[0] : minima.MinBy(h => Mise(h, n));
    }

    /// <summary>All h at which the MISE has a local minimum, ascending. The claw at n = 50 has two.</summary>
    /// <param name="n">Number of observations, at least 1.</param>
    /// <returns>At least one bandwidth.</returns>
    /// <exception cref="InvalidOperationException">No minimum was found.</exception>
    public IReadOnlyList<double> LocallyOptimalBandwidths(long n)
    {
        Guard.AtLeast(n, 1);
        int p = (2 * DerivativeOrder) + 1;
        return Minima(
            h =>
            {
                (double bias2, double mean2) = _exact.IntegralSlopes(h);
                return bias2 + (((-p * KernelRoughness * Math.Pow(h, -p - 1)) - mean2) / n);
            },
            n,
            "The MISE");
    }

    /// <summary>The h of least MSE at x.</summary>
    /// <param name="x">Where, finite.</param>
    /// <param name="n">Number of observations, at least 1.</param>
    /// <returns>The global minimiser within the range looked at, up to twenty times the spread of the target.</returns>
    /// <exception cref="InvalidOperationException">The MSE has no minimum there, such as far out where it falls for ever.</exception>
    public double OptimalBandwidthAt(double x, long n)
    {
        Guard.Finite(x);
        Guard.AtLeast(n, 1);
        double g = Target.Derivative(x, DerivativeOrder);
        List<double> minima = Minima(
            h =>
            {
                double bias = _exact.Bias(x, h);
                double slope = _exact.BiasSlope(x, h);
                return (2 * bias * slope) + ((_exact.SpreadSlope(x, h) - (2 * (g + bias) * slope)) / n);
            },
            n,
            Guard.Text($"The MSE at {x}"));
        return minima.Count == 1 ? minima[0] : minima.MinBy(h => MeanSquaredError(x, h, n));
    }

    /// <summary>Minimiser of <see cref="Amise"/>: {(2r + 1) R(K⁽ʳ⁾) (k!)²/(2k μ_k² R(f⁽ʳ⁺ᵏ⁾) n)}^(1/(2k+2r+1)).</summary>
    /// <param name="n">Number of observations, at least 1.</param>
    /// <returns>The asymptotically best bandwidth.</returns>
    /// <exception cref="InvalidOperationException">R(f⁽ʳ⁺ᵏ⁾) does not exist; the message says why.</exception>
    public double AsymptoticOptimalBandwidth(long n)
    {
        Guard.AtLeast(n, 1);
        return Power(KernelRoughness, LeadingFactor * LeadingFactor * Target.Roughness(DerivativeOrder + Kernel.Order), n);
    }

    /// <summary>Minimiser of <see cref="AsymptoticMeanSquaredError"/> at x.</summary>
    /// <param name="x">Where, finite.</param>
    /// <param name="n">Number of observations, at least 1.</param>
    /// <returns>The asymptotically best bandwidth at x.</returns>
    /// <exception cref="InvalidOperationException">f⁽ʳ⁺ᵏ⁾(x) = 0 or f(x) = 0, where the formula has no minimum.</exception>
    public double AsymptoticOptimalBandwidthAt(double x, long n)
    {
        Guard.AtLeast(n, 1);
        int order = DerivativeOrder + Kernel.Order;
        double curvature = LeadingFactor * Target.Derivative(Guard.Finite(x), order);
        double f = Target.Value(x);
        if (!(curvature != 0 && f > 0))
        {
            throw new InvalidOperationException(Guard.Text($"The asymptotic optimal bandwidth at {x} does not exist: f = {f} and f^({order}) = {Target.Derivative(x, order)} there, and the formula needs both above or below 0. Use OptimalBandwidthAt, which is exact."));
        }

        return Power(f * KernelRoughness, curvature * curvature, n);
    }

    /// <summary>The bandwidth with which <paramref name="other"/> smooths as this kernel does with <paramref name="h"/>: h δ₀(other)/δ₀(this).</summary>
    /// <remarks>Source: Marron &amp; Nolan (1988).</remarks>
    /// <param name="h">Bandwidth of this kernel, positive.</param>
    /// <param name="other">A kernel of the same order.</param>
    /// <returns>The equivalent bandwidth.</returns>
    /// <exception cref="ArgumentException">The orders differ.</exception>
    public double EquivalentBandwidth(double h, Kernel other)
    {
        Guard.Given(other);
        return other.Order == Kernel.Order
            ? Guard.Positive(h) * other.CanonicalBandwidth / Kernel.CanonicalBandwidth
            : throw new ArgumentException(Guard.Text($"other must have order {Kernel.Order}, but {other.Name} has order {other.Order}: kernels of different orders have no common scale."), nameof(other));
    }

    private double Power(double variance, double bias2, long n)
    {
        int p = (2 * DerivativeOrder) + 1;
        int k = Kernel.Order;
        return Math.Pow(p * variance / (2 * k * bias2 * n), 1.0 / ((2 * k) + p));
    }

    private List<double> Minima(Func<double, double> slope, long n, string what)
    {
        // From well below the smallest feature's own best h (jumps ask for n^(−1/2)) to where nothing is left of the shape.
        bool closed = _exact is GaussianMixtureError or GaussianFamilyError;
        double low = 0.05 * Target.Finest * Math.Pow(n, Target.Breaks.Count > 0 ? -0.5 : -1 / 3.0);
        double high = 20 * Math.Max(Target.Widest, Target.Finest);
        double step = closed ? 1.05 : 1.3; // closed forms can afford a finer scan
        var minima = new List<double>();
        double last = low;
        double before = slope(low);
        for (double h = low * step; h <= high; h *= step)
        {
            double now = slope(h);
            if (before < 0 && now >= 0)
            {
                minima.Add(Roots.Between(slope, last, h));
            }

            (last, before) = (h, now);
        }

        return minima.Count > 0 ? minima : throw new InvalidOperationException(Guard.Text($"{what} has no minimum for h between {low} and {high}: it still falls at the end. Use a larger n or a point nearer to the data."));
    }
}
