using Smoothing.Estimation;
using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Estimation;

public class AdaptiveTests
{
    private static readonly Sample s_eruptions = Sample.Of(TestData.Load("faithful_eruptions_272"));

    [Fact]
    public void Value_ExponentZero_IsTheFixedBandwidth()
    {
        Density fixedWidth = Density.Of(s_eruptions, Kernel.Gaussian, 0.2);
        Density adaptive = Density.Of(s_eruptions, Kernel.Gaussian, 0.2, new DensityOptions { Adaptive = new AdaptiveBandwidth { Exponent = 0 } });
        foreach (double x in new[] { 1.5, 3, 4.4 })
        {
            Near.Relative(fixedWidth.Value(x), adaptive.Value(x), 1e-13);
            Near.Relative(fixedWidth.Derivative(x, 2), adaptive.Derivative(x, 2), 1e-11);
            Near.Relative(fixedWidth.Cumulative(x), adaptive.Cumulative(x), 1e-13);
        }
    }

    // Abramson (1982) written out: h_i = h (f(X_i)/g)^(−1/2), g the geometric mean, by a plain double loop.
    [Fact]
    public void Value_SquareRootLaw_IsTheFormula()
    {
        double[] v = [0, 0.4, 1, 3];
        static double Phi(double u) => Math.Exp(-u * u / 2) / Math.Sqrt(2 * Math.PI);
        double[] pilot = v.Select(x => v.Average(y => Phi((x - y) / 0.8) / 0.8)).ToArray();
        double g = Math.Exp(pilot.Average(p => Math.Log(p)));
        double[] h = pilot.Select(p => 0.5 * Math.Pow(p / g, -0.5)).ToArray();
        Density density = Density.Of(Sample.Of(v), Kernel.Gaussian, 0.5, new DensityOptions { Adaptive = new AdaptiveBandwidth { PilotBandwidth = 0.8 } });
        foreach (double x in new[] { -1, 0.2, 2, 5 })
        {
            double expected = v.Select((y, i) => Phi((x - y) / h[i]) / h[i]).Average();
            Near.Relative(expected, density.Value(x), 1e-13);
        }
    }

    [Fact]
    public void Curve_WithAndWithoutReflection_IsOneDistribution()
    {
        double[] values = Enumerable.Range(1, 60).Select(i => -Math.Log((i - 0.5) / 60)).ToArray();
        foreach (Kernel kernel in new[] { Kernel.Gaussian, Kernel.Epanechnikov })
        {
            foreach (BoundaryCorrection? correction in new BoundaryCorrection?[] { null, BoundaryCorrection.Reflection, BoundaryCorrection.LogScale })
            {
                var options = new DensityOptions { Adaptive = new AdaptiveBandwidth() };
                options = correction is { } c ? options with { Support = new Interval(0, double.PositiveInfinity), Boundary = c } : options;
                Density density = Density.Of(Sample.Of(values), kernel, 0.5, options);
                Near.Absolute(1, density.Cumulative(double.PositiveInfinity), 1e-12);
                Near.Absolute(1, density.Survival(correction is null ? double.NegativeInfinity : 0), 1e-12);
                foreach (double p in new[] { 1e-9, 0.2, 0.5, 0.99 })
                {
                    Near.Absolute(p, density.Cumulative(density.Quantile(p)), 1e-12);
                }

                const double Step = 1e-5;
                double slope = (density.Cumulative(1.0137 + Step) - density.Cumulative(1.0137 - Step)) / (2 * Step);
                Near.Relative(slope, density.Value(1.0137), 1e-7);
                Assert.NotEmpty(density.Peaks().Peaks);
            }
        }
    }

    [Fact]
    public void Draw_Adaptive_FollowsTheCurve()
    {
        Density density = Density.Of(s_eruptions, Kernel.Gaussian, 0.25, new DensityOptions { Adaptive = new AdaptiveBandwidth() });
        double[] draws = density.Draw(3000, 3);
        Array.Sort(draws);
        double distance = draws.Select((x, i) => Math.Abs(density.Cumulative(x) - ((i + 0.5) / 3000))).Max();

        // Kolmogorov's limit law: 1.95/√n is passed with probability 0.001.
        Assert.True(distance < 1.95 / Math.Sqrt(3000));
    }

    [Fact]
    public void Of_AdaptiveBadOptions_AreErrors()
    {
        DensityOptions With(AdaptiveBandwidth a) => new() { Adaptive = a };
        Assert.Contains("Exponent", Assert.Throws<ArgumentException>(() => Density.Of(s_eruptions, Kernel.Gaussian, 0.2, With(new AdaptiveBandwidth { Exponent = 1.5 }))).Message, StringComparison.Ordinal);
        Assert.Throws<ArgumentException>(() => Density.Of(s_eruptions, Kernel.Gaussian, 0.2, With(new AdaptiveBandwidth { Exponent = double.NaN })));
        Assert.Throws<ArgumentOutOfRangeException>(() => Density.Of(s_eruptions, Kernel.Gaussian, 0.2, With(new AdaptiveBandwidth { PilotBandwidth = 0 })));
        DensityOptions linear = With(new AdaptiveBandwidth()) with { Support = new Interval(0, double.PositiveInfinity) };
        Assert.Contains("Reflection", Assert.Throws<ArgumentException>(() => Density.Of(s_eruptions, Kernel.Gaussian, 0.2, linear)).Message, StringComparison.Ordinal);
    }
}
