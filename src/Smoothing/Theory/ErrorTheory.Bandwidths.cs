using Smoothing.Kernels;
using Smoothing.Numerics;

namespace Smoothing.Theory;

/// <content>Optimal bandwidths.</content>
public sealed partial class ErrorTheory
{
    private const double Farthest = 20; // spreads of the target: with more smoothing nothing is left of its shape at any point
    private const double FarthestOverall = 8; // the same for integrated errors: for N(0, 1) even one observation asks for no more than √2

    /// <summary>The h of least MISE: the best of all local minima.</summary>
    /// <remarks>
    /// Method: sign changes of the derivative by h on a logarithmic scan (steps of 5 % for closed forms, 40 % for quadrature) up to eight
    /// spreads of the target, each refined as a root; the minimum with the least MISE wins. Accuracy 1e-11 for closed forms, 1e-8 by
    /// quadrature. Cost: about 150 evaluations of a closed form, 0.1 to 2 milliseconds; by quadrature 0.2 to 5 seconds.
    /// </remarks>
    /// <param name="n">Number of observations, at least 1.</param>
    /// <returns>The global minimiser, in the unit of the values.</returns>
    /// <exception cref="ArgumentOutOfRangeException">n is below 1.</exception>
    /// <exception cref="InvalidOperationException">No minimum was found, or R(f⁽ʳ⁾) does not exist.</exception>
    public double OptimalBandwidth(long n)
    {
        List<double> minima = Minima(Guard.AtLeast(n, 1));
        return Length(minima.Count == 1 ? minima[0] : Some(minima, n).MinBy(h => ExactMise(h, n)));
    }

    /// <summary>All h at which the MISE has a local minimum, ascending. The claw at n = 50 has two (Marron &amp; Wand 1992, sec. 3).</summary>
    /// <param name="n">Number of observations, at least 1.</param>
    /// <returns>At least one bandwidth.</returns>
    /// <exception cref="ArgumentOutOfRangeException">n is below 1.</exception>
    /// <exception cref="InvalidOperationException">No minimum was found, or R(f⁽ʳ⁾) does not exist.</exception>
    public IReadOnlyList<double> LocallyOptimalBandwidths(long n) => [.. Some(Minima(Guard.AtLeast(n, 1)), n).Select(Length)];

    /// <summary>The h of least MSE at x.</summary>
    /// <remarks>
    /// It exists where the asymptotic one does not, such as at an inflection, f''(x) = 0. In a valley or a tail E f̂(x) crosses f(x) at some large h,
    /// where nothing of the shape is left but the value at x is right by accident; the global minimum may sit there. <paramref name="largest"/> keeps it out.
    /// </remarks>
    /// <param name="x">Where, finite.</param>
    /// <param name="n">Number of observations, at least 1.</param>
    /// <param name="largest">The largest h allowed, positive; by default twenty times the spread of the target.</param>
    /// <returns>The global minimiser up to there; <paramref name="largest"/> itself where a given one is best.</returns>
    /// <exception cref="ArgumentOutOfRangeException">x is not finite, n is below 1 or <paramref name="largest"/> is not positive.</exception>
    /// <exception cref="InvalidOperationException">None is given and the MSE falls up to the end, such as far out in a tail.</exception>
    public double OptimalBandwidthAt(double x, long n, double largest = double.PositiveInfinity)
    {
        (double h, bool falls, double high) = BestAt(X(x), Guard.AtLeast(n, 1), Cap(largest));
        return !falls ? Length(h) : throw new InvalidOperationException(Guard.Text($"The MSE at {x} has no least value for h up to {Length(high)}: it is lowest at that end, where the curve is all but 0. Use a larger n or a point nearer to the data."));
    }

