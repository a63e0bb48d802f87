using Smoothing.Numerics;

namespace Smoothing.Kernels;

/// <summary>K(u) = φ(u).</summary>
internal sealed class GaussianKernel : Kernel
{
    private static readonly double[] s_polynomial = [1];

    public override string Name => "Gaussian";

    public override double SupportRadius => double.PositiveInfinity;

    public override double Efficiency => 3 / (5 * Math.Sqrt(5)) / Roughness();

    internal override ReadOnlySpan<double> GaussianPolynomial => s_polynomial;

    internal override double ValueCore(double u) => NormalLaw.Density(u);

    internal override double DerivativeCore(double u, int order)
    {
        if (double.IsInfinity(u))
        {
            return 0;
        }

        // φ^(r)(u) = (−1)^r He_r(u) φ(u), He_{r+1} = u He_r − r He_{r−1}.
        double below = 0;
        double hermite = 1;
        for (int r = 0; r < order; r++)
        {
            (below, hermite) = (hermite, (u * hermite) - (r * below));
        }

        double density = NormalLaw.Density(u);
        return density == 0 ? 0 : (order % 2 == 0 ? hermite : -hermite) * density;
    }

    internal override double CumulativeCore(double u) => NormalLaw.Cumulative(u);

    internal override double EvenMoment(int order)
    {
        // μ_{2k} = (2k − 1)!!
        double moment = 1;
        for (int j = 1; j < order; j += 2)
        {
            moment *= j;
        }

        return moment;
    }

    internal override double RoughnessCore(int derivative)
    {
        // R(φ^(r)) = (2r − 1)!! / (2^{r+1} √π).
        double roughness = 0.5 / NormalLaw.SqrtPi;
        for (int r = 1; r <= derivative; r++)
        {
            roughness *= ((2 * r) - 1) / 2.0;
        }

        return roughness;
    }
}
