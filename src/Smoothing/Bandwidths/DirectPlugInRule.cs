using Smoothing.Kernels;

namespace Smoothing.Bandwidths;

/// <summary>Direct plug-in: the asymptotically best bandwidth with an estimated ∫(f^(k+r))².</summary>
/// <remarks>
/// Method: h = {(2r+1) R(K^(r)) (k!)²/(2k μ_k² R̂_{k+r} n)}^(1/(2k+2r+1)), R̂ by <see cref="PlugInFunctional"/> with the stages asked for. Exact for
/// the kernel itself, of any order k. Source: Wand &amp; Jones (1995), section 3.6.1. Dominant error: the normal start.
/// </remarks>
internal static class DirectPlugInRule
{
    public static RuleOutcome Find(SelectionInput input, Kernel kernel)
    {
        double scale = input.ScaleFor(input.Options.Scale);
        int k = kernel.Order, r = input.Options.Derivative;
        double roughness = PlugInFunctional.Roughness(input, k + r, input.Options.PlugInStages, scale);
        // The normal reference of unit scale holds all constants of the kernel; only ∫(f^(k+r))² is exchanged.
        double h = NormalReferenceRule.Bandwidth(kernel, r, 1, input.N)
            * Math.Pow(NormalReferenceRule.NormalRoughness(k + r) / roughness, 1.0 / ((2 * k) + (2 * r) + 1));
        return new RuleOutcome(BandwidthRule.DirectPlugIn, h, BandwidthStatus.Formula) { Scale = scale, IsExact = true };
    }
}
