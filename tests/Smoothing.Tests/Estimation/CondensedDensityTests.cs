using Smoothing.Estimation;
using Smoothing.Kernels;
using Smoothing.Samples;
using Smoothing.Tests.Samples;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Estimation;

/// <summary>Curves from cell moments against the sums over all values.</summary>
public class CondensedDensityTests
{
    [Theory]
    [InlineData("normal", 0.05, 16)]
    [InlineData("two groups", 0.3, 8)]
    [InlineData("exponential", 0.2, 16)]
    [InlineData("peaked", 1.7, 8)]
    public void Of_CondensedSample_IsTheCurveOfTheValues(string shape, double h, int moments)
    {
        double[] values = [.. SeededColumns.Draw(shape, 3000, 1), 40, 41.5];
        double[] weights = SeededColumns.Draw("uniform", values.Length, 2);
        Density direct = Density.Of(Sample.Of(values, new SampleOptions { Weights = weights }), Kernel.Gaussian, h);
        foreach (double? width in new double?[] { h / 16, h / 500, null })
        {
            Density condensed = Density.Of(CondensedSample.Of(values, new CondensingOptions { CellWidth = width, Moments = moments, Weights = weights, MaximumCells = 2000 }), Kernel.Gaussian, h);
            double peak = 0.4 / h;
            for (double x = -5; x < 45; x += 0.37)
            {
                Near.Absolute(direct.Value(x), condensed.Value(x), 1e-13 * peak, $"value at {x}");
                Near.Absolute(direct.Derivative(x, 2), condensed.Derivative(x, 2), 2e-12 * peak / (h * h), $"second derivative at {x}");
                Near.Absolute(direct.Cumulative(x), condensed.Cumulative(x), 1e-13, $"F at {x}");
                Near.Absolute(direct.Survival(x), condensed.Survival(x), 1e-13, $"1 − F at {x}");
            }

            Near.Relative(direct.Quantile(0.95), condensed.Quantile(0.95), 1e-9);
            Near.Absolute(1, condensed.Cumulative(double.PositiveInfinity), 1e-13);
            Near.Relative(direct.Value(60), condensed.Value(60), width is null ? 1 : moments == 16 ? 1e-9 : 1e-4, "far tail");
        }
    }

    [Fact]
    public void Of_TwoMoments_IsTheCurveToAMillionth()
    {
        double[] values = SeededColumns.Draw("two groups", 5000, 3);
        Density direct = Density.Of(Sample.Of(values), Kernel.Gaussian, 0.25);
        Density binned = Density.Of(CondensedSample.Of(values, new CondensingOptions { CellWidth = 0.0005, Moments = 2 }), Kernel.Gaussian, 0.25);
        for (double x = -3; x < 3; x += 0.1)
        {
            Near.Absolute(direct.Value(x), binned.Value(x), 1e-6 * 0.4 / 0.25);
        }
    }

    [Fact]
    public void Of_DeclaredLimit_EqualsTheValues()
    {
        double[] values = SeededColumns.Draw("exponential", 2000, 4);
        var options = new DensityOptions { Support = new Smoothing.Numerics.Interval(0, double.PositiveInfinity), Boundary = BoundaryCorrection.Reflection };
        Density direct = Density.Of(Sample.Of(values), Kernel.Gaussian, 0.2, options);
        Density condensed = Density.Of(CondensedSample.Of(values), Kernel.Gaussian, 0.2, options);
        for (double x = 0; x < 5; x += 0.2)
        {
            Near.Absolute(direct.Value(x), condensed.Value(x), 1e-12);
        }
    }

