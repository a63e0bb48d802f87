using Smoothing.Estimation;
using Smoothing.Kernels;
using Smoothing.Samples;
using Smoothing.Tests.Samples;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Estimation;

/// <summary>The scan's sums over pairs against the double loop over the kernel's own values.</summary>
public class CompactLagsTests
{
    [Theory]
    [InlineData("normal", 2e-6)]
    [InlineData("two groups", 2e-6)]
    [InlineData("rounded", 2e-3)]
    public void Sums_ScannedBandwidths_MatchTheDoubleLoop(string name, double tolerance)
    {
        double[] values = SeededColumns.Draw(name == "rounded" ? "normal" : name, 3000, 3);
        double unit = Sample.Of(values).StandardDeviation;
        values = name == "rounded" ? [.. values.Select(v => Math.Round(v / (0.02 * unit)) * 0.02 * unit)] : values;
        double[] weights = [.. values.Select((_, i) => 0.5 + (i % 3))];
        foreach (double[] w in (double[][])[[], weights])
        {
            CompactLags lags = CompactLags.Of(Sample.Of(values, new SampleOptions { Weights = w }), Kernel.Epanechnikov, 0.1 * unit)!;
            foreach (double h in (double[])[0.1 * unit, 0.1371 * unit, 0.333 * unit, 1.7 * unit])
            {
                (double kernels, double convolutions) = Loop(values, w, h);
                Near.Relative(kernels, lags.Kernels(h), tolerance, $"{name}, K, h = {h}");
                Near.Relative(convolutions, lags.SelfConvolutions(h), tolerance / 100, $"{name}, K∗K, h = {h}");
            }
        }
    }

    [Fact]
    public void Serves_KernelsThatEndAtZeroWithoutJump()
    {
        Assert.True(CompactLags.Serves(Kernel.Epanechnikov));
        Assert.False(CompactLags.Serves(Kernel.Uniform));
        Assert.False(CompactLags.Serves(Kernel.Triweight));
        Assert.False(CompactLags.Serves(Kernel.Gaussian));
    }

    [Fact]
    public void Of_RangeTooLong_IsNull() => Assert.Null(CompactLags.Of(Sample.Of([0.0, 1, 1e9]), Kernel.Epanechnikov, 1e-3));

    private static (double Kernels, double Convolutions) Loop(double[] values, double[] weights, double h)
    {
        double kernels = 0, convolutions = 0;
        for (int i = 1; i < values.Length; i++)
        {
            for (int j = 0; j < i; j++)
            {
                double u = Math.Abs(values[i] - values[j]) / h, w = weights.Length == 0 ? 1 : weights[i] * weights[j], t = 2 - u;

                // Epanechnikov's K∗K = 3/160 t³(20 − 10t + t²).
                kernels += u < 1 ? w * 0.75 * (1 - (u * u)) : 0;
                convolutions += t > 0 ? w * 3 / 160 * t * t * t * (20 + (t * (t - 10))) : 0;
            }
        }

        return (kernels, convolutions);
    }
}
