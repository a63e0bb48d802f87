namespace Smoothing.Estimation;

/// <summary>The multiplier of the sharp estimate, and the projection of a curve on densities.</summary>
internal static class SharpFilter
{
    /// <summary>Weights below this no longer show in a curve drawn to 1e-6 of its peak.</summary>
    private const double Negligible = 1e-9;

    /// <summary>
    /// A third each of exp(−h²t²/2), (1 + z)exp(−z) with z = h₄²t²/2, and the Wiener weight p/(p + (1 − p)/n), p = |φ_n|² exp(−h²t²); cut where nothing is left.
    /// Beyond π/<paramref name="latticeStep"/> the spectrum of rounded values repeats itself, so the Wiener part ends there.
    /// </summary>
    public static double[] Multiplier(EmpiricalSpectrum spectrum, double bandwidth, double sharpBandwidth, double latticeStep = 0)
    {
        ReadOnlySpan<double> squared = spectrum.SquaredModulus;
        var weights = new double[squared.Length];
        int end = 1;
        for (int k = 0; k < weights.Length; k++)
        {
            double t = k * spectrum.Step;
            double plain = Math.Exp(-0.5 * bandwidth * bandwidth * t * t);
            double z = 0.5 * sharpBandwidth * sharpBandwidth * t * t;
            double debiased = (1 + z) * Math.Exp(-z);
            double p = Math.Min(1, squared[k] * plain * plain);
            double wiener = p / (p + ((1 - p) / spectrum.EffectiveCount));
            weights[k] = (plain + debiased + (p > 0 && t * latticeStep <= Math.PI ? wiener : 0)) / 3;
            end = weights[k] > Negligible ? k + 1 : end;
        }

        return weights[..end];
    }

    /// <summary>The nearest density in mean square: max(g − ξ, 0) with ξ such that it integrates to 1; never farther from any density than g (Glad, Hjort &amp; Ushakov 2003).</summary>
    public static void Project(double[] curve, double spacing)
    {
        double lower = 0, upper = curve.Max();
        // ∫max(g, 0) ≥ ∫g = 1, so ξ ≥ 0; 60 halvings reach the last bit.
        for (int i = 0; i < 60 && lower < upper; i++)
        {
            double level = 0.5 * (lower + upper);
            if (MassAbove(curve, level) * spacing > 1)
            {
                lower = level;
            }
            else
            {
                upper = level;
            }
        }

        double mass = MassAbove(curve, upper) * spacing;
        for (int i = 0; i < curve.Length; i++)
        {
            curve[i] = Math.Max(curve[i] - upper, 0) / mass;
        }
    }

    private static double MassAbove(double[] curve, double level)
    {
        double sum = 0;
        foreach (double y in curve)
        {
            sum += Math.Max(y - level, 0);
        }

        return sum;
    }
}
