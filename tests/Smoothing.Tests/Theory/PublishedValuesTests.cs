using Smoothing.Kernels;
using Smoothing.Tests.Support;
using Smoothing.Theory;

namespace Smoothing.Tests.Theory;

/// <summary>Values printed in the literature, each with its source.</summary>
public class PublishedValuesTests
{
    private static readonly NormalMixture s_normal = NormalMixture.Normal();

    [Fact]
    public void SampleSizeFor_NormalAtItsCentre_IsSilvermansFour()
    {
        // Silverman (1986), Table 4.2, d = 1: relative MSE below 0.1 at the centre takes 4 observations.
        var theory = new ErrorTheory(Kernel.Gaussian, s_normal);
        Assert.Equal(4, theory.SampleSizeFor(0, Math.Sqrt(0.1)));

        // The best h at 4 as a root in 40-digit decimal arithmetic; the relative MSE at 4 and at 3 by an independent program.
        double f2 = s_normal.Value(0) * s_normal.Value(0);
        Near.Relative(0.78134114523893517301, theory.OptimalBandwidthAt(0, 4), 1e-12);
        Near.Relative(0.08774974737899643, theory.MeanSquaredError(0, theory.OptimalBandwidthAt(0, 4), 4) / f2, 1e-12);
        Near.Relative(0.10068276471785795, theory.MeanSquaredError(0, theory.OptimalBandwidthAt(0, 3), 3) / f2, 1e-12);
    }

    [Theory]
    [InlineData(10)]
    [InlineData(100)]
    [InlineData(100_000)]
    public void Mise_NormalTargetGaussianKernel_IsFryersFormula(long n)
    {
        // Fryer (1976): MISE = (1/(2√π)) {1/(nh) + (1 − 1/n)(1 + h²)^(−1/2) + 1 − 2^(3/2) (2 + h²)^(−1/2)}, evaluated in decimal arithmetic.
        var theory = new ErrorTheory(Kernel.Gaussian, s_normal);
        foreach (double h in new[] { 0.001, 0.05, 0.2, 0.45, 1, 3, 20 })
        {
            Near.Relative(Fryer(h, n), theory.Mise(h, n), 1e-14, FormattableString.Invariant($"h = {h}"));
        }
    }

    [Fact]
    public void AsymptoticOptimalBandwidth_NormalTarget_HasThePublishedFactors()
    {
        // Orders 2 to 8 at derivative 0: Wand & Schucany (1990) kernels; derivatives 0 to 3 at order 2: σ {4/((2r + 3)n)}^(1/(2r + 5)), Wand & Jones (1995), sec. 2.12.
        double[] orders = [1.0592238410488122533, 1.0834457275896205194, 1.0767369385249101407, 1.0685255097491877784];
        for (int i = 0; i < orders.Length; i++)
        {
            int k = 2 * (i + 1);
            var theory = new ErrorTheory(Kernel.GaussianOfOrder(k), NormalMixture.Normal(5, 3));
            Near.Relative(orders[i] * 3 * Math.Pow(1000, -1.0 / ((2 * k) + 1)), theory.AsymptoticOptimalBandwidth(1000), 1e-13, FormattableString.Invariant($"order {k}"));
        }

        for (int r = 0; r <= 3; r++)
        {
            var theory = new ErrorTheory(Kernel.Gaussian, NormalMixture.Normal(5, 3), r);
            Near.Relative(3 * Math.Pow(4.0 / (((2 * r) + 3) * 1000.0), 1.0 / ((2 * r) + 5)), theory.AsymptoticOptimalBandwidth(1000), 1e-13, FormattableString.Invariant($"derivative {r}"));
        }
    }

    [Fact]
    public void AsymptoticOptimalBandwidth_SmoothestTarget_GivesTheOversmoothingConstant()
    {
        // Terrell & Scott (1985), Terrell (1990): R(f'') ≥ 35/(243 σ⁵), reached by the triweight density on ±3σ; the Gaussian factor is printed as 1.144.
        double Triweight(double x) => 35.0 / 32 / 3 * Math.Pow(1 - (x * x / 9), 3);
        double Derivative(double x, int order) => order switch
        {
            1 => -35.0 / 16 / 9 * (x / 3) * 3 * Math.Pow(1 - (x * x / 9), 2),
            2 => 35.0 / 16 * 3 / 27 * ((4 * x * x / 9 * (1 - (x * x / 9))) - Math.Pow(1 - (x * x / 9), 2)),
            _ => throw new ArgumentOutOfRangeException(nameof(order), order, "only the first two derivatives are asked for"),
        };
        TargetDensity target = TargetDensity.FromFunction("triweight on ±3", Triweight, new(-3, 3), Derivative);
        Near.Relative(35.0 / 243, target.Roughness(2), 1e-11);
        double factor = new ErrorTheory(Kernel.Gaussian, target).AsymptoticOptimalBandwidth(1);
        Near.Relative(1.143896311070071207, factor, 1e-11);
        Assert.Equal(1.144, Math.Round(factor, 3));
    }

    [Fact]
    public void EquivalentBandwidth_GaussianToEpanechnikov_IsThePublishedRatio()
    {
        // Scott (1992), Table 6.3 prints 2.214 for the factor from the normal to the Epanechnikov kernel (figure from memory; recomputed to 18 digits).
        var theory = new ErrorTheory(Kernel.Gaussian, s_normal);
        double other = theory.EquivalentBandwidth(1, Kernel.Epanechnikov);
        Near.Relative(2.213804358861339379, other, 1e-14);

        // And it is the ratio of the asymptotically best bandwidths on every target.
        var epanechnikov = new ErrorTheory(Kernel.Epanechnikov, NormalMixture.MarronWand[7]);
        var gaussian = new ErrorTheory(Kernel.Gaussian, NormalMixture.MarronWand[7]);
        Near.Relative(epanechnikov.AsymptoticOptimalBandwidth(500), theory.EquivalentBandwidth(gaussian.AsymptoticOptimalBandwidth(500), Kernel.Epanechnikov), 1e-13);
    }

    private static double Fryer(double h, long n)
    {
        decimal t = (decimal)h * (decimal)h;
        decimal braces = (1 / (n * (decimal)h)) + ((1 - (1m / n)) / Root(1 + t)) + 1 - (2 * Root(2) / Root(2 + t));
        return (double)(braces / (2 * Root(3.1415926535897932384626433833m)));
    }

    private static decimal Root(decimal v)
    {
        decimal r = (decimal)Math.Sqrt((double)v);
        for (int i = 0; i < 3; i++)
        {
            r = (r + (v / r)) / 2;
        }

        return r;
    }
}
