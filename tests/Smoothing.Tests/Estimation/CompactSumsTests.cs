using Smoothing.Estimation;
using Smoothing.Kernels;
using Smoothing.Samples;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Estimation;

// Against sums in 31-digit arithmetic of the kernels' usual formulas; windows decided on exact differences.
[Trait("Category", "Widths")]
public class CompactSumsTests
{
    public static TheoryData<string> Samples => [.. HardSamples.Names];

    [Theory]
    [MemberData(nameof(Samples))]
    public void Derivatives_HardSamples_Hold13DigitsAndExactZeros(string name)
    {
        double[] values = HardSamples.Make(name, 3000);
        const double width = 0.15;
        double[] x = HardSamples.Points(values, width, 40);
        var actual = new double[x.Length];
        foreach (EdgeKernel kernel in EdgeKernel.All)
        {
            new CompactSums(Sample.Of(values), kernel, width).Derivatives(x, 0, actual);
            for (int j = 0; j < x.Length; j++)
            {
                double expected = (double)(Sum(values, [], x[j], width, kernel.Formula) / (width * (DoubleDouble)values.Length));
                if (expected == 0)
                {
                    Assert.Equal(0, actual[j]);
                }

                Near.Relative(expected, actual[j], 1e-13, $"{name} {kernel.Name} at {x[j]}");
            }
        }
    }

    [Theory]
    [MemberData(nameof(Samples))]
    public void Derivatives_Weights_Hold13Digits(string name)
    {
        double[] values = HardSamples.Make(name, 1000);
        double[] weights = [.. values.Select((_, i) => 1e-3 + ((i * 7919) % 1000 / 10.0))];
        const double width = 0.4;
        double[] x = HardSamples.Points(values, width, 20);
        var actual = new double[x.Length];
        DoubleDouble total = weights.Aggregate((DoubleDouble)0, (s, w) => s + w);
        Sample sample = Sample.Of(values, new SampleOptions { Weights = weights });
        foreach (EdgeKernel kernel in EdgeKernel.All)
        {
            new CompactSums(sample, kernel, width).Derivatives(x, 0, actual);
            for (int j = 0; j < x.Length; j++)
            {
                Near.Relative((double)(Sum(values, weights, x[j], width, kernel.Formula) / (width * total)), actual[j], 1e-13, $"{name} {kernel.Name}");
            }
        }
    }

    // Slopes of opposite sign cancel: the error is measured against the steepest slope times the number of values in the window.
    [Theory]
    [MemberData(nameof(Samples))]
    public void Derivatives_FirstOrder_HoldAgainstTheSteepestSlope(string name)
    {
        double[] values = HardSamples.Make(name, 1000);
        const double width = 0.3;
        double[] x = HardSamples.Points(values, width, 20);
        var actual = new double[x.Length];
        foreach (EdgeKernel kernel in EdgeKernel.All.Where(k => k.Name != "flat"))
        {
            double steepest = Enumerable.Range(1, 99).Max(i => Math.Abs((double)kernel.Slope(i / 100.0)));
            new CompactSums(Sample.Of(values), kernel, width).Derivatives(x, 1, actual);
            for (int j = 0; j < x.Length; j++)
            {
                DoubleDouble sum = 0;
                double magnitude = 0;
                foreach (double value in values)
                {
                    DoubleDouble u = ((DoubleDouble)x[j] - value) / width;
                    DoubleDouble distance = DoubleDouble.Abs(u);
                    double sign = Math.Sign(u.High);
                    if (sign != 0 && !(distance > 1))
                    {
                        // At the very edge the mean of the one-sided slopes: half.
                        DoubleDouble term = kernel.Slope(distance) * (distance < 1 ? sign : sign / 2);
                        sum += term;
                        magnitude += steepest;
                    }
                }

                DoubleDouble scale = (DoubleDouble)values.Length * width * width;
                Near.Absolute((double)(sum / scale), actual[j], 1e-13 * magnitude / (double)scale, $"{name} {kernel.Name} at {x[j]}");
            }
        }
    }

