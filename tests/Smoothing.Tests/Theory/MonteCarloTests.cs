using MathNet.Numerics.Distributions;
using Smoothing.Estimation;
using Smoothing.Kernels;
using Smoothing.Samples;
using Smoothing.Tests.Support;
using Smoothing.Theory;

namespace Smoothing.Tests.Theory;

/// <summary>The library's own curve on 2,000 seeded samples scatters as the theory says.</summary>
public class MonteCarloTests
{
    public static TheoryData<string> Targets => new("claw", "gamma", "uniform and normal");

    [Theory]
    [MemberData(nameof(Targets))]
    public void Density_TwoThousandSamples_HasTheBiasAndVarianceOfTheTheory(string name)
    {
        (TargetDensity target, Kernel kernel, double h) = name switch
        {
            "claw" => ((TargetDensity)NormalMixture.MarronWand[9], Kernel.Gaussian, 0.2),
            "gamma" => (TargetDensity.From(new Gamma(2, 1)), Kernel.Epanechnikov, 0.8),
            _ => (TargetDensity.Mixture([0.4, 0.6], [TargetDensity.From(new ContinuousUniform(0, 1)), NormalMixture.Normal(2, 0.5)]), Kernel.Triweight, 0.5),
        };
        const int Samples = 2_000;
        const int N = 50;
        double[] points = [.. new[] { 0.05, 0.25, 0.5, 0.75, 0.95 }.Select(target.Quantile)];
        double[,] values = new double[5, Samples];
        double[] row = new double[5];
        for (int s = 0; s < Samples; s++)
        {
            Density.Of(Sample.Of(target.Draw(N, (ulong)(s + 1))), kernel, h).Values(points, row);
            for (int i = 0; i < 5; i++)
            {
                values[i, s] = row[i];
            }
        }

        var theory = new ErrorTheory(kernel, target);
        for (int i = 0; i < 5; i++)
        {
            double[] v = [.. Enumerable.Range(0, Samples).Select(s => values[i, s])];
            double mean = v.Average();
            double variance = v.Sum(y => (y - mean) * (y - mean)) / (Samples - 1);
            double fourth = v.Sum(y => Math.Pow(y - mean, 4)) / Samples;
            Near.Absolute(theory.Bias(points[i], h), mean - target.Value(points[i]), 4 * Math.Sqrt(variance / Samples), FormattableString.Invariant($"bias at {points[i]}"));
            Near.Absolute(theory.Variance(points[i], h, N), variance, 4 * Math.Sqrt((fourth - (variance * variance)) / Samples), FormattableString.Invariant($"variance at {points[i]}"));
        }
    }
}
