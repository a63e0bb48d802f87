using FsCheck.Xunit;
using MathNet.Numerics.Distributions;
using Smoothing.Kernels;
using Smoothing.Tests.Support;
using Smoothing.Theory;

namespace Smoothing.Tests.Theory;

/// <summary>Errors follow the unit and the origin of the values; minimisers are the lowest points of dense grids.</summary>
public class EquivarianceTests
{
    [Property(MaxTest = 60, Replay = "1976,2101")]
    public void Errors_ScaledAndShiftedMixture_FollowTheUnit(int seed)
    {
        var c = new RandomCase(seed);
        double s = Math.Pow(10, (seed & 7) - 3);
        const double By = 2.5;
        var plain = new ErrorTheory(c.Kernel, c.Target);
        var moved = new ErrorTheory(c.Kernel, c.Target.Scaled(s).Shifted(By));
        double x = (s * c.X) + By;
        double h = s * c.H;
        double room = 1e-9 + (1e-14 * Math.Abs(By) / (s * c.Deviations.Min())); // shifting rounds the means
        double top = c.Means.Max(c.F);
        Near.Absolute(plain.Bias(c.X, c.H), moved.Bias(x, h) * s, room * Math.Abs(plain.Bias(c.X, c.H)) + (room * top), "bias " + c);
        Near.Relative(plain.MeanSquaredError(c.X, c.H, c.N), moved.MeanSquaredError(x, h, c.N) * s * s, 1e-8 + (100 * room), "MSE " + c);
        Near.Relative(plain.Mise(c.H, c.N), moved.Mise(h, c.N) * s, 1e-8 + room, "MISE " + c);
        Near.Relative(plain.AsymptoticOptimalBandwidth(c.N), moved.AsymptoticOptimalBandwidth(c.N) / s, 1e-8 + room, "h " + c);
        Near.Relative(plain.Amise(c.H, c.N), moved.Amise(h, c.N) * s, 1e-8 + (100 * room), "AMISE " + c);
    }

    [Theory]
    [InlineData(1e-150)]
    [InlineData(1e150)]
    [InlineData(1e-290)]
    [InlineData(1e290)]
    public void Errors_ExtremeUnits_AreTheSame(double s)
    {
        foreach (Kernel kernel in new[] { Kernel.Gaussian, Kernel.Epanechnikov, Kernel.GaussianOfOrder(4) })
        {
            var plain = new ErrorTheory(kernel, NormalMixture.MarronWand[7]);
            var scaled = new ErrorTheory(kernel, NormalMixture.MarronWand[7].Scaled(s));
            Near.Relative(plain.OptimalBandwidth(100), scaled.OptimalBandwidth(100) / s, 1e-9);
            Near.Relative(plain.AsymptoticOptimalBandwidth(100), scaled.AsymptoticOptimalBandwidth(100) / s, 1e-10);
            Near.Relative(plain.OptimalBandwidthAt(0.3, 100), scaled.OptimalBandwidthAt(0.3 * s, 100) / s, 1e-8);
            Near.Relative(plain.Mise(0.3, 100), scaled.Mise(0.3 * s, 100) * s, 1e-10);
            Near.Relative(plain.Bias(0.3, 0.3), scaled.Bias(0.3 * s, 0.3 * s) * s, 1e-10);
            Assert.Equal(plain.SampleSizeFor(0.3, 0.2), scaled.SampleSizeFor(0.3 * s, 0.2));
        }

        var gamma = new ErrorTheory(Kernel.Biweight, TargetDensity.From(new Gamma(4, 1)));
        var far = new ErrorTheory(Kernel.Biweight, TargetDensity.From(new Gamma(4, 1 / s)));
        Near.Relative(gamma.Bias(2, 0.5), far.Bias(2 * s, 0.5 * s) * s, 1e-10);
        Near.Relative(gamma.AsymptoticOptimalBandwidth(50), far.AsymptoticOptimalBandwidth(50) / s, 1e-10);
    }

    [Theory]
    [InlineData(1e-300)]
    [InlineData(1e20)]
    [InlineData(1e150)]
    [InlineData(1e300)]
    public void Errors_HostileBandwidths_ReachTheirLimits(double h)
    {
        TargetDensity[] targets = [NormalMixture.Normal(), TargetDensity.From(new Gamma(3, 1)), TargetDensity.From(new Cauchy(0, 1))];
        foreach (TargetDensity target in targets)
        {
            foreach (Kernel kernel in target is NormalMixture ? [Kernel.Gaussian, Kernel.Epanechnikov, Kernel.GaussianOfOrder(6)] : new[] { Kernel.Epanechnikov })
            {
                var theory = new ErrorTheory(kernel, target);
                double mise = theory.Mise(h, long.MaxValue);
                double variance = theory.Variance(0.5, h, 7);
                Assert.True(double.IsFinite(mise) && double.IsFinite(variance) && variance >= 0 && theory.IntegratedVariance(h, 7) >= 0, FormattableString.Invariant($"{kernel}, {target}: {mise}, {variance}"));
                Near.Absolute(h > 1 ? -target.Value(0.5) : 0, theory.Bias(0.5, h), 1e-15);
                Near.Absolute(h > 1 ? target.Roughness() : 0, theory.IntegratedSquaredBias(h), 1e-11);
                if (h < 1)
                {
                    Near.Relative(target.Value(0.5) * kernel.Roughness() / (7 * h), variance, 1e-10);
                }
            }
        }
    }

