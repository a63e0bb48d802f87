using Smoothing.Numerics;

namespace Smoothing.Kernels;

/// <content>The standard kernels and the families of higher order.</content>
public abstract partial class Kernel
{
    /// <summary>Uniform: ½ on [−1, 1].</summary>
    public static Kernel Uniform => StandardKernels.Uniform;

    /// <summary>Triangular: 1 − |u| on [−1, 1].</summary>
    public static Kernel Triangular => StandardKernels.Triangular;

    /// <summary>Epanechnikov: ¾(1 − u²) on [−1, 1]; the smallest asymptotic error of its order. Source: Epanechnikov (1969).</summary>
    public static Kernel Epanechnikov => StandardKernels.Epanechnikov;

    /// <summary>Biweight: (15/16)(1 − u²)² on [−1, 1].</summary>
    public static Kernel Biweight => StandardKernels.Biweight;

    /// <summary>Triweight: (35/32)(1 − u²)³ on [−1, 1].</summary>
    public static Kernel Triweight => StandardKernels.Triweight;

    /// <summary>Tricube: (70/81)(1 − |u|³)³ on [−1, 1].</summary>
    public static Kernel Tricube => StandardKernels.Tricube;

    /// <summary>Cosine: (π/4)cos(πu/2) on [−1, 1].</summary>
    public static Kernel Cosine => StandardKernels.Cosine;

    /// <summary>Gaussian: exp(−u²/2)/√(2π) on the whole line.</summary>
    public static Kernel Gaussian => PlainGaussian.Kernel;

    /// <summary>Logistic: e^(−u)/(1 + e^(−u))² on the whole line.</summary>
    public static Kernel Logistic => StandardKernels.Logistic;

    /// <summary>Laplace: ½e^(−|u|) on the whole line.</summary>
    public static Kernel Laplace => StandardKernels.Laplace;

    /// <summary>The ten standard kernels: uniform, triangular, Epanechnikov, biweight, triweight, tricube, cosine, Gaussian, logistic, Laplace.</summary>
    public static IReadOnlyList<Kernel> Standard => StandardKernels.All;

    /// <summary>Gaussian-based kernel of higher order: φ(u) times a polynomial, moments 1 to k − 1 zero.</summary>
    /// <remarks>Order 4: φ(u)(3 − u²)/2. Negative in places, so the curve may be, and its cumulative is not monotone. Source: Wand &amp; Schucany (1990).</remarks>
    /// <param name="order">k: 2, 4, 6 or 8; 2 is the Gaussian itself.</param>
    /// <returns>The kernel.</returns>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="order"/> is none of these.</exception>
    public static Kernel GaussianOfOrder(int order) => order is 2 or 4 or 6 or 8
        ? HigherOrderKernels.Gaussians[(order / 2) - 1]
        : throw new ArgumentOutOfRangeException(nameof(order), Guard.Text($"order must be 2, 4, 6 or 8, but is {order}."));

    /// <summary>Polynomial kernel on [−1, 1] with the smallest asymptotic error of its order among those with few sign changes.</summary>
    /// <remarks>Order 4: (15/32)(1 − u²)(3 − 7u²). Negative in places for orders above 2. Source: Gasser, Müller &amp; Mammitzsch (1985).</remarks>
    /// <param name="order">k: 2, 4 or 6; 2 is <see cref="Epanechnikov"/>.</param>
    /// <returns>The kernel.</returns>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="order"/> is none of these.</exception>
    public static Kernel PolynomialOfOrder(int order) => order is 2 or 4 or 6
        ? HigherOrderKernels.Polynomials[(order / 2) - 1]
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
}
