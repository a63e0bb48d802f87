using Smoothing.Numerics;

namespace Smoothing.Bandwidths;

/// <summary>Estimates of ∫(f^(s))² by kernel stages that start from a normal law.</summary>
/// <remarks>
/// Method: R_s = n⁻² Σᵢⱼ of the overlap at pilot g_s, own terms included, g_s = {2 (2s−1)!!/(√(2π) R_{s+1} n)}^(1/(2s+3)), the pilot at
/// which the leading bias cancels the own terms; R at the start is the normal law's. Source: Wand &amp; Jones (1995), section 3.5.
/// </remarks>
internal static class PlugInFunctional
{
    public static double Roughness(SelectionInput input, int s, int stages, double scale)
    {
        double value = NormalReferenceRule.NormalRoughness(s + stages) / Math.Pow(scale, (2 * (s + stages)) + 1);
        for (int j = s + stages - 1; j >= s; j--)
        {
            double odd = 1;
            for (int i = 3; i < 2 * j; i += 2)
            {
                odd *= i;
            }

            double pilot = Math.Pow(2 * odd * NormalLaw.InverseSqrtTwoPi / (value * input.N), 1.0 / ((2 * j) + 3));
            value = input.Roughness(j, pilot / Math.Sqrt(2));
        }

        return value;
    }
}
