using Smoothing.Numerics;

namespace Smoothing.Kernels;

/// <content>The standard kernels and the families of higher order.</content>
public abstract partial class Kernel
{
    /// <summary>Uniform: ½ on [−1, 1].</summary>
    public static Kernel Uniform { get; } = new PolynomialKernel("Uniform", 2, Rational.Of(1, 2), [1], static _ => 0.5);

    /// <summary>Triangular: 1 − |u| on [−1, 1].</summary>
    public static Kernel Triangular { get; } = new PolynomialKernel("Triangular", 2, Rational.Of(1), [0, 1], static a => 1 - a);

    /// <summary>Epanechnikov: ¾(1 − u²) on [−1, 1]; the smallest asymptotic error of its order. Source: Epanechnikov (1969).</summary>
    public static Kernel Epanechnikov { get; } = new PolynomialKernel("Epanechnikov", 2, Rational.Of(3, 4), [0, 2, -1], static a => 0.75 * (1 - a) * (1 + a));

    /// <summary>Biweight: (15/16)(1 − u²)² on [−1, 1].</summary>
    public static Kernel Biweight { get; } = new PolynomialKernel("Biweight", 2, Rational.Of(15, 16), [0, 0, 4, -4, 1], static a => 0.9375 * Power((1 - a) * (1 + a), 2));

    /// <summary>Triweight: (35/32)(1 − u²)³ on [−1, 1].</summary>
    public static Kernel Triweight { get; } = new PolynomialKernel("Triweight", 2, Rational.Of(35, 32), [0, 0, 0, 8, -12, 6, -1], static a => 1.09375 * Power((1 - a) * (1 + a), 3));

    /// <summary>Tricube: (70/81)(1 − |u|³)³ on [−1, 1].</summary>
    public static Kernel Tricube { get; } = new PolynomialKernel("Tricube", 2, Rational.Of(70, 81), [0, 0, 0, 27, -81, 108, -81, 36, -9, 1], static a => 70.0 / 81 * Power((1 - a) * (1 + (a * (1 + a))), 3));

    /// <summary>Cosine: (π/4)cos(πu/2) on [−1, 1].</summary>
    public static Kernel Cosine { get; } = new CosineKernel();

    /// <summary>Gaussian: exp(−u²/2)/√(2π) on the whole line.</summary>
    public static Kernel Gaussian { get; } = new GaussianKernel(2);

    /// <summary>Logistic: e^(−u)/(1 + e^(−u))² on the whole line.</summary>
    public static Kernel Logistic { get; } = new LogisticKernel();

    /// <summary>Laplace: ½e^(−|u|) on the whole line.</summary>
    public static Kernel Laplace { get; } = new LaplaceKernel();

    /// <summary>The ten standard kernels: uniform, triangular, Epanechnikov, biweight, triweight, tricube, cosine, Gaussian, logistic, Laplace.</summary>
    public static IReadOnlyList<Kernel> Standard { get; } =
        Array.AsReadOnly([Uniform, Triangular, Epanechnikov, Biweight, Triweight, Tricube, Cosine, Gaussian, Logistic, Laplace]);

    private static readonly Kernel[] s_gaussians = [Gaussian, new GaussianKernel(4), new GaussianKernel(6), new GaussianKernel(8)];

    private static readonly Kernel[] s_polynomials =
    [
        Epanechnikov,

        // (15/32)(1 − u²)(3 − 7u²) and (105/256)(1 − u²)(5 − 30u² + 33u⁴), rewritten in s = 1 − |u|.
        new PolynomialKernel("Polynomial of order 4", 4, Rational.Of(15, 32), [0, -8, 32, -28, 7], static a => 15.0 / 32 * (1 - a) * (1 + a) * (3 - (7 * a * a))),
        new PolynomialKernel("Polynomial of order 6", 6, Rational.Of(21, 256), [0, 80, -760, 2040, -2160, 990, -165], static a => 105.0 / 256 * (1 - a) * (1 + a) * (5 - (a * a * (30 - (33 * a * a))))),
    ];

    /// <summary>Gaussian-based kernel of higher order: φ(u) times a polynomial, moments 1 to k − 1 zero.</summary>
    /// <remarks>Order 4: φ(u)(3 − u²)/2. Negative in places, so the curve may be, and its cumulative is not monotone. Source: Wand &amp; Schucany (1990).</remarks>
    /// <param name="order">k: 2, 4, 6 or 8; 2 is the Gaussian itself.</param>
    /// <returns>The kernel.</returns>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="order"/> is none of these.</exception>
    public static Kernel GaussianOfOrder(int order) => order is 2 or 4 or 6 or 8
        ? s_gaussians[(order / 2) - 1]
        : throw new ArgumentOutOfRangeException(nameof(order), Guard.Text($"order must be 2, 4, 6 or 8, but is {order}."));

    /// <summary>Polynomial kernel on [−1, 1] with the smallest asymptotic error of its order among those with few sign changes.</summary>
    /// <remarks>Order 4: (15/32)(1 − u²)(3 − 7u²). Negative in places for orders above 2. Source: Gasser, Müller &amp; Mammitzsch (1985).</remarks>
    /// <param name="order">k: 2, 4 or 6; 2 is <see cref="Epanechnikov"/>.</param>
    /// <returns>The kernel.</returns>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="order"/> is none of these.</exception>
    public static Kernel PolynomialOfOrder(int order) => order is 2 or 4 or 6
        ? s_polynomials[(order / 2) - 1]
        : throw new ArgumentOutOfRangeException(nameof(order), Guard.Text($"order must be 2, 4 or 6, but is {order}."));

    /// <summary>A kernel of the caller's own shape, normalised and measured by quadrature to 1e-9.</summary>
    /// <param name="name">Its name in reports.</param>
    /// <param name="shape">The shape at u, finite and symmetric about 0; any positive integral, since it is divided by it.</param>
    /// <param name="supportRadius">The shape is zero beyond this distance: positive, or +∞.</param>
    /// <param name="derivative">The r-th derivative of the shape (not yet normalised) at u, called with (u, r); null when there is none.</param>
    /// <returns>The kernel; without <paramref name="derivative"/> its <see cref="Derivative"/> and <see cref="Roughness"/> of derivatives throw.</returns>
    /// <exception cref="ArgumentException">The shape is NaN, unbounded or asymmetric somewhere, or its integral or second moment is not usable; the message says where.</exception>
    public static Kernel FromShape(string name, Func<double, double> shape, double supportRadius, Func<double, int, double>? derivative = null) =>
        ShapeKernel.Make(Guard.Given(name), Guard.Given(shape), supportRadius, derivative);

    private static double Power(double x, int exponent) => exponent == 2 ? x * x : x * x * x;
}
