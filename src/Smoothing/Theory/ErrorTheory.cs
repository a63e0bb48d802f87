using MathNet.Numerics;
using Smoothing.Kernels;
using Smoothing.Numerics;

namespace Smoothing.Theory;

/// <summary>What smoothing a sample of a known density costs: bias, variance and their sums, exactly and asymptotically.</summary>
/// <remarks>
/// Exact values: closed forms for the Gaussian kernel on normal mixtures, else quadrature (about 1e-10 relative for smooth targets).
/// Immutable and safe to share between threads. Notation: E = K_h∗f⁽ʳ⁾, k the order of the kernel, μ_k its k-th moment, R(a) = ∫a².
/// A theory informs a decision; it replaces no standard, code or licensed judgement.
/// </remarks>
public sealed partial class ErrorTheory
{
    private readonly SmoothingError _exact;

    /// <summary>The theory of one kernel on one target.</summary>
    /// <param name="kernel">Any kernel.</param>
    /// <param name="target">Any target.</param>
    /// <param name="derivative">r: the r-th derivative of the curve is what is estimated; 0 is the density itself.</param>
    /// <exception cref="ArgumentNullException">An argument is null.</exception>
    /// <exception cref="InvalidOperationException">A derivative below r jumps, in the target or in the kernel, so the estimate has no such theory.</exception>
    public ErrorTheory(Kernel kernel, TargetDensity target, int derivative = 0)
    {
        Kernel = Guard.Given(kernel);
        Target = Guard.Given(target);
        DerivativeOrder = Guard.AtLeast(derivative, 0);
        target.RequireNoJump(derivative, Guard.Text($"The error of derivative {derivative}"));
        KernelRoughness = kernel.Roughness(derivative);
        _exact = (target as NormalMixture, kernel.GaussianPolynomial.Length) switch
        {
            (null, _) => new QuadratureError(kernel, target, derivative),
            ({ } mixture, 0) => new MixtureKernelError(kernel, mixture, derivative),
            ({ } mixture, 1) when derivative == 0 => new GaussianMixtureError(mixture),
            ({ } mixture, _) => new GaussianFamilyError(kernel, mixture, derivative),
        };
    }

    /// <summary>The kernel.</summary>
    public Kernel Kernel { get; }

    /// <summary>The target.</summary>
    public TargetDensity Target { get; }

    /// <summary>r: which derivative is estimated.</summary>
    public int DerivativeOrder { get; }

    private double KernelRoughness { get; }

    private double LeadingFactor => Kernel.Moment(Kernel.Order) / SpecialFunctions.Factorial(Kernel.Order);

    /// <summary>(K_h∗f⁽ʳ⁾ − f⁽ʳ⁾)(x), exact; relative accuracy kept as h → 0.</summary>
    /// <param name="x">Where, finite.</param>
    /// <param name="h">Bandwidth, positive.</param>
    /// <returns>How much too high (positive) or too low the estimate is on average.</returns>
    /// <exception cref="ArgumentOutOfRangeException">x is not finite or h not positive.</exception>
    public double Bias(double x, double h) => _exact.Bias(Guard.Finite(x), Guard.Positive(h));

    /// <summary>hᵏ μ_k f⁽ʳ⁺ᵏ⁾(x)/k!, which is h²μ₂f''(x)/2 for order 2; with two terms also hᵏ⁺² μ_k+2 f⁽ʳ⁺ᵏ⁺²⁾(x)/(k + 2)!.</summary>
    /// <param name="x">Where, finite.</param>
    /// <param name="h">Bandwidth, positive.</param>
    /// <param name="terms">1 or 2.</param>
    /// <returns>The leading bias as h → 0.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument is out of range.</exception>
    public double AsymptoticBias(double x, double h, int terms = 1)
    {
        Guard.Finite(x);
        Guard.Positive(h);
        Guard.InRange(terms, 1, 2);
        int k = Kernel.Order;
        double bias = Math.Pow(h, k) * LeadingFactor * Target.Derivative(x, DerivativeOrder + k);
        return terms == 1
            ? bias
            : bias + (Math.Pow(h, k + 2) * Kernel.Moment(k + 2) / SpecialFunctions.Factorial(k + 2) * Target.Derivative(x, DerivativeOrder + k + 2));
    }

    /// <summary>Variance of the estimate, exact: {h^(−2r−1) ∫ K⁽ʳ⁾(u)² f(x − hu) du − E²}/n.</summary>
    /// <param name="x">Where, finite.</param>
    /// <param name="h">Bandwidth, positive.</param>
    /// <param name="n">Number of observations, at least 1.</param>
    /// <returns>The variance.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument is out of range.</exception>
    public double Variance(double x, double h, long n)
    {
        double mean = Target.Derivative(Guard.Finite(x), DerivativeOrder) + Bias(x, h);
        return (_exact.Spread(x, h) - (mean * mean)) / Guard.AtLeast(n, 1);
    }

