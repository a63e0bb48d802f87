using MathNet.Numerics;
using Smoothing.Kernels;
using Smoothing.Numerics;

namespace Smoothing.Theory;

/// <summary>What smoothing a sample of a known density costs: bias, variance and their sums, exactly and asymptotically.</summary>
/// <remarks>
/// <para>Notation: f the target, f̂ the estimate from n independent observations with kernel K and bandwidth h, K_h(u) = K(u/h)/h, k the order
/// of the kernel, μ_k its k-th moment, r the derivative that is estimated, R(a) = ∫a². x and h are in the unit of the target's values; errors
/// of the curve in that unit to the power −(r + 1), integrated squared errors to the power −(2r + 1).</para>
/// <para>Exact values. Gaussian and Gaussian-based kernels on normal mixtures: closed forms, relative error about 1e-13 for bias and
/// integrated squared bias at every h (Fryer 1976; Marron &amp; Wand 1992), 0.5 to 8 microseconds for a 15-component mixture. Other kernels on
/// normal mixtures: one integral for each pair of components, 1e-10. Every other target: quadrature, 1e-10 where its derivatives are known;
/// where they are not, bias as h → 0 keeps only about 1e-14 of f. Variances lose digits where h is so large that f̂ hardly scatters: about 1e-15 of E f̂² absolute.</para>
/// <para>Lengths are taken in a power of two near the target's spread where that is below 1e-6 or above 1e6, so that results are the same in
/// any unit; a result outside the range of double ends as 0 or ∞. Immutable and safe to share between threads.
/// A theory informs a decision; it replaces no standard, code or licensed judgement.</para>
/// </remarks>
public sealed partial class ErrorTheory
{
    private readonly SmoothingError _exact;
    private readonly TargetDensity _target; // in units of 2^_power
    private readonly int _power;
    private readonly Lazy<bool> _integrable;

    /// <summary>The theory of one kernel on one target.</summary>
    /// <param name="kernel">Any kernel.</param>
    /// <param name="target">Any target.</param>
    /// <param name="derivative">r: the r-th derivative of the curve is what is estimated; 0, the default, is the density itself.</param>
    /// <exception cref="ArgumentNullException">An argument is null.</exception>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="derivative"/> is negative.</exception>
    /// <exception cref="InvalidOperationException">A derivative below r jumps, in the target or in the kernel, so the estimate has no such theory.</exception>
    public ErrorTheory(Kernel kernel, TargetDensity target, int derivative = 0)
    {
        Kernel = Guard.Given(kernel);
        Target = Guard.Given(target);
        DerivativeOrder = Guard.AtLeast(derivative, 0);
        target.RequireNoJump(derivative, Guard.Text($"The error of derivative {derivative}"));
        KernelRoughness = kernel.Roughness(derivative);
        double spread = Math.Max(target.Widest, target.Finest);
        _power = spread is >= 1e-6 and <= 1e6 ? 0 : Math.Clamp(Math.ILogB(spread), -1000, 1000);
        _target = _power == 0 ? target : target.Scaled(Math.ScaleB(1, -_power));
        _exact = (_target as NormalMixture, kernel.GaussianPolynomial.Length) switch
        {
            (null, _) => new QuadratureError(kernel, _target, derivative),
            ({ } mixture, 0) => new MixtureKernelError(kernel, mixture, derivative),
            ({ } mixture, 1) when derivative == 0 => new GaussianMixtureError(mixture),
            ({ } mixture, _) => new GaussianFamilyError(kernel, mixture, derivative),
        };
        _integrable = new(() =>
        {
            _target.RequireSquareIntegrable(derivative, Guard.Text($"An integrated error (with R(f^({derivative})))"));
            return true;
        });
    }

    /// <summary>The kernel.</summary>
    public Kernel Kernel { get; }

    /// <summary>The target.</summary>
    public TargetDensity Target { get; }

    /// <summary>r: which derivative is estimated; 0 is the density itself.</summary>
    public int DerivativeOrder { get; }

    private double KernelRoughness { get; }

    private double LeadingFactor => Kernel.Moment(Kernel.Order) / SpecialFunctions.Factorial(Kernel.Order);

    /// <summary>(K_h∗f⁽ʳ⁾ − f⁽ʳ⁾)(x), exact; relative accuracy kept as h → 0.</summary>
    /// <remarks>Closed forms cost one exponential a component; quadrature some 10 to 100 microseconds. As h → ∞ the bias tends to −f⁽ʳ⁾(x).</remarks>
    /// <param name="x">Where, finite, in the unit of the values.</param>
    /// <param name="h">Bandwidth, positive, in the unit of the values.</param>
    /// <returns>How much too high (positive) or too low (negative) the estimate is on average.</returns>
    /// <exception cref="ArgumentOutOfRangeException">x is not finite or h not positive and finite.</exception>
    public double Bias(double x, double h) => Out(_exact.Bias(X(x), H(h)), DerivativeOrder + 1);

