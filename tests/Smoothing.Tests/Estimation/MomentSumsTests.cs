using Smoothing.Estimation;
using Smoothing.Kernels;
using Smoothing.Samples;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Estimation;

/// <summary>Gaussian sums from cell moments against sums in 31-digit arithmetic: the accuracy promised, on data that usually cost digits.</summary>
[Trait("Category", "Widths")]
public class MomentSumsTests
{
    private const int Count = 3000;

    public static TheoryData<string, double> Cases()
    {
        var cases = new TheoryData<string, double>();
        foreach (string name in HardSamples.Names)
        {
            foreach (double width in (double[])[0.25, 0.51, 0.07])
            {
                cases.Add(name, width);
            }
        }

        return cases;
    }

    [Theory]
    [MemberData(nameof(Cases))]
    public void Derivatives_HardSamples_HoldTheGaussianGate(string name, double width)
    {
        double[] values = HardSamples.Make(name, Count);
        CompareValues(values, [], width, Points(values, width), $"{name}, h = {width}");
    }

    [Theory]
    [InlineData("normal", 0.3)]
    [InlineData("offset", 0.1)]
    [InlineData("heavy", 0.3)]
    [InlineData("gap", 0.4)]
    public void Derivatives_Weights_HoldTheGaussianGate(string name, double width)
    {
        double[] values = HardSamples.Make(name, Count);
        double[] weights = [.. values.Select((_, i) => Math.Exp(2 * Math.Sin(i)))];
        CompareValues(values, weights, width, Points(values, width), $"weighted {name}");
    }

    [Theory]
    [InlineData("normal", 0.3)]
    [InlineData("offset", 0.1)]
    [InlineData("heavy", 0.3)]
    [InlineData("rounded", 0.25)]
    [InlineData("gap", 0.4)]
    public void Derivatives_OrdersOneToFour_AreExactToTheirSize(string name, double width)
    {
        double[] values = HardSamples.Make(name, Count);
        double[] x = Points(values, width);
        MomentSums sums = Make(values, [], Kernel.Gaussian, width);
        var actual = new double[x.Length];
        for (int order = 1; order <= 4; order++)
        {
            sums.Derivatives(x, order, actual);
            for (int j = 0; j < x.Length; j++)
            {
                double size = NormalOracle.Size(values, [], width, x[j], order);
                Near.Absolute(NormalOracle.Derivative(values, [], width, x[j], order), actual[j], 1e-12 * size, $"{name}, order {order} at {x[j]}");
            }
        }
    }

    [Theory]
    [InlineData("normal", 0.3)]
    [InlineData("offset", 0.1)]
    [InlineData("heavy", 0.3)]
    [InlineData("rounded", 0.25)]
    [InlineData("gap", 0.4)]
    [InlineData("equal", 0.4)]
    public void Cumulatives_BothSides_KeepRelativeAccuracyInTheirTails(string name, double width)
    {
        double[] values = HardSamples.Make(name, Count);
        foreach (double[] weights in (double[][])[[], [.. values.Select((_, i) => 1 + (i % 5 * 0.25))]])
        {
            double[] x = [.. Points(values, width).Where((_, j) => j % 3 == 0 || weights.Length == 0 && j % 3 == 1)];
            MomentSums sums = Make(values, weights, Kernel.Gaussian, width);
            var actual = new double[x.Length];
            foreach (bool upper in (bool[])[false, true])
            {
                sums.Cumulatives(x, upper, actual);
                for (int j = 0; j < x.Length; j++)
                {
                    double expected = NormalOracle.Cumulative(values, weights, width, x[j], upper);
                    if (expected > 1e-200)
                    {
                        Near.Relative(expected, actual[j], 1e-12, $"{name}, upper {upper} at {x[j]}");
                    }
                    else
                    {
                        Near.Absolute(expected, actual[j], 1e-200, $"{name}, upper {upper} at {x[j]}");
                    }
                }
            }
        }
    }