    /// <summary>f(x) R(K⁽ʳ⁾)/(n h^(2r+1)); with two terms also −f⁽ʳ⁾(x)²/n.</summary>
    /// <param name="x">Where, finite.</param>
    /// <param name="h">Bandwidth, positive.</param>
    /// <param name="n">Number of observations, at least 1.</param>
    /// <param name="terms">1 or 2.</param>
    /// <returns>The leading variance as h → 0.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument is out of range.</exception>
    public double AsymptoticVariance(double x, double h, long n, int terms = 1)
    {
        Guard.Finite(x);
        Guard.AtLeast(n, 1);
        Guard.InRange(terms, 1, 2);
        double variance = Target.Value(x) * KernelRoughness / (n * Math.Pow(Guard.Positive(h), (2 * DerivativeOrder) + 1));
        double level = terms == 1 ? 0 : Target.Derivative(x, DerivativeOrder);
        return variance - (level * level / n);
    }

    /// <summary>Bias² + variance, exact.</summary>
    /// <param name="x">Where, finite.</param>
    /// <param name="h">Bandwidth, positive.</param>
    /// <param name="n">Number of observations, at least 1.</param>
    /// <returns>The mean squared error at x.</returns>
    public double MeanSquaredError(double x, double h, long n)
    {
        double bias = Bias(x, h);
        return (bias * bias) + Variance(x, h, n);
    }

    /// <summary>Leading bias² + leading variance.</summary>
    /// <param name="x">Where, finite.</param>
    /// <param name="h">Bandwidth, positive.</param>
    /// <param name="n">Number of observations, at least 1.</param>
    /// <returns>The asymptotic mean squared error at x.</returns>
    public double AsymptoticMeanSquaredError(double x, double h, long n)
    {
        double bias = AsymptoticBias(x, h);
        return (bias * bias) + AsymptoticVariance(x, h, n);
    }

    /// <summary>∫ bias², exact.</summary>
    /// <param name="h">Bandwidth, positive.</param>
    /// <returns>The integrated squared bias.</returns>
    public double IntegratedSquaredBias(double h) => _exact.Integrals(Guard.Positive(h)).Bias2;

    /// <summary>∫ variance, exact: {R(K⁽ʳ⁾) h^(−2r−1) − ∫ E²}/n.</summary>
    /// <param name="h">Bandwidth, positive.</param>
    /// <param name="n">Number of observations, at least 1.</param>
    /// <returns>The integrated variance.</returns>
    public double IntegratedVariance(double h, long n) =>
        ((KernelRoughness / Math.Pow(Guard.Positive(h), (2 * DerivativeOrder) + 1)) - _exact.Integrals(h).Mean2) / Guard.AtLeast(n, 1);

    /// <summary>Mean integrated squared error, exact.</summary>
    /// <param name="h">Bandwidth, positive.</param>
    /// <param name="n">Number of observations, at least 1.</param>
    /// <returns>Integrated squared bias + integrated variance. For N(0, 1) and the Gaussian kernel Fryer's (1976) formula.</returns>
    public double Mise(double h, long n)
    {
        Guard.AtLeast(n, 1);
        (double bias2, double mean2) = _exact.Integrals(Guard.Positive(h));
        return bias2 + (((KernelRoughness / Math.Pow(h, (2 * DerivativeOrder) + 1)) - mean2) / n);
    }

    /// <summary>Asymptotic MISE: R(K⁽ʳ⁾)/(n h^(2r+1)) + h²ᵏ (μ_k/k!)² R(f⁽ʳ⁺ᵏ⁾).</summary>
    /// <param name="h">Bandwidth, positive.</param>
    /// <param name="n">Number of observations, at least 1.</param>
    /// <returns>The leading terms of the MISE.</returns>
    /// <exception cref="InvalidOperationException">R(f⁽ʳ⁺ᵏ⁾) does not exist; the message says why.</exception>
    public double Amise(double h, long n)
    {
        Guard.AtLeast(n, 1);
        int r = DerivativeOrder;
        return (KernelRoughness / (n * Math.Pow(Guard.Positive(h), (2 * r) + 1))) + (Math.Pow(h, 2 * Kernel.Order) * LeadingFactor * LeadingFactor * Target.Roughness(r + Kernel.Order));
    }
}
