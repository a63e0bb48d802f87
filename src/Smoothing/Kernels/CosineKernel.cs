using Smoothing.Numerics;

namespace Smoothing.Kernels;

/// <summary>K(u) = (π/4) cos(πu/2) on [−1, 1].</summary>
internal sealed class CosineKernel : Kernel
{
    private const double Rate = Math.PI / 2;

    public override string Name => "Cosine";

    public override double SupportRadius => 1;

    internal override double ValueCore(double u)
    {
        // cos(πu/2) = sin(πs/2), s = 1 − |u|: exact zero at the edge.
        double s = 1 - Math.Abs(u);
        return s <= 0 ? 0 : Math.PI / 4 * Math.Sin(Rate * s);
    }

    internal override double DerivativeCore(double u, int order)
    {
        double a = Math.Abs(u);
        if (a > 1)
        {
            return 0;
        }

        if (a == 1)
        {
            return order == 1 ? -Math.Sign(u) * Math.PI * Math.PI / 16 : throw NoDerivative(order, "at the ends of the support");
        }

        double wave = (order % 4) switch
        {
            0 => Math.Cos(Rate * u),
            1 => -Math.Sin(Rate * u),
            2 => -Math.Cos(Rate * u),
            _ => Math.Sin(Rate * u),
        };
        return Math.PI / 4 * Math.Pow(Rate, order) * wave;
    }

    internal override double CumulativeCore(double u)
    {
        if (Math.Abs(u) >= 1)
        {
            return u < 0 ? 0 : 1;
        }

        // (1 − cos(πs/2))/2 = sin²(πs/4)
        double root = Math.Sin(Math.PI / 4 * (1 - Math.Abs(u)));
        double tail = root * root;
        return u <= 0 ? tail : 1 - tail;
    }

    internal override double EvenMoment(int order) =>
        2 * GaussLegendre.Integrate(u => Math.Pow(u, order) * ValueCore(u), 0, 1, Math.Min(64, 16 + order));

    internal override double RoughnessCore(int derivative) => derivative switch
    {
        0 => Math.PI * Math.PI / 16,
        1 => Math.PI * Math.PI * Math.PI * Math.PI / 64,
        _ => throw NoRoughness(derivative),
    };

    internal override double TransformCore(double t)
    {
        // (π²/4) cos t / (π²/4 − t²); cos t = sin(π/2 − t) takes the zero of the denominator away.
        double gap = Rate - t;
        double quotient = Math.Abs(gap) < 1e-8 ? 1 - (gap * gap / 6) : Math.Sin(gap) / gap;
        return Rate * Rate / (Rate + t) * quotient;
    }

    internal override double SelfConvolutionCore(double u)
    {
        // (π²/32)[sin(ct)/c − t cos(ct)], t = 2 − u, c = π/2; with x = ct the bracket is (sin x − x cos x)/c, a series where it cancels.
        double x = Rate * (2 - u);
        double bracket;
        if (x < 1)
        {
            // Σ_{k≥1} (−1)^{k+1} 2k x^{2k+1}/(2k+1)!; for x < 1 ten terms end below 1e-20.
            bracket = 0;
            double power = x;
            for (int k = 1; k <= 10; k++)
            {
                power *= -x * x / ((2 * k) * ((2 * k) + 1));
                bracket -= 2 * k * power;
            }
        }
        else
        {
            bracket = Math.Sin(x) - (x * Math.Cos(x));
        }

        return Math.PI * Math.PI / 32 * bracket / Rate;
    }

    internal override double IncompleteMomentCore(int order, double upper)
    {
        int nodes = Math.Min(64, 16 + order);
        double Term(double u) => Math.Pow(u, order) * ValueCore(u);
        if (upper <= 0)
        {
            return GaussLegendre.Integrate(Term, -1, upper, nodes);
        }

        double mirrored = GaussLegendre.Integrate(Term, -1, -upper, nodes);
        return order % 2 == 0 ? EvenMoment(order) - mirrored : mirrored;
    }
}
