using Smoothing.Kernels;

namespace Smoothing.Bandwidths;

/// <summary>The largest bandwidth that is best for any law of the given standard deviation.</summary>
/// <remarks>Method: h = 3 {R(K)/(35 μ₂²)}^(1/5) σ n^(−1/5), since ∫f″² ≥ 35/(243 σ⁵). Source: Terrell (1990). Order 2.</remarks>
internal static class OversmoothedRule
{
    public static double Bandwidth(Kernel kernel, double deviation, double n)
    {
        double moment = kernel.Moment(2);
        return 3 * Math.Pow(kernel.Roughness() / (35 * moment * moment * n), 0.2) * deviation;
    }
}
