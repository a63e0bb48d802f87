using Smoothing.Bandwidths;
using Smoothing.Kernels;
using Smoothing.Samples;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Bandwidths;

/// <summary>The numbers inside the rules, derived again from their definitions.</summary>
public class RuleConstantTests
{
    [Fact]
    public void SheatherJones_Constants_RoundToThePublishedFigures()
    {
        // a = {−2φ⁗(0) …}: pilots that are best for a normal law, from R(φ^(s)) by plain integration and φ⁗(0) = 3φ(0), φ⁽⁶⁾(0) = −15φ(0).
        double phi0 = 1 / Math.Sqrt(2 * Math.PI);
        double third = Integral(u => Square(((3 * u) - (u * u * u)) * Phi(u)));
        double fourth = Integral(u => Square(((u * u * u * u) - (6 * u * u) + 3) * Phi(u)));
        double a = Math.Pow(2 * 3 * phi0 / third, 1.0 / 7), b = Math.Pow(2 * 15 * phi0 / fourth, 1.0 / 9);
        Near.Relative(a, SheatherJonesRule.Exact.A, 1e-8);
        Near.Relative(b, SheatherJonesRule.Exact.B, 1e-8);
        const double Quartiles = 1.3489795003921634;
        // Sheather & Jones (1991): 1.357, 0.920, 0.912, remembered and recomputed.
        Assert.Equal(0.920, Math.Round(a / Quartiles, 3));
        Assert.Equal(0.912, Math.Round(b / Quartiles, 3));
        // α₂ = c {S/T}^(1/7) h^(5/7): h⁵ = R(φ)/(n S) put into the best pilot {6φ(0)/(n T)}^(1/7).
        double c = Math.Pow(6 * phi0 * 2 * Math.Sqrt(Math.PI), 1.0 / 7);
        Near.Relative(c, SheatherJonesRule.Exact.C, 1e-12);
        Assert.Equal(1.357, Math.Round(c, 3));
    }

    [Fact]
    public void OneSidedKernel_MomentsAndFactor_AgreeWithIntegration()
    {
        double s1 = 1 / Math.Sqrt(2 * Math.PI), determinant = 0.25 - (s1 * s1);
        double L(double u) => u < 0 ? 0 : Phi(u) * (0.5 - (s1 * u)) / determinant;
        Near.Absolute(1, HalfIntegral(L), 1e-9);
        Near.Absolute(0, HalfIntegral(u => u * L(u)), 1e-9);
        double second = HalfIntegral(u => u * u * L(u)), roughness = HalfIntegral(u => Square(L(u)));
        Near.Relative(second, OneSidedKernel.SecondMoment, 1e-8);
        Near.Relative(roughness, OneSidedKernel.Roughness, 1e-8);
        Near.Relative(Math.Pow(second * second / (2 * Math.Sqrt(Math.PI)) / roughness, 0.2), OneSidedKernel.Factor, 1e-8);
        foreach (double w in new[] { 0, 0.3, 1.7, 6.2, 28, 33 })
        {
            (double re, double im) = OneSidedKernel.Transform(w);
            Near.Absolute(HalfIntegral(u => L(u) * Math.Cos(w * u)), re, 1e-7, $"w = {w}");
            Near.Absolute(HalfIntegral(u => L(u) * Math.Sin(w * u)), im, 1e-7, $"w = {w}");
        }
    }

    [Fact]
    public void ForDistribution_Gaussian_HasSpreadOneOverRootPi()
    {
        double gaussian = Integral(u => 2 * u * Phi(u) * Kernel.Gaussian.Cumulative(u));
        Near.Relative(gaussian, DistributionRule.Spread(Kernel.Gaussian), 1e-8);
        // 2∫uKW for Epanechnikov by its polynomials is 9/35.
        Near.Relative(9.0 / 35, DistributionRule.Spread(Kernel.Epanechnikov), 1e-10);
    }

    [Fact]
    public void ForDistribution_LargeNormalSample_ApproachesTheBestBandwidth()
    {
        // h = {1/(√π n ∫f′²)}^(1/3) with ∫f′² = 1/(4√π): (4/n)^(1/3) for a standard normal law (Polansky & Baker 2000 with the true functional).
        const int N = 20000;
        BandwidthChoice choice = BandwidthRules.ForDistribution(Sample.Of(BadInputTests.Normal(N, 31)), Kernel.Gaussian);
        // The plug-in's relative error is of order n^(−2/5)…n^(−1/2): 3 % covers four standard errors here.
        Near.Relative(Math.Pow(4.0 / N, 1.0 / 3), choice, 0.03);
    }

    [Theory]
    [InlineData(BandwidthRule.SheatherJones, 0.05)]
    [InlineData(BandwidthRule.DirectPlugIn, 0.05)]
    [InlineData(BandwidthRule.DiffusionFixedPoint, 0.12)]
    [InlineData(BandwidthRule.Automatic, 0.12)]
    [InlineData(BandwidthRule.OneSidedCrossValidation, 0.15)]
    [InlineData(BandwidthRule.BlockSpectrum, 0.2)]
    public void Choose_LargeNormalSamples_ApproachTheNormalOptimum(BandwidthRule rule, double tolerance)
    {
        // (4/3)^(1/5) n^(−1/5), Wand & Jones (1995) sec. 3.2; the geometric mean over eight samples, tolerance about four standard errors plus the exact-error shift.
        const int N = 20000;
        double sum = 0;
        for (ulong seed = 41; seed < 49; seed++)
        {
            sum += Math.Log(BandwidthRules.Choose(rule, Sample.Of(BadInputTests.Normal(N, seed)), Kernel.Gaussian)) / 8;
        }

        Near.Relative(Math.Pow(4.0 / (3 * N), 0.2), Math.Exp(sum), tolerance, rule.ToString());
    }

    [Fact]
    public void SharpBandwidth_LargeNormalSamples_ApproachTheNormalOptimum()
    {
        // 1.0834 n^(−1/9) for the fourth-order Gaussian-based kernel (Wand & Schucany 1990, recomputed); geometric mean of eight samples, four standard errors.
        const int N = 20000;
        double sum = 0;
        for (ulong seed = 61; seed < 69; seed++)
        {
            sum += Math.Log(RuleDispatch.SharpBandwidth(SelectionInput.Of(Sample.Of(BadInputTests.Normal(N, seed)), null))) / 8;
        }

        Near.Relative(1.0834457275896205 * Math.Pow(N, -1.0 / 9), Math.Exp(sum), 0.2);
    }

    private static double Phi(double u) => Math.Exp(-0.5 * u * u) / Math.Sqrt(2 * Math.PI);

    private static double Square(double v) => v * v;

    // Simpson's rule on 0 … 12.
    private static double HalfIntegral(Func<double, double> f)
    {
        const int Steps = 24000;
        double h = 12.0 / Steps, sum = f(0) + f(12);
        for (int i = 1; i < Steps; i++)
        {
            sum += (i % 2 == 1 ? 4 : 2) * f(i * h);
        }

        return sum * h / 3;
    }

    private static double Integral(Func<double, double> f) => HalfIntegral(f) + HalfIntegral(u => f(-u));
}