    [Theory]
    [InlineData("normal", 0.3)]
    [InlineData("offset", 0.1)]
    [InlineData("gap", 0.4)]
    [InlineData("heavy", 0.3)]
    public void Evaluate_ThreeAtOnce_EqualsTheThreeCalls(string name, double width)
    {
        double[] values = HardSamples.Make(name, Count), x = Points(values, width);
        foreach (Kernel kernel in (Kernel[])[Kernel.Gaussian, Kernel.GaussianOfOrder(4)])
        {
            Density density = Density.Of(Sample.Of(values), kernel, width);
            double[] f = new double[x.Length], slope = new double[x.Length], share = new double[x.Length], expected = new double[x.Length];
            density.Evaluate(x, f, slope, share);
            for (int r = 0; r <= 1; r++)
            {
                density.Derivatives(x, r, expected);
                for (int j = 0; j < x.Length; j++)
                {
                    Near.Absolute(expected[j], (r == 0 ? f : slope)[j], (1e-13 * NormalOracle.Size(values, [], width, x[j], r)) + (1e-12 * Math.Abs(expected[j])), $"{kernel.Name}, derivative {r} at {x[j]}");
                }
            }

            density.Cumulatives(x, expected);
            for (int j = 0; j < x.Length; j++)
            {
                Near.Absolute(expected[j], share[j], kernel.Order == 2 ? 1e-12 * expected[j] : 1e-14, $"{kernel.Name}, share at {x[j]}");
            }
        }
    }

    // The level rule and any read past a record show here and nowhere else: a single value sets the density next to a cell of 200,000.
    [Theory]
    [InlineData(0.26)]
    [InlineData(0.37)]
    [InlineData(0.49)]
    [InlineData(0.51)]
    public void Derivatives_OneValueBesideACrowdedCell_HoldRelativeAccuracy(double width)
    {
        const int crowd = 200_000;
        double[] x = [.. Enumerable.Range(0, 60).Select(j => (j - 4) * 0.25 * width)];
        foreach (double far in (double[])[3, 6, 9, 14])
        {
            double[] values = [0, .. Enumerable.Repeat(far * width, crowd)];
            MomentSums sums = Make(values, [], Kernel.Gaussian, width);
            var actual = new double[x.Length];
            sums.Derivatives(x, 0, actual);
            for (int j = 0; j < x.Length; j++)
            {
                double expected = NormalOracle.Derivative([0, far * width], [1, crowd], width, x[j], 0);
                Near.Relative(expected, actual[j], 1e-13, $"crowd at {far} h, x = {x[j]}");
            }
        }
    }

    // Adding the same number ten million times errs in one direction unless full cells are emptied.
    [Fact]
    public void Derivatives_TenMillionEqualValues_AreThoseOfOne()
    {
        double[] values = new double[10_000_000];
        Array.Fill(values, 0.1);
        values[0] = 3;
        MomentSums sums = Make(values, [], Kernel.Gaussian, 0.3);
        double[] x = [0.1, 0.05, 0.4, -0.7, 2.9];
        var actual = new double[x.Length];
        sums.Derivatives(x, 0, actual);
        double peak = actual[0];
        for (int j = 0; j < x.Length; j++)
        {
            double expected = NormalOracle.Derivative([0.1, 3], [values.Length - 1, 1], 0.3, x[j], 0);
            Near.Absolute(expected, actual[j], 1e-14 * peak, $"equal at {x[j]}");
            Near.Relative(expected, actual[j], 1e-12, $"equal at {x[j]}");
        }
    }

