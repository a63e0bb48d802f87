namespace Smoothing.Samples;

/// <summary>Moments about another centre at half the resolution.</summary>
internal static class MomentShift
{
    /// <summary>Σw((b + by)/2)^r = 2^−r Σ_q C(r, q) by^(r − q) Σwb^q, for all r.</summary>
    public static void Apply(ReadOnlySpan<double> moments, double by, Span<double> shifted)
    {
        double scale = 1;
        for (int r = 0; r < moments.Length; r++)
        {
            // Horner in "by" with the binomials built from the top: C(r, q) = C(r, q + 1)·(q + 1)/(r − q), exact in a double up to r = 15.
            double sum = 0, binomial = 1, power = 1;
            for (int q = r; q >= 0; q--)
            {
                sum += binomial * power * moments[q];
                power *= by;
                binomial = binomial * q / (r - q + 1);
            }

            shifted[r] = sum * scale;
            scale /= 2;
        }
    }
}
