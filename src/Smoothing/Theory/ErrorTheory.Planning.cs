using Smoothing.Numerics;

namespace Smoothing.Theory;

/// <content>How many observations a wanted precision takes: the smallest n by bisection on the exact error.</content>
public sealed partial class ErrorTheory
{
    private const long Most = 1L << 50; // beyond 10¹⁵ observations a plan means nothing

    /// <summary>Smallest n whose best h gives √MSE(x) ≤ <paramref name="relativeRootMeanSquaredError"/>·|f⁽ʳ⁾(x)|.</summary>
    /// <remarks>
    /// Method: the least MSE never grows with n, so halving on its exact value finds the n that is enough while n − 1 is not. Cost: about
    /// 2 log₂ n local optima. Silverman (1986), Table 4.2, d = 1 asks for a relative MSE below 0.1 at 0 of N(0, 1): 4. In a valley or a tail some
    /// large h makes the value at x right by accident (see <see cref="OptimalBandwidthAt"/>), and the n found for it is small and of no use for a
    /// curve: give <paramref name="largestBandwidth"/> there, such as a quarter of the distance between the groups.
    /// </remarks>
    /// <param name="x">Where, finite, in the unit of the values.</param>
    /// <param name="relativeRootMeanSquaredError">Such as 0.1 for ±10 %; positive.</param>
    /// <param name="largestBandwidth">The largest h allowed, positive; by default twenty times the spread of the target.</param>
    /// <returns>The smallest such n.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument is out of range.</exception>
    /// <exception cref="InvalidOperationException">f⁽ʳ⁾(x) is 0, or more than 10¹⁵ observations would be needed.</exception>
    public long SampleSizeFor(double x, double relativeRootMeanSquaredError, double largestBandwidth = double.PositiveInfinity)
    {
        double largest = Cap(largestBandwidth);
        double at = X(x);
        double wanted = Guard.Positive(relativeRootMeanSquaredError) * _target.Derivative(at, DerivativeOrder);
        if (!(Math.Abs(wanted) > 0))
        {
            throw new InvalidOperationException(Guard.Text($"A relative error at {x} does not exist: the target is 0 there. Ask at a point where it is not 0."));
        }

        return Smallest(n => ExactSquaredError(at, BestAt(at, n, largest).H, n) <= wanted * wanted);
    }

    /// <summary>Smallest n whose best h gives MISE ≤ <paramref name="mise"/>.</summary>
    /// <param name="mise">Wanted mean integrated squared error, positive, in the unit of the values to the power −(2r + 1).</param>
    /// <returns>The smallest such n.</returns>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="mise"/> is not positive and finite.</exception>
    /// <exception cref="InvalidOperationException">More than 10¹⁵ observations would be needed, or R(f⁽ʳ⁾) does not exist.</exception>
    public long SampleSizeForMise(double mise)
    {
        double wanted = Out(Guard.Positive(mise), -((2 * DerivativeOrder) + 1));
        return Smallest(n => LeastMise(n) <= wanted);
    }

    /// <summary>Smallest n with z·√Var(x) ≤ <paramref name="halfWidth"/> at bandwidth h, z the normal quantile of the level.</summary>
    /// <remarks>The half-width of the plain interval f̂(x) ± z·sd; it says nothing about bias, which no n removes at a fixed h.</remarks>
    /// <param name="x">Where, finite.</param>
    /// <param name="h">Bandwidth, positive.</param>
    /// <param name="halfWidth">Wanted half-width, positive, in the unit of the curve.</param>
    /// <param name="level">Level strictly between 0 and 1; 0.95 by default, the level of the library's intervals.</param>
    /// <returns>The smallest such n.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument is out of range.</exception>
    /// <exception cref="InvalidOperationException">More than 10¹⁵ observations would be needed.</exception>
    public long SampleSizeForHalfWidth(double x, double h, double halfWidth, double level = 0.95)
    {
        (double at, double width) = (X(x), H(h));
        double wanted = Out(Guard.Positive(halfWidth), -(DerivativeOrder + 1));
        double z = NormalLaw.Quantile(0.5 + (Guard.Level(level) / 2));
        double deviation = Math.Sqrt(ExactVariance(at, width, 1));
        return Smallest(n => z * deviation / Math.Sqrt(n) <= wanted);
    }

    private static long Smallest(Func<long, bool> enough)
    {
        long high = 1;
        while (!enough(high))
        {
            high = high < Most ? high * 2 : throw new InvalidOperationException("More than 10¹⁵ observations would be needed: ask for less precision.");
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
