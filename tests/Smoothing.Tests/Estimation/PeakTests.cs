using System.Globalization;
using FsCheck.Xunit;
using Smoothing.Estimation;
using Smoothing.Kernels;
using Smoothing.Samples;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Estimation;

public class PeakTests
{
    public static TheoryData<string, int, double> CriticalBandwidths()
    {
        var rows = new TheoryData<string, int, double>();
        foreach (string line in File.ReadLines(TestData.PathOf("critical_bandwidths.csv")).Skip(2))
        {
            string[] f = line.Split(',');
            rows.Add(f[0], int.Parse(f[1], CultureInfo.InvariantCulture), double.Parse(f[2], CultureInfo.InvariantCulture));
        }

        return rows;
    }

    // Source: Data/critical_bandwidths.csv. A fold opens like the square root of the distance: at 1e-8 the two new turning points are some 1e-4 h apart.
    [Theory]
    [MemberData(nameof(CriticalBandwidths))]
    public void Peaks_BothSidesOfCriticalBandwidth_ChangeByOne(string data, int k, double h)
    {
        Sample sample = Sample.Of(TestData.Load(data));
        Assert.Equal(k, Density.Of(sample, Kernel.Gaussian, h * (1 + 1e-8)).Peaks().Peaks.Count);
        Assert.Equal(k + 1, Density.Of(sample, Kernel.Gaussian, h * (1 - 1e-8)).Peaks().Peaks.Count);
    }

    // Two equal normals at ±1 with standard deviation s have their modes where x = tanh(x/s²), a zero of elementary functions.
    [Fact]
    public void Peaks_TwoValues_SolveTheElementaryEquation()
    {
        const double H = 0.7;
        PeakSummary found = Density.Of(Sample.Of([-1, 1]), Kernel.Gaussian, H).Peaks();
        double mode = 1;
        for (int i = 0; i < 500; i++)
        {
            mode = Math.Tanh(mode / (H * H));
        }

        Assert.Equal(2, found.Peaks.Count);
        Near.Absolute(-mode, found.Peaks[0].Location, 1e-10);
        Near.Absolute(mode, found.Peaks[1].Location, 1e-10);
        Near.Absolute(0, found.Valleys[0].Location, 1e-10);
        Near.Absolute(0.5, found.Valleys[0].MassBelow, 1e-14);
        Near.Absolute(0.5, found.Peaks[1].Mass, 1e-14);

        // The leftmost of two equal peaks counts as the highest: its prominence is its height. The other rises from the valley.
        double rise = found.Peaks[0].Height - found.Valleys[0].Height;
        Near.Absolute(rise, Math.Min(found.Peaks[0].Prominence, found.Peaks[1].Prominence), 1e-14);
        Near.Absolute(found.Highest.Height, Math.Max(found.Peaks[0].Prominence, found.Peaks[1].Prominence), 1e-14);
    }

    [Fact]
    public void Peaks_OneValue_HasTheNormalInflections()
    {
        PeakSummary found = Density.Of(Sample.Of([5]), Kernel.Gaussian, 2).Peaks();
        Peak peak = Assert.Single(found.Peaks);
        Near.Absolute(5, peak.Location, 1e-10);
        Near.Absolute(1, peak.Mass, 1e-14);
        Assert.False(peak.AtLimit);
        Assert.Empty(found.Valleys);
        Assert.Equal(2, found.Inflections.Count);
        Near.Absolute(3, found.Inflections[0], 1e-10);
        Near.Absolute(7, found.Inflections[1], 1e-10);
    }

    // A known mixture as weighted data is the limit n → ∞: the estimate at h of weights on two points is the mixture of two normals itself.
    // Skewed pair 0.75 N(0, 1) + 0.25 N(3, 1): zeros of its elementary derivative by bisection here, on their own formula.
    [Fact]
    public void Peaks_MixtureAsWeights_MatchTheMixturesOwn()
    {
        Sample sample = Sample.Of([0, 3], new SampleOptions { Weights = new[] { 0.75, 0.25 } });
        PeakSummary found = Density.Of(sample, Kernel.Gaussian, 1).Peaks();
        static double Slope(double x) => (-0.75 * x * Math.Exp(-x * x / 2)) - (0.25 * (x - 3) * Math.Exp(-(x - 3) * (x - 3) / 2));
        static double Bisect(double a, double b)
        {
            double atA = Slope(a);
            for (int i = 0; i < 200; i++)
            {
                double m = (a + b) / 2;
                (a, b) = Slope(m) > 0 == atA > 0 ? (m, b) : (a, m);
            }

            return a;
        }

        Assert.Equal(2, found.Peaks.Count);
        Near.Absolute(Bisect(-0.5, 1), found.Peaks[0].Location, 1e-10);
        Near.Absolute(Bisect(1, 2.5), found.Valleys[0].Location, 1e-10);
        Near.Absolute(Bisect(2.5, 3.5), found.Peaks[1].Location, 1e-10);
        Near.Relative(found.Peaks[1].Height - found.Valleys[0].Height, found.Peaks[1].Prominence, 1e-13);
        Near.Relative(found.Peaks[0].Height, found.Peaks[0].Prominence, 1e-13);
    }

