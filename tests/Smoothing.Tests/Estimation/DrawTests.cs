using Smoothing.Estimation;
using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Estimation;

public class DrawTests
{
    private static readonly Sample s_waiting = Sample.Of(TestData.Load("faithful_waiting_272"));

    [Fact]
    public void Draw_Streams_AreReproducibleAndDiffer()
    {
        Density density = Density.Of(s_waiting, Kernel.Gaussian, 3);
        double[] first = density.Draw(100, 5, new DrawOptions { Stream = 1 });
        Assert.Equal(first, density.Draw(100, 5, new DrawOptions { Stream = 1 }));
        Assert.NotEqual(first, density.Draw(100, 5, new DrawOptions { Stream = 2 }));
        Assert.Equal(density.Draw(100, 5), density.Draw(100, 5, new DrawOptions()));
        Assert.Equal(first[..40], density.Draw(40, 5, new DrawOptions { Stream = 1 }));
    }

    // Variance of the plain draws: s² + h²; of the corrected ones: s² (divisor n). Standard error of a variance of 40 000 draws: below √(2/n) s² = 0.7 %; five of them.
    [Fact]
    public void Draw_VarianceCorrected_HasTheVarianceOfTheData()
    {
        Density density = Density.Of(s_waiting, Kernel.Gaussian, 6);
        double s2 = s_waiting.StandardDeviation * s_waiting.StandardDeviation * 271 / 272;
        static double Variance(double[] x) => x.Average(v => v * v) - (x.Average() * x.Average());
        Near.Relative(s2 + 36, Variance(density.Draw(40_000, 9)), 0.035);
        double[] corrected = density.Draw(40_000, 9, new DrawOptions { VarianceCorrected = true });
        Near.Relative(s2, Variance(corrected), 0.035);
        Near.Absolute(s_waiting.Mean, corrected.Average(), 5 * Math.Sqrt(s2 / 40_000));
    }

    [Fact]
    public void Draw_VarianceCorrectedWithLimits_IsAnError()
    {
        Density density = Density.Of(s_waiting, Kernel.Gaussian, 3, new DensityOptions { Support = new Interval(0, 200) });
        Assert.Throws<InvalidOperationException>(() => density.Draw(1, 1, new DrawOptions { VarianceCorrected = true }));
    }
}
