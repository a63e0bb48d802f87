using Smoothing.Bandwidths;
using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Bandwidths;

/// <summary>What every rule must do when the data are shifted, scaled, reordered, or repeated.</summary>
public class BandwidthPropertyTests
{
    public static TheoryData<BandwidthRule> Rules => [.. Enum.GetValues<BandwidthRule>()];

    [Theory]
    [MemberData(nameof(Rules))]
    public void Choose_ShiftedAndScaledData_MovesAlong(BandwidthRule rule)
    {
        double[] x = Mixture(150);
        double h = BandwidthRules.Choose(rule, Sample.Of(x), Kernel.Gaussian);
        double moved = BandwidthRules.Choose(rule, Sample.Of([.. x.Select(v => (37 * v) - 1000)]), Kernel.Gaussian);
        double turned = BandwidthRules.Choose(rule, Sample.Of([.. x.Select(v => -v)]), Kernel.Gaussian);
        // Minima are sought to 1e-9, and the shift costs three digits of the values.
        Near.Relative(37 * h, moved, 1e-6, rule.ToString());
        Near.Relative(h, turned, 1e-6, rule.ToString());
    }

    [Theory]
    [MemberData(nameof(Rules))]
    public void Choose_PermutedData_ChangesNothing(BandwidthRule rule)
    {
        double[] x = Mixture(150);
        double h = BandwidthRules.Choose(rule, Sample.Of(x), Kernel.Gaussian);
        Array.Reverse(x);
        Assert.Equal(h, BandwidthRules.Choose(rule, Sample.Of(x), Kernel.Gaussian).Value);
    }

    [Theory]
    [MemberData(nameof(Rules))]
    public void Choose_CountWeights_EqualDuplication(BandwidthRule rule)
    {
        double[] x = Mixture(60);
        double[] weights = [.. x.Select((_, i) => 1.0 + (i % 3))];
        double[] repeated = [.. x.SelectMany((v, i) => Enumerable.Repeat(v, 1 + (i % 3)))];
        var options = new BandwidthOptions { RoundingUnit = 0 };
        double h = BandwidthRules.Choose(rule, Sample.Of(x, new SampleOptions { Weights = weights, WeightMeaning = WeightMeaning.Counts }), Kernel.Gaussian, options);
        Near.Relative(BandwidthRules.Choose(rule, Sample.Of(repeated), Kernel.Gaussian, options), h, 1e-8, rule.ToString());
    }

    [Theory]
    [MemberData(nameof(Rules))]
    public void Choose_RelativeWeightsScaled_ChangeNothing(BandwidthRule rule)
    {
        double[] x = Mixture(100);
        double[] weights = [.. x.Select((_, i) => 0.5 + (i % 7))];
        double h = BandwidthRules.Choose(rule, Sample.Of(x, new SampleOptions { Weights = weights }), Kernel.Gaussian);
        double scaled = BandwidthRules.Choose(rule, Sample.Of(x, new SampleOptions { Weights = weights.Select(w => 1000 * w).ToArray() }), Kernel.Gaussian);
        Near.Relative(h, scaled, 1e-6, rule.ToString());
    }

    [Theory]
    [MemberData(nameof(Rules))]
    public void Choose_DeclaredLimit_MirrorsAndAgreesOnCells(BandwidthRule rule)
    {
        double[] x = [.. BadInputTests.Normal(600, 21).Select(Math.Abs)];
        double[] weights = [.. x.Select((_, i) => 0.5 + (i % 3))];
        var lower = new BandwidthOptions { Support = new Interval(0, double.PositiveInfinity) };
        var upper = new BandwidthOptions { Support = new Interval(double.NegativeInfinity, 0) };
        double h = BandwidthRules.Choose(rule, Sample.Of(x, new SampleOptions { Weights = weights }), Kernel.Gaussian, lower);
        double mirrored = BandwidthRules.Choose(rule, Sample.Of([.. x.Select(v => -v)], new SampleOptions { Weights = weights }), Kernel.Gaussian, upper);
        Near.Relative(h, mirrored, 1e-6, rule.ToString());
        double cells = BandwidthRules.Choose(rule, CondensedSample.Of(x, new CondensingOptions { CellWidth = 1.0 / 1024, Weights = weights }), Kernel.Gaussian, lower);
        Near.Relative(h, cells, 0.02, rule.ToString());
    }

    [Fact]
    public void Automatic_OtherKernel_IsTheCanonicalEquivalent()
    {
        Sample sample = Sample.Of(Mixture(300));
        BandwidthChoice gaussian = BandwidthRules.Automatic(sample, Kernel.Gaussian);
        BandwidthChoice other = BandwidthRules.Automatic(sample, Kernel.Epanechnikov);
        Near.Relative(gaussian.EquivalentFor(Kernel.Epanechnikov), other, 1e-12);
        // Härdle (1991), Scott (1992) Table 6.3: Gaussian to Epanechnikov 2.214, remembered and recomputed.
        Near.Absolute(2.214, other / gaussian, 5e-4);
        Assert.Equal(2, gaussian.Candidates.Count);
        Assert.Equal(gaussian.Candidates.Values.Min(), gaussian.Value);
    }

    /// <summary>Two hills of unequal width.</summary>
    internal static double[] Mixture(int n) =>
        [.. BadInputTests.Normal(n, 11).Select((v, i) => i % 3 == 0 ? 3 + (0.5 * v) : v)];
}