    [Theory]
    [InlineData(BoundaryCorrection.Reflection)]
    [InlineData(BoundaryCorrection.LinearKernel)]
    [InlineData(BoundaryCorrection.PositiveLinear)]
    [InlineData(BoundaryCorrection.Renormalised)]
    [InlineData(BoundaryCorrection.None)]
    public void Of_EveryCorrection_EqualsTheValues(BoundaryCorrection boundary)
    {
        double[] values = SeededColumns.Draw("exponential", 4000, 4);
        var options = new DensityOptions { Support = new Smoothing.Numerics.Interval(0, double.PositiveInfinity), Boundary = boundary };
        Density direct = Density.Of(Sample.Of(values), Kernel.Gaussian, 0.2, options);
        Density condensed = Density.Of(CondensedSample.Of(values), Kernel.Gaussian, 0.2, options);
        for (double x = 0; x < 5; x += 0.1)
        {
            Near.Absolute(direct.Value(x), condensed.Value(x), 1e-12, $"value at {x}");
            Near.Absolute(direct.Derivative(x), condensed.Derivative(x), 1e-11, $"slope at {x}");
            Near.Absolute(direct.Cumulative(x), condensed.Cumulative(x), 1e-11, $"F at {x}");
        }

        Near.Relative(direct.Quantile(0.9), condensed.Quantile(0.9), 1e-9);
    }

    [Theory]
    [InlineData(4)]
    [InlineData(6)]
    [InlineData(8)]
    public void Of_HigherOrders_AreTheCurveOfTheValues(int order)
    {
        double[] values = SeededColumns.Draw("two groups", 5000, 6);
        Density direct = Density.Of(Sample.Of(values), Kernel.GaussianOfOrder(order), 0.4);
        Density condensed = Density.Of(CondensedSample.Of(values), Kernel.GaussianOfOrder(order), 0.4);
        for (double x = -4; x < 4; x += 0.17)
        {
            Near.Absolute(direct.Value(x), condensed.Value(x), 1e-12, $"value at {x}");
            Near.Absolute(direct.Cumulative(x), condensed.Cumulative(x), 1e-12, $"F at {x}");
        }
    }

    [Fact]
    public void Peaks_OfACondensedSample_AreThoseOfTheValues()
    {
        double[] values = SeededColumns.Draw("two groups", 5000, 7);
        PeakSummary direct = Density.Of(Sample.Of(values), Kernel.Gaussian, 0.3).Peaks(), condensed = Density.Of(CondensedSample.Of(values), Kernel.Gaussian, 0.3).Peaks();
        Assert.Equal(direct.Peaks.Count, condensed.Peaks.Count);
        for (int i = 0; i < direct.Peaks.Count; i++)
        {
            Near.Absolute(direct.Peaks[i].Location, condensed.Peaks[i].Location, 1e-9);
            Near.Relative(direct.Peaks[i].Height, condensed.Peaks[i].Height, 1e-11);
        }
    }

    [Fact]
    public void Of_OneValueFarBeyondTheLattice_IsKeptSingly()
    {
        double[] values = [.. SeededColumns.Draw("normal", 4000, 8), 1e300];
        CondensedSample sample = CondensedSample.Of(values, new CondensingOptions { MaximumCells = 1000 });
        Density condensed = Density.Of(sample, Kernel.Gaussian, 0.3), direct = Density.Of(Sample.Of(values[..^1]), Kernel.Gaussian, 0.3);
        Near.Relative(direct.Value(0.2) * 4000 / 4001, condensed.Value(0.2), 1e-12);
        Near.Relative(1.0 / 4001, condensed.Survival(1e200), 1e-12);
    }

    [Fact]
    public void Of_WhatCellsCannotGive_IsRefused()
    {
        CondensedSample sample = CondensedSample.Of(SeededColumns.Draw("normal", 500, 5), new CondensingOptions { CellWidth = 0.0625, Moments = 8 });
        Assert.StartsWith(
            "cells must be at most 0.03125 wide for a bandwidth of 0.5 with 8 moments, but are 0.0625: condense with that CellWidth",
            Assert.Throws<ArgumentException>(() => Density.Of(sample, Kernel.Gaussian, 0.5)).Message, StringComparison.Ordinal);
        Assert.Equal(1 / Math.Sqrt(4 * Math.PI), Density.Of(sample, Kernel.Gaussian, 1).Value(0), 0.03);
        Assert.Throws<ArgumentException>(() => Density.Of(sample, Kernel.Epanechnikov, 1));
        Assert.Throws<ArgumentOutOfRangeException>(() => Density.Of(sample, Kernel.Gaussian, double.NaN));
    }
}
