using MathNet.Numerics.Distributions;
using Smoothing.Bandwidths;
using Smoothing.Estimation;
using Smoothing.Inference;
using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;
using Smoothing.Tests.Support;
using Smoothing.Theory;

namespace Smoothing.Tests.Inference;

public class UncertaintyTests
{
    private static readonly Sample s_eruptions = Sample.Of(TestData.Load("faithful_eruptions_272"));

    // M = φ(3 − u²)/2 has R(M) = 27/(32√π) and R(M')/R(M) = 55/54; D_2 and D_4 as used by the fine-scale check: plain trapezoid sums.
    [Fact]
    public void Constants_DebiasedKernel_AreRecomputed()
    {
        static double M(double u) => Math.Exp(-u * u / 2) / Math.Sqrt(2 * Math.PI) * (3 - (u * u)) / 2;
        static double Slope(double u) => Math.Exp(-u * u / 2) / Math.Sqrt(2 * Math.PI) * ((u * u) - 5) * u / 2;
        double roughness = Sum(u => M(u) * M(u));
        Near.Relative(27 / (32 * Math.Sqrt(Math.PI)), roughness, 1e-12);
        Near.Relative(55.0 / 54, Sum(u => Slope(u) * Slope(u)) / roughness, 1e-12);
        foreach ((int k, double size) in FineScale.Scales)
        {
            Near.Absolute(size, Sum(u => Math.Pow(M(u) - (k * M(k * u)), 2)), 6e-6);
        }
    }

    // R(M_p) at p = 0, ¼, ½, 1 and far inside, computed before in double precision from the definition: 3.443, 1.548, 0.831, 0.537, 0.476.
    [Theory]
    [InlineData(0, 3.443)]
    [InlineData(0.25, 1.548)]
    [InlineData(0.5, 0.831)]
    [InlineData(1, 0.537)]
    [InlineData(40, 0.476)]
    public void BoundaryWeights_KnownPlaces_HaveTheMomentsAndRoughness(double p, double roughness)
    {
        BoundaryWeights w = BoundaryWeights.Of(p, double.PositiveInfinity);
        Near.Absolute(roughness, w.Roughness, 5.1e-4);
        double upper = Math.Min(p, 12);
        double K(double u) => Math.Exp(-u * u / 2) / Math.Sqrt(2 * Math.PI) * (w.C0 + (w.C1 * u) + (w.C2 * u * u));
        Near.Absolute(1, Between(K, -12, upper), 1e-9);
        Near.Absolute(0, Between(u => u * K(u), -12, upper), 1e-9);
        Near.Absolute(0, Between(u => u * u * K(u), -12, upper), 1e-9);
        Near.Absolute(w.Roughness, Between(u => K(u) * K(u), -12, upper), 1e-8);
    }

    // Against the inverse of a general-purpose library, where that one is accurate.
    [Theory]
    [InlineData(0.7, 0.01)]
    [InlineData(3, 0.001)]
    [InlineData(25, 0.0005)]
    [InlineData(900, 0.025)]
    public void GammaQuantile_BothTails_AgreesWithALibrary(double shape, double tail)
    {
        Near.Relative(Gamma.InvCDF(shape, 1, tail), GammaLimits.Quantile(shape, tail, upper: false), 1e-6);
        Near.Relative(Gamma.InvCDF(shape, 1, 1 - tail), GammaLimits.Quantile(shape, tail, upper: true), 1e-6);
        Near.Relative(tail, MathNet.Numerics.SpecialFunctions.GammaLowerRegularized(shape, GammaLimits.Quantile(shape, tail, upper: false)), 1e-10);
        Near.Relative(tail, MathNet.Numerics.SpecialFunctions.GammaUpperRegularized(shape, GammaLimits.Quantile(shape, tail, upper: true)), 1e-10);
    }

    // Garwood (1936) limits of a plain count through χ²: 10 events, 95 %: 4.795 to 18.39 (common tables); here the upper shape is m + ½, not m + 1.
    [Fact]
    public void GammaLimits_Lower_IsGarwoods() => Near.Absolute(4.795, GammaLimits.Of(10, 1, 0.025).Lower, 5e-4);

    [Fact]
    public void TubeValue_EmptyRange_IsTheNormalQuantileAndGrows()
    {
        Near.Absolute(1.959964, TubeValue.Of(1e-12, 1, TubeValue.Debiased, 0.05), 1e-6);
        Assert.InRange(TubeValue.Of(30, 1, TubeValue.Debiased, 0.05), 3.0, 3.6);
    }

