using Smoothing.Bandwidths;
using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;
using Smoothing.Tests.Samples;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Bandwidths;

/// <summary>Rounded and heaped values, limits and cells.</summary>
public class RoundedDataTests
{
    [Theory]
    [InlineData(0.05)]
    [InlineData(0.25)]
    [InlineData(0.5)]
    [InlineData(1.0)]
    public void Automatic_RoundedNormal_StaysNearTheUnroundedChoice(double step)
    {
        double[] x = BadInputTests.Normal(2000, 51);
        BandwidthChoice exact = BandwidthRules.Automatic(Sample.Of(x), Kernel.Gaussian);
        BandwidthChoice rounded = BandwidthRules.Automatic(Sample.Of([.. x.Select(v => Math.Round(v / step) * step)]), Kernel.Gaussian);
        Assert.NotNull(rounded.LatticeStep);
        Near.Relative(step, rounded.LatticeStep.Value, 1e-9);
        Assert.True(rounded.Value >= 0.5 * step * (1 - 1e-12));
        Assert.InRange(rounded.Value, 0.7 * exact, Math.Max(1.4 * exact, 0.51 * step));
        Assert.True(rounded.TiedShare > 0.9);
    }

    [Fact]
    public void Automatic_CoarselyRounded_SaysThatRoundingLimits()
    {
        double[] x = [.. BadInputTests.Normal(5000, 52).Select(v => Math.Round(v))];
        BandwidthChoice choice = BandwidthRules.Automatic(Sample.Of(x), Kernel.Gaussian);
        Assert.Equal(BandwidthStatus.RoundingFloor, choice.Status);
        Assert.Equal(0.5, choice.Value, 12);
        Assert.Contains(choice.Notes, n => n.Contains("Rounding limits", StringComparison.Ordinal));
    }

    [Fact]
    public void Automatic_MostValuesHeaped_StopsWhereTheHeapsWouldShow()
    {
        var stream = new RandomStream(58);
        double[] x = [.. BadInputTests.Normal(10000, 59).Select(v => stream.NextUniform() < 0.6 ? Math.Round(v * 2) / 2 : v)];
        BandwidthChoice choice = BandwidthRules.Automatic(Sample.Of(x), Kernel.Gaussian);
        Assert.NotNull(choice.LatticeStep);
        Near.Relative(0.5, choice.LatticeStep.Value, 1e-9);
        // 2 · 0.6 exp(−2π²h²/0.25) = 1.44 % at h = 0.237, and the share is known to about 1 %.
        Assert.InRange(choice.Floor, 0.23, 0.24);
        Assert.True(choice.Value >= choice.Floor);
    }

    [Fact]
    public void LeastSquaresCrossValidation_TiedData_Warns()
    {
        double[] x = [.. BadInputTests.Normal(500, 53).Select(v => Math.Round(v, 1))];
        BandwidthChoice choice = BandwidthRules.LeastSquaresCrossValidation(Sample.Of(x), Kernel.Gaussian);
        Assert.Contains(choice.Notes, n => n.Contains("ties", StringComparison.Ordinal));
        Assert.True(choice.Value >= 0.05);
    }

    [Fact]
    public void DiffusionFixedPoint_KnownLimit_IgnoresTheJump()
    {
        var stream = new RandomStream(54);
        double[] x = [.. Enumerable.Range(0, 1000).Select(_ => Math.Abs(stream.NextNormal()))];
        BandwidthChoice ignored = BandwidthRules.Automatic(Sample.Of(x), Kernel.Gaussian);
        BandwidthChoice known = BandwidthRules.Automatic(Sample.Of(x), Kernel.Gaussian, new BandwidthOptions { Support = new Interval(0, double.PositiveInfinity) });
        // Half a normal law, reflected, is a normal law of 2n values of which n are independent: the best h is that of n values.
        double best = Math.Pow(4.0 / 3000, 0.2);
        Assert.InRange(known / best, 0.7, 1.4);
        Assert.True(ignored < 0.7 * best);
        double upper = BandwidthRules.Automatic(
            Sample.Of([.. x.Select(v => 5 - v)]), Kernel.Gaussian, new BandwidthOptions { Support = new Interval(double.NegativeInfinity, 5) });
        Near.Relative(known, upper, 1e-6);
    }

