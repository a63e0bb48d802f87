namespace Smoothing.Tests.Support;

/// <summary>Sums of the Gaussian kernel in arithmetic of 31 digits, for comparison. Definitions only; no formula of the library.</summary>
internal static class NormalOracle
{
    /// <summary>√(2π) to 32 digits, as high and low part.</summary>
    private static DoubleDouble Root => (DoubleDouble)2.5066282746310007 - 1.8328579980459167e-16;

    /// <summary>(1/(Σw h^{r+1})) Σ w φ⁽ʳ⁾((x − X)/h), φ⁽ʳ⁾ = (−1)ʳ Heᵣ φ.</summary>
    public static double Derivative(double[] values, double[] weights, double width, double x, int order)
    {
        if (double.IsInfinity(x))
        {
            return 0;
        }

        DoubleDouble sum = 0, total = 0;
        for (int i = 0; i < values.Length; i++)
        {
            DoubleDouble w = weights.Length == 0 ? 1 : weights[i];
            DoubleDouble u = ((DoubleDouble)x - values[i]) / width;
            total += w;
            sum += Math.Abs(u.High) < 40 ? DoubleDouble.Exp(u * u * -0.5) * Hermite(u, order) * w : 0; // below the smallest double beyond
        }

        return (double)(sum / total / Root / DoubleDouble.Power(width, order + 1)) * (order % 2 == 0 ? 1 : -1);
    }

    /// <summary>Σw(φ + |φ⁽ʳ⁾|) scaled alike: what a sum with signs can be held to.</summary>
    public static double Size(double[] values, double[] weights, double width, double x, int order)
    {
        double sum = 0, total = 0;
        for (int i = 0; i < values.Length; i++)
        {
            double u = (x - values[i]) / width, w = weights.Length == 0 ? 1 : weights[i];
            total += w;
            sum += Math.Abs(u) < 40 ? Math.Exp(-0.5 * u * u) * (1 + Math.Abs((double)Hermite(u, order))) * w : 0;
        }

        return sum / total / Math.Sqrt(2 * Math.PI) / Math.Pow(width, order + 1);
    }

    /// <summary>Share of the weight below x (above it), each value spread by the normal law.</summary>
    public static double Cumulative(double[] values, double[] weights, double width, double x, bool upper)
    {
        if (double.IsInfinity(x))
        {
            return x > 0 == upper ? 0 : 1;
        }

        DoubleDouble sum = 0, total = 0;
        for (int i = 0; i < values.Length; i++)
        {
            DoubleDouble w = weights.Length == 0 ? 1 : weights[i];
            DoubleDouble u = ((DoubleDouble)x - values[i]) / width;
            total += w;
            sum += LowerTail(upper ? -u : u) * w;
        }

        return (double)(sum / total);
    }

    /// <summary>Φ(z): Taylor series about 0 for |z| below 6 (Abramowitz &amp; Stegun 26.2.11), Laplace's continued fraction beyond (26.2.14).</summary>
    public static DoubleDouble LowerTail(DoubleDouble z)
    {
        if (Math.Abs(z.High) > 39)
        {
            return z.High < 0 ? 0 : 1;
        }

        if (z.High > 6)
        {
            return 1 - LowerTail(-z);
        }

        DoubleDouble density = DoubleDouble.Exp(z * z * -0.5) / Root;
        if (z.High > -6)
        {
            DoubleDouble term = z, sum = z;
            for (int k = 1; k < 200 && Math.Abs(term.High) > 1e-34; k++)
            {
                term = term * z * z / ((2 * k) + 1);
                sum += term;
            }

            return (DoubleDouble)0.5 + (density * sum);
        }

        DoubleDouble fraction = -z;
        for (int k = 150; k >= 1; k--)
        {
            fraction = -z + ((DoubleDouble)k / fraction);
        }

        return density / fraction;
    }

    private static DoubleDouble Hermite(DoubleDouble u, int order)
    {
        DoubleDouble before = 0, here = 1;
        for (int n = 0; n < order; n++)
        {
            (before, here) = (here, (u * here) - (before * n));
        }

        return here;
    }
}