    // f̃ equals the curve of the fourth-order kernel at the same bandwidth: exact identity.
    [Fact]
    public void DebiasedCurve_Interior_IsTheFourthOrderKernel()
    {
        var curve = new DebiasedCurve(s_eruptions, 0.24, Interval.WholeLine, 1);
        Density fourth = Density.Of(s_eruptions, Kernel.GaussianOfOrder(4), 0.24);
        double[] x = [1.2, 1.9, 3, 4.4, 5.5];
        var f = new double[5];
        var size = new double[5];
        curve.Evaluate(x, f, size, new double[5]);
        for (int i = 0; i < 5; i++)
        {
            Near.Relative(fourth.Value(x[i]), f[i], 1e-11);
            Near.Relative(27 / (32 * Math.Sqrt(Math.PI)) / (272 * 0.24), size[i], 1e-12);
        }
    }

    [Fact]
    public void DebiasedCurve_NearALimit_HasTheEmpiricalErrorOfItsTerms()
    {
        double[] x = [0.1, 0.3, 0.35, 0.7, 1.1, 1.4, 2.2, 0.05];
        const double H = 0.6;
        var curve = new DebiasedCurve(Sample.Of(x), H, new Interval(0, double.PositiveInfinity), 1);
        var f = new double[1];
        var size = new double[1];
        var near = new double[1];
        curve.Evaluate([0.2], f, size, near);
        BoundaryWeights w = BoundaryWeights.Of(0.2 / H, double.PositiveInfinity);
        double[] terms = [.. x.Select(v => (0.2 - v) / H).Select(u => Math.Exp(-u * u / 2) / Math.Sqrt(2 * Math.PI) * (w.C0 + (w.C1 * u) + (w.C2 * u * u)) / H)];
        Near.Relative(terms.Average(), f[0], 1e-12);
        Near.Relative(Math.Sqrt((terms.Average(t => t * t) - Math.Pow(terms.Average(), 2)) / 8), near[0], 1e-11);
    }

    // Seeded coverage at five places, n = 300, 400 samples: the standard error of a share near 95 % is 1.1 points; 4 of them below.
    [Theory]
    [InlineData(1)]
    [InlineData(6)]
    public void IntervalAt_MixtureSamples_CoverTheTruth(int number)
    {
        NormalMixture truth = NormalMixture.MarronWand[number - 1];
        double[] places = [.. new[] { 0.05, 0.25, 0.5, 0.8, 0.975 }.Select(truth.Quantile)];
        var covered = new int[places.Length];
        int whole = 0;
        const int Samples = 400;
        for (ulong seed = 0; seed < Samples; seed++)
        {
            Sample sample = Sample.Of(truth.Draw(300, seed + (1000 * (ulong)number)));
            BandwidthChoice h = BandwidthRules.Automatic(sample, Kernel.Gaussian);
            Uncertainty trust = Uncertainty.Of(Density.Of(sample, Kernel.Gaussian, h), new UncertaintyOptions { Choice = h });
            Assert.Equal(CoverageStatus.Tested, trust.Status);
            for (int i = 0; i < places.Length; i++)
            {
                covered[i] += trust.IntervalAt(places[i]).Contains(truth.Value(places[i])) ? 1 : 0;
            }

            Band band = trust.Band(truth.Quantile(0.05), truth.Quantile(0.95), 61);
            whole += Enumerable.Range(0, 61).All(i => truth.Value(band.X[i]) >= band.Lower[i] && truth.Value(band.X[i]) <= band.Upper[i]) ? 1 : 0;
        }

        Assert.All(covered, c => Assert.InRange((double)c / Samples, 0.95 - (4 * 0.011), 1));
        Assert.InRange((double)whole / Samples, 0.95 - (4 * 0.011), 1);
    }

    // At a known limit, exponential law, n = 200: the interval at 0 covered 96 % in simulation; 200 samples, standard error 1.5 points.
    [Fact]
    public void IntervalAt_ExponentialAtTheLimit_CoversTheTruth()
    {
        int covered = 0;
        var support = new Interval(0, double.PositiveInfinity);
        for (ulong seed = 0; seed < 200; seed++)
        {
            var random = new RandomStream(seed, 5);
            var x = new double[200];
            for (int i = 0; i < x.Length; i++)
            {
                x[i] = -Math.Log(random.NextUniform());
            }

            Sample sample = Sample.Of(x);
            BandwidthChoice h = BandwidthRules.Automatic(sample, Kernel.Gaussian, new BandwidthOptions { Support = support });
            Uncertainty trust = Uncertainty.Of(Density.Of(sample, Kernel.Gaussian, h, new DensityOptions { Support = support }), new UncertaintyOptions { Choice = h });
            covered += trust.IntervalAt(0).Contains(1) ? 1 : 0;
        }

        Assert.InRange(covered / 200.0, 0.95 - (4 * 0.0154), 1);
    }

