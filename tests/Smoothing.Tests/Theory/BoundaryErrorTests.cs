using MathNet.Numerics.Distributions;
using Smoothing.Kernels;
using Smoothing.Tests.Support;
using Smoothing.Theory;

namespace Smoothing.Tests.Theory;

/// <summary>Bias and variance near a known limit against integrals by the tests' own code.</summary>
public class BoundaryErrorTests
{
    private static readonly BoundaryCorrection[] s_linear = [BoundaryCorrection.None, BoundaryCorrection.Renormalised, BoundaryCorrection.Reflection, BoundaryCorrection.LinearKernel];

    public static TheoryData<BoundaryCorrection, string> Cases => new(from c in s_linear from k in new[] { "Gaussian", "Epanechnikov", "Biweight", "Laplace" } select (c, k));

    [Theory]
    [MemberData(nameof(Cases))]
    public void BoundaryErrors_ExponentialFromOne_AreTheDirectIntegrals(BoundaryCorrection correction, string name)
    {
        Kernel kernel = Kernel.Standard.Single(k => k.Name == name);
        var theory = new ErrorTheory(kernel, TargetDensity.From(new Exponential(2)).Shifted(1));
        double F(double x) => x < 1 ? 0 : 2 * Math.Exp(-2 * (x - 1));
        double radius = double.IsFinite(kernel.SupportRadius) ? kernel.SupportRadius : 40;
        foreach (double c in new[] { 0, 0.3, 0.8, 1.7 })
        {
            foreach (double h in new[] { 0.05, 0.4, 2 })
            {
                // The weights as Jones (1993) writes them, their moments integrated here.
                double Moment(int l) => OwnIntegral.Of(u => Math.Pow(u, l) * kernel.Value(u), -radius, Math.Min(c, radius), [0, -1, -3, -8]);
                (double a0, double a1, double a2) = (Moment(0), Moment(1), Moment(2));
                double Weight(double u) => correction switch
                {
                    BoundaryCorrection.Renormalised => kernel.Value(u) / a0,
                    BoundaryCorrection.Reflection => kernel.Value(u) + kernel.Value((2 * c) - u),
                    BoundaryCorrection.LinearKernel => (a2 - (a1 * u)) / ((a0 * a2) - (a1 * a1)) * kernel.Value(u),
                    _ => kernel.Value(u),
                };
                double x = 1 + (c * h);
                double[] cuts = [0, -1, -3, -8, (2 * c) - radius, c - (1 / h), c - (5 / h)];
                double mean = OwnIntegral.Of(u => Weight(u) * F(x - (h * u)), -radius, Math.Min(c, radius), cuts);
                double square = OwnIntegral.Of(u => Weight(u) * Weight(u) * F(x - (h * u)), -radius, Math.Min(c, radius), cuts);
                string what = FormattableString.Invariant($"{correction}, {name}, c = {c}, h = {h}");
                Near.Absolute(mean - F(x), theory.BoundaryBias(correction, c, h), 1e-12, "bias " + what);
                Near.Relative(((square / h) - (mean * mean)) / 50, theory.BoundaryVariance(correction, c, h, 50), 1e-10, "variance " + what);
                double plain = OwnIntegral.Of(u => Weight(u) * Weight(u), -radius, Math.Min(c, radius), cuts);
                Near.Relative(F(x) * plain / (50 * h), theory.AsymptoticBoundaryVariance(correction, c, h, 50), 1e-10, "asymptotic variance " + what);
            }
        }
    }

    [Theory]
    [MemberData(nameof(Cases))]
    public void AsymptoticBoundaryBias_HalvedBandwidth_LeavesARemainderOfOrderThree(BoundaryCorrection correction, string name)
    {
        // All terms up to h² are in the formula, so the rest falls by 8 when h halves (u³ has no zero moment near a limit).
        Kernel kernel = Kernel.Standard.Single(k => k.Name == name);
        var theory = new ErrorTheory(kernel, TargetDensity.From(new Exponential(1)));
        double Rest(double h) => Math.Abs(theory.BoundaryBias(correction, 0.4, h) - theory.AsymptoticBoundaryBias(correction, 0.4, h));
        double start = 0.02 / Math.Sqrt(kernel.Moment(2));
        Near.Absolute(3, Math.Log2(Rest(start) / Rest(start / 2)), 0.1, name);
    }