    // The distribution function of the tent and of ¾(1 − u²), both sides, from their own integrals s²/2 and s²(3 − s)/4.
    [Theory]
    [MemberData(nameof(Samples))]
    public void Cumulatives_HardSamples_HoldOnBothSides(string name)
    {
        double[] values = HardSamples.Make(name, 1000);
        const double width = 0.3;
        double[] x = HardSamples.Points(values, width, 20);
        var actual = new double[x.Length];
        foreach (bool upper in new[] { false, true })
        {
            foreach ((EdgeKernel kernel, Func<DoubleDouble, DoubleDouble> tail) in new (EdgeKernel, Func<DoubleDouble, DoubleDouble>)[]
                { (EdgeKernel.Tent, s => s * s / 2), (EdgeKernel.Beta1, s => s * s * ((DoubleDouble)3 - s) / 4) })
            {
                new CompactSums(Sample.Of(values), kernel, width).Cumulatives(x, upper, actual);
                for (int j = 0; j < x.Length; j++)
                {
                    DoubleDouble sum = 0;
                    foreach (double value in values)
                    {
                        DoubleDouble u = (upper ? (DoubleDouble)value - x[j] : (DoubleDouble)x[j] - value) / width;
                        DoubleDouble distance = DoubleDouble.Abs(u);
                        DoubleDouble beyond = distance > 1 ? 0 : tail((DoubleDouble)1 - distance);
                        sum += u.High > 0 ? (DoubleDouble)1 - beyond : beyond;
                    }

                    Near.Relative((double)(sum / values.Length), actual[j], 1e-13, $"{name} {kernel.Name} {upper} at {x[j]}");
                }
            }
        }
    }

    // Running sums must not drift: a million equal terms.
    [Fact]
    public void Derivatives_AMillionEqualValues_HoldAllDigits()
    {
        var values = new double[1_000_000];
        Array.Fill(values, 0.1);
        double[] x = [0.1, 0.2, -0.01, 0.39999];
        var actual = new double[x.Length];
        foreach (EdgeKernel kernel in EdgeKernel.All)
        {
            new CompactSums(Sample.Of(values), kernel, 0.3).Derivatives(x, 0, actual);
            for (int j = 0; j < x.Length; j++)
            {
                Near.Relative((double)(Sum([0.1], [], x[j], 0.3, kernel.Formula) / 0.3), actual[j], 2e-14, kernel.Name);
            }
        }
    }

    [Fact]
    public void Cumulatives_Infinities_GiveTheLimits()
    {
        var sums = new CompactSums(Sample.Of([1.0, 2, 3]), Kernel.Epanechnikov, 0.5);
        var actual = new double[2];
        double[] x = [double.NegativeInfinity, double.PositiveInfinity];
        sums.Cumulatives(x, false, actual);
        Assert.Equal([0.0, 1], actual);
        sums.Cumulatives(x, true, actual);
        Assert.Equal([1.0, 0], actual);
        sums.Derivatives(x, 0, actual);
        Assert.Equal([0.0, 0], actual);
        sums.Derivatives(x, 1, actual);
        Assert.Equal([0.0, 0], actual);
    }

    [Fact]
    public void For_PolynomialKernel_ChoosesBlocks()
    {
        Sample sample = Sample.Of([1.0, 2, 3]);
        Assert.Equal("CompactBlocks", SumsChoice.For(sample, Kernel.Epanechnikov, 0.5).Method);
        Assert.Equal("CompactBlocks", Density.Of(sample, Kernel.Epanechnikov, 0.5).Sums.Method);
        // 1/h would overflow: loops that divide instead.
        Assert.Equal("Windowed", SumsChoice.For(sample, Kernel.Epanechnikov, 1e-310).Method);
    }

    internal static DoubleDouble Sum(double[] values, double[] weights, double x, double width, Func<DoubleDouble, DoubleDouble> formula)
    {
        DoubleDouble sum = 0;
        for (int i = 0; i < values.Length; i++)
        {
            DoubleDouble distance = DoubleDouble.Abs((DoubleDouble)x - values[i]);
            if (!(distance > width))
            {
                sum += formula(distance / width) * (weights.Length == 0 ? 1 : weights[i]);
            }
        }

        return sum;
    }
}
