using Smoothing.Estimation;
using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Estimation;

public class LimitEvidenceTests
{
    private static readonly Interval s_positive = new(0, double.PositiveInfinity);

    // Quantiles of dᵅ at (i − ½)/n: the exponent is known.
    private static Sample Power(double alpha, int n) => Sample.Of(Enumerable.Range(1, n).Select(i => Math.Pow((i - 0.5) / n, 1 / alpha)).ToArray());

    [Theory]
    [InlineData(0.5)]
    [InlineData(1.0)]
    [InlineData(1.5)]
    [InlineData(2.0)]
    public void Exponent_PowerLaw_IsFound(double alpha)
    {
        (double found, double error) = LimitEvidence.Exponent(Power(alpha, 1000), 0, lower: true)!.Value;
        Near.Absolute(alpha, found, error / 2);
        Near.Relative(alpha / Math.Sqrt(63), error, 0.1);
    }

    [Fact]
    public void LimitNotes_UnboundedAndSteepDensities_AreSaid()
    {
        var options = new DensityOptions { Support = s_positive };
        Assert.Contains("without bound", Assert.Single(Density.Of(Power(0.5, 1000), Kernel.Gaussian, 0.1, options).LimitNotes), StringComparison.Ordinal);
        Assert.Contains("infinite slope", Assert.Single(Density.Of(Power(1.5, 2000), Kernel.Gaussian, 0.1, options).LimitNotes), StringComparison.Ordinal);
        Assert.Empty(Density.Of(Power(1, 1000), Kernel.Gaussian, 0.1, options).LimitNotes);
        Assert.Empty(Density.Of(Power(2, 1000), Kernel.Gaussian, 0.1, options).LimitNotes);
        Assert.Empty(Density.Of(Power(0.5, 1000), Kernel.Gaussian, 0.1).LimitNotes);

        // At the upper limit alike.
        Sample mirrored = Sample.Of(Power(0.5, 1000).Values.ToArray().Select(v => 1 - v).ToArray());
        Assert.Contains("limit 1", Assert.Single(Density.Of(mirrored, Kernel.Gaussian, 0.1, new DensityOptions { Support = new Interval(double.NegativeInfinity, 1) }).LimitNotes), StringComparison.Ordinal);
    }

    // 200 seeded samples of each law; at most 5 % may be flagged (expected below 2 %: three standard errors, and two and a half on one side).
    [Fact]
    public void Declared_ExponentialAndGammaTwo_AreRarelyFlagged()
    {
        int exponential = 0;
        int gamma = 0;
        for (ulong seed = 0; seed < 200; seed++)
        {
            var random = new RandomStream(seed, 5);
            var a = new double[500];
            var b = new double[500];
            for (int i = 0; i < a.Length; i++)
            {
                a[i] = -Math.Log(random.NextUniform());
                b[i] = -Math.Log(random.NextUniform()) - Math.Log(random.NextUniform());
            }

            exponential += LimitEvidence.Declared(Sample.Of(a), s_positive).Count;
            gamma += LimitEvidence.Declared(Sample.Of(b), s_positive).Count;
        }

        Assert.InRange(exponential, 0, 10);
        Assert.InRange(gamma, 0, 10);
    }

    // Jumps are seen, normal and lognormal ends are not: shares of 100 seeded samples.
    [Fact]
    public void Suspected_JumpsAndSmoothEnds_AreToldApart()
    {
        int exponential = 0;
        int uniform = 0;
        int normal = 0;
        int lognormal = 0;
        for (ulong seed = 0; seed < 100; seed++)
        {
            var random = new RandomStream(seed, 6);
            var draws = new double[4][];
            for (int law = 0; law < 4; law++)
            {
                draws[law] = new double[800];
            }

            for (int i = 0; i < 800; i++)
            {
                draws[0][i] = -Math.Log(random.NextUniform());
                draws[1][i] = random.NextUniform();
                draws[2][i] = random.NextNormal();
                draws[3][i] = Math.Exp(0.5 * random.NextNormal());
            }

            exponential += LimitEvidence.Suspected(Sample.Of(draws[0])).Count(f => f.IsLower);
            uniform += LimitEvidence.Suspected(Sample.Of(draws[1])).Count;
            normal += LimitEvidence.Suspected(Sample.Of(draws[2])).Count;
            lognormal += LimitEvidence.Suspected(Sample.Of(draws[3])).Count;
        }

        Assert.InRange(exponential, 75, 100);
        Assert.InRange(uniform, 150, 200);
        Assert.InRange(normal, 0, 5);
        Assert.InRange(lognormal, 0, 5);
    }

    [Fact]
    public void Suspected_TiedOrFewValues_SayNothing()
    {
        Assert.Empty(LimitEvidence.Suspected(Sample.Of(TestData.Load("six_points"))));
        Assert.Empty(LimitEvidence.Suspected(Sample.Of(TestData.Load("faithful_waiting_272"))));
    }
}