    // Far more points than cells: polynomials of cells. The points hold every value and places between and beyond.
    [Theory]
    [InlineData("normal", 0.3)]
    [InlineData("offset", 0.51)]
    [InlineData("gap", 0.4)]
    [InlineData("rounded", 0.27)]
    [InlineData("equal", 0.3)]
    public void Derivatives_ManyPoints_HoldTheGaussianGate(string name, double width)
    {
        double[] values = HardSamples.Make(name, Count), asked = Points(values, width);
        double[] many = [.. asked, .. Enumerable.Range(0, 40_000).Select(i => values[i % Count] + (0.01 * (i / Count)))];
        MomentSums sums = Make(values, [], Kernel.Gaussian, width);
        var actual = new double[many.Length];
        for (int order = 0; order <= 1; order++)
        {
            sums.Derivatives(many, order, actual);
            for (int j = 0; j < asked.Length + 15; j++)
            {
                double expected = NormalOracle.Derivative(values, [], width, many[j], order);
                Near.Absolute(expected, actual[j], 3e-13 * NormalOracle.Size(values, [], width, many[j], order), $"{name}, order {order} at {many[j]}");
            }
        }
    }

    [Theory]
    [InlineData(4)]
    [InlineData(6)]
    [InlineData(8)]
    public void HigherOrders_ValueSlopeAndCount_AreThoseOfTheKernelsOwnFormulas(int order)
    {
        Kernel kernel = Kernel.GaussianOfOrder(order);
        double[] values = HardSamples.Make("normal", Count);
        const double width = 0.6;
        double[] x = Points(values, width);
        MomentSums sums = Make(values, [], kernel, width);
        var actual = new double[x.Length];
        for (int r = 0; r <= 2; r++)
        {
            sums.Derivatives(x, r, actual);
            for (int j = 0; j < x.Length; j++)
            {
                double expected = double.IsInfinity(x[j]) ? 0 : values.Sum(v => r == 0 ? kernel.Value((x[j] - v) / width) : kernel.Derivative((x[j] - v) / width, r)) / values.Length / Math.Pow(width, r + 1);
                Near.Absolute(expected, actual[j], 2e-13 / Math.Pow(width, r + 1), $"order {order}, derivative {r} at {x[j]}");
            }
        }

        foreach (bool upper in (bool[])[false, true])
        {
            sums.Cumulatives(x, upper, actual);
            for (int j = 0; j < x.Length; j++)
            {
                double expected = values.Average(v => kernel.Cumulative((upper ? -1 : 1) * (x[j] - v) / width));
                Near.Absolute(expected, actual[j], 2e-13, $"order {order}, upper {upper} at {x[j]}");
            }
        }
    }

    [Theory]
    [InlineData("normal", 1e-140)]
    [InlineData("normal", 1e140)]
    [InlineData("heavy", 1e-100)]
    [InlineData("heavy", 1e100)]
    public void Derivatives_ExtremeUnits_OnlyScale(string name, double unit)
    {
        double[] values = HardSamples.Make(name, Count);
        double[] x = Points(values, 0.25);
        var plain = new double[x.Length];
        var scaled = new double[x.Length];
        Make(values, [], Kernel.Gaussian, 0.25).Derivatives(x, 0, plain);
        Make([.. values.Select(v => v * unit)], [], Kernel.Gaussian, 0.25 * unit).Derivatives([.. x.Select(v => v * unit)], 0, scaled);
        double peak = plain.Max();
        for (int j = 0; j < x.Length; j++)
        {
            Near.Absolute(plain[j], scaled[j] * unit, 1e-12 * peak, $"{name} in units of {unit} at {x[j]}");
        }
    }

    [Fact]
    public void AllCalls_AfterTheFirst_AllocateNothing()
    {
        double[] values = HardSamples.Make("normal", Count);
        MomentSums sums = Make(values, [], Kernel.Gaussian, 0.3);
        double[] x = Points(values, 0.3);
        var destination = new double[x.Length];
        void All()
        {
            sums.Derivatives(x, 0, destination);
            sums.Derivatives(x, 2, destination);
            sums.Cumulatives(x, false, destination);
            sums.Cumulatives(x, true, destination);
        }

        // The runtime itself may allocate once while it recompiles or collects: what the calls allocate every time is the least of several.
        long least = long.MaxValue;
        for (int call = 0; call < 6; call++)
        {
            long before = GC.GetAllocatedBytesForCurrentThread();
            All();
            least = Math.Min(least, GC.GetAllocatedBytesForCurrentThread() - before);
        }

        Assert.Equal(0, least);
    }

