using MathNet.Numerics.Distributions;
using Smoothing.Kernels;
using Smoothing.Tests.Support;
using Smoothing.Theory;

namespace Smoothing.Tests.Theory;

/// <summary>The smallest n is exact: it is enough and n − 1 is not, by formulas and a search that are the tests' own.</summary>
public class PlanningTests
{
    private static readonly NormalMixture s_groups = NormalMixture.MarronWand[5]; // ½N(−1, (2/3)²) + ½N(1, (2/3)²)

    [Theory]
    [InlineData(0, 0.3)]
    [InlineData(0, 0.1)]
    [InlineData(1, 0.1)]
    [InlineData(2.5, 0.25)]
    [InlineData(0, 0.02)]
    public void SampleSizeFor_TwoGroups_IsEnoughAndOneLessIsNot(double x, double relative)
    {
        long n = new ErrorTheory(Kernel.Gaussian, s_groups).SampleSizeFor(x, relative);
        double Least(long count) => Math.Sqrt(Smallest(h => SquaredError(x, h, count), 1e-3, 20 * s_groups.StandardDeviation)) / Value(x, 0);
        Assert.True(Least(n) <= relative * (1 + 1e-12), FormattableString.Invariant($"{n} gives {Least(n)}"));
        Assert.True(Least(n - 1) > relative, FormattableString.Invariant($"{n - 1} gives {Least(n - 1)}"));
    }

    [Theory]
    [InlineData(0, 0.1)]
    [InlineData(2.5, 0.25)]
    public void SampleSizeFor_LargestBandwidth_KeepsTheAccidentOut(double x, double relative)
    {
        // In a valley or tail some large h is right by accident; below 0.5 there is none, and more observations are needed.
        var theory = new ErrorTheory(Kernel.Gaussian, s_groups);
        long n = theory.SampleSizeFor(x, relative, 0.5);
        Assert.True(n > 2 * theory.SampleSizeFor(x, relative));
        double Least(long count) => Math.Sqrt(Smallest(h => SquaredError(x, h, count), 1e-3, 0.5)) / Value(x, 0);
        Assert.True(Least(n) <= relative * (1 + 1e-12));
        Assert.True(Least(n - 1) > relative);
        Assert.Equal(0.3, theory.OptimalBandwidthAt(x, 1, 0.3));
        Assert.Throws<ArgumentOutOfRangeException>(() => theory.SampleSizeFor(x, relative, 0));
    }

    [Fact]
    public void SampleSizeForMise_Normal_IsEnoughAndOneLessIsNot()
    {
        // Fryer's (1976) formula, minimised here.
        double Fryer(double h, long n) => ((1 / (n * h)) + ((1 - (1.0 / n)) / Math.Sqrt(1 + (h * h))) + 1 - (2 * Math.Sqrt(2) / Math.Sqrt(2 + (h * h)))) / (2 * Math.Sqrt(Math.PI));
        var theory = new ErrorTheory(Kernel.Gaussian, NormalMixture.Normal());
        foreach (double wanted in new[] { 0.05, 0.004, 1e-4 })
        {
            long n = theory.SampleSizeForMise(wanted);
            Assert.True(Smallest(h => Fryer(h, n)) <= wanted);
            Assert.True(Smallest(h => Fryer(h, n - 1)) > wanted);
        }
    }

    [Theory]
    [InlineData(0.02, 0.95)]
    [InlineData(0.005, 0.8)]
    [InlineData(0.0001, 0.99)]
    public void SampleSizeForHalfWidth_TwoGroups_IsEnoughAndOneLessIsNot(double wanted, double level)
    {
        const double H = 0.3;
        long n = new ErrorTheory(Kernel.Gaussian, s_groups).SampleSizeForHalfWidth(1, H, wanted, level);
        double z = Normal.InvCDF(0, 1, (1 + level) / 2); // MathNet's quantile
        double HalfWidth(long count) => z * Math.Sqrt((SquaredError(1, H, count) - Math.Pow(Value(1, H * H) - Value(1, 0), 2)));
        Assert.True(HalfWidth(n) <= wanted * (1 + 1e-12));
        Assert.True(HalfWidth(n - 1) > wanted);
    }

