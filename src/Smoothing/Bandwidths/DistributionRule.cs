using Smoothing.Kernels;
using Smoothing.Numerics;

namespace Smoothing.Bandwidths;

/// <summary>Plug-in for the smoothed distribution function.</summary>
/// <remarks>
/// Method: h = {ρ/(n μ₂² R̂₁)}^(1/3), ρ = 2∫ u K(u) W(u) du with W = ∫K (1/√π for the Gaussian), R̂₁ the estimate of ∫f′² from the stages asked for.
/// Source: Polansky &amp; Baker (2000). The gain over the step function is 5 to 20 % of its integrated error, none with heavy tails.
/// </remarks>
internal static class DistributionRule
{
    public static RuleOutcome Find(SelectionInput input, Kernel kernel)
    {
        BandwidthChecks.SecondOrder(kernel, BandwidthRule.DirectPlugIn);
        double scale = input.ScaleFor(input.Options.Scale);
        double moment = kernel.Moment(2);
        double roughness = PlugInFunctional.Roughness(input, 1, input.Options.PlugInStages, scale);
        double h = Math.Pow(Spread(kernel) / (input.N * moment * moment * roughness), 1.0 / 3);
        return new RuleOutcome(BandwidthRule.DirectPlugIn, h, BandwidthStatus.Formula) { Scale = scale, IsExact = true, Notes = ["Chosen for the distribution function, not for the density."] };
    }

    /// <summary>2∫ u K(u) W(u) du; K is even and W(u) − ½ odd, so twice the half line.</summary>
    internal static double Spread(Kernel kernel)
    {
        if (ReferenceEquals(kernel, Kernel.Gaussian))
        {
            return 1 / NormalLaw.SqrtPi;
        }

        double end = double.IsFinite(kernel.SupportRadius) ? kernel.SupportRadius : 60;
        return 4 * Quadrature.Integrate(u => u * kernel.Value(u) * (kernel.Cumulative(u) - 0.5), 0, end, 1e-12);
    }
}
