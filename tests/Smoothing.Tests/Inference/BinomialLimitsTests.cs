using Smoothing.Inference;
using Smoothing.Numerics;
using Smoothing.Samples;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Inference;

public class BinomialLimitsTests
{
    // Limits solved from exact binomial sums in 50-digit decimal arithmetic by bisection.
    [Theory]
    [InlineData(0, 10, 0.95, 0, 0.308497107818760823)]
    [InlineData(1, 10, 0.95, 0.002528578544461784, 0.445016117028195420)]
    [InlineData(5, 10, 0.95, 0.187086028447398531, 0.812913971552601468)]
    [InlineData(10, 10, 0.95, 0.691502892181239176, 1)]
    [InlineData(3, 50, 0.95, 0.012548587835334061, 0.165481946603772893)]
    [InlineData(7, 200, 0.99, 0.010289183813943585, 0.083516373075541768)]
    [InlineData(150, 200, 0.90, 0.694532643350806135, 0.799826754818243041)]
    [InlineData(1, 1000, 0.95, 0.000025317487491294, 0.005558924279826672)]
    [InlineData(997, 1000, 0.95, 0.991257976761521696, 0.999380900068350428)]
    [InlineData(1, 1, 0.95, 0.025, 1)]
    public void Share_Counts_MatchExactBinomialSums(double count, double n, double level, double lower, double upper)
    {
        Interval interval = BinomialLimits.Share(count, n, level);
        Near.Relative(lower, interval.Lower, 1e-10);
        Near.Relative(upper, interval.Upper, 1e-10);
    }

    // Ranks and exact coverage from binomial sums in 50-digit decimal arithmetic; tail 0.025 on each side.
    [Theory]
    [InlineData(50, 0.5, 18, 33, 0.96716086243573651648)]
    [InlineData(50, 0.95, 44, 51, 0.98821355220273571203)]
    [InlineData(72, 0.95, 64, 72, 0.96549004790837384004)]
    [InlineData(71, 0.95, 63, 72, 0.99120510161884604732)]
    [InlineData(100, 0.5, 40, 61, 0.96479979978229518404)]
    [InlineData(368, 0.99, 360, 368, 0.96241582041085869077)]
    [InlineData(367, 0.99, 359, 368, 0.98738074686972651513)]
    [InlineData(200, 0.9, 171, 189, 0.96688390089792952206)]
    [InlineData(10, 0.5, 2, 9, 0.978515625)]
    [InlineData(6, 0.5, 1, 6, 0.96875)]
    [InlineData(5, 0.5, 0, 6, 1)]
    public void Ranks_SampleSizes_MatchExactBinomialSums(int n, double p, int lower, int upper, double attained)
    {
        Assert.Equal(lower, BinomialLimits.LowerRank(n, p, 0.025));
        Assert.Equal(upper, BinomialLimits.UpperRank(n, p, 0.025));
        double[] values = Enumerable.Range(1, n).Select(i => (double)i).ToArray();
        QuantileEstimate estimate = Quantiles.Of(Sample.Of(values), p);
        Assert.Equal(lower == 0 ? double.NegativeInfinity : lower, estimate.Interval.Lower);
        Assert.Equal(upper > n ? double.PositiveInfinity : upper, estimate.Interval.Upper);
        Near.Absolute(attained, estimate.AttainedLevel, 1e-12);
    }

    [Fact]
    public void Of_FiftyValues_SaysThatSeventyTwoAreNeeded()
    {
        double[] values = Enumerable.Range(1, 50).Select(i => (double)i).ToArray();
        QuantileEstimate estimate = Quantiles.Of(Sample.Of(values), 0.95);
        Assert.Contains("No upper limit can be given with n = 50; n ≥ 72 is needed.", estimate.Notes);
        Assert.Equal(72, Quantiles.SampleSizeForFiniteInterval(0.95));
        Assert.Equal(368, Quantiles.SampleSizeForFiniteInterval(0.99));
    }

    [Fact]
    public void Beyond_WeightsThatAreCounts_EqualsRepeatedValues()
    {
        var counts = new SampleOptions { Weights = new double[] { 3, 1, 2, 4 }, WeightMeaning = WeightMeaning.Counts };
        ShareEstimate weighted = Shares.Beyond(Sample.Of([1, 2, 3, 4], counts), 2.5);
        ShareEstimate repeated = Shares.Beyond(Sample.Of([1, 1, 1, 2, 3, 3, 4, 4, 4, 4]), 2.5);
        Assert.Equal(repeated.Interval, weighted.Interval);
        Assert.Equal(repeated.Estimate, weighted.Estimate, 15);
    }

    [Theory]
    [InlineData(0)]
    [InlineData(1)]
    [InlineData(95)]
    [InlineData(double.NaN)]
    public void Beyond_LevelOutside_Throws(double level)
    {
        Sample sample = Sample.Of([1, 2, 3]);
        Assert.Throws<ArgumentOutOfRangeException>(() => Shares.Beyond(sample, 2, level));
        Assert.Throws<ArgumentOutOfRangeException>(() => Quantiles.Of(sample, 0.5, level));
    }
}