    [Fact]
    public void SampleSizeFor_AnyKernelOnASkewedTarget_AgreesWithItsOwnError()
    {
        var theory = new ErrorTheory(Kernel.Epanechnikov, TargetDensity.From(new Gamma(3, 1)));
        long n = theory.SampleSizeFor(2, 0.1);
        double wanted = 0.1 * 2 * Math.Exp(-2); // f(2) = 2²e⁻²/2
        double Least(long count) => Math.Sqrt(Smallest(h => theory.MeanSquaredError(2, h, count), 0.3, 6, 40));
        Assert.True(Least(n) <= wanted * (1 + 1e-9));
        Assert.True(Least(n - 1) > wanted);
    }

    [Fact]
    public void SampleSizeFor_FarOutWhereOneObservationHasNoBestBandwidth_StillAnswers()
    {
        // At 6 standard deviations the MSE of a few observations falls for ever; such n are not enough, and the search goes on.
        long n = new ErrorTheory(Kernel.Gaussian, NormalMixture.Normal()).SampleSizeFor(6, 0.2);
        Assert.True(n > 1_000_000, FormattableString.Invariant($"{n}"));
        Assert.Throws<InvalidOperationException>(() => new ErrorTheory(Kernel.Gaussian, NormalMixture.Normal()).OptimalBandwidthAt(40, 2));
    }

    [Fact]
    public void Planning_BadInput_SaysWhatIsWrong()
    {
        var theory = new ErrorTheory(Kernel.Gaussian, s_groups);
        Assert.Contains("is 0 there", Assert.Throws<InvalidOperationException>(() => theory.SampleSizeFor(1000, 0.1)).Message, StringComparison.Ordinal);
        Assert.Contains("10¹⁵", Assert.Throws<InvalidOperationException>(() => theory.SampleSizeFor(0, 1e-9)).Message, StringComparison.Ordinal);
        Assert.Contains("10¹⁵", Assert.Throws<InvalidOperationException>(() => theory.SampleSizeForMise(1e-30)).Message, StringComparison.Ordinal);
        Assert.Throws<ArgumentOutOfRangeException>(() => theory.SampleSizeFor(0, 0));
        Assert.Throws<ArgumentOutOfRangeException>(() => theory.SampleSizeFor(double.NaN, 0.1));
        Assert.Throws<ArgumentOutOfRangeException>(() => theory.SampleSizeForMise(double.NaN));
        Assert.Throws<ArgumentOutOfRangeException>(() => theory.SampleSizeForHalfWidth(0, 0.3, -1));
        Assert.Throws<ArgumentOutOfRangeException>(() => theory.SampleSizeForHalfWidth(0, 0.3, 0.1, 95));
    }

    /// <summary>f with all variances larger by t.</summary>
    private static double Value(double x, double t)
    {
        double v = (4 / 9.0) + t;
        double Bell(double d) => Math.Exp(-d * d / (2 * v)) / Math.Sqrt(2 * Math.PI * v);
        return (Bell(x + 1) + Bell(x - 1)) / 2;
    }

    // E f̂ = f with variances + h²; E f̂² in one term = f with variances + h²/2 over 2√π h.
    private static double SquaredError(double x, double h, long n)
    {
        double mean = Value(x, h * h);
        double bias = mean - Value(x, 0);
        return (bias * bias) + (((Value(x, h * h / 2) / (2 * Math.Sqrt(Math.PI) * h)) - (mean * mean)) / n);
    }

    /// <summary>Least value over h: a dense grid, then thirds about its best point.</summary>
    private static double Smallest(Func<double, double> f, double from = 1e-3, double to = 12, int points = 2000)
    {
        double step = Math.Pow(to / from, 1.0 / points);
        double best = Enumerable.Range(0, points + 1).Select(i => from * Math.Pow(step, i)).MinBy(f);
        (double low, double high) = (best / step, Math.Min(to, best * step));
        for (int i = 0; i < 80; i++)
        {
            double a = low + ((high - low) / 3);
            double b = high - ((high - low) / 3);
            (low, high) = f(a) < f(b) ? (low, b) : (a, high);
        }

        return Math.Min(f(to), f((low + high) / 2));
    }
}