    [Fact]
    public void Peaks_CompactKernelWithGap_PutsTheValleyInTheMiddleOfTheFlat()
    {
        PeakSummary found = Density.Of(Sample.Of([0, 10]), Kernel.Epanechnikov, 1).Peaks();
        Assert.Equal(2, found.Peaks.Count);
        Near.Absolute(0, found.Peaks[0].Location, 1e-10);
        Near.Absolute(5, found.Valleys[0].Location, 1e-7);
        Assert.Equal(0.0, found.Valleys[0].Height);
        Assert.Empty(found.Inflections);
    }

    [Fact]
    public void Peaks_FarValue_CostsNoGridAcrossTheGap()
    {
        PeakSummary found = Density.Of(Sample.Of([0, 0.1, 1e9]), Kernel.Gaussian, 0.5).Peaks();
        Assert.Equal(2, found.Peaks.Count);
        Near.Absolute(0.05, found.Peaks[0].Location, 1e-10);
        Near.Absolute(2.0 / 3, found.Peaks[0].Mass, 1e-12);
    }

    // Epanechnikov: between neighbouring kinks f is one parabola, so a full look at every piece counts the maxima independently.
    [Property(MaxTest = 40)]
    public void Peaks_Epanechnikov_AgreeWithPieceByPieceCount(byte seed)
    {
        var random = new Random(seed);
        double[] values = Enumerable.Range(0, 3 + (seed % 12)).Select(_ => Math.Round(random.NextDouble() * 10, 2)).ToArray();
        double h = 0.4 + random.NextDouble();
        Density density = Density.Of(Sample.Of(values), Kernel.Epanechnikov, h);
        double[] kinks = values.SelectMany(v => new[] { v - h, v + h }).Distinct().Order().ToArray();
        int expected = 0;
        for (int i = 1; i < kinks.Length; i++)
        {
            double[] inside = values.Where(v => Math.Abs(v - ((kinks[i - 1] + kinks[i]) / 2)) < h).ToArray();
            if (inside.Length > 0)
            {
                // f is a sum of parabolas with their tops at the values in reach: its top is their mean.
                double top = inside.Average();
                expected += top > kinks[i - 1] && top < kinks[i] ? 1 : 0;
            }
        }

        Assert.Equal(expected, density.Peaks().Peaks.Count);
    }

    [Property(MaxTest = 30)]
    public void Peaks_ShiftAndScale_MoveAlong(byte seed)
    {
        var random = new Random(seed);
        double[] values = Enumerable.Range(0, 5 + (seed % 20)).Select(_ => random.NextDouble() * 4).ToArray();
        double[] moved = values.Select(v => (8 * v) - 3).ToArray();
        PeakSummary a = Density.Of(Sample.Of(values), Kernel.Gaussian, 0.25).Peaks();
        PeakSummary b = Density.Of(Sample.Of(moved), Kernel.Gaussian, 2).Peaks();
        Assert.Equal(a.Peaks.Count, b.Peaks.Count);
        Assert.Equal(a.Peaks.Count - 1, a.Valleys.Count);
        for (int i = 0; i < a.Peaks.Count; i++)
        {
            Near.Absolute((8 * a.Peaks[i].Location) - 3, b.Peaks[i].Location, 1e-7);
            Near.Relative(a.Peaks[i].Height, 8 * b.Peaks[i].Height, 1e-12);
            Near.Absolute(a.Peaks[i].Mass, b.Peaks[i].Mass, 1e-9);
        }

        Near.Absolute(1, a.Peaks.Sum(p => p.Mass), 1e-13);
    }
}
