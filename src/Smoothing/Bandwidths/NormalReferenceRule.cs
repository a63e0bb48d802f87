using Smoothing.Kernels;
using Smoothing.Numerics;

namespace Smoothing.Bandwidths;

/// <summary>The bandwidth that is asymptotically best for a normal law.</summary>
/// <remarks>
/// Method: h = {(2r+1) R(K^(r)) (k!)² / (2k μ_k² R(f^(k+r)) n)}^(1/(2k+2r+1)) with f normal and
/// R(φ_σ^(s)) = (2s)!/(2^(2s+1) s! √π σ^(2s+1)). For the Gaussian, r = 0: (4/3)^(1/5) σ n^(−1/5). Source: Wand &amp; Jones
/// (1995), sections 2.5, 2.12 and 3.2. Exact for the kernel itself, of any order.
/// </remarks>
internal static class NormalReferenceRule
{
    public static double Bandwidth(Kernel kernel, int derivative, double scale, double n)
    {
        int k = kernel.Order;
        double moment = kernel.Moment(k);
        double factorial = Factorial(k);
        double noise = ((2 * derivative) + 1) * kernel.Roughness(derivative) * factorial * factorial;
        double bias = 2 * k * moment * moment * NormalRoughness(k + derivative) * n;
        return scale * Math.Pow(noise / bias, 1.0 / ((2 * k) + (2 * derivative) + 1));
    }

    /// <summary>R(φ^(s)) of the standard normal law.</summary>
    public static double NormalRoughness(int s)
    {
        double value = 0.5 / NormalLaw.SqrtPi;
        for (int j = 1; j <= s; j++)
        {
            value *= ((2 * j) - 1) / 2.0;
        }

        return value;
    }

    private static double Factorial(int k) => k <= 1 ? 1 : k * Factorial(k - 1);
}
