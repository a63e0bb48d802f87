using System.Numerics;
using System.Numerics.Tensors;
using MathNet.Numerics.IntegralTransforms;

namespace Smoothing.Numerics;

/// <summary>Complex discrete Fourier transforms of any length, in place, on separate real and imaginary parts; powers of two are fast.</summary>
/// <remarks>Forward: X_k = Σ_j x_j exp(−2πi jk/N), no factor. Inverse: the conjugate sum with the factor 1/N.</remarks>
internal static class FourierPlan
{
    public static void Forward(Span<double> real, Span<double> imaginary) => Run(real, imaginary, forward: true);

    public static void Inverse(Span<double> real, Span<double> imaginary) => Run(real, imaginary, forward: false);

    private static void Run(Span<double> real, Span<double> imaginary, bool forward)
    {
        if (int.IsPow2(real.Length))
        {
            if (forward)
            {
                StockhamTransform.Forward(real, imaginary);
                return;
            }

            // The conjugate sum is the forward one with the parts exchanged.
            StockhamTransform.Forward(imaginary, real);
            TensorPrimitives.Divide(real, (double)real.Length, real);
            TensorPrimitives.Divide(imaginary, (double)real.Length, imaginary);
            return;
        }

        var work = new Complex[real.Length];
        for (int i = 0; i < work.Length; i++)
        {
            work[i] = new Complex(real[i], imaginary[i]);
        }

        if (forward)
        {
            Fourier.Forward(work, FourierOptions.AsymmetricScaling);
        }
        else
        {
            Fourier.Inverse(work, FourierOptions.AsymmetricScaling);
        }

        for (int i = 0; i < work.Length; i++)
        {
            real[i] = work[i].Real;
            imaginary[i] = work[i].Imaginary;
        }
    }
}
