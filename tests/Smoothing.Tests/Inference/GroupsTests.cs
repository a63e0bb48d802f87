using System.Globalization;
using MathNet.Numerics.Distributions;
using Smoothing.Inference;
using Smoothing.Numerics;
using Smoothing.Samples;
using Smoothing.Tests.Support;
using Smoothing.Theory;

namespace Smoothing.Tests.Inference;

public class GroupsTests
{
    private static readonly GroupOptions Quick = new() { Resamples = 100 };

    // critical_bandwidths.csv: fold points of f' = f'' = 0, computed independently at high precision (Data/README.md).
    [Fact]
    public void CriticalBandwidth_OpenData_AreTheTabledFolds()
    {
        int checkedRows = 0;
        foreach (string line in File.ReadLines(TestData.PathOf("critical_bandwidths.csv")).Where(l => l.Length > 0 && l[0] != '#').Skip(1))
        {
            string[] parts = line.Split(',');
            Sample sample = Sample.Of(TestData.Load(parts[0]));
            var range = new Interval(sample.Minimum, sample.Maximum);
            double h = CriticalBandwidth.Polished(sample, sample.Values.ToArray(), [], int.Parse(parts[1], CultureInfo.InvariantCulture), range);
            Near.Relative(double.Parse(parts[2], CultureInfo.InvariantCulture), h, 1e-8, line);
            checkedRows++;
        }

        Assert.True(checkedRows >= 10);
    }

    // Silverman (1981), chondrites: 2.39, 1.83, 0.68, quoted from memory.
    [Theory]
    [InlineData(1, 2.39)]
    [InlineData(2, 1.83)]
    [InlineData(3, 0.68)]
    public void CriticalBandwidth_Chondrites_AreSilvermans(int k, double published)
    {
        Sample sample = Sample.Of(TestData.Load("chondrite_22"));
        double h = CriticalBandwidth.Of(sample.Values, [], k, new Interval(sample.Minimum, sample.Maximum));
        Near.Absolute(published, h, 0.01);
    }

    // The paper's value is about 1.13 at 5 % (from memory); the three numbers are the polynomial's, computed independently.
    [Theory]
    [InlineData(0.01, 1.14883)]
    [InlineData(0.05, 1.12942)]
    [InlineData(0.10, 1.10987)]
    public void Calibration_UsualLevels_IsThePolynomial(double alpha, double lambda) => Near.Absolute(lambda, ModeTests.Calibration(alpha), 6e-6);

    [Fact]
    public void ModeCounter_SixSeparateValues_CountsThemAll()
    {
        double[] x = [0, 1, 2, 3, 4, 5];
        Assert.Equal(6, ModeCounter.Count(x, [], 0.3, new Interval(-1, 6)));
        Assert.Equal(1, ModeCounter.Count(x, [], 2, new Interval(-1, 6)));
        Assert.Equal(2, ModeCounter.Count(x, [], 0.3, new Interval(0.5, 2.5)));
        Assert.Equal(2, ModeCounter.Count([0, 1, 2], [1, 1e-9, 1], 0.5, new Interval(-1, 3)));
    }

    // Dip against bisection on "does a law with one mode lie within d of the steps", tried with the mode at each value: the definition itself.
    [Theory]
    [InlineData(5, 1)]
    [InlineData(8, 2)]
    [InlineData(13, 3)]
    [InlineData(30, 4)]
    public void Dip_SmallSamples_IsTheDefinition(int n, ulong seed)
    {
        for (ulong r = 0; r < 25; r++)
        {
            var random = new RandomStream(seed, r);
            double[] x = [.. Enumerable.Range(0, n).Select(i => random.NextNormal() + (r % 3 == 0 && i % 2 == 0 ? 3 : 0)).Order()];
            Near.Absolute(ByDefinition(x), DipStatistic.Of(x), 1e-8, Guard.Text($"n = {n}, {r}"));
        }
    }

