using Smoothing.Estimation;
using Smoothing.Kernels;
using Smoothing.Samples;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Estimation;

public class DensityTests
{
    // Six points at h = 1.5: a widely printed teaching example; the digits were computed in 40-digit arithmetic from the definition.
    [Theory]
    [InlineData(-2, 0.11058794717606075231, 0.14814814814814814815)]
    [InlineData(1, 0.085786708128152333218, 0.064074074074074074074)]
    [InlineData(3.5, 0.06077979496600124167, 0)]
    [InlineData(6, 0.082022519622635291478, 0.13518518518518518519)]
    public void Value_SixPoints_MatchesHighPrecision(double x, double gaussian, double epanechnikov)
    {
        Sample sample = Sample.Of(TestData.Load("six_points"));
        Near.Relative(gaussian, Density.Of(sample, Kernel.Gaussian, 1.5).Value(x), 1e-13);
        Near.Relative(epanechnikov, Density.Of(sample, Kernel.Epanechnikov, 1.5).Value(x), 1e-13);
    }

    [Theory]
    [InlineData(0)]
    [InlineData(-1)]
    [InlineData(double.NaN)]
    [InlineData(double.PositiveInfinity)]
    public void Of_UnusableBandwidth_Throws(double bandwidth)
    {
        Sample sample = Sample.Of([1, 2, 3]);
        var error = Assert.Throws<ArgumentOutOfRangeException>(() => Density.Of(sample, Kernel.Gaussian, bandwidth));
        Assert.Contains("bandwidth must be positive and finite", error.Message, StringComparison.Ordinal);
    }
}
