namespace Smoothing.Kernels;

/// <summary>The Gaussian alone, so that a first curve need not make the others.</summary>
internal static class PlainGaussian
{
    public static readonly Kernel Kernel = new GaussianKernel(2);
}
