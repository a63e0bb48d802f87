using System.Numerics;
using Smoothing.Numerics;

namespace Smoothing.Kernels;

/// <summary>K(u) = e^(−u)/(1 + e^(−u))² = F(1 − F), F the logistic distribution function.</summary>
/// <remarks>Method: K^(r) is a polynomial in F with whole coefficients, p_{r+1} = p_r' F(1 − F), so R(K^(r)) = ∫₀¹ p_r²/(F(1 − F)) dF is an exact fraction.</remarks>
internal sealed class LogisticKernel : Kernel
{
    public override string Name => "Logistic";

    public override double SupportRadius => double.PositiveInfinity;

    internal override double AnalyticHalfWidth => Math.PI;

    private protected override double FiniteRadius => 750;

    internal override double ValueCore(double u)
    {
        double decay = Math.Exp(-Math.Abs(u));
        return decay / ((1 + decay) * (1 + decay));
    }

    internal override double DerivativeCore(double u, int order)
    {
        // In the lower tail, where F is small and nothing cancels; K^(r)(u) = (−1)^r K^(r)(−u) carries it over.
        double f = CumulativeCore(-Math.Abs(u));
        BigInteger[] coefficients = Polynomial(order);
        double sum = 0;
        for (int k = coefficients.Length - 1; k >= 0; k--)
        {
            sum = (sum * f) + (double)coefficients[k];
        }

        return u > 0 && order % 2 == 1 ? -sum : sum;
    }

    internal override double CumulativeCore(double u)
    {
        double decay = Math.Exp(-Math.Abs(u));
        return (u <= 0 ? decay : 1) / (1 + decay);
    }

    internal override double EvenMoment(int order)
    {
        if (order == 0)
        {
            return 1;
        }

        // 2 j! η(j), η the alternating zeta function.
        return 2 * Factorial(order) * Alternating(1, order);
    }

    internal override double RoughnessCore(int derivative)
    {
        // p = F(1 − F) q: ∫ p²/(F(1 − F)) = ∫ F(1 − F) q² = ∫ p q.
        BigInteger[] p = Polynomial(derivative);

        // q by division of p by F(1 − F): q_k = p_{k+1} + q_{k−1}.
        var q = new BigInteger[p.Length - 2];
        for (int k = 0; k < q.Length; k++)
        {
            q[k] = p[k + 1] + (k > 0 ? q[k - 1] : 0);
        }

        Rational sum = Rational.Zero;
        for (int i = 0; i < p.Length; i++)
        {
            for (int j = 0; j < q.Length; j++)
            {
                sum += new Rational(p[i] * q[j], i + j + 1);
            }
        }

        return sum.ToDouble();
    }

    internal override double TransformCore(double t)
    {
        double x = Math.PI * t;
        return x > 710 ? 2 * x * Math.Exp(-x) : x / Math.Sinh(x);
    }

    internal override double SelfConvolutionCore(double u)
    {
        // (x cosh x − sinh x)/(2 sinh³x), x = u/2: a series of positive terms for small x, decaying exponentials for large.
        double x = u / 2;
        if (x < 1)
        {
            double square = x * x;
            double numerator = 0;
            double sinh = 0;
            double term = 1;

            // x^{2k}/(2k+1)!, both series divided by x³ and x: fifteen terms end below 1e-30 at x = 1.
            double over = 1.0 / 6;
            for (int k = 0; k < 15; k++)
            {
                sinh += term;
                term *= square / (((2 * k) + 2) * ((2 * k) + 3));
                numerator += 2 * (k + 1) * over;
                over *= square / (((2 * k) + 4) * ((2 * k) + 5));
            }

            return numerator / (2 * sinh * sinh * sinh);
        }

        double decay = Math.Exp(-2 * x);
        double gap = 1 - decay;
        return 2 * decay * ((x * (1 + decay)) - gap) / (gap * gap * gap);
    }

    internal override double IncompleteMomentCore(int order, double upper)
    {
        if (upper > 0)
        {
            double mirrored = IncompleteMomentCore(order, -upper);
            return order % 2 == 0 ? EvenMoment(order) - mirrored : mirrored;
        }

        // By parts, j times: Σ_i (−1)^i j!/(j − i)! p^{j−i} L_i, L_i(z) = Σ_k (−1)^{k−1} z^k/k^i at z = e^p. For p ≤ 0 all terms have one sign.
        double z = Math.Exp(upper);
        double sum = 0;
        double factor = 1;
        for (int i = 0; i <= order && z > 0; i++)
        {
            double term = i == 0 ? CumulativeCore(upper) : Alternating(z, i);
            sum += factor * Math.Pow(upper, order - i) * term;
            factor *= -(order - i);
        }

        return sum;
    }

    // Σ_{k≥1} (−1)^{k−1} z^k/k^s for 0 < z ≤ 1, speeded up after Cohen, Rodriguez Villegas & Zagier (2000), algorithm 1: error 5.8^−n of the first term.
    private static double Alternating(double z, int s)
    {
        const int Terms = 24;
        double d = Math.Pow(3 + Math.Sqrt(8), Terms);
        d = (d + (1 / d)) / 2;
        double b = -1;
        double c = -d;
        double sum = 0;
        double power = 1;
        for (int k = 0; k < Terms; k++)
        {
            power *= z;
            double a = power;
            for (int i = 0; i < s; i++)
            {
                a /= k + 1;
            }

            c = b - c;
            sum += c * a;
            b *= (k + Terms) * (k - (double)Terms) / ((k + 0.5) * (k + 1));
        }

        return sum / d;
    }

    private static double Factorial(int n)
    {
        double product = 1;
        for (int k = 2; k <= n; k++)
        {
            product *= k;
        }

        return product;
    }

    // p_0 = F − F²; p_{r+1} = p_r' (F − F²).
    private static BigInteger[] Polynomial(int order)
    {
        BigInteger[] p = [0, 1, -1];
        for (int r = 0; r < order; r++)
        {
            var next = new BigInteger[p.Length + 1];
            for (int k = 1; k < p.Length; k++)
            {
                next[k] += k * p[k];
                next[k + 1] -= k * p[k];
            }

            p = next;
        }

        return p;
    }
}
