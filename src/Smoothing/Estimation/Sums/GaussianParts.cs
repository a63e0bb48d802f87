using Smoothing.Kernels;

namespace Smoothing.Estimation;

/// <summary>φ(u)·q(u²) as Σ cᵢ φ⁽²ⁱ⁾(u): the form in which sums of derivatives of the plain Gaussian give any kernel of the family.</summary>
internal static class GaussianParts
{
    /// <summary>c₀, 0, c₁, 0, c₂, …: entry j belongs to the j-th derivative.</summary>
    public static double[] Of(Kernel kernel)
    {
        ReadOnlySpan<double> q = kernel.GaussianPolynomial;
        int degree = 2 * (q.Length - 1);
        var rest = new double[degree + 1];
        for (int k = 0; k < q.Length; k++)
        {
            rest[2 * k] = q[k];
        }

        // φ⁽ʲ⁾ = (−1)ʲ Heⱼ φ, j even: take the highest power off with Heⱼ, whose leading coefficient is 1.
        var parts = new double[degree + 1];
        for (int j = degree; j >= 0; j -= 2)
        {
            parts[j] = rest[j];
            double[] hermite = Hermite(j);
            for (int k = 0; k <= j; k++)
            {
                rest[k] -= parts[j] * hermite[k];
            }
        }

        return parts;
    }

    // He_{n+1} = u He_n − n He_{n−1}.
    private static double[] Hermite(int order)
    {
        double[] before = new double[order + 1], here = new double[order + 1];
        here[0] = 1;
        for (int n = 0; n < order; n++)
        {
            var next = new double[order + 1];
            for (int k = 0; k <= order; k++)
            {
                next[k] = (k > 0 ? here[k - 1] : 0) - (n * before[k]);
            }

            (before, here) = (here, next);
        }

        return here;
    }
}