    [Fact]
    public void Automatic_TwoLimitsUniform_StopsAtTheLargestBandwidth()
    {
        var stream = new RandomStream(55);
        double[] x = [.. Enumerable.Range(0, 500).Select(_ => stream.NextUniform())];
        BandwidthChoice choice = BandwidthRules.Automatic(Sample.Of(x), Kernel.Gaussian, new BandwidthOptions { Support = new Interval(0, 1) });
        // At most 1.3 sd n^(−1/5): a flat law has no finite best bandwidth.
        double most = 1.3 * Sample.Of(x).StandardDeviation * Math.Pow(500, -0.2);
        Assert.InRange(choice.Value, 0.3 * most, most * (1 + 1e-9));
    }

    [Theory]
    [InlineData(BandwidthRule.Automatic)]
    [InlineData(BandwidthRule.NormalReference)]
    [InlineData(BandwidthRule.OneSidedCrossValidation)]
    [InlineData(BandwidthRule.BlockSpectrum)]
    [InlineData(BandwidthRule.LeastSquaresCrossValidation)]
    public void Choose_CondensedSample_AgreesWithTheValues(BandwidthRule rule)
    {
        double[] x = BandwidthPropertyTests.Mixture(3000);
        double values = BandwidthRules.Choose(rule, Sample.Of(x), Kernel.Gaussian);
        var condensed = CondensedSample.Of(x, new CondensingOptions { CellWidth = 1.0 / 256 });
        BandwidthChoice choice = BandwidthRules.Choose(rule, condensed, Kernel.Gaussian);
        // Cells of 1/256 against h near 0.2: the values move by at most h/100.
        Near.Relative(values, choice, 0.01, rule.ToString());
        Assert.True(double.IsNaN(choice.TiedShare));
        Assert.Contains(choice.Notes, n => n.Contains("cells", StringComparison.Ordinal));
    }

    [Fact]
    public void Automatic_WeightedSample_UsesTheEffectiveCount()
    {
        double[] x = BadInputTests.Normal(1500, 56);
        var stream = new RandomStream(57);
        double[] w = [.. x.Select(_ => Math.Exp(1.27 * stream.NextNormal()))];
        Sample weighted = Sample.Of(x, new SampleOptions { Weights = w });
        BandwidthChoice choice = BandwidthRules.Automatic(weighted, Kernel.Gaussian);
        Near.Relative(weighted.EffectiveCount, choice.EffectiveCount, 1e-12);
        // The normal optimum at the effective count, (4/(3n))^(1/5); a rule that believed in 1,500 equal values would fall far below.
        Assert.InRange(choice / Math.Pow(4 / (3 * weighted.EffectiveCount), 0.2), 0.6, 1.4);
    }

    [Fact]
    public void Objective_OnRequest_IsTheCriterionOverBandwidths()
    {
        Sample sample = Sample.Of(BandwidthPropertyTests.Mixture(200));
        Assert.Null(BandwidthRules.SheatherJones(sample, Kernel.Gaussian).Objective);
        BandwidthChoice choice = BandwidthRules.LeastSquaresCrossValidation(sample, Kernel.Gaussian, new BandwidthOptions { KeepObjective = true });
        Assert.NotNull(choice.Objective);
        int least = choice.Objective.Y.Index().Where(p => choice.Objective.X[p.Index] > choice.Value / 2).MinBy(p => p.Item).Index;
        Assert.InRange(choice.Objective.X[least] / choice.Value, 0.9, 1.1);
    }

    // On the reflected sample the fixed point is the only candidate: where rounding stops its search, it stops there and is not replaced.
    [Fact]
    public void Automatic_RoundedWithALimit_StopsAtTheFloor()
    {
        double[] values = [.. SeededColumns.Draw("exponential", 3000, 12).Select(x => Math.Round(2 * x) / 2)];
        BandwidthChoice choice = BandwidthRules.Automatic(Sample.Of(values), Kernel.Gaussian, new BandwidthOptions { Support = new Smoothing.Numerics.Interval(0, double.PositiveInfinity) });
        Assert.Equal(BandwidthStatus.RoundingFloor, choice.Status);
        Assert.Equal(choice.Floor, choice.Value, 1e-12);
        Assert.Equal(BandwidthRule.DiffusionFixedPoint, choice.ReplacedBy);
    }
}
