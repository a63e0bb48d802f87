using FsCheck.Xunit;
using Smoothing.Estimation;
using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Estimation;

public class DensityPropertyTests
{
    private static readonly Kernel[] s_kernels = [Kernel.Gaussian, Kernel.Epanechnikov];

    private static double[] Values(int seed, int count)
    {
        var random = new RandomStream((ulong)seed, 91);
        var values = new double[count];
        for (int i = 0; i < count; i++)
        {
            values[i] = Math.Round(20 * random.NextUniform(), seed % 4);
        }

        return values;
    }

    [Property(MaxTest = 40)]
    public void Curve_ShiftedAndScaledData_MovesAlong(byte seed)
    {
        double[] values = Values(seed, 2 + (seed % 30));
        foreach (Kernel kernel in s_kernels)
        {
            // Powers of two and a shift that is exact for rounded values: nothing but the last digits may differ.
            Density a = Density.Of(Sample.Of(values), kernel, 0.75);
            Density b = Density.Of(Sample.Of(values.Select(v => (4 * v) + 16).ToArray()), kernel, 3);
            foreach (double x in new[] { -0.5, 3.25, 11, 19.875 })
            {
                double y = (4 * x) + 16;
                Near.Absolute(a.Value(x), 4 * b.Value(y), 1e-13);
                Near.Absolute(a.Derivative(x), 16 * b.Derivative(y), 1e-12);
                Near.Absolute(a.Cumulative(x), b.Cumulative(y), 1e-13);
                Near.Absolute(a.Survival(x), b.Survival(y), 1e-13);
            }

            Near.Absolute((4 * a.Quantile(0.3)) + 16, b.Quantile(0.3), 1e-6);
        }
    }

    [Property(MaxTest = 40)]
    public void Curve_AnyOrderOfValues_IsTheSame(byte seed)
    {
        double[] values = Values(seed, 2 + (seed % 30));
        double[] reversed = [.. values.Reverse()];
        foreach (Kernel kernel in s_kernels)
        {
            Density a = Density.Of(Sample.Of(values), kernel, 0.9);
            Density b = Density.Of(Sample.Of(reversed), kernel, 0.9);
            foreach (double x in new[] { 0.1, 7.3, 15 })
            {
                Near.Absolute(a.Value(x), b.Value(x), 1e-14);
                Near.Absolute(a.Cumulative(x), b.Cumulative(x), 1e-14);
            }
        }
    }

    [Property(MaxTest = 40)]
    public void Curve_WeightsAndRepeatedValues_Agree(byte seed)
    {
        double[] values = Values(seed, 1 + (seed % 12));
        double[] weights = [.. values.Select((_, i) => (double)(1 + ((seed + i) % 4)))];
        double[] repeated = [.. values.SelectMany((v, i) => Enumerable.Repeat(v, (int)weights[i]))];
        foreach (Kernel kernel in s_kernels)
        {
            Density a = Density.Of(Sample.Of(values, new SampleOptions { Weights = weights }), kernel, 1.1);
            Density b = Density.Of(Sample.Of(repeated), kernel, 1.1);
            Near.Absolute(b.Value(9.9), a.Value(9.9), 1e-13);
            Near.Absolute(b.Survival(9.9), a.Survival(9.9), 1e-13);
            Assert.Equal(b.Peaks().Peaks.Count, a.Peaks().Peaks.Count);
            foreach (double p in new[] { 0.04, 0.61 })
            {
                Near.Absolute(p, b.Cumulative(a.Quantile(p)), 1e-12);
            }
        }
    }

    // h → 0: F becomes the step function between values, f vanishes there. h → ∞: f becomes K(0)/h everywhere.
    [Fact]
    public void Curve_ExtremeBandwidths_HaveTheirLimits()
    {
        double[] values = [1, 2, 2, 5];
        foreach (Kernel kernel in s_kernels)
        {
            Density narrow = Density.Of(Sample.Of(values), kernel, 1e-9);
            Assert.Equal(0.0, narrow.Value(1.5));
            Near.Absolute(0.25, narrow.Cumulative(1.5), 1e-15);
            Near.Absolute(0.75, narrow.Cumulative(3), 1e-15);
            Near.Absolute(2, narrow.Quantile(0.6), 1e-8);
            Density wide = Density.Of(Sample.Of(values), kernel, 1e9);
            Near.Relative(kernel.Value(0) / 1e9, wide.Value(3), 1e-15);
            Near.Absolute(0.5, wide.Cumulative(3), 1e-8);
        }
    }

    // Five-point difference quotients: error step⁴ f⁽⁵⁺⁾/30 and rounding 1e-16/step of what is differenced.
    [Fact]
    public void Derivative_OrdersOneToFour_AreDifferenceQuotients()
    {
        Density density = Density.Of(Sample.Of(TestData.Load("faithful_eruptions_272")), Kernel.Gaussian, 0.3);
        const double Step = 1e-3;
        foreach (double x in new[] { 1.5, 2.1, 3.3, 4.9 })
        {
            for (int r = 1; r <= 4; r++)
            {
                double Below(double t) => density.Derivative(t, r - 1);
                double quotient = (Below(x - (2 * Step)) - (8 * Below(x - Step)) + (8 * Below(x + Step)) - Below(x + (2 * Step))) / (12 * Step);
                double size = density.Value(x) / Math.Pow(0.3, r);
                Near.Absolute(density.Derivative(x, r), quotient, 1e-7 * size, $"order {r} at {x}");
            }
        }
    }
}