    // Evenly spaced values lie as near to one mode as any can: 1/(2n). Two equal heaps are as far as any can be: 1/4 (Hartigan & Hartigan 1985).
    [Fact]
    public void Dip_ExtremeSamples_HasTheExtremeValues()
    {
        Near.Relative(1.0 / 40, DipStatistic.Of([.. Enumerable.Range(0, 20).Select(i => (double)i)]), 1e-12);
        Near.Absolute(0.25, DipStatistic.Of([.. Enumerable.Repeat(0.0, 500), .. Enumerable.Repeat(1.0, 500)]), 1e-3);
    }

    // √n·dip of uniform samples has settled by the size that stands for all larger ones.
    [Fact]
    public void Dip_UniformSamples_ScaleWithRootN()
    {
        double Quantile(int n)
        {
            var dips = new double[400];
            for (int r = 0; r < dips.Length; r++)
            {
                dips[r] = Math.Sqrt(n) * DipStatistic.Of([.. Draw(new ContinuousUniform(), n, (ulong)r).Order()]);
            }

            Array.Sort(dips);
            return dips[380];
        }

        // A 95 % point of 400 has a standard error of about 3 % here.
        Near.Relative(Quantile(2000), Quantile(500), 0.12);
    }

    [Theory]
    [InlineData(40, 0.1)]
    [InlineData(60, 0.4)]
    [InlineData(30, 0.8)]
    public void BinomialDraws_SmallN_FollowTheLaw(int n, double p)
    {
        const int Draws = 20_000;
        var random = new RandomStream(9);
        var counts = new int[n + 1];
        for (int i = 0; i < Draws; i++)
        {
            counts[BinomialDraws.One(ref random, n, p)]++;
        }

        var law = new Binomial(p, n);
        double chi = 0;
        int cells = 0;
        for (int k = 0; k <= n; k++)
        {
            double expected = Draws * law.Probability(k);
            if (expected >= 5)
            {
                chi += (counts[k] - expected) * (counts[k] - expected) / expected;
                cells++;
            }
        }

        Assert.True(chi < ChiSquared.InvCDF(cells, 0.999), Guard.Text($"{chi} over {cells}"));
    }

    [Fact]
    public void Of_Eruptions_FindsTwoGroups()
    {
        GroupEvidence evidence = Groups.Of(Sample.Of(TestData.Load("faithful_eruptions_272")), 1);
        Assert.Equal(2, evidence.AtLeast);
        Assert.True(evidence.DipAgrees);
        Assert.Contains("at least 2 peaks", evidence.Sentence, StringComparison.Ordinal);
        Assert.True(evidence.Tests[0].IsRejected && !evidence.Tests[^1].IsRejected);
        Assert.All(evidence.Peaks, peak => Assert.True(peak.LocationInterval.Contains(peak.Location) && peak.HeightInterval.Contains(peak.Height)));
        Assert.Equal(2, evidence.Peaks.Count(peak => peak.StandsApart));
    }

    [Fact]
    public void Of_SameSeed_SameAnswer()
    {
        Sample sample = Sample.Of(TestData.Load("chondrite_22"));
        GroupEvidence a = Groups.Of(sample, 5, Quick);
        GroupEvidence b = Groups.Of(sample, 5, Quick);
        Assert.Equal(a.Sentence, b.Sentence);
        Assert.Equal(a.Tests.Select(t => t.PValue), b.Tests.Select(t => t.PValue));
        Assert.NotEqual(a.Tests[0].PValue, Groups.Of(sample, 6, Quick).Tests[0].PValue);
    }

    // Level of "one peak" at 5 %: at most 8 % is the aim; 100 samples leave three standard errors of 6.5 points.
    [Fact]
    public void Of_NormalSamples_RarelySeeMoreThanOne() => Assert.True(Rejections(NormalMixture.Normal(), 200, 100) <= 0.05 + (3 * Math.Sqrt(0.05 * 0.95 / 100)));

    // Power on the bimodal mixture at n = 200: at least 60 % is the aim; 100 samples leave three standard errors of 15 points.
    [Fact]
    public void Of_BimodalSamples_SeeTwoMoreOftenThanNot() => Assert.True(Rejections(NormalMixture.MarronWand[5], 200, 100) >= 0.6 - (3 * Math.Sqrt(0.6 * 0.4 / 100)));

