using Smoothing.Numerics;

namespace Smoothing.Inference;

/// <summary>The kernel M_p(u) = φ(u)(c₀ + c₁u + c₂u²) on [−q, p] with moments (1, 0, 0), and its roughness.</summary>
/// <remarks>Method: the 3 × 3 system of truncated Gaussian moments; in the interior c = (3/2, 0, −1/2) and R(M) = 27/(32√π).</remarks>
internal readonly record struct BoundaryWeights(double C0, double C1, double C2, double Roughness)
{
    // Past nine bandwidths a limit changes nothing that a double can hold.
    private const double Reach = 9;

    private static readonly BoundaryWeights s_interior = new(1.5, 0, -0.5, 27 / (32 * NormalLaw.SqrtPi));

    public static BoundaryWeights Of(double p, double q)
    {
        if (p >= Reach && q >= Reach)
        {
            return s_interior;
        }

        double upper = Math.Min(p, Reach);
        double lower = -Math.Min(q, Reach);
        Span<double> a = stackalloc double[5];
        Span<double> b = stackalloc double[5];
        Moments(lower, upper, a);

        // ∫ uᵏ φ² = ∫ vᵏ φ(v) dv /(√(2π)·2^{(k+1)/2}), v = √2 u.
        Moments(lower * Math.Sqrt(2), upper * Math.Sqrt(2), b);
        for (int k = 0; k < 5; k++)
        {
            b[k] *= NormalLaw.InverseSqrtTwoPi / Math.Pow(2, (k + 1) / 2.0);
        }

        // Cramer's rule for [a0 a1 a2; a1 a2 a3; a2 a3 a4] c = (1, 0, 0).
        double c0 = (a[2] * a[4]) - (a[3] * a[3]);
        double c1 = (a[2] * a[3]) - (a[1] * a[4]);
        double c2 = (a[1] * a[3]) - (a[2] * a[2]);
        double determinant = (a[0] * c0) + (a[1] * c1) + (a[2] * c2);
        c0 /= determinant;
        c1 /= determinant;
        c2 /= determinant;
        double roughness = (c0 * c0 * b[0]) + (2 * c0 * c1 * b[1]) + (((c1 * c1) + (2 * c0 * c2)) * b[2]) + (2 * c1 * c2 * b[3]) + (c2 * c2 * b[4]);
        return new BoundaryWeights(c0, c1, c2, roughness);
    }

    private static void Moments(double lower, double upper, Span<double> moments)
    {
        double atLower = NormalLaw.Density(lower);
        double atUpper = NormalLaw.Density(upper);
        moments[0] = NormalLaw.Cumulative(upper) - NormalLaw.Cumulative(lower);
        moments[1] = atLower - atUpper;
        for (int k = 2; k < moments.Length; k++)
        {
            moments[k] = ((k - 1) * moments[k - 2]) - (Math.Pow(upper, k - 1) * atUpper) + (Math.Pow(lower, k - 1) * atLower);
        }
    }
}
