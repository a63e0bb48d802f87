using MathNet.Numerics;
using Smoothing.Numerics;

namespace Smoothing.Inference;

/// <summary>Exact binomial and multinomial numbers whose cost does not grow with n.</summary>
/// <remarks>Method: inversion where the mean is below 10, otherwise Hörmann's (1993) transformed rejection with squeeze; a multinomial as a chain of binomials.</remarks>
internal static class BinomialDraws
{
    private const double InversionBelow = 10;

    /// <summary>destination[j] = number of n draws that fall into cell j; the shares sum to at most 1, what is missing falls nowhere.</summary>
    public static void Multinomial(ref RandomStream random, long n, ReadOnlySpan<double> shares, Span<double> destination)
    {
        double rest = 1;
        for (int j = 0; j < shares.Length; j++)
        {
            if (n == 0 || rest <= 0)
            {
                destination[j..shares.Length].Clear();
                return;
            }

            long k = One(ref random, n, Math.Clamp(shares[j] / rest, 0, 1));
            destination[j] = k;
            n -= k;
            rest -= shares[j];
        }
    }

    public static long One(ref RandomStream random, long n, double p)
    {
        if (p > 0.5)
        {
            return n - One(ref random, n, 1 - p);
        }

        return n * p < InversionBelow ? Inversion(ref random, n, p) : Rejection(ref random, n, p);
    }

    private static long Inversion(ref RandomStream random, long n, double p)
    {
        double odds = p / (1 - p);
        double mass = Math.Exp(n * Math.Log(1 - p));
        double u = random.NextUniform();
        long k = 0;
        while (u > mass && k < n)
        {
            u -= mass;
            k++;
            mass *= odds * (n - k + 1) / k;
        }

        return k;
    }

    // Constants of algorithm BTRS, Hörmann (1993), p. 104.
    private static long Rejection(ref RandomStream random, long n, double p)
    {
        double spread = Math.Sqrt(n * p * (1 - p));
        double b = 1.15 + (2.53 * spread);
        double a = -0.0873 + (0.0248 * b) + (0.01 * p);
        double c = (n * p) + 0.5;
        double squeeze = 0.92 - (4.2 / b);
        double alpha = (2.83 + (5.1 / b)) * spread;
        double mode = Math.Floor((n + 1) * p);
        while (true)
        {
            double u = random.NextUniform() - 0.5;
            double v = random.NextUniform();
            double us = 0.5 - Math.Abs(u);
            double k = Math.Floor((((2 * a / us) + b) * u) + c);
            if (k < 0 || k > n)
            {
                continue;
            }

            if (us >= 0.07 && v <= squeeze)
            {
                return (long)k;
            }

            double left = Math.Log(v * alpha / ((a / (us * us)) + b));
            double right = SpecialFunctions.GammaLn(mode + 1) + SpecialFunctions.GammaLn(n - mode + 1)
                - SpecialFunctions.GammaLn(k + 1) - SpecialFunctions.GammaLn(n - k + 1) + ((k - mode) * Math.Log(p / (1 - p)));
            if (left <= right)
            {
                return (long)k;
            }
        }
    }
}