    // Above ten thousand values counts are drawn instead of values: the same p-value within the error of 400 resamples, 3·√2·√(p(1 − p)/400).
    [Fact]
    public void Resamples_CountsAndValues_GiveTheSameShares()
    {
        Sample small = Sample.Of(NormalMixture.MarronWand[7].Draw(9_900, 3));
        Sample large = Sample.Of([.. small.Values, .. small.Values]);
        var range = new Interval(small.Quantile(0.025), small.Quantile(0.975));
        double h = 0.4 * CriticalBandwidth.Of(small.Values, [], 1, range);
        double p = Share(small, h);
        double q = Share(Sample.Of([.. small.Values, .. small.Values.ToArray().Take(100)]), h);
        Assert.InRange(p, 0.02, 0.98);
        Near.Absolute(p, q, 3 * Math.Sqrt(2 * p * (1 - p) / 400));
        Assert.True(Groups.Of(large, 1, Quick).Tests.Count > 0);

        double Share(Sample sample, double bandwidth)
        {
            (double[] x, double[] w) = ModeTests.Condense(sample, range);
            var resamples = new SmoothedResamples(sample, x, w, bandwidth, range, keepVariance: true);
            int modes = ModeCounter.Count(x, w, bandwidth, range);
            return ModeTests.Several(resamples, bandwidth, modes, range, 17, 400, () => { });
        }
    }

    // Intervals for the place of the peak hold the truth: N(0, 1) at 0, 150 samples, three standard errors of 5.3 points.
    [Fact]
    public void Peaks_NormalSamples_HoldPlaceAndHeight()
    {
        int place = 0, height = 0, count = 0;
        NormalMixture law = NormalMixture.Normal();
        var range = new Interval(-1.96, 1.96);
        for (ulong r = 0; r < 150; r++)
        {
            Sample sample = Sample.Of(law.Draw(300, r));
            double h = Smoothing.Bandwidths.BandwidthRules.Automatic(sample, Smoothing.Kernels.Kernel.Gaussian);
            IReadOnlyList<GroupPeak> peaks = PeakIntervals.Of(Smoothing.Estimation.Density.Of(sample, Smoothing.Kernels.Kernel.Gaussian, h), 0.95, range);
            if (peaks.Count == 1)
            {
                count++;
                place += peaks[0].LocationInterval.Contains(0) ? 1 : 0;
                height += peaks[0].HeightInterval.Contains(law.Value(0)) ? 1 : 0;
            }
        }

        double least = 0.95 - (3 * Math.Sqrt(0.95 * 0.05 / count));
        Assert.True(count > 60);
        Assert.True(place >= least * count, Guard.Text($"place {place} of {count}"));
        Assert.True(height >= least * count, Guard.Text($"height {height} of {count}"));
    }

    [Fact]
    public void Warnings_UniformSample_SayThatItIsFlat()
    {
        GroupEvidence evidence = Groups.Of(Sample.Of(Draw(new ContinuousUniform(), 500, 4)), 1, Quick);
        Assert.Contains(evidence.Warnings, w => w.Contains("flat", StringComparison.Ordinal));
        Assert.DoesNotContain(Groups.Of(Sample.Of(NormalMixture.Normal().Draw(500, 4)), 1, Quick).Warnings, w => w.Contains("flat", StringComparison.Ordinal));
    }

    [Theory]
    [InlineData(new[] { 1.0 })]
    [InlineData(new[] { 1.0, 2.0 })]
    [InlineData(new[] { 3.0, 3.0, 3.0, 3.0, 3.0, 3.0, 3.0 })]
    public void Of_NothingToGoBy_SaysSo(double[] values)
    {
        GroupEvidence evidence = Groups.Of(Sample.Of(values), 1);
        Assert.Equal(1, evidence.AtLeast);
        Assert.Empty(evidence.Tests);
        Assert.Contains("nothing can be said", evidence.Sentence, StringComparison.Ordinal);
    }

