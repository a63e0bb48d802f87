using System.Numerics;
using MathNet.Numerics.IntegralTransforms;
using Smoothing.Estimation;
using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Benchmarks.Targets;

/// <summary>Targets of sums over pairs: T10 and T18, and the transform behind it against the library's.</summary>
internal static class PairTargets
{
    private const int Million = 1_000_000;
    private const int Bandwidths = 50;
    private const int Length = 16_384;

    public static IReadOnlyList<Func<Target>> All { get; } = [CrossValidation, CompactScan, Transform];

    private static Target CrossValidation()
    {
        double[] values = GaussianTargets.Normal(Million, 1), work = new double[Million];
        double middle = 1.06 * Math.Pow(Million, -0.2), root2 = Math.Sqrt(2);
        return new Target(
            "T10",
            "exact least-squares cross-validation at 50 bandwidths over a factor of 16, Gaussian, n = 10^6 unsorted, sample included / Span.Sort",
            0.11,
            () => values.CopyTo(work, 0),
            () => work.AsSpan().Sort(),
            () =>
            {
                MomentLags lags = MomentLags.Of(Sample.Of(values), middle / 4)!;
                double n = Million, best = double.PositiveInfinity;
                for (int k = 0; k < Bandwidths; k++)
                {
                    double h = middle / 4 * Math.Pow(16, k / (Bandwidths - 1.0));
                    double score = (lags.Sum(0, root2 * h) / (n * n * root2 * h)) - (2 * lags.SumOfOthers(0, h) / (n * (n - 1) * h));
                    best = Math.Min(best, score);
                }
            });
    }

    private static Target CompactScan()
    {
        // The normal reference of the Epanechnikov kernel, 2.345 σ n^(−1/5), a quarter to four times.
        double[] values = GaussianTargets.Normal(Million, 1), work = new double[Million];
        double smallest = 2.345 * Math.Pow(Million, -0.2) / 4, roughness = Kernel.Epanechnikov.Roughness();
        return new Target(
            "T18",
            "least-squares cross-validation scanned at 50 bandwidths over a factor of 16, Epanechnikov, n = 10^6 unsorted, sample included / Span.Sort",
            0.12,
            () => values.CopyTo(work, 0),
            () => work.AsSpan().Sort(),
            () =>
            {
                CompactLags lags = CompactLags.Of(Sample.Of(values), Kernel.Epanechnikov, smallest)!;
                double n = Million, best = double.PositiveInfinity;
                for (int k = 0; k < Bandwidths; k++)
                {
                    double h = smallest * Math.Pow(16, k / (Bandwidths - 1.0));
                    double score = (((n * roughness) + (2 * lags.SelfConvolutions(h))) / (n * n * h)) - (4 * lags.Kernels(h) / (n * (n - 1) * h));
                    best = Math.Min(best, score);
                }
            });
    }

    private static Target Transform()
    {
        double[] real = GaussianTargets.Normal(Length, 1), imaginary = GaussianTargets.Normal(Length, 2);
        Complex[] packed = [.. real.Zip(imaginary, (a, b) => new Complex(a, b))];
        return new Target(
            "FFT",
            "complex transform of 16,384 numbers, own / MathNet.Numerics managed",
            0.2,
            () => { },
            () => Fourier.Forward(packed, FourierOptions.NoScaling),
            () => FourierPlan.Forward(real, imaginary));
    }
}