    /// <summary>Minimiser of <see cref="Amise"/>: {(2r + 1) R(K⁽ʳ⁾) (k!)²/(2k μ_k² R(f⁽ʳ⁺ᵏ⁾) n)}^(1/(2k+2r+1)).</summary>
    /// <remarks>For N(m, σ²) and the Gaussian kernel σ{4/((2r + 3)n)}^(1/(2r+5)). Source: Wand &amp; Jones (1995), sec. 2.12. It can be several times too small: see docs/theory.md.</remarks>
    /// <param name="n">Number of observations, at least 1.</param>
    /// <returns>The asymptotically best bandwidth.</returns>
    /// <exception cref="ArgumentOutOfRangeException">n is below 1.</exception>
    /// <exception cref="InvalidOperationException">R(f⁽ʳ⁺ᵏ⁾) does not exist (the message says why) or is 0 (a target that is straight between its ends).</exception>
    public double AsymptoticOptimalBandwidth(long n)
    {
        Guard.AtLeast(n, 1);
        int order = DerivativeOrder + Kernel.Order;
        double roughness = _target.Roughness(order);
        return roughness > 0
            ? Length(Balance(KernelRoughness, LeadingFactor * LeadingFactor * roughness, n))
            : throw new InvalidOperationException(Guard.Text($"The asymptotic optimal bandwidth does not exist: R(f^({order})) of {Target.Name} is 0, so the formula sees no bias. Use OptimalBandwidth, which is exact."));
    }

    /// <summary>Minimiser of <see cref="AsymptoticMeanSquaredError"/> at x: {(2r + 1) f(x) R(K⁽ʳ⁾) (k!)²/(2k μ_k² f⁽ʳ⁺ᵏ⁾(x)² n)}^(1/(2k+2r+1)).</summary>
    /// <param name="x">Where, finite.</param>
    /// <param name="n">Number of observations, at least 1.</param>
    /// <returns>The asymptotically best bandwidth at x.</returns>
    /// <exception cref="ArgumentOutOfRangeException">x is not finite or n is below 1.</exception>
    /// <exception cref="InvalidOperationException">f(x) = 0 or f⁽ʳ⁺ᵏ⁾(x) = 0 (but for rounding: below 1e-12 of f(x) per feature length), where the formula has no minimum.</exception>
    public double AsymptoticOptimalBandwidthAt(double x, long n)
    {
        double at = X(x);
        Guard.AtLeast(n, 1);
        int order = DerivativeOrder + Kernel.Order;
        double f = _target.Value(at);
        double g = _target.Derivative(at, order);
        if (!(f > 0) || !(Math.Abs(g) > 1e-12 * f / Math.Pow(_target.Finest, order)))
        {
            throw new InvalidOperationException(Guard.Text($"The asymptotic optimal bandwidth at {x} does not exist: f = {Out(f, 1)} and f^({order}) = {Out(g, order + 1)} there, and the formula needs f above 0 and f^({order}) away from 0, or its bias vanishes. Use OptimalBandwidthAt, which is exact."));
        }

        return Length(Balance(f * KernelRoughness, LeadingFactor * LeadingFactor * g * g, n));
    }

    /// <summary>The bandwidth with which <paramref name="other"/> smooths as this kernel does with <paramref name="h"/>: h δ₀(other)/δ₀(this).</summary>
    /// <remarks>The ratio of the two asymptotically best bandwidths on every target. Source: Marron &amp; Nolan (1988).</remarks>
    /// <param name="h">Bandwidth of this kernel, positive.</param>
    /// <param name="other">A kernel of the same order.</param>
    /// <returns>The equivalent bandwidth.</returns>
    /// <exception cref="ArgumentNullException"><paramref name="other"/> is null.</exception>
    /// <exception cref="ArgumentOutOfRangeException">h is not positive and finite.</exception>
    /// <exception cref="ArgumentException">The orders differ.</exception>
    public double EquivalentBandwidth(double h, Kernel other)
    {
        Guard.Given(other);
        return other.Order == Kernel.Order
            ? Guard.Positive(h) * other.CanonicalBandwidth / Kernel.CanonicalBandwidth
            : throw new ArgumentException(Guard.Text($"other must have order {Kernel.Order}, but {other.Name} has order {other.Order}: kernels of different orders have no common scale."), nameof(other));
    }

