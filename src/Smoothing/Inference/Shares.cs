using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Inference;

/// <summary>The share of a quantity's law beyond, below or between limits, with an exact interval.</summary>
/// <remarks>
/// The interval is Clopper and Pearson's (1934) for the counted values and never covers less than its level for independent
/// values, whatever the law. A smoothed share is shown beside it as a point only: intervals built on smoothed tails covered
/// 4–95 % instead of 95 in simulation. Relative weights count with the smaller of the global and the local effective size.
/// An estimate informs a decision and replaces no standard, code or licensed judgement.
/// </remarks>
public static class Shares
{
    /// <summary>What the note about values on a limit says.</summary>
    internal const string TieNote = "equal the limit";

    private const string Exact = "Clopper–Pearson";

    /// <summary>P(X &gt; <paramref name="limit"/>): values equal to the limit don't count.</summary>
    /// <param name="sample">The values.</param>
    /// <param name="limit">The limit, in the unit of the data; may lie outside the data, not NaN.</param>
    /// <param name="level">Confidence level in (0, 1), two-sided; 0.95 by default, the habit of reports.</param>
    /// <param name="dependence">What is made of the order of the values.</param>
    /// <returns>The counted share and its interval. Cost: one pass.</returns>
    /// <exception cref="ArgumentOutOfRangeException">A limit is NaN or the level is not in (0, 1).</exception>
    public static ShareEstimate Beyond(Sample sample, double limit, double level = 0.95, SerialDependence dependence = SerialDependence.Ignore)
    {
        Guard.Number(limit);
        return Of(sample, x => x > limit, level, dependence, [limit]);
    }

    /// <summary>P(X &lt; <paramref name="limit"/>): values equal to the limit don't count.</summary>
    /// <param name="sample">The values.</param>
    /// <param name="limit">The limit, in the unit of the data; may lie outside the data, not NaN.</param>
    /// <param name="level">Confidence level in (0, 1), two-sided.</param>
    /// <param name="dependence">What is made of the order of the values.</param>
    /// <returns>The counted share and its interval. Cost: one pass.</returns>
    /// <exception cref="ArgumentOutOfRangeException">A limit is NaN or the level is not in (0, 1).</exception>
    public static ShareEstimate Below(Sample sample, double limit, double level = 0.95, SerialDependence dependence = SerialDependence.Ignore)
    {
        Guard.Number(limit);
        return Of(sample, x => x < limit, level, dependence, [limit]);
    }

    /// <summary>P(<paramref name="from"/> ≤ X ≤ <paramref name="to"/>): values equal to a limit count.</summary>
    /// <param name="sample">The values.</param>
    /// <param name="from">Lower limit, in the unit of the data; may be −∞.</param>
    /// <param name="to">Upper limit, in the unit of the data, above <paramref name="from"/>; may be +∞.</param>
    /// <param name="level">Confidence level in (0, 1), two-sided.</param>
    /// <param name="dependence">What is made of the order of the values.</param>
    /// <returns>The counted share and its interval. Cost: one pass.</returns>
    /// <exception cref="ArgumentException">A limit is NaN, the limits are not in order, or the level is not in (0, 1).</exception>
    public static ShareEstimate Between(Sample sample, double from, double to, double level = 0.95, SerialDependence dependence = SerialDependence.Ignore)
    {
        Guard.Number(from);
        Guard.Number(to);
        if (!(from <= to))
        {
            throw new ArgumentException(Guard.Text($"from must not exceed to, but from is {from} and to is {to}: exchange them."), nameof(from));
        }

        return Of(sample, x => x >= from && x <= to, level, dependence, [from, to]);
    }

    /// <summary>The number of independent values that brings the half-width of the interval for a share down to <paramref name="halfWidth"/>.</summary>
    /// <param name="share">The share expected, in [0, 1].</param>
    /// <param name="halfWidth">Half the length of the interval wanted, above 0 and below 0.5.</param>
    /// <param name="level">Confidence level in (0, 1), two-sided.</param>
    /// <returns>The smallest n whose interval around the expected count is short enough.</returns>
    /// <remarks>By doubling and bisection on the exact interval itself, the count taken as n·share (a real number).</remarks>
    /// <exception cref="ArgumentOutOfRangeException">An argument is outside its range.</exception>
    public static long SampleSizeFor(double share, double halfWidth, double level = 0.95)
    {
        Guard.Probability(share);
        Guard.Level(level);
        if (!(halfWidth > 0 && halfWidth < 0.5))
        {
            throw new ArgumentOutOfRangeException(nameof(halfWidth), Guard.Text($"halfWidth must lie in (0, 0.5), but is {halfWidth}: pass half the length of the interval wanted, as a share."));
        }

        bool Enough(long n) => BinomialLimits.Share(share * n, n, level).Length <= 2 * halfWidth;
        long high = 1;
        while (!Enough(high))
        {
            high = high > 1L << 40 ? throw new ArgumentOutOfRangeException(nameof(halfWidth), Guard.Text($"halfWidth {halfWidth} would need more than 10^12 values: ask for a wider interval.")) : high * 2;
        }

        long low = high / 2;
        while (high - low > 1)
        {
            long middle = low + ((high - low) / 2);
            (low, high) = Enough(middle) ? (low, middle) : (middle, high);
        }

        return high;
    }

    private static ShareEstimate Of(Sample sample, Func<double, bool> inside, double level, SerialDependence dependence, double[] limits)
    {
        Guard.Given(sample);
        Guard.Level(level);
        var notes = new List<string>();
        (double n, double share, double weight) = EffectiveSize.Of(sample, inside, dependence, notes);
        bool counts = !sample.IsWeighted || sample.WeightMeaning == WeightMeaning.Counts;
        bool plain = counts && dependence != SerialDependence.AllowFor;
        Interval interval = BinomialLimits.Share(plain ? weight : share * n, n, level);
        string method = plain ? Exact : counts ? Exact + ", dependent values" : Exact + ", effective size";
        foreach (double limit in limits)
        {
            int at = 0;
            foreach (double x in sample.Values)
            {
                at += x == limit ? 1 : 0;
            }

            if (at > 0)
            {
                notes.Add(Guard.Text($"{at} of {sample.Count} values {TieNote} {limit}: beyond and below count strictly, between counts them."));
            }
        }

        return new ShareEstimate(share, interval, level, n, weight, method, notes.AsReadOnly());
    }
}
