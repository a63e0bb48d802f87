using Smoothing.Numerics;

namespace Smoothing.Kernels;

/// <summary>The standard kernels but for the Gaussian. Made together on first need: their exact constants take longer to compile than a curve takes to compute.</summary>
internal static class StandardKernels
{
    public static readonly Kernel Uniform = new PolynomialKernel("Uniform", 2, Rational.Of(1, 2), [1], static _ => 0.5);
    public static readonly Kernel Triangular = new PolynomialKernel("Triangular", 2, Rational.Of(1), [0, 1], static a => 1 - a);
    public static readonly Kernel Epanechnikov = new PolynomialKernel("Epanechnikov", 2, Rational.Of(3, 4), [0, 2, -1], static a => 0.75 * (1 - a) * (1 + a));
    public static readonly Kernel Biweight = new PolynomialKernel("Biweight", 2, Rational.Of(15, 16), [0, 0, 4, -4, 1], static a => 0.9375 * Power((1 - a) * (1 + a), 2));
    public static readonly Kernel Triweight = new PolynomialKernel("Triweight", 2, Rational.Of(35, 32), [0, 0, 0, 8, -12, 6, -1], static a => 1.09375 * Power((1 - a) * (1 + a), 3));
    public static readonly Kernel Tricube = new PolynomialKernel("Tricube", 2, Rational.Of(70, 81), [0, 0, 0, 27, -81, 108, -81, 36, -9, 1], static a => 70.0 / 81 * Power((1 - a) * (1 + (a * (1 + a))), 3));
    public static readonly Kernel Cosine = new CosineKernel();
    public static readonly Kernel Logistic = new LogisticKernel();
    public static readonly Kernel Laplace = new LaplaceKernel();

    public static readonly IReadOnlyList<Kernel> All = Array.AsReadOnly([Uniform, Triangular, Epanechnikov, Biweight, Triweight, Tricube, Cosine, PlainGaussian.Kernel, Logistic, Laplace]);

    private static double Power(double x, int exponent) => exponent == 2 ? x * x : x * x * x;
}
