using MathNet.Numerics.Distributions;
using Smoothing.Inference;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Tests.Inference;

public class QuantilesTests
{
    // The classical table of ranks for the median (binomial, two-sided 95 %): n = 10 gives the 2nd and 9th value. Common practice, recomputed below.
    [Theory]
    [InlineData(10, 2, 9)]
    [InlineData(20, 6, 15)]
    [InlineData(50, 18, 33)]
    public void Of_Median_HasTheTabledRanks(int n, int lower, int upper)
    {
        QuantileEstimate median = Quantiles.Of(Sample.Of(Enumerable.Range(1, n).Select(i => (double)i)), 0.5);
        Assert.Equal(lower, median.Interval.Lower);
        Assert.Equal(upper, median.Interval.Upper);
        Assert.True(median.AttainedLevel >= 0.95);
    }

    // Order-statistic interval [X_(l), X_(u)] covers the p-quantile of a continuous law with probability P(l ≤ B < u), B binomial: never below the level.
    [Theory]
    [InlineData(80, 0.95)]
    [InlineData(400, 0.99)]
    [InlineData(35, 0.5)]
    [InlineData(200, 0.1)]
    public void Of_AnyQuantile_CoversAtLeastTheLevel(int n, double p)
    {
        Interval interval = Quantiles.Of(Sample.Of(Enumerable.Range(1, n).Select(i => (double)i)), p).Interval;
        int lower = double.IsInfinity(interval.Lower) ? 0 : (int)interval.Lower;
        int upper = double.IsInfinity(interval.Upper) ? n + 1 : (int)interval.Upper;
        double covered = Enumerable.Range(0, n + 1).Where(k => k >= lower && k < upper).Sum(k => Binomial.PMF(p, n, k));
        Assert.True(covered >= 0.95 - 1e-9, $"{covered}");
    }

    // n ≥ ln(0.025)/ln(p): 72 for the 95th percentile... in full 71.9, and 367.04 for the 99th.
    [Theory]
    [InlineData(0.95, 72)]
    [InlineData(0.99, 368)]
    public void SampleSizeForFiniteInterval_HighPercentile_IsTheClosedForm(double p, long needed)
    {
        Assert.Equal(needed, Quantiles.SampleSizeForFiniteInterval(p));
        QuantileEstimate few = Quantiles.Of(Sample.Of(Enumerable.Range(1, (int)needed - 1).Select(i => (double)i)), p);
        Assert.Equal(double.PositiveInfinity, few.Interval.Upper);
        Assert.Contains(few.Notes, note => note.Contains(needed.ToString(System.Globalization.CultureInfo.InvariantCulture), StringComparison.Ordinal));
        Assert.True(double.IsFinite(Quantiles.Of(Sample.Of(Enumerable.Range(1, (int)needed).Select(i => (double)i)), p).Interval.Upper));
    }

    [Fact]
    public void Of_UnusableProbabilityOrLevel_Throws()
    {
        Sample sample = Sample.Of([1.0, 2, 3]);
        Assert.ThrowsAny<ArgumentException>(() => Quantiles.Of(sample, double.NaN));
        Assert.ThrowsAny<ArgumentException>(() => Quantiles.Of(sample, 1.5));
        Assert.ThrowsAny<ArgumentException>(() => Quantiles.Of(sample, 0.5, 1));
    }
}