    /// <summary>hᵏ μ_k f⁽ʳ⁺ᵏ⁾(x)/k!, which is h²μ₂f''(x)/2 for order 2; with two terms also hᵏ⁺² μ_k+2 f⁽ʳ⁺ᵏ⁺²⁾(x)/(k + 2)!.</summary>
    /// <remarks>The remainder is of order hᵏ⁺² with one term, hᵏ⁺⁴ with two, where f has that many derivatives in reach of the kernel. Source: Wand &amp; Jones (1995), sec. 2.8 and 2.12.</remarks>
    /// <param name="x">Where, finite.</param>
    /// <param name="h">Bandwidth, positive.</param>
    /// <param name="terms">1 or 2.</param>
    /// <returns>The leading bias as h → 0.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument is out of range.</exception>
    /// <exception cref="InvalidOperationException">The target's derivative of that order is not known.</exception>
    public double AsymptoticBias(double x, double h, int terms = 1)
    {
        (double at, double width) = (X(x), H(h));
        Guard.InRange(terms, 1, 2);
        int k = Kernel.Order;
        double bias = LeadingBias(at, width);
        double next = terms == 1 ? 0 : Math.Pow(width, k + 2) * Kernel.Moment(k + 2) / SpecialFunctions.Factorial(k + 2) * _target.Derivative(at, DerivativeOrder + k + 2);
        return Out(bias + next, DerivativeOrder + 1);
    }

    /// <summary>Variance of the estimate, exact: {h^(−2r−1) ∫ K⁽ʳ⁾(u)² f(x − hu) du − E²}/n, E = f⁽ʳ⁾(x) + bias.</summary>
    /// <param name="x">Where, finite.</param>
    /// <param name="h">Bandwidth, positive.</param>
    /// <param name="n">Number of observations, at least 1.</param>
    /// <returns>The variance, never negative.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument is out of range.</exception>
    public double Variance(double x, double h, long n) => Out(ExactVariance(X(x), H(h), Guard.AtLeast(n, 1)), (2 * DerivativeOrder) + 2);

    /// <summary>f(x) R(K⁽ʳ⁾)/(n h^(2r+1)); with two terms also −f⁽ʳ⁾(x)²/n.</summary>
    /// <remarks>For r = 0 the remainder is of order 1/n with one term, h/n with two. Source: Wand &amp; Jones (1995), sec. 2.5 and 2.12.</remarks>
    /// <param name="x">Where, finite.</param>
    /// <param name="h">Bandwidth, positive.</param>
    /// <param name="n">Number of observations, at least 1.</param>
    /// <param name="terms">1 or 2.</param>
    /// <returns>The leading variance as h → 0; with two terms it is negative where h is far too large for the formula.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument is out of range.</exception>
    public double AsymptoticVariance(double x, double h, long n, int terms = 1)
    {
        (double at, double width) = (X(x), H(h));
        Guard.AtLeast(n, 1);
        Guard.InRange(terms, 1, 2);
        double level = terms == 1 ? 0 : _target.Derivative(at, DerivativeOrder);
        return Out(LeadingVariance(at, width, n) - (level * level / n), (2 * DerivativeOrder) + 2);
    }

    /// <summary>E{f̂⁽ʳ⁾(x) − f⁽ʳ⁾(x)}² = bias² + variance, exact.</summary>
    /// <param name="x">Where, finite.</param>
    /// <param name="h">Bandwidth, positive.</param>
    /// <param name="n">Number of observations, at least 1.</param>
    /// <returns>The mean squared error at x.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument is out of range.</exception>
    public double MeanSquaredError(double x, double h, long n) => Out(ExactSquaredError(X(x), H(h), Guard.AtLeast(n, 1)), (2 * DerivativeOrder) + 2);

    /// <summary>{hᵏ μ_k f⁽ʳ⁺ᵏ⁾(x)/k!}² + f(x) R(K⁽ʳ⁾)/(n h^(2r+1)): leading bias² + leading variance.</summary>
    /// <param name="x">Where, finite.</param>
    /// <param name="h">Bandwidth, positive.</param>
    /// <param name="n">Number of observations, at least 1.</param>
    /// <returns>The asymptotic mean squared error at x.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument is out of range.</exception>
    /// <exception cref="InvalidOperationException">The target's derivative r + k is not known.</exception>
    public double AsymptoticMeanSquaredError(double x, double h, long n)
    {
        (double at, double width) = (X(x), H(h));
        double bias = LeadingBias(at, width);
        return Out((bias * bias) + LeadingVariance(at, width, Guard.AtLeast(n, 1)), (2 * DerivativeOrder) + 2);
    }

