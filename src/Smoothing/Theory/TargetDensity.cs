using MathNet.Numerics.Distributions;
using Smoothing.Numerics;

namespace Smoothing.Theory;

/// <summary>A density that is known exactly, against which an estimate can be judged.</summary>
/// <remarks>Targets are immutable and safe to share between threads. Make one with <see cref="NormalMixture"/>, <see cref="From"/> or <see cref="FromFunction"/>.</remarks>
public abstract class TargetDensity
{
    private protected TargetDensity()
    {
    }

    /// <summary>The target's name, used in messages.</summary>
    public abstract string Name { get; }

    /// <summary>The range outside which the density is 0; ends may be infinite.</summary>
    public abstract Interval Support { get; }

    /// <summary>A target from a distribution of MathNet.Numerics.</summary>
    /// <param name="distribution">Normal, Gamma, Exponential, LogNormal, StudentT, Weibull, Beta, Logistic and ContinuousUniform have closed-form derivatives of any order; others use central differences, about 1e-7 relative for order 1 and 1e-5 for order 2, and none above.</param>
    /// <returns>The target.</returns>
    /// <exception cref="ArgumentNullException"><paramref name="distribution"/> is null.</exception>
    public static TargetDensity From(IContinuousDistribution distribution) => new DistributionTarget(Guard.Given(distribution));

    /// <summary>A target from a function that is a density on <paramref name="support"/>.</summary>
    /// <param name="name">A name for messages.</param>
    /// <param name="density">f(x), finite and nowhere negative.</param>
    /// <param name="support">Where f may be above 0.</param>
    /// <param name="derivative">f⁽ʳ⁾(x) for x inside the support, r ≥ 1; without it derivatives are refused.</param>
    /// <returns>The target; cumulative and quantile by adaptive quadrature, about 1e-10 absolute.</returns>
    /// <exception cref="ArgumentException">f is negative at one of the points looked at, or does not integrate to 1 within 1e-8.</exception>
    public static TargetDensity FromFunction(string name, Func<double, double> density, Interval support, Func<double, int, double>? derivative = null) =>
        new FunctionTarget(Guard.Given(name), Guard.Given(density), support, derivative);

    /// <summary>Σ wᵢ fᵢ.</summary>
    /// <param name="weights">Weights, not negative, summing to 1 within 1e-12.</param>
    /// <param name="targets">As many targets.</param>
    /// <returns>The mixture.</returns>
    /// <exception cref="ArgumentException">Lengths differ, a weight is negative, or the sum is not 1.</exception>
    public static TargetDensity Mixture(ReadOnlySpan<double> weights, IReadOnlyList<TargetDensity> targets) => new MixtureTarget(weights, Guard.Given(targets));

    /// <summary>The density of X + <paramref name="by"/>.</summary>
    /// <param name="by">Shift, finite.</param>
    /// <returns>The shifted target.</returns>
    public TargetDensity Shifted(double by) => new AffineTarget(this, Guard.Finite(by), 1);

    /// <summary>The density of <paramref name="factor"/>·X.</summary>
    /// <param name="factor">Positive factor, such as 60 from hours to minutes.</param>
    /// <returns>The scaled target.</returns>
    public TargetDensity Scaled(double factor) => new AffineTarget(this, 0, Guard.Positive(factor));

    /// <summary>f(x); 0 outside the support.</summary>
    /// <param name="x">Any number.</param>
    /// <returns>The density, per unit of x.</returns>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="x"/> is NaN.</exception>
    public double Value(double x) => ValueCore(Guard.Number(x));

    /// <summary>f⁽ʳ⁾(x); 0 outside the support; at an end of the support the value from inside.</summary>
    /// <param name="x">Any number.</param>
    /// <param name="order">r ≥ 0.</param>
    /// <returns>The derivative, per unit of x to the power r + 1.</returns>
    /// <exception cref="InvalidOperationException">No derivative of this order is known.</exception>
    public double Derivative(double x, int order = 1)
    {
        Guard.Number(x);
        Guard.AtLeast(order, 0);
        return order == 0 ? ValueCore(x) : DerivativeCore(x, order);
    }

