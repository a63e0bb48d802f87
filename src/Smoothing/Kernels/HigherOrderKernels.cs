using Smoothing.Numerics;

namespace Smoothing.Kernels;

/// <summary>The two families of higher order; entry i is of order 2(i + 1).</summary>
internal static class HigherOrderKernels
{
    public static readonly Kernel[] Gaussians = [PlainGaussian.Kernel, new GaussianKernel(4), new GaussianKernel(6), new GaussianKernel(8)];

    public static readonly Kernel[] Polynomials =
    [
        StandardKernels.Epanechnikov,

        // (15/32)(1 − u²)(3 − 7u²) and (105/256)(1 − u²)(5 − 30u² + 33u⁴), rewritten in s = 1 − |u|.
        new PolynomialKernel("Polynomial of order 4", 4, Rational.Of(15, 32), [0, -8, 32, -28, 7], static a => 15.0 / 32 * (1 - a) * (1 + a) * (3 - (7 * a * a))),
        new PolynomialKernel("Polynomial of order 6", 6, Rational.Of(21, 256), [0, 80, -760, 2040, -2160, 990, -165], static a => 105.0 / 256 * (1 - a) * (1 + a) * (5 - (a * a * (30 - (33 * a * a))))),
    ];
}
