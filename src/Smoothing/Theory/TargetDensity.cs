using MathNet.Numerics.Distributions;
using Smoothing.Numerics;

namespace Smoothing.Theory;

/// <summary>A density that is known exactly, against which an estimate can be judged.</summary>
/// <remarks>
/// Targets are immutable and safe to share between threads (a caller's function must be, too). Make one with <see cref="NormalMixture"/>,
/// <see cref="From"/> or <see cref="FromFunction"/>; shift, scale and mix them. x is in the unit of the values, f in one over that unit.
/// </remarks>
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
    /// <remarks>
    /// Derivatives of any order by power-series arithmetic, rounding only: Normal (which becomes a <see cref="NormalMixture"/>), Exponential, Gamma, Erlang,
    /// ChiSquared, LogNormal, StudentT, Cauchy, Weibull, Rayleigh, Beta, BetaScaled, Logistic, Laplace, Pareto, Triangular and ContinuousUniform. Any other
    /// distribution must be smooth inside its support; its derivatives come from a local polynomial through 17 values, orders 1 to 4 within 1e-10, 1e-9,
    /// 1e-7 and 1e-6 of the largest value of that derivative (measured on the inverse Gaussian, inverse gamma and F distributions), none above, and optimal
    /// bandwidths on it are good to about 1e-6. Cumulatives are MathNet's; quantiles invert them.
    /// </remarks>
    /// <param name="distribution">Any continuous distribution with positive, finite scale.</param>
    /// <returns>The target.</returns>
    /// <exception cref="ArgumentNullException"><paramref name="distribution"/> is null.</exception>
    /// <exception cref="ArgumentOutOfRangeException">Its location is not finite, or its scale not positive and finite.</exception>
    public static TargetDensity From(IContinuousDistribution distribution) => DistributionFamilies.Of(Guard.Given(distribution));

    /// <summary>A target from a function that is a density on <paramref name="support"/>.</summary>
    /// <remarks>Cumulative by adaptive quadrature, about 1e-10 absolute; quantiles and draws invert it, some milliseconds each.</remarks>
    /// <param name="name">A name for messages.</param>
    /// <param name="density">f(x), nowhere negative; finite but at the ends of the support and at <paramref name="cuts"/>.</param>
    /// <param name="support">Where f may be above 0; of positive length, ends may be infinite.</param>
    /// <param name="derivative">f⁽ʳ⁾(x) for x inside the support, r ≥ 1; NaN or NotSupportedException for an order it does not know. Without it
    /// derivatives are refused and exact errors lose relative accuracy as h → 0.</param>
    /// <param name="cuts">Points of the support where f or a derivative has a kink, jump or pole, or, for an f much narrower than its support, where its features lie.</param>
    /// <returns>The target.</returns>
    /// <exception cref="ArgumentNullException"><paramref name="name"/> or <paramref name="density"/> is null.</exception>
    /// <exception cref="ArgumentException">f is negative or not finite at one of the points looked at, does not integrate to 1 within 1e-8, the support
    /// has no length, or a cut lies outside it.</exception>
    public static TargetDensity FromFunction(string name, Func<double, double> density, Interval support, Func<double, int, double>? derivative = null, IReadOnlyList<double>? cuts = null) =>
        new FunctionTarget(Guard.Given(name), Guard.Given(density), support, derivative, cuts ?? []);

    /// <summary>Σ wᵢ fᵢ.</summary>
    /// <param name="weights">Weights, not negative, summing to 1 within 1e-12.</param>
    /// <param name="targets">As many targets.</param>
    /// <returns>The mixture of those with weight; of normal mixtures alone again a <see cref="NormalMixture"/>, with its closed forms.</returns>
    /// <exception cref="ArgumentNullException"><paramref name="targets"/> or one of them is null.</exception>
    /// <exception cref="ArgumentException">Lengths differ or are 0, a weight is negative, or the sum (which the message gives) is not 1.</exception>
    public static TargetDensity Mixture(ReadOnlySpan<double> weights, IReadOnlyList<TargetDensity> targets) => MixtureTarget.Of(weights, Guard.Given(targets));

    /// <summary>The density of X + <paramref name="by"/>.</summary>
    /// <param name="by">Shift, finite, in the unit of the values.</param>
    /// <returns>The shifted target; a <see cref="NormalMixture"/> stays one.</returns>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="by"/> is not finite.</exception>
    public TargetDensity Shifted(double by) => Moved(Guard.Finite(by), 1);

    /// <summary>The density of <paramref name="factor"/>·X.</summary>
    /// <param name="factor">Positive factor, such as 60 from hours to minutes.</param>
    /// <returns>The scaled target; a <see cref="NormalMixture"/> stays one.</returns>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="factor"/> is not positive and finite.</exception>
    public TargetDensity Scaled(double factor) => Moved(0, Guard.Positive(factor));

    /// <summary>f(x); 0 outside the support and at ±∞; +∞ at an end where the density is unbounded.</summary>
    /// <param name="x">Any number.</param>
    /// <returns>The density, per unit of x.</returns>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="x"/> is NaN.</exception>
    public double Value(double x) => ValueCore(Guard.Number(x));

    /// <summary>f⁽ʳ⁾(x); 0 outside the support; at an end of the support the value from inside, at a kink the mean of both sides.</summary>
    /// <param name="x">Any number.</param>
    /// <param name="order">r ≥ 0; 1, the slope, by default.</param>
    /// <returns>The derivative, per unit of x to the power r + 1; ±∞ at an end where it is unbounded.</returns>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="x"/> is NaN or <paramref name="order"/> negative.</exception>
    /// <exception cref="InvalidOperationException">No derivative of this order is known.</exception>
    public double Derivative(double x, int order = 1)
    {
        Guard.Number(x);
        Guard.AtLeast(order, 0);
        return order == 0 ? ValueCore(x) : DerivativeCore(x, order);
    }

    /// <summary>R(f⁽ʳ⁾) = ∫ (f⁽ʳ⁾)².</summary>
    /// <remarks>For normal mixtures (−1)ʳ ΣΣ wᵢwⱼ φ⁽²ʳ⁾ at mᵢ − mⱼ with variance sᵢ² + sⱼ² (Marron &amp; Wand 1992), else quadrature to about 1e-10 relative (1e-8 where f⁽ʳ⁾ is unbounded).</remarks>
    /// <param name="order">r ≥ 0.</param>
    /// <returns>The integral, per unit of x to the power 2r + 1.</returns>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="order"/> is negative.</exception>
    /// <exception cref="InvalidOperationException">The integral does not exist, because a lower derivative jumps or f⁽ʳ⁾ has too steep a pole; the message says where.
    /// Or the derivative is not known.</exception>
    public double Roughness(int order = 0) => RoughnessCore(Guard.AtLeast(order, 0));

    /// <summary>F(x) = ∫ f up to x.</summary>
    /// <param name="x">Any number, ±∞ allowed.</param>
    /// <returns>A share in [0, 1].</returns>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="x"/> is NaN.</exception>
    public double Cumulative(double x) => CumulativeCore(Guard.Number(x));

    /// <summary>inf{x : F(x) ≥ p}.</summary>
    /// <param name="probability">p in [0, 1]; 0 and 1 give the ends of the support.</param>
    /// <returns>The quantile; on a stretch where F is level its left end.</returns>
    /// <exception cref="ArgumentOutOfRangeException">p is NaN or outside [0, 1].</exception>
    public double Quantile(double probability)
    {
        Guard.Probability(probability);
        return probability == 0 ? Support.Lower : probability == 1 ? Support.Upper : QuantileCore(probability);
    }

    /// <summary>Independent draws; the same seed gives the same bits on every machine.</summary>
    /// <remarks>Normal mixtures draw a component and a normal number, 20 nanoseconds; the others invert F, which takes microseconds (milliseconds for a caller's function).</remarks>
    /// <param name="count">How many, 0 or more.</param>
    /// <param name="seed">The seed.</param>
    /// <returns>The draws, in no order.</returns>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="count"/> is negative.</exception>
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

    /// <summary>The density of factor·X + shift.</summary>
    internal virtual TargetDensity Moved(double shift, double factor) => new AffineTarget(AffineTarget.NameOf(this, shift, factor), this, shift, factor);

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
        string quantity = Guard.Text($"R(f^({order}))");
        RequireNoJump(order, quantity);
        RequireSquareIntegrable(order, quantity);
        return RoughnessIntegral.Of(this, order);
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

    /// <summary>Refuses a quantity that needs (f⁽ʳ⁾)² to be integrable where f behaves as a power of the distance from a break.</summary>
    internal void RequireSquareIntegrable(int order, string quantity)
    {
        foreach (double at in Breaks)
        {
            foreach (int side in new[] { -1, 1 })
            {
                double far = at + (side * 1e-5 * Widest);
                double near = at + (side * 1e-8 * Widest);
                if (!Support.Contains(far) || near == at)
                {
                    continue;
                }

                // The exponent p of the distance from two values; (f⁽ʳ⁾)² ~ distance^2p is integrable for 2p > −1.
                double power = Math.Log(Math.Abs(Derivative(near, order) / Derivative(far, order))) / Math.Log(1e-3);
                if ((2 * power) + 1 <= 1e-4)
                {
                    throw new InvalidOperationException(Guard.Text($"{quantity} of {Name} does not exist: near {at} f^({order}) behaves as the distance to the power {Math.Round(power, 3)}, and its square has no finite integral. Look at the error at a point instead."));
                }
            }
        }
    }
}
