using Smoothing.Estimation;
using Smoothing.Kernels;
using Smoothing.Samples;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Estimation;

// Against e^(−u²/2) summed in 31-digit arithmetic.
[Trait("Category", "Widths")]
public class GaussianDirectTests
{
    private const double Root = 2.5066282746310002; // √(2π)

    public static TheoryData<string> Samples => ["normal", "offset", "gap", "rounded", "equal"];

    [Theory]
    [MemberData(nameof(Samples))]
    public void Derivatives_AnyPoints_HoldTheGaussianGate(string name)
    {
        double[] values = HardSamples.Make(name, 203);
        const double width = 0.3;
        double[] x = [.. HardSamples.Points(values, width, 12), values.Max() + (29 * width), values.Min() - (28 * width)];
        Compare(Sample.Of(values), [], width, x, "scattered " + name);
    }

    [Theory]
    [InlineData("normal", 0.3, 100)]
    [InlineData("normal", 0.05, 401)]
    [InlineData("gap", 0.6, 70)]
    [InlineData("rounded", 0.3, 81)]
    [InlineData("equal", 0.2, 64)]
    [InlineData("equal", 0.01, 37)]
    [InlineData("normal", 0.05, 800)] // more sixteens than share a ratio
    public void Derivatives_EqualSteps_HoldTheGaussianGate(string name, double width, int points)
    {
        double[] values = HardSamples.Make(name, 203);
        double from = values.Min() - (8 * width);
        double to = values.Max() + (8 * width);
        double[] x = [.. Enumerable.Range(0, points).Select(j => from + (j * (to - from) / (points - 1)))];
        Assert.True(GaussianGrid.Serves(x, width));
        Compare(Sample.Of(values), [], width, x, "grid " + name);
        double[] backwards = [.. x.Reverse()];
        Assert.True(GaussianGrid.Serves(backwards, width));
        Compare(Sample.Of(values), [], width, backwards, "backward grid " + name);
        double[] weights = [.. values.Select((_, i) => 1.0 + (i % 7))];
        Compare(Sample.Of(values, new SampleOptions { Weights = weights }), weights, width, x, "weighted grid " + name);
    }

    // 36 bandwidths outside, where factors of the recurrence are near the ends of the range of doubles.
    [Fact]
    public void Derivatives_EqualStepsFarOutside_HoldRelativeAccuracy()
    {
        double[] values = HardSamples.Make("normal", 51);
        double[] x = [.. Enumerable.Range(0, 160).Select(j => values.Min() - 9 + (0.125 * j))];
        Assert.True(GaussianGrid.Serves(x, 0.25));
        Compare(Sample.Of(values), [], 0.25, x, "far grid");
    }

    // More values than are held at once, the last lot of every length.
    [Theory]
    [InlineData(511)]
    [InlineData(512)]
    [InlineData(513)]
    [InlineData(1026)]
    [InlineData(1535)]
    public void Derivatives_EqualStepsAndManyValues_HoldTheGaussianGate(int count)
    {
        double[] values = HardSamples.Make("normal", count);
        double[] x = [.. Enumerable.Range(0, 40).Select(j => -4 + (0.2 * j))];
        Assert.True(GaussianGrid.Serves(x, 0.5));
        Compare(Sample.Of(values), [], 0.5, x, $"{count} values");
    }

    [Fact]
    public void Serves_UnequalOrWideSteps_IsFalse()
    {
        double[] x = [.. Enumerable.Range(0, 40).Select(j => j * 0.1)];
        Assert.True(GaussianGrid.Serves(x, 0.5));
        Assert.False(GaussianGrid.Serves(x, 0.1));
        x[17] += 1e-9;
        Assert.False(GaussianGrid.Serves(x, 0.5));
        x[17] = double.NegativeInfinity;
        Assert.False(GaussianGrid.Serves(x, 0.5));
        Assert.False(GaussianGrid.Serves(x.AsSpan(0, 10), 0.5));
    }

    // φ'(u) = −uφ, φ''' = (3u − u³)φ, φ'''' = (u⁴ − 6u² + 3)φ: textbook.
    [Fact]
    public void Derivatives_OrdersOneThreeFour_MatchHermitePolynomials()
    {
        double[] values = HardSamples.Make("normal", 100);
        const double width = 0.4;
        double[] x = HardSamples.Points(values, width, 8);
        var actual = new double[x.Length];
        var sums = new GaussianDirectSums(Sample.Of(values), Kernel.Gaussian, width);
        foreach ((int order, double largest, Func<DoubleDouble, DoubleDouble> q) in new (int, double, Func<DoubleDouble, DoubleDouble>)[]
            {
                (1, 0.25, u => -u), (3, 0.6, u => (u * 3) - (u * u * u)), (4, 1.2, u => (u * u * u * u) - (u * u * 6) + 3),
            })
        {
            sums.Derivatives(x, order, actual);
            double scale = Math.Pow(width, order + 1);
            for (int j = 0; j < x.Length; j++)
            {
                DoubleDouble sum = 0;
                foreach (double value in values)
                {
                    DoubleDouble u = ((DoubleDouble)x[j] - value) / width;
                    sum += DoubleDouble.Exp(u * u * -0.5) * q(u);
                }

                Near.Absolute((double)(sum / (values.Length * Root)) / scale, actual[j], 1e-14 * largest / scale, $"order {order} at {x[j]}");
            }
        }
    }

    [Fact]
    public void For_GaussianAndFewValues_ChoosesTheDirectLoop() =>
        Assert.Equal("GaussianDirect", SumsChoice.For(Sample.Of([1.0, 2, 3]), Kernel.Gaussian, 0.5).Method);

    private static void Compare(Sample sample, double[] weights, double width, double[] x, string what)
    {
        var actual = new double[x.Length];
        new GaussianDirectSums(sample, Kernel.Gaussian, width).Derivatives(x, 0, actual);
        double[] expected = [.. x.Select(at =>
        {
            DoubleDouble sum = 0;
            for (int i = 0; i < sample.Count; i++)
            {
                DoubleDouble u = ((DoubleDouble)at - sample.Values[i]) / width;
                sum += DoubleDouble.Exp(u * u * -0.5) * (weights.Length == 0 ? 1 : weights[i]);
            }

            return (double)(sum / (sample.TotalWeight * width)) / Root;
        })];
        double peak = expected.Max();
        for (int j = 0; j < x.Length; j++)
        {
            Near.Absolute(expected[j], actual[j], 1e-14 * peak, $"{what} at {x[j]}");
            if (expected[j] > 1e-200 * peak)
            {
                Near.Relative(expected[j], actual[j], 1e-12, $"{what} at {x[j]}");
            }
        }
    }
}
