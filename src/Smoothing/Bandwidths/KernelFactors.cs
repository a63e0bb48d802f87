using Smoothing.Kernels;

namespace Smoothing.Bandwidths;

/// <summary>Factors that carry a bandwidth from the Gaussian kernel to another of order 2, and from the density to a derivative.</summary>
internal static class KernelFactors
{
    /// <summary>h for <paramref name="kernel"/> over h for the Gaussian, estimating the r-th derivative: ({R(K^(r))/μ₂²}/{R(φ^(r))})^(1/(2r+5)).</summary>
    public static double FromGaussian(Kernel kernel, int derivative)
    {
        double moment = kernel.Moment(2);
        double ratio = kernel.Roughness(derivative) / (moment * moment) / Kernel.Gaussian.Roughness(derivative);
        return Math.Pow(ratio, 1.0 / ((2 * derivative) + 5));
    }

    /// <summary>Best h for the r-th derivative over best h for the density, Gaussian kernel, normal law: {4/((2r+3)n)}^(1/(2r+5)) / {4/(3n)}^(1/5).</summary>
    public static double FromDensity(int derivative, double n) =>
        Math.Pow(4 / (((2 * derivative) + 3) * n), 1.0 / ((2 * derivative) + 5)) / Math.Pow(4 / (3 * n), 0.2);
}