    [Fact]
    public void Of_BadOptions_Throw()
    {
        Sample sample = Sample.Of(TestData.Load("chondrite_22"));
        Assert.Throws<ArgumentNullException>(() => Groups.Of(null!, 1));
        foreach (GroupOptions options in new GroupOptions[]
        {
            new() { Significance = 0 }, new() { Significance = double.NaN }, new() { Level = 1 }, new() { Resamples = 99 },
            new() { LargestTested = 0 }, new() { Bandwidth = -1 }, new() { Bandwidth = double.NaN },
        })
        {
            Assert.Throws<ArgumentOutOfRangeException>(() => Groups.Of(sample, 1, options));
        }

        using var stop = new CancellationTokenSource();
        stop.Cancel();
        Assert.Throws<OperationCanceledException>(() => Groups.Of(sample, 1, Quick with { Cancellation = stop.Token }));
    }

    private static double Rejections(TargetDensity law, int n, int repetitions)
    {
        int rejected = 0;
        for (int r = 0; r < repetitions; r++)
        {
            GroupEvidence evidence = Groups.Of(Sample.Of(law.Draw(n, (ulong)(r + 300))), (ulong)r, Quick with { LargestTested = 1 });
            rejected += evidence.AtLeast > 1 ? 1 : 0;
        }

        return (double)rejected / repetitions;
    }

    private static double[] Draw(IContinuousDistribution law, int n, ulong seed) => TargetDensity.From(law).Draw(n, seed);

    private static double ByDefinition(double[] x)
    {
        double low = 0;
        double high = 0.5;
        for (int i = 0; i < 50; i++)
        {
            double d = (low + high) / 2;
            bool possible = Enumerable.Range(0, x.Length).Any(m => Feasible(x, m, d));
            (low, high) = possible ? (low, d) : (d, high);
        }

        return high;
    }

    // A convex line through the bounds up to x_m and a concave one from there, both through one height at x_m: the first needs it high enough, the second low enough.
    private static bool Feasible(double[] x, int m, double d)
    {
        int n = x.Length;
        double least = ((m + 1.0) / n) - d;
        double most = ((double)m / n) + d;
        if (least > most)
        {
            return false;
        }

        bool Left(double v) => Convex([.. Enumerable.Range(0, m).Select(i => (x[i], ((i + 1.0) / n) - d, ((double)i / n) + d)), (x[m], v, v)]);
        bool Right(double v) => Convex([.. Enumerable.Range(m + 1, n - m - 1).Reverse().Select(i => (-x[i], -((double)i / n) - d, -((i + 1.0) / n) + d)), (-x[m], -v, -v)]);
        if (!Left(most) || !Right(least))
        {
            return false;
        }

        double low = least;
        double high = most;
        for (int i = 0; i < 40; i++)
        {
            double v = (low + high) / 2;
            (low, high) = Left(v) ? (low, v) : (v, high);
        }

        return Right(high - 1e-13);
    }

    // The greatest convex function below the upper bounds must not fall below a lower bound.
    private static bool Convex(List<(double X, double Low, double High)> points)
    {
        var hull = new List<(double X, double High)>();
        foreach ((double px, _, double high) in points)
        {
            while (hull.Count > 1 && (hull[^1].High - hull[^2].High) * (px - hull[^2].X) >= (high - hull[^2].High) * (hull[^1].X - hull[^2].X))
            {
                hull.RemoveAt(hull.Count - 1);
            }

            hull.Add((px, high));
        }

        int segment = 0;
        foreach ((double px, double low, _) in points)
        {
            while (segment + 1 < hull.Count && hull[segment + 1].X < px)
            {
                segment++;
            }

            (double X, double High) a = hull[segment];
            (double X, double High) b = hull[Math.Min(segment + 1, hull.Count - 1)];
            double y = b.X > a.X ? a.High + ((b.High - a.High) * (px - a.X) / (b.X - a.X)) : a.High;
            if (y < low - 1e-12)
            {
                return false;
            }
        }

        return true;
    }
}
