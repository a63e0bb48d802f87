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

        // 2 j! η(j), η the alternating zeta function; its series speeded up after Cohen, Rodriguez Villegas & Zagier (2000), algorithm 1 (error 5.8^−n).
        const int Terms = 26;
        double d = Math.Pow(3 + Math.Sqrt(8), Terms);
        d = (d + (1 / d)) / 2;
        double b = -1;
        double c = -d;
        double sum = 0;
        for (int k = 0; k < Terms; k++)
        {
            c = b - c;
            sum += c * Math.Pow(k + 1, -order);
            b *= (k + Terms) * (k - (double)Terms) / ((k + 0.5) * (k + 1));
        }

        double factorial = 1;
        for (int k = 2; k <= order; k++)
        {
            factorial *= k;
        }

        return 2 * factorial * sum / d;
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

        // K falls by e a unit: 60 + 4j units below the end nothing is left of the integral; panels of two units, 24 nodes.
        double reach = 60 + (4 * order);
        int panels = (int)(reach / 2);
        CompensatedSum sum = default;
        for (int i = 0; i < panels; i++)
        {
            double to = upper - (2 * i);
            sum.Add(GaussLegendre.Integrate(u => Math.Pow(u, order) * ValueCore(u), to - 2, to, 24));
        }

        return sum.Value;
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
