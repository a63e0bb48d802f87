using Smoothing.Numerics;

namespace Smoothing.Kernels;

/// <summary>A symmetric weight function K with ∫K = 1 that spreads each value over its neighbourhood.</summary>
/// <remarks>
/// An estimate at bandwidth h uses K((x − X)/h)/h, so h is the scale of K as written here, not its standard deviation.
/// Kernels are immutable and safe to share between threads. Constants: closed forms, 1e-14 relative.
/// </remarks>
public abstract partial class Kernel
{
    private protected Kernel()
    {
    }

    /// <summary>The kernel's name, a term of the trade.</summary>
    public abstract string Name { get; }

    /// <summary>Index k of the first non-zero moment after the zeroth; 2 for every kernel that is nowhere negative.</summary>
    public virtual int Order => 2;

    /// <summary>K is zero beyond this distance from 0; +∞ when K has no end.</summary>
    public abstract double SupportRadius { get; }

    /// <summary>K(u); supports are closed, so K(±1) is the value at the edge. 0 at ±∞.</summary>
    /// <param name="u">Distance from the centre in bandwidths; ±∞ allowed.</param>
    /// <returns>K(u), which is negative in places only for kernels of order above 2.</returns>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="u"/> is NaN.</exception>
    public double Value(double u) => ValueCore(Guard.Number(u));

    /// <summary>The r-th derivative of K at <paramref name="u"/>; at a kink the mean of the one-sided limits.</summary>
    /// <param name="u">Distance from the centre in bandwidths; ±∞ allowed.</param>
    /// <param name="order">Which derivative, 0 or more.</param>
    /// <returns>K⁽ʳ⁾(u).</returns>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="u"/> is NaN or <paramref name="order"/> negative.</exception>
    /// <exception cref="InvalidOperationException">The derivative would hold a jump of K or of a lower derivative there.</exception>
    public double Derivative(double u, int order = 1)
    {
        Guard.Number(u);
        Guard.AtLeast(order, 0);
        return order == 0 ? ValueCore(u) : DerivativeCore(u, order);
    }

    /// <summary>∫ K from −∞ to <paramref name="u"/>.</summary>
    /// <param name="u">Upper end in bandwidths; ±∞ allowed.</param>
    /// <returns>A number in [0, 1] for kernels that are nowhere negative; relative accuracy kept in the lower tail.</returns>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="u"/> is NaN.</exception>
    public double Cumulative(double u) => CumulativeCore(Guard.Number(u));

    /// <summary>The j-th moment μ_j = ∫ uʲ K(u) du; 0 for odd j.</summary>
    /// <param name="order">Which moment, 0 or more.</param>
    /// <returns>μ_j.</returns>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="order"/> is negative.</exception>
    public double Moment(int order) => Guard.AtLeast(order, 0) % 2 == 1 ? 0 : EvenMoment(order);

    /// <summary>Roughness R(K⁽ʳ⁾) = ∫ (K⁽ʳ⁾(u))² du.</summary>
    /// <param name="derivative">r, 0 or more.</param>
    /// <returns>The integral, positive.</returns>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="derivative"/> is negative.</exception>
    /// <exception cref="InvalidOperationException">K⁽ʳ⁾ is not square integrable: K or a lower derivative jumps.</exception>
    public double Roughness(int derivative = 0) => RoughnessCore(Guard.AtLeast(derivative, 0));

    /// <summary>Canonical bandwidth δ₀ = (R(K)/μ_k²)^(1/(2k+1)), k = <see cref="Order"/>: h in units of δ₀ smooths alike for all kernels of one order.</summary>
    /// <remarks>Source: Marron &amp; Nolan (1988).</remarks>
    public double CanonicalBandwidth
    {
        get
        {
            double moment = Moment(Order);
            return Math.Pow(Roughness() / (moment * moment), 1.0 / ((2 * Order) + 1));
        }
    }

    /// <summary>A ratio of sample sizes, 1 is best: how many observations the optimal polynomial kernel of the same order needs for the error that this kernel reaches with 1.</summary>
    /// <remarks>
    /// {R(K*) |μ_k(K*)|^(1/k)} / {R(K) |μ_k(K)|^(1/k)}, k = <see cref="Order"/>, K* = <c>PolynomialOfOrder(k)</c> (for k = 8 the kernel of the same
    /// family). For k = 2 this is {3/(5√5)}/{√μ₂ R(K)}. Source: Silverman (1986), eq. 3.26; for order k from the minimum of the asymptotic error.
    /// </remarks>
    public double Efficiency => KernelConstants.BestSize(Order) / (Roughness() * Math.Pow(Math.Abs(Moment(Order)), 1.0 / Order));

    /// <summary>The name of the kernel.</summary>
    /// <returns><see cref="Name"/>.</returns>
    public override string ToString() => Name;

    internal abstract double ValueCore(double u);

    internal abstract double DerivativeCore(double u, int order);

    internal abstract double CumulativeCore(double u);

    internal abstract double EvenMoment(int order);

    internal abstract double RoughnessCore(int derivative);

    /// <summary>Coefficients of K in s = 1 − |u| on the support [−1, 1], lowest power first; empty when K is no such polynomial.</summary>
    internal virtual ReadOnlySpan<double> EdgePolynomial => default;

    /// <summary>Coefficients of q in K(u) = φ(u) q(u²), lowest power first, for Gaussian-based kernels; empty otherwise.</summary>
    internal virtual ReadOnlySpan<double> GaussianPolynomial => default;

    private protected InvalidOperationException NoDerivative(int order, string where) =>
        new(Guard.Text($"Derivative {order} of the {Name} kernel does not exist {where}: the one below it jumps there. Use a smoother kernel, such as the Gaussian."));

    private protected InvalidOperationException NoRoughness(int derivative) =>
        new(Guard.Text($"R(K^({derivative})) of the {Name} kernel does not exist: a lower derivative jumps, so this one is not square integrable. Use a smoother kernel, such as the Gaussian."));
}