    // Mean of the bias estimates over 60 samples of the bimodal law (n = 1,000) against the exact bias: right sign at peak and valley, and, as measured
    // before, about two thirds of its size; the standard error of the mean is below a tenth of it.
    [Fact]
    public void BiasAt_PeakAndValley_HasTheSignAndAboutTwoThirdsOfTheSize()
    {
        NormalMixture truth = NormalMixture.MarronWand[5];
        double peak = 0, valley = 0, exactPeak = 0, exactValley = 0;
        var theory = new ErrorTheory(Kernel.Gaussian, truth);
        for (ulong seed = 0; seed < 60; seed++)
        {
            Sample sample = Sample.Of(truth.Draw(1000, seed));
            BandwidthChoice h = BandwidthRules.Automatic(sample, Kernel.Gaussian);
            Uncertainty trust = Uncertainty.Of(Density.Of(sample, Kernel.Gaussian, h), new UncertaintyOptions { Choice = h });
            peak += trust.BiasAt(1).Estimate;
            valley += trust.BiasAt(0).Estimate;
            exactPeak += theory.Bias(1, h);
            exactValley += theory.Bias(0, h);
        }

        Assert.True(exactPeak < 0 && exactValley > 0);
        Assert.InRange(peak / exactPeak, 0.4, 1.05);
        Assert.InRange(valley / exactValley, 0.4, 1.05);
    }

    // A 5 % spike of width 0.05 that one bandwidth for all cannot show: the check finds it at n = 2,500 in most samples and widens the limits there.
    [Fact]
    public void Contradicted_NarrowSpike_IsFoundAndWidened()
    {
        var truth = new NormalMixture([0.95, 0.05], [0, -0.8], [1, 0.05]);
        int found = 0;
        for (ulong seed = 0; seed < 20; seed++)
        {
            Sample sample = Sample.Of(truth.Draw(2500, seed));
            Density density = Density.Of(sample, Kernel.Gaussian, 0.2);
            Uncertainty trust = Uncertainty.Of(density);
            bool near = trust.Contradicted.Any(c => c.Contains(-0.8));
            found += near ? 1 : 0;
            Interval plain = Uncertainty.Of(density, new UncertaintyOptions { FineScale = FineScaleCheck.Off }).IntervalAt(-0.8);
            Interval wide = trust.IntervalAt(-0.8);
            Assert.True(wide.Lower <= plain.Lower && wide.Upper >= plain.Upper);
            Assert.True(!near || wide.Length > plain.Length);
        }

        Assert.InRange(found, 15, 20);
    }

    [Fact]
    public void Status_BandwidthWithoutARule_IsUntested()
    {
        Assert.Equal(CoverageStatus.UntestedBandwidth, Uncertainty.Of(Density.Of(s_eruptions, Kernel.Gaussian, 0.3)).Status);
        BandwidthChoice h = BandwidthRules.Automatic(s_eruptions, Kernel.Biweight);
        Assert.Equal(CoverageStatus.EquivalentBandwidth, Uncertainty.Of(Density.Of(s_eruptions, Kernel.Biweight, h), new UncertaintyOptions { Choice = h }).Status);
    }

    [Fact]
    public void IntervalAt_FarFromAllValues_StartsAtZeroAndEndsAboveIt()
    {
        Uncertainty trust = Uncertainty.Of(Density.Of(s_eruptions, Kernel.Gaussian, 0.2));
        Interval far = trust.IntervalAt(40);
        Assert.Equal(0, far.Lower);
        Assert.True(far.Upper > 0);
        Band band = trust.Band(0, 8);
        Assert.All(Enumerable.Range(0, band.X.Count), i => Assert.True(band.Lower[i] <= band.Centre[i] && band.Centre[i] <= band.Upper[i] && band.Lower[i] >= 0));
    }

    [Fact]
    public void IntervalAt_ShiftAndScale_MoveAlong()
    {
        Uncertainty trust = Uncertainty.Of(Density.Of(s_eruptions, Kernel.Gaussian, 0.25));
        Uncertainty moved = Uncertainty.Of(Density.Of(Sample.Of(TestData.Load("faithful_eruptions_272").Select(v => 10 + (4 * v))), Kernel.Gaussian, 1));
        foreach (double x in new[] { 1.7, 3.1, 4.4 })
        {
            Near.Relative(trust.IntervalAt(x).Upper, 4 * moved.IntervalAt(10 + (4 * x)).Upper, 1e-9);
            Near.Relative(trust.BiasAt(x).Estimate, 4 * moved.BiasAt(10 + (4 * x)).Estimate, 1e-8);
        }
    }

