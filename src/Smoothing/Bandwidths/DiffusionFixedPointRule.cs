using Smoothing.Numerics;

namespace Smoothing.Bandwidths;

/// <summary>The fixed point of Botev, Grotowski and Kroese.</summary>
/// <remarks>
/// Method: h² = γ(h), where γ starts from J_L = ∫(f̂_h^(L))² and descends, s = L−1 … 2: g_s² = {2 c_s/(n J_{s+1})}^(2/(2s+3)),
/// c_s = (1 + 2^(−s−½))/3 · 1·3·…·(2s−1)/√(2π), J_s = ∫(f̂_{g_s}^(s))²; γ = (2n√π J₂)^(−2/5). No normal law is assumed
/// anywhere. Source: Botev, Grotowski &amp; Kroese (2010), section 5. Changes: integrals over the whole line (their cosine series on the range of
/// the data is reflection at its ends), L = 7 by default; the smallest crossing of h² − γ(h) from − to +, since ties make
/// a spurious one from + to − near 0. Dominant error: no crossing for rounded data, which the cut of the spectrum at π/step mends.
/// </remarks>
internal static class DiffusionFixedPointRule
{
    /// <summary>Bandwidths scanned for roots: 1.13 apart over the search ratio of 500.</summary>
    private const int ScanPoints = 52;

    public static RuleOutcome Find(SelectionInput input)
    {
        double[] grid = RootScan.Grid(input.Smallest, input.HasLimits ? input.Bracket : input.Largest, ScanPoints);
        double Criterion(double h) => Math.Clamp(Math.Log(h * h / Gamma(input, h)), -1000, 1000);
        List<(double Root, bool Rising)> crossings = RootScan.Crossings(Criterion, grid, out double[] values);
        double bracket = input.Bracket;
        (double Root, bool Rising) first = crossings.Find(r => r.Rising && r.Root <= bracket);
        int rising = crossings.Count(r => r.Rising && r.Root <= bracket);
        bool open = input.HasLimits && values[^1] < 0 && rising == 0;

        // h² is above γ(h) already where rounding stops the search: the root lies below the floor. Without limits the other candidate decides.
        bool below = input.HasLimits && rising == 0 && values[0] >= 0 && input.Floor > 0 && input.Smallest <= input.Floor;
        return new RuleOutcome(
            BandwidthRule.DiffusionFixedPoint,
            rising > 0 ? first.Root : open ? grid[^1] : below ? grid[0] : double.NaN,
            rising == 0 ? BandwidthStatus.EndOfSearch : crossings.Count == 1 ? BandwidthStatus.Found : BandwidthStatus.SeveralFound)
        {
            Roots = [.. crossings.Select(r => r.Root)],
            Objective = input.Options.KeepObjective ? (grid, values) : null,
        };
    }

    /// <summary>γ(h) of the recursion; +∞ where an integral underflows, which reads as "h too small".</summary>
    private static double Gamma(SelectionInput input, double h)
    {
        double n = input.N;
        double roughness = input.Roughness(input.Options.HighestDerivative, h);
        for (int s = input.Options.HighestDerivative - 1; s >= 2; s--)
        {
            double odd = 1;
            for (int j = 3; j < 2 * s; j += 2)
            {
                odd *= j;
            }

            double constant = (1 + Math.Pow(2, -s - 0.5)) / 3 * odd * NormalLaw.InverseSqrtTwoPi;
            double g = Math.Pow(2 * constant / (n * roughness), 1.0 / ((2 * s) + 3));
            if (!double.IsFinite(g))
            {
                return double.PositiveInfinity;
            }

            roughness = input.Roughness(s, g);
        }

        double gamma = Math.Pow(2 * n * NormalLaw.SqrtPi * roughness, -0.4);
        return double.IsFinite(gamma) ? gamma : double.PositiveInfinity;
    }
}
