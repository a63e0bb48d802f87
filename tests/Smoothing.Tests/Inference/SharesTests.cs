using MathNet.Numerics.Distributions;
using Smoothing.Inference;
using Smoothing.Numerics;
using Smoothing.Samples;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Inference;

public class SharesTests
{
    // Zero of ten: upper end 1 − 0.025^(1/10); ten of ten by symmetry. Clopper & Pearson (1934), closed form at the ends.
    [Fact]
    public void Beyond_NoneOrAll_HasTheClosedForm()
    {
        Sample sample = Sample.Of(Enumerable.Range(1, 10).Select(i => (double)i));
        double end = 1 - Math.Pow(0.025, 0.1);
        Interval none = Shares.Beyond(sample, 10).Interval;
        Assert.Equal(0, none.Lower);
        Near.Relative(end, none.Upper, 1e-12);
        Interval all = Shares.Beyond(sample, 0).Interval;
        Near.Relative(1 - end, all.Lower, 1e-12);
        Assert.Equal(1, all.Upper);
    }

    // Against the beta quantiles of a general-purpose library: Beta(k, n − k + 1) and Beta(k + 1, n − k).
    [Theory]
    [InlineData(3, 40, 0.95)]
    [InlineData(81, 624, 0.95)]
    [InlineData(81, 624, 0.99)]
    [InlineData(5000, 100_000, 0.9)]
    public void Beyond_Counts_AreBetaQuantiles(int count, int n, double level)
    {
        double[] values = [.. Enumerable.Range(0, n).Select(i => i < count ? 2.0 : 1.0)];
        ShareEstimate share = Shares.Beyond(Sample.Of(values), 1.5, level);
        double tail = (1 - level) / 2;
        Near.Relative((double)count / n, share.Estimate, 1e-14);
        Near.Relative(tail, Beta.CDF(count, n - count + 1, share.Interval.Lower), 1e-8);
        Near.Relative(1 - tail, Beta.CDF(count + 1, n - count, share.Interval.Upper), 1e-8);
    }

    [Fact]
    public void BeyondBelowBetween_ValuesAtTheLimit_AreCountedAsStated()
    {
        Sample sample = Sample.Of([1.0, 2, 2, 3, 4]);
        Assert.Equal(0.4, Shares.Beyond(sample, 2).Estimate, 15);
        Assert.Equal(0.2, Shares.Below(sample, 2).Estimate, 15);
        Assert.Equal(0.4, Shares.Between(sample, 2, 2).Estimate, 15);
        Assert.Equal(0.6, Shares.Between(sample, 2, 3).Estimate, 15);
    }

    [Fact]
    public void Beyond_CountWeights_EqualRepetition()
    {
        Sample weighted = Sample.Of([1.0, 2, 3], new SampleOptions { Weights = new double[] { 7, 2, 4 }, WeightMeaning = WeightMeaning.Counts });
        Sample repeated = Sample.Of(Enumerable.Repeat(1.0, 7).Concat(Enumerable.Repeat(2.0, 2)).Concat(Enumerable.Repeat(3.0, 4)));
        Interval a = Shares.Beyond(weighted, 1.5).Interval;
        Interval b = Shares.Beyond(repeated, 1.5).Interval;
        Near.Relative(b.Lower, a.Lower, 1e-12);
        Near.Relative(b.Upper, a.Upper, 1e-12);
    }

    // Exact coverage, summed over the binomial law of a general-purpose library: never below the level, whatever the share.
    [Theory]
    [InlineData(20)]
    [InlineData(75)]
    public void Beyond_EveryShare_CoversAtLeastTheLevel(int n)
    {
        Interval[] intervals = [.. Enumerable.Range(0, n + 1).Select(k =>
            Shares.Beyond(Sample.Of(Enumerable.Range(0, n).Select(i => i < k ? 1.0 : 0.0)), 0.5).Interval)];
        for (double p = 0.01; p < 1; p += 0.0173)
        {
            double covered = Enumerable.Range(0, n + 1).Where(k => intervals[k].Contains(p)).Sum(k => Binomial.PMF(p, n, k));
            Assert.True(covered >= 0.95 - 1e-9, $"p = {p}: {covered}");
        }
    }

    // AR(1) with correlation 0.8: at n = 500 the raw interval of P(X > 0) covers about 59 %, the one that allows for dependence about 94 % (measured
    // by simulation before). 120 seeded series: standard error 2.2 points at 94 %, 4.5 at 59 %.
    [Fact]
    public void Beyond_DependentValues_CoverOnlyWhenAllowedFor()
    {
        int raw = 0, allowed = 0;
        for (ulong seed = 0; seed < 120; seed++)
        {
            var random = new RandomStream(seed, 77);
            var x = new double[500];
            x[0] = random.NextNormal();
            for (int i = 1; i < x.Length; i++)
            {
                x[i] = (0.8 * x[i - 1]) + (0.6 * random.NextNormal());
            }

            Sample sample = Sample.Of(x);
            raw += Shares.Beyond(sample, 0).Interval.Contains(0.5) ? 1 : 0;
            allowed += Shares.Beyond(sample, 0, dependence: Smoothing.Inference.SerialDependence.AllowFor).Interval.Contains(0.5) ? 1 : 0;
        }

        Assert.InRange(raw / 120.0, 0.59 - (4 * 0.045), 0.59 + (4 * 0.045));
        Assert.InRange(allowed / 120.0, 0.94 - (4 * 0.022), 1);
    }

    [Theory]
    [InlineData(0)]
    [InlineData(1)]
    [InlineData(95)]
    [InlineData(double.NaN)]
    public void Beyond_UnusableLevel_Throws(double level) => Assert.Throws<ArgumentOutOfRangeException>(() => Shares.Beyond(Sample.Of([1.0, 2]), 1, level));

    [Fact]
    public void Shares_UnusableLimits_Throw()
    {
        Sample sample = Sample.Of([1.0, 2]);
        Assert.Throws<ArgumentOutOfRangeException>(() => Shares.Beyond(sample, double.NaN));
        Assert.ThrowsAny<ArgumentException>(() => Shares.Between(sample, 3, 2));
    }

    [Fact]
    public void SampleSizeFor_WantedHalfWidth_IsReachedAndNotBefore()
    {
        long n = Shares.SampleSizeFor(0.1, 0.02);
        double Half(long size)
        {
            double count = 0.1 * size;
            return (Beta.InvCDF(count + 1, size - count, 0.975) - Beta.InvCDF(count, size - count + 1, 0.025)) / 2;
        }

        Assert.True(Half(n) <= 0.02);
        Assert.True(Half(n - 1) > 0.02 - 1e-9);
    }
}
