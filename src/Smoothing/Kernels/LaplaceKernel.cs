using Smoothing.Numerics;

namespace Smoothing.Kernels;

/// <summary>K(u) = ½ e^(−|u|).</summary>
internal sealed class LaplaceKernel : Kernel
{
    public override string Name => "Laplace";

    public override double SupportRadius => double.PositiveInfinity;

    internal override double ExponentialRate => 1;

    private protected override double FiniteRadius => 750;

    internal override double ValueCore(double u) => 0.5 * Math.Exp(-Math.Abs(u));

    internal override double DerivativeCore(double u, int order)
    {
        if (u == 0)
        {
            // The slope jumps from ½ to −½: its mean is 0, and nothing lies above it.
            return order == 1 ? 0 : throw NoDerivative(order, "at 0");
        }

        double value = ValueCore(u);
        return order % 2 == 1 && u > 0 ? -value : value;
    }

    internal override double CumulativeCore(double u) => u <= 0 ? 0.5 * Math.Exp(u) : 1 - (0.5 * Math.Exp(-u));

    internal override double EvenMoment(int order) => Factorial(order);

    internal override double RoughnessCore(int derivative) => derivative <= 1 ? 0.25 : throw NoRoughness(derivative);

    internal override double TransformCore(double t) => 1 / (1 + (t * t));

    internal override double SelfConvolutionCore(double u) => (1 + u) * Math.Exp(-u) / 4;

    internal override double IncompleteMomentCore(int order, double upper)
    {
        if (upper > 0)
        {
            double mirrored = IncompleteMomentCore(order, -upper);
            return order % 2 == 0 ? EvenMoment(order) - mirrored : mirrored;
        }

        // ½ e^p Σ_k (−1)^k j!/(j − k)! p^{j−k}: for p ≤ 0 all terms have one sign.
        double decay = Math.Exp(upper);
        if (decay == 0)
        {
            return 0;
        }

        double sum = 0;
        for (int k = 0; k <= order; k++)
        {
            double sign = k % 2 == 0 ? 1 : -1;
            sum += sign * Factorial(order) / Factorial(order - k) * Math.Pow(upper, order - k);
        }

        return 0.5 * decay * sum;
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
}