    [Fact]
    public void Intervals_CountWeights_EqualRepetition()
    {
        double[] x = [.. TestData.Load("faithful_waiting_272").Distinct().Order()];
        double[] counts = [.. x.Select(v => (double)TestData.Load("faithful_waiting_272").Count(w => w == v))];
        Sample weighted = Sample.Of(x, new SampleOptions { Weights = counts, WeightMeaning = WeightMeaning.Counts });
        Sample repeated = Sample.Of(TestData.Load("faithful_waiting_272"));
        Interval a = Uncertainty.Of(Density.Of(weighted, Kernel.Gaussian, 3)).IntervalAt(75);
        Interval b = Uncertainty.Of(Density.Of(repeated, Kernel.Gaussian, 3)).IntervalAt(75);
        Near.Relative(b.Lower, a.Lower, 1e-9);
        Near.Relative(b.Upper, a.Upper, 1e-9);
    }

    // Weights that depend on x: the smaller of global and local size makes the limits wider than the global size alone where heavy weights sit.
    [Fact]
    public void Intervals_InformativeWeights_AreWiderWhereHeavyWeightsSit()
    {
        var random = new RandomStream(8);
        var x = new double[400];
        var w = new double[400];
        for (int i = 0; i < x.Length; i++)
        {
            x[i] = random.NextNormal();
            w[i] = Math.Exp(1.2 * x[i]);
        }

        Sample weighted = Sample.Of(x, new SampleOptions { Weights = w });
        var curve = new DebiasedCurve(weighted, 0.3, Interval.WholeLine, 1);
        var size = new double[2];
        curve.Evaluate([-1.5, 2], new double[2], size, new double[2]);
        Assert.True(size[1] > 1.3 * size[0]);
    }

    [Fact]
    public void Of_UnusableInput_Throws()
    {
        Density density = Density.Of(s_eruptions, Kernel.Gaussian, 0.3);
        Assert.ThrowsAny<ArgumentException>(() => Uncertainty.Of(density, new UncertaintyOptions { Level = 1 }));
        Assert.ThrowsAny<ArgumentException>(() => Uncertainty.Of(density, new UncertaintyOptions { Level = double.NaN }));
        Assert.ThrowsAny<ArgumentException>(() => Uncertainty.Of(Density.Of(Sample.Of([1.0, 2]), Kernel.Gaussian, 1)));
        Assert.ThrowsAny<ArgumentException>(() => Uncertainty.Of(Density.Of(Sample.Of([1.0, 1, 1, 1]), Kernel.Gaussian, 1)));
        Assert.ThrowsAny<ArgumentException>(() => Uncertainty.Of(Density.Of(s_eruptions, Kernel.GaussianOfOrder(4), 1)));
        Uncertainty trust = Uncertainty.Of(density);
        Assert.ThrowsAny<ArgumentException>(() => trust.IntervalAt(double.NaN));
        Assert.ThrowsAny<ArgumentException>(() => trust.Band(3, 3));
        Assert.ThrowsAny<ArgumentException>(() => trust.Band(1, 2, 1));
        Uncertainty limited = Uncertainty.Of(Density.Of(s_eruptions, Kernel.Gaussian, 0.3, new DensityOptions { Support = new Interval(0, 10) }));
        Assert.Contains("support", Assert.ThrowsAny<ArgumentException>(() => limited.IntervalAt(-1)).Message, StringComparison.Ordinal);
    }

    [Fact]
    public void BiasStatement_Words_FollowTheSign()
    {
        Uncertainty trust = Uncertainty.Of(Density.Of(s_eruptions, Kernel.Gaussian, 0.3));
        Assert.Contains("higher than drawn", trust.BiasAt(4.4).Sentence, StringComparison.Ordinal);
        Assert.Contains("lower than drawn", trust.BiasAt(3.0).Sentence, StringComparison.Ordinal);
    }

    private static double Sum(Func<double, double> f)
    {
        double sum = 0;
        for (int i = -12_000; i <= 12_000; i++)
        {
            sum += f(i / 1000.0) / 1000;
        }

        return sum;
    }

    private static double Between(Func<double, double> f, double from, double to)
    {
        // Simpson on 20,000 panels.
        const int Panels = 20_000;
        double step = (to - from) / Panels;
        double sum = f(from) + f(to);
        for (int i = 1; i < Panels; i++)
        {
            sum += (i % 2 == 1 ? 4 : 2) * f(from + (i * step));
        }

        return sum * step / 3;
    }
}
