using Smoothing.Estimation;
using Smoothing.Numerics;
using Smoothing.Samples;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Estimation;

/// <summary>The sharp estimate against its definition by plain sums, and as a distribution.</summary>
public class SharpEstimateTests
{
    [Fact]
    public void Value_WideData_AgreesWithTheDefinition()
    {
        double[] x = Draw(80, 21);
        const double H = 0.35, Sharp = 0.6;
        SharpEstimate estimate = SharpEstimate.Of(Sample.Of(x), H, Sharp);
        // The definition: φ_n by plain sums on a line of frequencies fine enough for values within ±12, weights as written, back by a plain sum.
        const double Step = 2 * Math.PI / 40;
        double[] at = [-2.5, -1, -0.2, 0, 0.7, 1.5];
        double[] raw = [.. at.Select(p => Raw(x, H, Sharp, Step, p))];
        // The projection takes the same ξ off everywhere and scales by the mass left; both are read off two points and must explain the rest.
        double scale = (estimate.Value(at[3]) - estimate.Value(at[1])) / (raw[3] - raw[1]);
        double level = raw[3] - (estimate.Value(at[3]) / scale);
        Near.Absolute(1, scale, 1e-3);
        Assert.InRange(level, -1e-4, 0.02);
        for (int i = 0; i < at.Length; i++)
        {
            Near.Absolute(Math.Max(0, scale * (raw[i] - level)), estimate.Value(at[i]), 2e-4, $"at {at[i]}");
        }
    }

    [Fact]
    public void Cumulative_AnySample_IsTheIntegralAndQuantileInvertsIt()
    {
        SharpEstimate estimate = SharpEstimate.Of(Sample.Of(Draw(300, 22)), 0.3, 0.5);
        Assert.Equal(0, estimate.Cumulative(double.NegativeInfinity));
        Assert.Equal(1, estimate.Cumulative(double.PositiveInfinity));
        Near.Absolute(1, estimate.Cumulative(20), 1e-12);
        const int Steps = 20000;
        double sum = 0;
        for (int i = 0; i < Steps; i++)
        {
            double x = -3 + (4.0 * (i + 0.5) / Steps);
            Assert.True(estimate.Value(x) >= 0);
            sum += estimate.Value(x) * 4 / Steps;
        }

        Near.Absolute(sum, estimate.Probability(-3, 1), 1e-6);
        foreach (double p in new[] { 1e-4, 0.01, 0.25, 0.5, 0.9, 0.999 })
        {
            Near.Absolute(p, estimate.Cumulative(estimate.Quantile(p)), 1e-12, $"p = {p}");
        }

        Assert.True(estimate.Quantile(0) < estimate.Quantile(1));
    }

    [Fact]
    public void Cumulative_FarClusters_KeepsTheirShares()
    {
        double[] near = Draw(200, 23);
        SharpEstimate estimate = SharpEstimate.Of(Sample.Of([.. near, .. near.Select(v => v + 1e7), 3e9]), 0.4, 0.7);
        Near.Absolute(200.0 / 401, estimate.Cumulative(5e6), 2e-3);
        Near.Absolute(400.0 / 401, estimate.Cumulative(1e9), 2e-3);
        Assert.Equal(0, estimate.Value(5e6));
        Assert.True(estimate.Value(1e7) > 0.1);
        Assert.InRange(estimate.Quantile(0.25), -1, 1);
        Assert.InRange(estimate.Quantile(0.75) - 1e7, -1, 1);
    }

    [Fact]
    public void Value_CountWeights_EqualDuplication()
    {
        double[] x = Draw(60, 24);
        double[] weights = [.. x.Select((_, i) => 1.0 + (i % 3))];
        double[] repeated = [.. x.SelectMany((v, i) => Enumerable.Repeat(v, 1 + (i % 3)))];
        var options = new SampleOptions { Weights = weights, WeightMeaning = WeightMeaning.Counts };
        SharpEstimate weighted = SharpEstimate.Of(Sample.Of(x, options), 0.4, 0.7), plain = SharpEstimate.Of(Sample.Of(repeated), 0.4, 0.7);
        for (double at = -3; at <= 3; at += 0.37)
        {
            Near.Absolute(plain.Value(at), weighted.Value(at), 1e-9);
        }
    }

    [Fact]
    public void Tabulate_Range_GivesTheValues()
    {
        SharpEstimate estimate = SharpEstimate.Of(Sample.Of(Draw(100, 25)), 0.4, 0.7);
        Curve curve = estimate.Tabulate(-2, 2, 5);
        Assert.Equal([-2.0, -1, 0, 1, 2], curve.X);
        Assert.Equal(estimate.Value(1), curve.Y[3]);
        Assert.Throws<ArgumentOutOfRangeException>(() => SharpEstimate.Of(Sample.Of([1.0, 2.0]), double.NaN, 1));
        Assert.Throws<ArgumentOutOfRangeException>(() => SharpEstimate.Of(Sample.Of([1.0, 2.0]), 1, 0));
        Assert.Throws<ArgumentOutOfRangeException>(() => estimate.Value(double.NaN));
        Assert.Throws<ArgumentOutOfRangeException>(() => estimate.Quantile(1.5));
    }

    private static double Raw(double[] x, double h, double sharp, double step, double at)
    {
        double sum = 0;
        for (int k = 0; k < 400; k++)
        {
            double t = k * step, re = 0, im = 0;
            foreach (double v in x)
            {
                re += Math.Cos(t * v) / x.Length;
                im += Math.Sin(t * v) / x.Length;
            }

            double p = ((re * re) + (im * im)) * Math.Exp(-h * h * t * t);
            double z = 0.5 * sharp * sharp * t * t;
            double w = (Math.Exp(-0.5 * h * h * t * t) + ((1 + z) * Math.Exp(-z)) + (p / (p + ((1 - p) / x.Length)))) / 3;
            sum += (k == 0 ? 0.5 : 1) * w * ((re * Math.Cos(t * at)) + (im * Math.Sin(t * at)));
        }

        return sum * step / Math.PI;
    }

    private static double[] Draw(int n, ulong seed)
    {
        var stream = new RandomStream(seed);
        var x = new double[n];
        for (int i = 0; i < n; i++)
        {
            x[i] = stream.NextNormal();
        }

        return x;
    }
}
