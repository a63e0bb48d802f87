using Smoothing.Numerics;

namespace Smoothing.Theory;

/// <content>How many observations a wanted precision takes: the smallest n by bisection on the exact error.</content>
public sealed partial class ErrorTheory
{
    private const long Most = 1L << 50; // beyond 10¹⁵ observations a plan means nothing

    /// <summary>Smallest n whose best h gives √MSE(x) ≤ <paramref name="relativeRootMeanSquaredError"/>·|f⁽ʳ⁾(x)|.</summary>
    /// <remarks>Silverman (1986), Table 4.2, d = 1 asks for a relative MSE below 0.1 at 0 of N(0, 1): 4.</remarks>
    /// <param name="x">Where, finite.</param>
    /// <param name="relativeRootMeanSquaredError">Such as 0.1 for ±10 %; positive.</param>
    /// <returns>The smallest such n.</returns>
    /// <exception cref="InvalidOperationException">f⁽ʳ⁾(x) is 0, or more than 10¹⁵ observations would be needed.</exception>
    public long SampleSizeFor(double x, double relativeRootMeanSquaredError)
    {
        double wanted = Guard.Positive(relativeRootMeanSquaredError) * Target.Derivative(Guard.Finite(x), DerivativeOrder);
        if (!(Math.Abs(wanted) > 0))
        {
            throw new InvalidOperationException(Guard.Text($"A relative error at {x} does not exist: the target is {wanted} there. Ask at a point where it is not 0."));
        }

        return Smallest(n => MeanSquaredError(x, OptimalBandwidthAt(x, n), n) <= wanted * wanted);
    }

    /// <summary>Smallest n whose best h gives MISE ≤ <paramref name="mise"/>.</summary>
    /// <param name="mise">Wanted mean integrated squared error, positive.</param>
    /// <returns>The smallest such n.</returns>
    /// <exception cref="InvalidOperationException">More than 10¹⁵ observations would be needed.</exception>
    public long SampleSizeForMise(double mise)
    {
        Guard.Positive(mise);
        return Smallest(n => Mise(OptimalBandwidth(n), n) <= mise);
    }

    /// <summary>Smallest n with z·√Var(x) ≤ <paramref name="halfWidth"/> at bandwidth h, z the normal quantile of the level.</summary>
    /// <remarks>The half-width of the plain interval; it says nothing about bias, which no n removes at a fixed h.</remarks>
    /// <param name="x">Where, finite.</param>
    /// <param name="h">Bandwidth, positive.</param>
    /// <param name="halfWidth">Wanted half-width, positive, in the unit of the curve.</param>
    /// <param name="level">Level strictly between 0 and 1.</param>
    /// <returns>The smallest such n.</returns>
    /// <exception cref="InvalidOperationException">More than 10¹⁵ observations would be needed.</exception>
    public long SampleSizeForHalfWidth(double x, double h, double halfWidth, double level = 0.95)
    {
        Guard.Positive(halfWidth);
        double z = NormalLaw.Quantile(0.5 + (Guard.Level(level) / 2));
        double single = Variance(x, h, 1);
        return Smallest(n => z * Math.Sqrt(single / n) <= halfWidth);
    }

    private static long Smallest(Func<long, bool> enough)
    {
        long high = 1;
        while (!enough(high))
        {
            high = high < Most ? high * 2 : throw new InvalidOperationException(Guard.Text($"More than {Most} observations would be needed: ask for less precision."));
        }

        long low = high / 2; // not enough, or 0
        while (high - low > 1)
        {
            long middle = low + ((high - low) / 2);
            (low, high) = enough(middle) ? (low, middle) : (middle, high);
        }

        return high;
    }
}
