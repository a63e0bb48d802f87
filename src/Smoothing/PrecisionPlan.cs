namespace Smoothing;

/// <summary>How many values it takes to know the same things twice as precisely.</summary>
/// <remarks>
/// Errors of shares, quantiles and limits fall with the square root of n: half the error takes 4 n. The error of a curve with its bandwidth chosen anew falls with
/// n^(2/5): half takes 2^(5/2) n, 5.7 times as many (order of the optimal error of a kernel of order 2: Silverman 1986, section 3.3).
/// </remarks>
/// <param name="Count">n now, as the intervals count it.</param>
/// <param name="ForShares">Values in all for intervals of shares and quantiles half as wide.</param>
/// <param name="ForCurve">Values in all for a band half as wide; null where the rounding of the data sets the smoothing, which no n makes finer.</param>
public sealed record PrecisionPlan(double Count, double ForShares, double? ForCurve)
{
    internal static PrecisionPlan Of(double count, bool limitedByRounding) =>
        new(count, 4 * count, limitedByRounding ? null : Math.Ceiling(Math.Pow(2, 2.5) * count));
}
