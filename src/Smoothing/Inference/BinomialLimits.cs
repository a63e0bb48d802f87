using MathNet.Numerics;
using MathNet.Numerics.Distributions;
using Smoothing.Numerics;

namespace Smoothing.Inference;

/// <summary>Confidence limits for a share from a count that may be a real number, and the order statistics that belong to them.</summary>
/// <remarks>
/// Method: Clopper and Pearson (1934) through the regularised incomplete beta function I, which also takes counts that are
/// no whole numbers (effective sizes). The limits are found by bisection and Brent on log p or log(1 − p), so that shares
/// near 0 and near 1 keep their relative accuracy: 1e-10 up to n = 1e7, where log Γ loses digits.
/// </remarks>
internal static class BinomialLimits
{
    // exp(−700) is the smallest share that a double can carry through logarithms without underflow.
    private const double SmallestLog = -700;

    /// <summary>Two-sided limits for the share behind <paramref name="count"/> of <paramref name="n"/>.</summary>
    public static Interval Share(double count, double n, double level)
    {
        double tail = (1 - level) / 2;
        return new Interval(Lower(count, n, tail), 1 - Lower(n - count, n, tail));
    }

    /// <summary>The p with P(Bin(n, p) ≥ count) = tail; 0 where the count is 0.</summary>
    public static double Lower(double count, double n, double tail)
    {
        if (count <= 0)
        {
            return 0;
        }

        double b = Math.Max(n - count, 0) + 1;
        if (b == 1)
        {
            return Math.Exp(Math.Log(tail) / count);   // I_p(n, 1) = p^n
        }

        // I_p(k, n − k + 1) rises with p. Near 1 the complement carries the digits.
        return SpecialFunctions.BetaRegularized(count, b, 0.5) >= tail
            ? Solve(count, b, tail)
            : 1 - Solve(b, count, 1 - tail);
    }

    // The p ≤ 1/2 with I_p(a, b) = value. The root finder also stops on a small residual, so one Newton step follows it.
    private static double Solve(double a, double b, double value)
    {
        double log = Roots.Between(l => SpecialFunctions.BetaRegularized(a, b, Math.Exp(l)) - value, SmallestLog, Math.Log(0.5));
        double p = Math.Exp(log);
        double slope = Beta.PDF(a, b, p) * p;
        double step = slope > 0 ? (SpecialFunctions.BetaRegularized(a, b, p) - value) / slope : 0;
        return Math.Abs(step) < 1e-3 ? p * Math.Exp(-step) : p;   // a longer step would mean that the root finder had failed
    }

    /// <summary>P(Bin(n, p) ≥ count) for a whole or real count.</summary>
    public static double AtLeast(double count, double n, double p) =>
        count <= 0 ? 1 : count > n ? 0 : SpecialFunctions.BetaRegularized(count, n - count + 1, p);

    /// <summary>P(Bin(n, p) &lt; count) for a whole or real count.</summary>
    public static double LessThan(double count, double n, double p) =>
        count <= 0 ? 0 : count > n ? 1 : SpecialFunctions.BetaRegularized(n - count + 1, count, 1 - p);

    /// <summary>The largest rank r with P(Bin(n, p) &lt; r) ≤ tail; 0 when there is none.</summary>
    public static long LowerRank(long n, double p, double tail)
    {
        long low = 0;
        long high = n + 1;
        while (high - low > 1)
        {
            long middle = low + ((high - low) / 2);
            if (LessThan(middle, n, p) <= tail)
            {
                low = middle;
            }
            else
            {
                high = middle;
            }
        }

        return low;
    }

    /// <summary>The smallest rank s with P(Bin(n, p) ≥ s) ≤ tail; n + 1 when there is none.</summary>
    public static long UpperRank(long n, double p, double tail)
    {
        long low = 0;
        long high = n + 1;
        while (high - low > 1)
        {
            long middle = low + ((high - low) / 2);
            if (AtLeast(middle, n, p) <= tail)
            {
                high = middle;
            }
            else
            {
                low = middle;
            }
        }

        return high;
    }
}
