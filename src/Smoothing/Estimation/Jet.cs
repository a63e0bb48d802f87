namespace Smoothing.Estimation;

/// <summary>Arithmetic on truncated Taylor series c₀ + c₁t + c₂t² + …: derivatives of products, quotients and compositions without a formula for each.</summary>
internal static class Jet
{
    public static double[] Multiply(ReadOnlySpan<double> a, ReadOnlySpan<double> b)
    {
        var c = new double[a.Length];
        for (int k = 0; k < c.Length; k++)
        {
            for (int i = 0; i <= k; i++)
            {
                c[k] += a[i] * b[k - i];
            }
        }

        return c;
    }

    public static double[] Combine(double p, ReadOnlySpan<double> a, double q, ReadOnlySpan<double> b)
    {
        var c = new double[a.Length];
        for (int k = 0; k < c.Length; k++)
        {
            c[k] = (p * a[k]) + (q * b[k]);
        }

        return c;
    }

    /// <summary>a/b, b₀ ≠ 0.</summary>
    public static double[] Divide(ReadOnlySpan<double> a, ReadOnlySpan<double> b)
    {
        var c = new double[a.Length];
        for (int k = 0; k < c.Length; k++)
        {
            double rest = a[k];
            for (int i = 1; i <= k; i++)
            {
                rest -= b[i] * c[k - i];
            }

            c[k] = rest / b[0];
        }

        return c;
    }

    /// <summary>exp(a), from k cₖ = Σ i aᵢ cₖ₋ᵢ.</summary>
    public static double[] Exp(ReadOnlySpan<double> a)
    {
        var c = new double[a.Length];
        c[0] = Math.Exp(a[0]);
        for (int k = 1; k < c.Length; k++)
        {
            for (int i = 1; i <= k; i++)
            {
                c[k] += i * a[i] * c[k - i] / k;
            }
        }

        return c;
    }

    /// <summary>g(y(x)) for g as a series about y(x₀) and y as a series about x₀ (its constant term is not used).</summary>
    public static double[] Compose(ReadOnlySpan<double> g, ReadOnlySpan<double> y)
    {
        double[] inner = y.ToArray();
        inner[0] = 0;
        var result = new double[g.Length];
        for (int k = g.Length - 1; k >= 0; k--)
        {
            result = Multiply(result, inner);
            result[0] += g[k];
        }

        return result;
    }

    public static double Factorial(int n)
    {
        double product = 1;
        for (int i = 2; i <= n; i++)
        {
            product *= i;
        }

        return product;
    }
}
