namespace Smoothing.Numerics;

/// <summary>Gauss–Legendre rules of up to 64 points, exact for polynomials of degree 2n − 1; all weights are positive, so positive integrands lose nothing.</summary>
internal static class GaussLegendre
{
    private const int Most = 64;
    private static readonly Lazy<(double[] Nodes, double[] Weights)>[] s_rules = [.. Enumerable.Range(0, Most + 1).Select(n => new Lazy<(double[], double[])>(() => Make(n)))];

    /// <summary>∫ f over [from, to] by the rule with <paramref name="points"/> nodes.</summary>
    public static double Integrate(Func<double, double> f, double from, double to, int points)
    {
        (double[] nodes, double[] weights) = s_rules[points].Value;
        double middle = (from + to) / 2;
        double half = (to - from) / 2;
        CompensatedSum sum = default;
        for (int i = 0; i < nodes.Length; i++)
        {
            sum.Add(weights[i] * f(middle + (half * nodes[i])));
        }

        return sum.Value * half;
    }

    // Method: Newton's iteration on P_n from the cosine start (Abramowitz & Stegun 22.16.6); weights 2/((1 − x²) P_n'²).
    private static (double[] Nodes, double[] Weights) Make(int n)
    {
        var nodes = new double[n];
        var weights = new double[n];
        for (int i = 0; i < n; i++)
        {
            double x = Math.Cos(Math.PI * (i + 0.75) / (n + 0.5));
            double slope = 0;
            for (int step = 0; step < 30; step++)
            {
                (double value, slope) = Legendre(n, x);
                double change = value / slope;
                x -= change;
                if (Math.Abs(change) < 1e-16)
                {
                    break;
                }
            }

            (_, slope) = Legendre(n, x);
            nodes[i] = x;
            weights[i] = 2 / ((1 - x) * (1 + x) * slope * slope);
        }

        return (nodes, weights);
    }

    private static (double Value, double Slope) Legendre(int n, double x)
    {
        double before = 1;
        double value = x;
        for (int k = 2; k <= n; k++)
        {
            (before, value) = (value, ((((2 * k) - 1) * x * value) - ((k - 1) * before)) / k);
        }

        return n == 1 ? (value, 1) : (value, n * ((x * value) - before) / ((x * x) - 1));
    }
}
