using Smoothing.Estimation;
using Smoothing.Samples;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Estimation;

// Kernels without polynomial form, against 31-digit sums of e^−|u|/2 and e^−|u|/(1 + e^−|u|)², and against the plain double loop.
public class TailSumsTests
{
    private static readonly Func<DoubleDouble, DoubleDouble> s_twoSided = u => DoubleDouble.Exp(-u) / 2;

    private static readonly Func<DoubleDouble, DoubleDouble> s_sigmoid = u =>
    {
        DoubleDouble e = DoubleDouble.Exp(-u);
        return e / (((DoubleDouble)1 + e) * ((DoubleDouble)1 + e));
    };

    public static TheoryData<string> Samples => [.. HardSamples.Names];

    [Theory]
    [MemberData(nameof(Samples))]
    public void ExponentialSums_ValuesOnAndOffTheData_Hold12Digits(string name) =>
        Compare(name, s => new ExponentialSums(s, TailKernel.TwoSided, 0.3), s_twoSided, 0.3, 1e-12);

    [Theory]
    [MemberData(nameof(Samples))]
    public void PanelSums_ValuesOnAndOffTheData_Hold12Digits(string name) =>
        Compare(name, s => new PanelSums(s, TailKernel.Sigmoid, 0.3), s_sigmoid, 0.3, 1e-12);

    // 0 < F < ½ in either tail: the plain loop adds positive terms and is exact to 1e-15.
    [Theory]
    [MemberData(nameof(Samples))]
    public void CumulativesAndSlopes_AllShapes_AgreeWithThePlainLoop(string name)
    {
        double[] values = HardSamples.Make(name, 1200);
        double[] weights = [.. values.Select((_, i) => 0.25 * (1 + (i % 4)))];
        const double width = 0.3;
        Sample sample = Sample.Of(values, new SampleOptions { Weights = weights });
        double[] x = [.. HardSamples.Points(values, width, 12), values.Min() - 20, values.Max() + 20];
        foreach ((TailKernel kernel, KernelSums sums) in new (TailKernel, KernelSums)[]
            {
                (TailKernel.TwoSided, new ExponentialSums(sample, TailKernel.TwoSided, width)),
                (TailKernel.Sigmoid, new PanelSums(sample, TailKernel.Sigmoid, width)),
                (TailKernel.Arch, new WindowedSums(sample, TailKernel.Arch, width)),
            })
        {
            var plain = new DirectSums(sample, kernel, width);
            var expected = new double[x.Length];
            var actual = new double[x.Length];
            foreach (bool upper in new[] { false, true })
            {
                plain.Cumulatives(x, upper, expected);
                sums.Cumulatives(x, upper, actual);
                for (int j = 0; j < x.Length; j++)
                {
                    Near.Relative(expected[j], actual[j], 1e-12, $"{name} {kernel.Name} tail at {x[j]}");
                }
            }

            foreach (int order in new[] { 0, 1 })
            {
                plain.Derivatives(x, order, expected);
                sums.Derivatives(x, order, actual);
                for (int j = 0; j < x.Length; j++)
                {
                    Near.Absolute(expected[j], actual[j], 1e-13 / Math.Pow(width, order + 1), $"{name} {kernel.Name} order {order} at {x[j]}");
                }
            }
        }
    }

    [Fact]
    public void PanelSums_ManyValues_SumOverFewNodes()
    {
        double[] values = HardSamples.Make("normal", 20_000);
        var sums = new PanelSums(Sample.Of(values), TailKernel.Sigmoid, 0.3);
        Assert.InRange(sums.Terms, 100, 28 * (int)(((values.Max() - values.Min()) / 0.3) + 2));
    }

    [Fact]
    public void For_EveryShape_ChoosesItsPath()
    {
        Sample sample = Sample.Of([1.0, 2, 3]);
        Assert.Equal("ExponentialRecursion", SumsChoice.For(sample, TailKernel.TwoSided, 0.5).Method);
        Assert.Equal("Panels", SumsChoice.For(sample, TailKernel.Sigmoid, 0.5).Method);
        Assert.Equal("Windowed", SumsChoice.For(sample, TailKernel.Arch, 0.5).Method);
    }

    private static void Compare(string name, Func<Sample, KernelSums> make, Func<DoubleDouble, DoubleDouble> formula, double width, double tolerance)
    {
        double[] values = HardSamples.Make(name, 1200);
        double[] x = [.. HardSamples.Points(values, width, 10), values.Min() - 40, values.Max() + 40];
        var actual = new double[x.Length];
        make(Sample.Of(values)).Derivatives(x, 0, actual);
        for (int j = 0; j < x.Length; j++)
        {
            DoubleDouble sum = 0;
            foreach (double value in values)
            {
                DoubleDouble u = DoubleDouble.Abs((DoubleDouble)x[j] - value) / width;
                sum += u.High < 690 ? formula(u) : 0;
            }

            double expected = (double)(sum / (width * (DoubleDouble)values.Length));
            Near.Relative(expected, actual[j], tolerance, $"{name} at {x[j]}");
        }
    }
}