    private double Length(double value) => Out(value, -1);

    /// <summary>The h at which variance/(n h^(2r+1)) + h²ᵏ bias² is least.</summary>
    private double Balance(double variance, double bias2, long n)
    {
        int p = (2 * DerivativeOrder) + 1;
        int k = Kernel.Order;
        return Math.Pow(p * variance / (2 * k * bias2 * n), 1.0 / ((2 * k) + p));
    }

    private List<double> Minima(long n)
    {
        _ = _integrable.Value;
        int p = (2 * DerivativeOrder) + 1;
        (double low, double high) = Range(n, FarthestOverall);
        return Scan(
            h =>
            {
                (double bias2, double mean2) = _exact.IntegralSlopes(h);
                return bias2 + (((-p * KernelRoughness * Math.Pow(h, -p - 1)) - mean2) / n);
            },
            low,
            high);
    }

    private List<double> Some(List<double> minima, long n) =>
        minima.Count > 0 ? minima : throw new InvalidOperationException(Guard.Text($"The MISE has no minimum for h up to {Length(Range(n, FarthestOverall).High)}: with n = {n} it still falls there. Use a larger n."));

    private double LeastMise(long n) => Minima(n).Append(Range(n, FarthestOverall).High).Min(h => ExactMise(h, n));

    /// <summary>The h of least MSE at x; <c>Falls</c> when the upper end of the range is better than every minimum inside.</summary>
    private (double H, bool Falls, double High) BestAt(double x, long n, double largest)
    {
        double g = _target.Derivative(x, DerivativeOrder);
        (double low, double high) = Range(n, Farthest);
        bool capped = largest < high;
        (low, high) = (Math.Min(low, largest / 2), Math.Min(high, largest));
        double best = high;
        double least = ExactSquaredError(x, high, n);
        foreach (double h in Scan(
            h =>
            {
                double bias = _exact.Bias(x, h);
                double slope = _exact.BiasSlope(x, h);
                return (2 * bias * slope) + ((_exact.SpreadSlope(x, h) - (2 * (g + bias) * slope)) / n);
            },
            low,
            high))
        {
            double error = ExactSquaredError(x, h, n);
            (best, least) = error <= least ? (h, error) : (best, least);
        }

        return (best, best == high && !capped, high);
    }

    private double Cap(double largest) =>
        double.IsPositiveInfinity(largest) ? largest : H(Guard.Positive(largest, "pass a bandwidth, or nothing"));

    /// <summary>From well below the smallest feature's own best h (which falls as n^(−1/2) where the curve jumps, else no faster than n^(−1/5)) to where nothing is left of the shape.</summary>
    private (double Low, double High) Range(long n, double farthest)
    {
        double scale = Kernel.CanonicalBandwidth / Kernel.Gaussian.CanonicalBandwidth; // h is in the kernel's own unit
        double low = 0.05 * scale * _target.Finest * Math.Pow(n, _target.Breaks.Count > 0 ? -0.5 : -0.2);
        return (low, farthest * scale * Math.Max(_target.Widest, _target.Finest));
    }

    /// <summary>Where the slope turns from negative to positive.</summary>
    private List<double> Scan(Func<double, double> slope, double low, double high)
    {
        bool closed = _exact is GaussianMixtureError or GaussianFamilyError;
        double step = closed ? 1.05 : 1.4; // closed forms can afford a finer scan
        var minima = new List<double>();
        double last = low;
        double before = slope(low);
        while (before >= 0 && last > 1e-12 * high)
        {
            last /= 10;
            before = slope(last);
        }

        for (double h = last * step; last < high; h *= step)
        {
            double to = Math.Min(h, high);
            double now = slope(to);
            if (before < 0 && now >= 0)
            {
                minima.Add(Roots.Between(slope, last, to, closed ? 1e-14 : 1e-10));
            }

            (last, before) = (to, now);
        }

        return minima;
    }
}