    [Property(MaxTest = 12, Replay = "1984,2203")]
    public void OptimalBandwidth_RandomCase_IsTheLowestPointOfADenseGrid(int seed)
    {
        var c = new RandomCase(seed);
        foreach (Kernel kernel in new[] { Kernel.Gaussian, Kernel.GaussianOfOrder(4) })
        {
            var theory = new ErrorTheory(kernel, c.Target);
            double least = theory.Mise(theory.OptimalBandwidth(c.N), c.N);
            double best = theory.AsymptoticOptimalBandwidth(c.N);
            double lowest = theory.Amise(best, c.N);
            for (double h = 1e-3; h < 30; h *= 1.02)
            {
                Assert.True(theory.Mise(h, c.N) >= least * (1 - 1e-12), FormattableString.Invariant($"MISE at {h} is below {least}: {c}"));
                Assert.True(theory.Amise(h, c.N) >= lowest * (1 - 1e-12), FormattableString.Invariant($"AMISE at {h} is below {lowest}: {c}"));
            }
        }
    }

    [Fact]
    public void AsymptoticMinimisers_ClosedForm_AreTheNumericalOnes()
    {
        // Thirds about the closed form; derivative and order enter both.
        foreach ((Kernel kernel, int r) in new[] { (Kernel.Epanechnikov, 0), (Kernel.Gaussian, 2), (Kernel.GaussianOfOrder(6), 0), (Kernel.Biweight, 1) })
        {
            var theory = new ErrorTheory(kernel, NormalMixture.MarronWand[7], r);
            Near.Relative(Thirds(h => theory.Amise(h, 300), theory.AsymptoticOptimalBandwidth(300)), theory.AsymptoticOptimalBandwidth(300), 1e-7);
            Near.Relative(Thirds(h => theory.AsymptoticMeanSquaredError(0.2, h, 300), theory.AsymptoticOptimalBandwidthAt(0.2, 300)), theory.AsymptoticOptimalBandwidthAt(0.2, 300), 1e-7);
        }
    }

    [Fact]
    public void AsymptoticOptimalBandwidthAt_Inflection_DoesNotExistAndTheExactOneDoes()
    {
        foreach (double s in new[] { 1, 0.3, 7e20 })
        {
            var theory = new ErrorTheory(Kernel.Gaussian, NormalMixture.Normal(0, s));
            string message = Assert.Throws<InvalidOperationException>(() => theory.AsymptoticOptimalBandwidthAt(s, 100)).Message;
            Assert.Contains("does not exist", message, StringComparison.Ordinal);
            Assert.Contains("OptimalBandwidthAt", message, StringComparison.Ordinal);
            double h = theory.OptimalBandwidthAt(s, 100);
            double least = theory.MeanSquaredError(s, h, 100);
            Assert.True(theory.MeanSquaredError(s, 0.99 * h, 100) > least && theory.MeanSquaredError(s, 1.01 * h, 100) > least);
        }
    }

    [Fact]
    public void OptimalBandwidth_KernelInAnotherUnit_IsFound()
    {
        // The Gaussian written with standard deviation 1000: the same curve needs a bandwidth 1000 times smaller.
        Kernel wide = Kernel.FromShape("wide", u => Math.Exp(-u * u / 2e6) / (1000 * Math.Sqrt(2 * Math.PI)), 40_000);
        double expected = new ErrorTheory(Kernel.Gaussian, NormalMixture.Normal()).OptimalBandwidth(100);
        Near.Relative(expected / 1000, new ErrorTheory(wide, NormalMixture.Normal()).OptimalBandwidth(100), 1e-7);
    }

    [Fact]
    public void Targets_MovedInEitherOrder_AgreeWithTheFormula()
    {
        TargetDensity target = TargetDensity.Mixture([0.3, 0.7], [TargetDensity.From(new Gamma(3, 1)), NormalMixture.Normal(-1, 0.5)]);
        TargetDensity moved = target.Scaled(4).Shifted(-10);
        foreach (double x in new[] { -1.2, 0.4, 2.5 })
        {
            Near.Relative(target.Value(x) / 4, moved.Value((4 * x) - 10), 1e-13);
            Near.Relative(target.Derivative(x, 2) / 64, moved.Derivative((4 * x) - 10, 2), 1e-12);
            Near.Relative(target.Cumulative(x), moved.Cumulative((4 * x) - 10), 1e-13);
        }

        Near.Relative(target.Roughness(1) / 64, moved.Roughness(1), 1e-10);
        Near.Absolute((4 * target.Quantile(0.3)) - 10, moved.Quantile(0.3), 1e-11);
        Assert.IsType<NormalMixture>(TargetDensity.Mixture([0.5, 0.5], [NormalMixture.MarronWand[3], NormalMixture.Normal().Scaled(2).Shifted(1)]));
    }

    private static double Thirds(Func<double, double> f, double about)
    {
        (double low, double high) = (about / 2, about * 2);
        for (int i = 0; i < 90; i++)
        {
            double a = low + ((high - low) / 3);
            double b = high - ((high - low) / 3);
            (low, high) = f(a) < f(b) ? (low, b) : (a, high);
        }

        return (low + high) / 2;
    }
}