    /// <summary>R(f⁽ʳ⁾) = ∫ (f⁽ʳ⁾)².</summary>
    /// <param name="order">r ≥ 0.</param>
    /// <returns>The integral; closed form for normal mixtures, else quadrature to about 1e-10 relative.</returns>
    /// <exception cref="InvalidOperationException">The integral does not exist, because a lower derivative jumps; the message says where.</exception>
    public double Roughness(int order = 0) => RoughnessCore(Guard.AtLeast(order, 0));

    /// <summary>F(x) = ∫ f up to x.</summary>
    /// <param name="x">Any number, ±∞ allowed.</param>
    /// <returns>A share in [0, 1].</returns>
    public double Cumulative(double x) => CumulativeCore(Guard.Number(x));

    /// <summary>inf{x : F(x) ≥ p}.</summary>
    /// <param name="probability">p in [0, 1]; 0 and 1 give the ends of the support.</param>
    /// <returns>The quantile.</returns>
    public double Quantile(double probability)
    {
        Guard.Probability(probability);
        return probability == 0 ? Support.Lower : probability == 1 ? Support.Upper : QuantileCore(probability);
    }

    /// <summary>Independent draws; the same seed gives the same bits.</summary>
    /// <param name="count">How many, 0 or more.</param>
    /// <param name="seed">The seed.</param>
    /// <returns>The draws.</returns>
    public double[] Draw(int count, ulong seed)
    {
        var random = new RandomStream(seed);
        var values = new double[Guard.AtLeast(count, 0)];
        for (int i = 0; i < values.Length; i++)
        {
            values[i] = DrawCore(ref random);
        }

        return values;
    }

    /// <summary>The name of the target.</summary>
    /// <returns><see cref="Name"/>.</returns>
    public override string ToString() => Name;

    /// <summary>Points where f or one of its derivatives may jump.</summary>
    internal virtual IReadOnlyList<double> Breaks => [.. new[] { Support.Lower, Support.Upper }.Where(double.IsFinite)];

    /// <summary>Points between which f has one scale, in order: where quadrature is cut.</summary>
    internal abstract IReadOnlyList<double> Splits { get; }

    /// <summary>Length of the smallest feature, roughly: where searches for a bandwidth start.</summary>
    internal virtual double Finest => (Quantile(0.6) - Quantile(0.4)) / 0.507; // 0.507: the same difference of N(0, 1)

    /// <summary>Length of the whole, roughly.</summary>
    internal virtual double Widest => (Quantile(0.975) - Quantile(0.025)) / 3.92; // 3.92: the same difference of N(0, 1)

    /// <summary>Whether the derivative of this order is known without differences.</summary>
    internal virtual bool Knows(int order) => true;

    internal abstract double ValueCore(double x);

    internal abstract double DerivativeCore(double x, int order);

    internal abstract double CumulativeCore(double x);

    internal virtual double QuantileCore(double probability) => TargetSearch.Quantile(this, probability);

    internal virtual double DrawCore(ref RandomStream random) => QuantileCore(random.NextUniform());

    /// <summary>f⁽ʳ⁾(b+) − f⁽ʳ⁾(b−).</summary>
    internal virtual double JumpCore(double at, int order) =>
        at == Support.Lower ? Derivative(at, order) : at == Support.Upper ? -Derivative(at, order) : 0;

    internal virtual double RoughnessCore(int order)
    {
        RequireNoJump(order, Guard.Text($"R(f^({order}))"));
        double value = TargetSearch.Integrate(x => Square(Derivative(x, order)), Support.Lower, Support.Upper, Splits, 1e-11);
        return double.IsFinite(value) ? value : throw new InvalidOperationException(Guard.Text($"R(f^({order})) of {Name} does not exist: the integral of its square diverges."));
    }

    /// <summary>Refuses a quantity that needs f, …, f^(order−1) without jumps.</summary>
    internal void RequireNoJump(int order, string quantity)
    {
        for (int r = 0; r < order; r++)
        {
            foreach (double at in Breaks)
            {
                double jump = JumpCore(at, r);
                if (!(Math.Abs(jump) <= 0))
                {
                    throw new InvalidOperationException(Guard.Text($"{quantity} of {Name} does not exist: f^({r}) jumps by {jump} at {at}, so the next derivative is not square integrable. Use the exact error instead."));
                }
            }
        }
    }

    private static double Square(double v) => v * v;
}