    [Fact]
    public void BoundaryBias_TinyBandwidth_KeepsItsDigits()
    {
        // Linear kernel at the limit itself: the bias is h² b₂ f''/2 (1 + O(h)), b₂ = (a₂² − a₁a₃)/(a₀a₂ − a₁²); Epanechnikov: a₀ = 1/2, a₁ = −3/16, a₂ = 1/10, a₃ = −1/16.
        double b2 = ((1 / 100.0) - (3 / 256.0)) / ((1 / 20.0) - (9 / 256.0));
        var theory = new ErrorTheory(Kernel.Epanechnikov, TargetDensity.From(new Exponential(1)));
        Near.Relative(b2 / 2 * 1e-14, theory.BoundaryBias(BoundaryCorrection.LinearKernel, 0, 1e-7), 1e-6);
        Near.Relative(b2 / 2 * 1e-200, theory.BoundaryBias(BoundaryCorrection.LinearKernel, 0, 1e-100), 1e-12);

        // Without correction half the mass is lost at the limit, with renormalisation the slope enters with a₁/a₀ = −3/8.
        Near.Relative(-0.5, theory.BoundaryBias(BoundaryCorrection.None, 0, 1e-9), 1e-8);
        Near.Relative(-3 / 8.0 * 1e-9, theory.BoundaryBias(BoundaryCorrection.Renormalised, 0, 1e-9), 1e-8);
    }

    [Fact]
    public void BoundaryErrors_FarFromTheLimit_AreThePlainOnes()
    {
        var theory = new ErrorTheory(Kernel.Epanechnikov, TargetDensity.From(new Gamma(3, 1)));
        foreach (BoundaryCorrection correction in s_linear)
        {
            Near.Relative(theory.Bias(1.5, 0.5), theory.BoundaryBias(correction, 3, 0.5), 1e-10, correction.ToString());
            Near.Relative(theory.Variance(1.5, 0.5, 20), theory.BoundaryVariance(correction, 3, 0.5, 20), 1e-10, correction.ToString());
            Near.Relative(theory.AsymptoticBias(1.5, 0.5), theory.AsymptoticBoundaryBias(correction, 3, 0.5), 1e-12, correction.ToString());
        }
    }

    [Fact]
    public void BoundaryErrors_BadInput_SayWhatIsMissing()
    {
        var theory = new ErrorTheory(Kernel.Epanechnikov, TargetDensity.From(new Exponential(1)));
        Assert.Contains("not linear", Assert.Throws<ArgumentException>(() => theory.BoundaryBias(BoundaryCorrection.LogScale, 0, 1)).Message, StringComparison.Ordinal);
        Assert.Contains("distance from the limit", Assert.Throws<ArgumentOutOfRangeException>(() => theory.BoundaryBias(BoundaryCorrection.None, -0.1, 1)).Message, StringComparison.Ordinal);
        Assert.Throws<ArgumentOutOfRangeException>(() => theory.BoundaryVariance(BoundaryCorrection.None, double.NaN, 1, 10));
        Assert.Throws<ArgumentOutOfRangeException>(() => theory.BoundaryVariance(BoundaryCorrection.None, 0, 1, 0));
        Assert.Contains("finite lower end", Assert.Throws<InvalidOperationException>(() => new ErrorTheory(Kernel.Gaussian, NormalMixture.Normal()).BoundaryBias(BoundaryCorrection.None, 0, 1)).Message, StringComparison.Ordinal);
        Assert.Contains("order 2", Assert.Throws<ArgumentException>(() => new ErrorTheory(Kernel.GaussianOfOrder(4), TargetDensity.From(new Exponential(1))).BoundaryBias(BoundaryCorrection.LinearKernel, 0, 1)).Message, StringComparison.Ordinal);
    }
}
