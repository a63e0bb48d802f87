namespace Smoothing.Kernels;

/// <summary>K(u) = ¾(1 − u²) on [−1, 1].</summary>
internal sealed class EpanechnikovKernel : Kernel
{
    // ¾(1 − u²) = ¾ s(2 − s) with s = 1 − |u|.
    private static readonly double[] s_edge = [0, 1.5, -0.75];

    public override string Name => "Epanechnikov";

    public override double SupportRadius => 1;

    public override double Efficiency => 1;

    internal override ReadOnlySpan<double> EdgePolynomial => s_edge;

    internal override double ValueCore(double u)
    {
        double s = 1 - Math.Abs(u);
        return s <= 0 ? 0 : 0.75 * s * (2 - s);
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
            // The slope jumps from −1.5 to 0 at the edge; the mean stands in for it, and nothing for what lies above.
            return order == 1 ? -0.75 * Math.Sign(u) : throw NoDerivative(order, "at the ends of the support");
        }

        return order switch { 1 => -1.5 * u, 2 => -1.5, _ => 0 };
    }

    internal override double CumulativeCore(double u)
    {
        if (u <= -1)
        {
            return 0;
        }

        if (u >= 1)
        {
            return 1;
        }

        // ∫ from the edge: s²(3 − s)/4 with s = 1 + u, no cancellation near the edge; by symmetry on the right.
        double s = 1 - Math.Abs(u);
        double tail = s * s * (3 - s) / 4;
        return u <= 0 ? tail : 1 - tail;
    }

    internal override double EvenMoment(int order) => 3.0 / ((order + 1.0) * (order + 3));

    internal override double RoughnessCore(int derivative) => derivative switch
    {
        0 => 0.6,
        1 => 1.5,
        _ => throw NoRoughness(derivative),
    };
}
