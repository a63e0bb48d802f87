using Smoothing.Bandwidths;
using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Tests.Bandwidths;

/// <summary>Every rule on data that no rule was made for: a finite bandwidth above zero and an honest status, or a clear error. Cases invented here.</summary>
public class BadInputTests
{
    public static TheoryData<BandwidthRule> Rules => [.. Enum.GetValues<BandwidthRule>()];

    [Theory]
    [MemberData(nameof(Rules))]
    public void Choose_HardData_GivesFiniteBandwidth(BandwidthRule rule)
    {
        foreach ((string name, Sample sample) in HardCases())
        {
            BandwidthChoice choice = BandwidthRules.Choose(rule, sample, Kernel.Gaussian);
            Assert.True(choice.Value > 0 && double.IsFinite(choice.Value), $"{rule} on {name}: {choice}");
            Assert.True(choice.Value >= choice.Floor, $"{rule} on {name}: {choice} below its floor");
            Assert.True(double.IsFinite(choice.Scale) && choice.Scale > 0, $"{rule} on {name}: scale {choice.Scale}");
        }
    }

    [Theory]
    [MemberData(nameof(Rules))]
    public void Choose_AllEqual_SaysThatNoRuleCan(BandwidthRule rule)
    {
        ArgumentException error = Assert.Throws<ArgumentException>(() => BandwidthRules.Choose(rule, Sample.Of([3.0, 3.0, 3.0]), Kernel.Gaussian));
        Assert.Contains("pass one as a number", error.Message, StringComparison.Ordinal);
        Assert.Contains("3", error.Message, StringComparison.Ordinal);
        Assert.Throws<ArgumentException>(() => BandwidthRules.Choose(rule, Sample.Of([7.0]), Kernel.Gaussian));
    }

    [Fact]
    public void Choose_AllWeightOnOneValue_IsRefused()
    {
        Sample sample = Sample.Of([1.0, 2.0, 3.0], new SampleOptions { Weights = new double[] { 0, 1, 0 } });
        Assert.Throws<ArgumentException>(() => BandwidthRules.Automatic(sample, Kernel.Gaussian));
    }

    [Fact]
    public void Automatic_OneFarOutlier_IgnoresIt()
    {
        double[] x = Normal(400, 5);
        double without = BandwidthRules.Automatic(Sample.Of(x), Kernel.Gaussian);
        double with = BandwidthRules.Automatic(Sample.Of([.. x, 1e12]), Kernel.Gaussian);
        Assert.InRange(with / without, 0.9, 1.1);
    }

    [Fact]
    public void Choose_ValueOutsideSupport_NamesIt()
    {
        ArgumentException error = Assert.Throws<ArgumentException>(
            () => BandwidthRules.Automatic(Sample.Of([1.0, 2.0, -0.5]), Kernel.Gaussian, new BandwidthOptions { Support = new Interval(0, double.PositiveInfinity) }));
        Assert.Contains("-0.5", error.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void NameOf_EveryRule_IsANameOfItsOwn()
    {
        string[] names = [.. Enum.GetValues<BandwidthRule>().Select(BandwidthRules.NameOf)];
        Assert.Equal(names.Length, names.Distinct().Count());
        Assert.Throws<ArgumentOutOfRangeException>(() => BandwidthRules.NameOf((BandwidthRule)99));
    }

    [Fact]
    public void Choose_BadOptions_AreNamed()
    {
        Sample sample = Sample.Of([1.0, 2.0, 3.0]);
        Assert.Throws<ArgumentOutOfRangeException>(() => BandwidthRules.Automatic(sample, Kernel.Gaussian, new BandwidthOptions { RoundingUnit = double.NaN }));
        Assert.Throws<ArgumentOutOfRangeException>(() => BandwidthRules.Automatic(sample, Kernel.Gaussian, new BandwidthOptions { LargestBandwidth = double.NaN }));
        Assert.Throws<ArgumentOutOfRangeException>(() => BandwidthRules.Automatic(sample, Kernel.Gaussian, new BandwidthOptions { SmallestBandwidth = -1 }));
        Assert.Throws<ArgumentException>(() => BandwidthRules.Automatic(sample, Kernel.Gaussian, new BandwidthOptions { SmallestBandwidth = 2, LargestBandwidth = 1 }));
        Assert.Throws<ArgumentOutOfRangeException>(() => BandwidthRules.Automatic(sample, Kernel.Gaussian, new BandwidthOptions { Derivative = 9 }));
        Assert.Throws<ArgumentOutOfRangeException>(() => BandwidthRules.Choose((BandwidthRule)99, sample, Kernel.Gaussian));
        Assert.Throws<ArgumentNullException>(() => BandwidthRules.Automatic((Sample)null!, Kernel.Gaussian));
        Assert.Throws<ArgumentNullException>(() => BandwidthRules.Automatic(sample, null!));
    }

    internal static double[] Normal(int n, ulong seed)
    {
        var stream = new RandomStream(seed);
        var x = new double[n];
        for (int i = 0; i < n; i++)
        {
            x[i] = stream.NextNormal();
        }

        return x;
    }

    private static IEnumerable<(string Name, Sample Sample)> HardCases()
    {
        double[] normal = Normal(200, 1);
        yield return ("two values", Sample.Of([1.0, 2.0]));
        yield return ("three values", Sample.Of([1.0, 2.0, 4.0]));
        yield return ("clusters 1e9 apart", Sample.Of([.. normal, .. normal.Select(v => v + 1e9)]));
        yield return ("outlier 1e12", Sample.Of([.. normal, 1e12]));
        var stream = new RandomStream(2);
        yield return ("Cauchy", Sample.Of([.. Enumerable.Range(0, 500).Select(_ => Math.Tan(Math.PI * (stream.NextUniform() - 0.5)))]));
        yield return ("two values only", Sample.Of([.. Enumerable.Range(0, 100).Select(i => (double)(i % 2))]));
        yield return ("constant but one", Sample.Of([.. Enumerable.Repeat(5.0, 99), 6.0]));
        yield return ("no IQR", Sample.Of([.. Enumerable.Repeat(0.0, 80), .. normal[..20]]));
        yield return ("weight on one value", Sample.Of([1.0, 2.0, 3.0], new SampleOptions { Weights = new[] { 1e-9, 1, 1e-9 } }));
        yield return ("tiny unit", Sample.Of([.. normal.Select(v => v * 1e-200)]));
        yield return ("huge unit", Sample.Of([.. normal.Select(v => v * 1e200)]));
        yield return ("rounded", Sample.Of([.. normal.Select(v => Math.Round(v))]));
    }
}
