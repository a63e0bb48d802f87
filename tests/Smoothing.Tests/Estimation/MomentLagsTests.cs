using Smoothing.Estimation;
using Smoothing.Samples;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Estimation;

/// <summary>Sums over all pairs against 31-digit arithmetic.</summary>
public class MomentLagsTests
{
    [Theory]
    [InlineData("normal", 0.1)]
    [InlineData("offset", 0.1)]
    [InlineData("gap", 0.07)]
    [InlineData("rounded", 0.13)]
    [InlineData("clusters", 0.02)]
    [InlineData("edge", 0.05)]
    [InlineData("equal", 0.3)]
    public void Sum_HardSamples_HoldsTwelveDigits(string name, double smallest)
    {
        double[] values = HardSamples.Make(name, 200), weights = [.. values.Select((_, i) => 0.5 + (i % 4))];
        foreach (double[] w in (double[][])[[], weights])
        {
            MomentLags lags = MomentLags.Of(Sample.Of(values, new SampleOptions { Weights = w }), smallest)!;
            foreach (double factor in w.Length == 0 ? (double[])[1, 1.3, 5] : [2.7])
            {
                double h = smallest * factor;
                for (int r = 0; r <= 4; r += 2)
                {
                    (double expected, double size) = Exact(values, w, h, r);
                    Near.Absolute(expected, lags.Sum(r, h), 1e-12 * size, $"{name}, derivative {r}, h = {h}");
                }
            }
        }
    }

    [Fact]
    public void SumOfOthers_LeavesEachValuesOwnPairOut()
    {
        double[] values = [0, 0.1, 5];
        MomentLags lags = MomentLags.Of(Sample.Of(values), 0.2)!;
        double pair = Math.Exp(-0.5 * 0.25) / Math.Sqrt(2 * Math.PI);
        Near.Relative(2 * pair, lags.SumOfOthers(0, 0.2), 1e-13);

        // φ''(u) = (u² − 1)φ(u), both orders of the pair; the third value is 25 bandwidths away.
        Near.Relative(2 * pair * (0.25 - 1), lags.SumOfOthers(2, 0.2), 1e-13);
    }

    [Fact]
    public void Of_RangeTooLong_IsNull() => Assert.Null(MomentLags.Of(Sample.Of([0.0, 1, 1e9]), 1e-3));

    private static (double Sum, double Size) Exact(double[] values, double[] weights, double h, int order)
    {
        double total = weights.Length == 0 ? values.Length : weights.Sum(), sum = 0, size = 0;
        for (int i = 0; i < values.Length; i++)
        {
            double w = weights.Length == 0 ? 1 : weights[i];
            sum += w * Part(i);
            size += w * NormalOracle.Size(values, weights, h, values[i], order) * total * Math.Pow(h, order + 1);
        }

        return (sum, size);

        double Part(int i) => NormalOracle.Derivative(values, weights, h, values[i], order) * total * Math.Pow(h, order + 1);
    }
}
