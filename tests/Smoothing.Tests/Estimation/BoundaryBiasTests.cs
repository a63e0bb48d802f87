using Smoothing.Estimation;
using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;
using Smoothing.Tests.Support;
using Smoothing.Theory;

namespace Smoothing.Tests.Estimation;

// The theory module's bias and variance near a limit against the estimates themselves: 400 seeded samples of 100 from the exponential law, at
// lower + c·h. Tolerance four standard errors of the mean; of the variance, four times √(2/400) and a little for its own kurtosis.
public class BoundaryBiasTests
{
    private const double H = 0.5;

    public static TheoryData<BoundaryCorrection, double> Cases()
    {
        var cases = new TheoryData<BoundaryCorrection, double>();
        foreach (BoundaryCorrection correction in new[] { BoundaryCorrection.LinearKernel, BoundaryCorrection.Renormalised, BoundaryCorrection.Reflection, BoundaryCorrection.None })
        {
            cases.Add(correction, 0);
            cases.Add(correction, 0.4);
        }

        return cases;
    }

    [Theory]
    [MemberData(nameof(Cases))]
    public void Value_MeanOverSamples_HasTheTheorysBias(BoundaryCorrection correction, double c)
    {
        var options = new DensityOptions { Support = new Interval(0, double.PositiveInfinity), Boundary = correction };
        foreach (Kernel kernel in new[] { Kernel.Gaussian, Kernel.Epanechnikov, Kernel.Laplace })
        {
            var found = new double[400];
            for (int s = 0; s < found.Length; s++)
            {
                var random = new RandomStream((ulong)s, 41);
                Sample sample = Sample.Of([.. Enumerable.Range(0, 100).Select(_ => -Math.Log(random.NextUniform()))]);
                found[s] = Raw(sample, kernel, options, c * H);
            }

            double mean = found.Average();
            double variance = found.Average(f => (f - mean) * (f - mean));
            var theory = new ErrorTheory(kernel, TargetDensity.From(new MathNet.Numerics.Distributions.Exponential(1)));
            Near.Absolute(Math.Exp(-c * H) + theory.BoundaryBias(correction, c, H), mean, 4 * Math.Sqrt(variance / found.Length), $"mean, {kernel.Name}");
            Near.Relative(theory.BoundaryVariance(correction, c, H, 100), variance, 0.35, $"variance, {kernel.Name}");
        }
    }

    // The theory speaks of the curve before it is divided by its mass.
    private static double Raw(Sample sample, Kernel kernel, DensityOptions options, double x)
    {
        if (options.Boundary is BoundaryCorrection.Reflection or BoundaryCorrection.None)
        {
            return Density.Of(sample, kernel, H, options).Value(x);
        }

        var range = new Interval(sample.Minimum, sample.Maximum);
        var form = new BoundaryForm(SumsChoice.For(sample, kernel, H), kernel, H, options, range, sample, (other, h) => SumsChoice.For(other, kernel, h));
        return form.Value(x) * form.RawMass;
    }
}