    /// <summary>∫ bias² = (1/2π) ∫ |φ_f(t)|² t²ʳ {1 − κ(ht)}² dt, exact; φ_f and κ the Fourier transforms of f and K.</summary>
    /// <param name="h">Bandwidth, positive.</param>
    /// <returns>The integrated squared bias; R(f⁽ʳ⁾) as h → ∞. Relative accuracy is kept as h → 0.</returns>
    /// <exception cref="ArgumentOutOfRangeException">h is not positive and finite.</exception>
    /// <exception cref="InvalidOperationException">R(f⁽ʳ⁾) does not exist, so no integrated error does.</exception>
    public double IntegratedSquaredBias(double h) => Out(Integrals(H(h)).Bias2, (2 * DerivativeOrder) + 1);

    /// <summary>∫ variance, exact: {R(K⁽ʳ⁾) h^(−2r−1) − ∫ E²}/n.</summary>
    /// <param name="h">Bandwidth, positive.</param>
    /// <param name="n">Number of observations, at least 1.</param>
    /// <returns>The integrated variance.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument is out of range.</exception>
    /// <exception cref="InvalidOperationException">R(f⁽ʳ⁾) does not exist, so no integrated error does.</exception>
    public double IntegratedVariance(double h, long n)
    {
        double width = H(h);
        return Out(Math.Max(0, RoughnessAt(width) - Integrals(width).Mean2) / Guard.AtLeast(n, 1), (2 * DerivativeOrder) + 1);
    }

    /// <summary>Mean integrated squared error ∫ E(f̂⁽ʳ⁾ − f⁽ʳ⁾)², exact.</summary>
    /// <remarks>Integrated squared bias + integrated variance. For the Gaussian kernel on N(0, 1) it is Fryer's (1976) formula, on normal mixtures Theorem 2.1 of Marron &amp; Wand (1992).</remarks>
    /// <param name="h">Bandwidth, positive.</param>
    /// <param name="n">Number of observations, at least 1.</param>
    /// <returns>The MISE, positive.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument is out of range.</exception>
    /// <exception cref="InvalidOperationException">R(f⁽ʳ⁾) does not exist, so no integrated error does.</exception>
    public double Mise(double h, long n) => Out(ExactMise(H(h), Guard.AtLeast(n, 1)), (2 * DerivativeOrder) + 1);

    /// <summary>Asymptotic MISE: R(K⁽ʳ⁾)/(n h^(2r+1)) + h²ᵏ (μ_k/k!)² R(f⁽ʳ⁺ᵏ⁾).</summary>
    /// <remarks>Source: Wand &amp; Jones (1995), sec. 2.5, 2.8 and 2.12. It can mislead where n is small for the target: see docs/theory.md.</remarks>
    /// <param name="h">Bandwidth, positive.</param>
    /// <param name="n">Number of observations, at least 1.</param>
    /// <returns>The leading terms of the MISE.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument is out of range.</exception>
    /// <exception cref="InvalidOperationException">R(f⁽ʳ⁺ᵏ⁾) does not exist; the message says why.</exception>
    public double Amise(double h, long n)
    {
        double width = H(h);
        double leading = RoughnessAt(width) / Guard.AtLeast(n, 1);
        return Out(leading + (Math.Pow(width, 2 * Kernel.Order) * LeadingFactor * LeadingFactor * _target.Roughness(DerivativeOrder + Kernel.Order)), (2 * DerivativeOrder) + 1);
    }

    // Clamped to where every formula still works; beyond, results have long reached their limits.
    private double X(double x) => Math.Clamp(Math.ScaleB(Guard.Finite(x), -_power), -1e300, 1e300);

    private double H(double h) => Math.Clamp(Math.ScaleB(Guard.Positive(h), -_power), 1e-300, 1e300);

    /// <summary>From units of 2^_power to the caller's: a value that is a length to the power −p.</summary>
    private double Out(double value, int p) => _power == 0 ? value : Math.ScaleB(value, -p * _power);

    private double RoughnessAt(double h) => KernelRoughness / Math.Pow(h, (2 * DerivativeOrder) + 1);

    private double LeadingBias(double x, double h) => Math.Pow(h, Kernel.Order) * LeadingFactor * _target.Derivative(x, DerivativeOrder + Kernel.Order);

    private double LeadingVariance(double x, double h, long n) => _target.Value(x) * RoughnessAt(h) / n;

    private double ExactVariance(double x, double h, long n)
    {
        double mean = _target.Derivative(x, DerivativeOrder) + _exact.Bias(x, h);
        return Math.Max(0, _exact.Spread(x, h) - (mean * mean)) / n;
    }

    private double ExactSquaredError(double x, double h, long n)
    {
        double bias = _exact.Bias(x, h);
        return (bias * bias) + ExactVariance(x, h, n);
    }

    private double ExactMise(double h, long n)
    {
        (double bias2, double mean2) = Integrals(h);
        return bias2 + (Math.Max(0, RoughnessAt(h) - mean2) / n);
    }

    private (double Bias2, double Mean2) Integrals(double h)
    {
        _ = _integrable.Value;
        return _exact.Integrals(h);
    }
}