    [Theory]
    [InlineData(0)]
    [InlineData(1)]
    [InlineData(7)]
    [InlineData(8)]
    [InlineData(9)]
    [InlineData(16)]
    [InlineData(203)]
    public void Add_AnyLength_GivesTheBitsOfOneByOne(int count)
    {
        double[] values = HardSamples.Make("normal", 256)[..count];
        double[] weights = [.. values.Select((_, i) => 0.5 + (i % 3))];
        foreach (bool weighted in (bool[])[false, true])
        {
            const int cells = 4096;
            var bulk = new double[cells * 16];
            var single = new double[cells * 16];
            unsafe
            {
                fixed (double* v = values, w = weights, b = bulk, s = single)
                {
                    MomentScatter.Add(v, weighted ? w : null, count, 64, -2048, cells, b);
                    for (int i = 0; i < count; i++)
                    {
                        MomentScatter.AddOne(v[i], weighted ? w[i] : 1, 64, s + (16 * (int)(Math.Floor(v[i] * 64) + 2048)));
                    }
                }
            }

            Assert.Equal(single, bulk);
        }
    }

    [Fact]
    public void Derivatives_ManyPoints_UsePolynomialsAndFewDoNot()
    {
        MomentSums sums = Make(HardSamples.Make("normal", Count), [], Kernel.Gaussian, 0.3);
        var field = Assert.IsType<DenseField>(sums.Field);
        double[] x = [.. Enumerable.Range(0, 20_000).Select(j => -4 + (0.0004 * j))], destination = new double[x.Length];
        sums.Derivatives(x.AsSpan(0, 500), 0, destination);
        Assert.False(field.HasPanels(0));
        sums.Derivatives(x, 0, destination);
        Assert.True(field.HasPanels(0));
        Assert.False(field.HasPanels(1));
        Assert.Same(field, sums.Field);
    }

    [Fact]
    public void Field_LongRange_KeepsOccupiedCellsOnly() =>
        Assert.IsType<SparseField>(Make(HardSamples.Make("heavy", Count), [], Kernel.Gaussian, 0.01).Field);

    [Fact]
    public void For_GaussianAndManyValues_ChoosesTheMoments()
    {
        Sample sample = Sample.Of(HardSamples.Make("normal", Count));
        Assert.Equal("GaussianMoments", SumsChoice.For(sample, Kernel.Gaussian, 0.5).Method);
        Assert.Equal("GaussianMoments", SumsChoice.For(sample, Kernel.GaussianOfOrder(6), 0.5).Method);
        Assert.NotEqual("GaussianMoments", SumsChoice.For(sample, Kernel.Gaussian, 1e-300).Method);
    }

    private static double[] Points(double[] values, double width) =>
        [.. HardSamples.Points(values, width, 6), values.Max() + (29 * width), values.Min() - (28 * width), values.Max() + (36 * width), values.Min() - (5 * width), double.PositiveInfinity, double.NegativeInfinity, 1e300];

    private static MomentSums Make(double[] values, double[] weights, Kernel kernel, double width) =>
        new(Sample.Of(values, new SampleOptions { Weights = weights }), kernel, width);

    private static void CompareValues(double[] values, double[] weights, double width, double[] x, string what)
    {
        var actual = new double[x.Length];
        Make(values, weights, Kernel.Gaussian, width).Derivatives(x, 0, actual);
        double[] expected = [.. x.Select(at => NormalOracle.Derivative(values, weights, width, at, 0))];
        double peak = expected.Max();
        for (int j = 0; j < x.Length; j++)
        {
            Near.Absolute(expected[j], actual[j], 1e-14 * peak, $"{what} at {x[j]}");
            if (expected[j] > 1e-200 * peak)
            {
                Near.Relative(expected[j], actual[j], 1e-12, $"{what} at {x[j]}");
            }
        }
    }
}
