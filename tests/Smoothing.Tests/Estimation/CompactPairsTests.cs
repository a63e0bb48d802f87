using Smoothing.Estimation;
using Smoothing.Kernels;
using Smoothing.Samples;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Estimation;

// Leave-one-out values and pair sums against 31-digit arithmetic over all pairs.
[Trait("Category", "Widths")]
public class CompactPairsTests
{
    public static TheoryData<string> Samples => [.. HardSamples.Names];

    [Theory]
    [MemberData(nameof(Samples))]
    public void LeaveOneOut_HardSamples_Hold13DigitsAndExactZeros(string name)
    {
        double[] values = HardSamples.Make(name, 1501);
        double[] weights = [.. values.Select((_, i) => 0.25 * (1 + (i % 5)))];
        foreach (bool weighted in new[] { false, true })
        {
            Sample sample = weighted ? Sample.Of(values, new SampleOptions { Weights = weights }) : Sample.Of(values);
            double[] sorted = sample.SortedValues.ToArray();
            double[] mass = sample.SortedWeights.ToArray();
            var actual = new double[sorted.Length];
            foreach (EdgeKernel kernel in EdgeKernel.All)
            {
                foreach (double width in new[] { 0.02, 0.15, 1.5 })
                {
                    new CompactPairs(sample, kernel).LeaveOneOut(width, actual);
                    for (int i = 0; i < sorted.Length; i += 61)
                    {
                        double[] others = [.. sorted.Where((_, j) => j != i)];
                        double[] rest = weighted ? [.. mass.Where((_, j) => j != i)] : [];
                        DoubleDouble total = weighted ? rest.Aggregate((DoubleDouble)0, (s, w) => s + w) : sorted.Length - 1;
                        double expected = (double)(CompactSumsTests.Sum(others, rest, sorted[i], width, kernel.Formula) / (total * width));
                        if (expected == 0)
                        {
                            Assert.Equal(0, actual[i]);
                        }

                        Near.Relative(expected, actual[i], 1e-13, $"{name} {kernel.Name} h = {width} at {sorted[i]:R}");
                    }
                }
            }
        }
    }

    [Theory]
    [MemberData(nameof(Samples))]
    public void Kernels_HardSamples_Hold13Digits(string name)
    {
        double[] values = HardSamples.Make(name, 400);
        foreach (EdgeKernel kernel in EdgeKernel.All)
        {
            foreach (double width in new[] { 0.1, 0.7 })
            {
                DoubleDouble expected = 0;
                for (int i = 1; i < values.Length; i++)
                {
                    expected += CompactSumsTests.Sum(values[..i], [], values[i], width, kernel.Formula);
                }

                Near.Relative((double)expected, new CompactPairs(Sample.Of(values), kernel).Kernels(width), 1e-13, $"{name} {kernel.Name}");
            }
        }
    }

    // K∗K of ¾(1 − u²) is 3/160 t³(20 − 10t + t²), t = 2 − |u|: by hand; of the flat kernel t/4.
    [Theory]
    [MemberData(nameof(Samples))]
    public void SelfConvolutions_HardSamples_MatchClosedForms(string name)
    {
        double[] values = HardSamples.Make(name, 400);
        foreach ((EdgeKernel kernel, Func<DoubleDouble, DoubleDouble> ofT) in new (EdgeKernel, Func<DoubleDouble, DoubleDouble>)[]
            {
                (EdgeKernel.Flat, t => t / 4),
                (EdgeKernel.Beta1, t => DoubleDouble.Power(t, 3) * ((DoubleDouble)20 - (t * 10) + (t * t)) * 3 / 160),
            })
        {
            foreach (double width in new[] { 0.1, 0.7 })
            {
                DoubleDouble expected = 0;
                for (int i = 1; i < values.Length; i++)
                {
                    expected += CompactSumsTests.Sum(values[..i], [], values[i], 2 * width, half => ofT((DoubleDouble)2 - (half * 2)));
                }

                Near.Relative((double)expected, new CompactPairs(Sample.Of(values), kernel).SelfConvolutions(width), 1e-12, $"{name} {kernel.Name}");
            }
        }
    }

    // Higher kernels against (K∗K)(u) = ∫ K(v) K(u − v) dv by Simpson's rule on each smooth piece, exact enough at 2,000 steps.
    [Fact]
    public void SelfConvolutions_HigherDegrees_MatchNumericalIntegration()
    {
        foreach (EdgeKernel kernel in new[] { EdgeKernel.Beta2, EdgeKernel.Beta3 })
        {
            foreach (double u in new[] { 0.0, 0.3, 1, 1.4, 1.9 })
            {
                double low = u - 1, sum = 0;
                const int steps = 2000;
                for (int k = 0; k <= steps; k++)
                {
                    double v = low + ((2 - u) * k / steps);
                    sum += (k == 0 || k == steps ? 1 : k % 2 == 1 ? 4 : 2) * kernel.ValueCore(v) * kernel.ValueCore(u - v);
                }

                double expected = sum * (2 - u) / steps / 3;
                Near.Relative(expected, new CompactPairs(Sample.Of([0, u * 0.5]), kernel).SelfConvolutions(0.5), 1e-10, $"{kernel.Name} {u}");
            }
        }
    }

    // ∫f̂² by Simpson's rule over the estimate itself, the mean of the leave-one-out values one by one.
    [Fact]
    public void LeastSquares_OldFaithful_MatchesTheDefinition()
    {
        Sample sample = Sample.Of(TestData.Load("faithful_eruptions_272"));
        var pairs = new CompactPairs(sample, Kernel.Epanechnikov);
        foreach (double width in new[] { 0.2, 0.5 })
        {
            Density density = Density.Of(sample, Kernel.Epanechnikov, width);
            const int steps = 20_000;
            double from = sample.Minimum - width, to = sample.Maximum + width, integral = 0;
            for (int k = 0; k <= steps; k++)
            {
                double f = density.Value(from + ((to - from) * k / steps));
                integral += (k == 0 || k == steps ? 1 : k % 2 == 1 ? 4 : 2) * f * f;
            }

            integral *= (to - from) / steps / 3;
            var left = new double[sample.Count];
            pairs.LeaveOneOut(width, left);
            Near.Relative(integral - (2 * left.Average()), pairs.LeastSquares(width), 1e-6);
        }
    }

    [Fact]
    public void HasSelfConvolution_KernelsWithAKinkAtZero_IsFalse()
    {
        Assert.All(new[] { EdgeKernel.Flat, EdgeKernel.Beta1, EdgeKernel.Beta2, EdgeKernel.Beta3 }, k => Assert.True(CompactPairs.HasSelfConvolution(k)));
        Assert.False(CompactPairs.HasSelfConvolution(EdgeKernel.Tent));
        Assert.False(CompactPairs.HasSelfConvolution(EdgeKernel.Cubes));
    }
}
