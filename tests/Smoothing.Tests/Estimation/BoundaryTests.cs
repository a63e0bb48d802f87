using System.Reflection;
using Smoothing.Estimation;
using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Estimation;

public class BoundaryTests
{
    private const double Infinity = double.PositiveInfinity;

    private static readonly double[] s_values = [0.02, 0.1, 0.15, 0.3, 0.31, 0.5, 0.77, 0.8, 1.2, 1.9, 2.4, 2.95];

    // Every kernel the library offers by name, those that come later included.
    private static readonly Kernel[] s_kernels =
        [.. typeof(Kernel).GetProperties(BindingFlags.Public | BindingFlags.Static).Where(p => p.PropertyType == typeof(Kernel)).Select(p => (Kernel)p.GetValue(null)!)];

    // One smooth and one compact kernel are tried on every support and in the slower tests.
    private static readonly Kernel[] s_everywhere = [Kernel.Gaussian, Kernel.Epanechnikov];

    public static TheoryData<BoundaryCorrection, string, double, double, double> Cases()
    {
        var cases = new TheoryData<BoundaryCorrection, string, double, double, double>();
        foreach (BoundaryCorrection correction in new[]
        {
            BoundaryCorrection.LinearKernel, BoundaryCorrection.PositiveLinear, BoundaryCorrection.Renormalised, BoundaryCorrection.Reflection, BoundaryCorrection.LogScale,
        })
        {
            foreach (Kernel kernel in s_kernels)
            {
                cases.Add(correction, kernel.Name, 0, 3, 0.3);
                if (s_everywhere.Contains(kernel))
                {
                    cases.Add(correction, kernel.Name, 0, Infinity, 0.3);
                    cases.Add(correction, kernel.Name, -Infinity, 3, 0.3);
                }

                cases.Add(correction, kernel.Name, 0, 3, 2.5);
            }
        }

        return cases;
    }

    [Theory]
    [MemberData(nameof(Cases))]
    public void Curve_EveryCorrection_IsOneDistribution(BoundaryCorrection correction, string kernel, double lower, double upper, double h)
    {
        Density density = Make(correction, kernel, lower, upper, h);
        Near.Absolute(1, density.Cumulative(upper), 1e-12);
        Near.Absolute(1, density.Survival(lower), 1e-12);
        Near.Absolute(0, density.Cumulative(lower), 1e-15);
        Near.Absolute(0, density.Survival(upper), 1e-15);
        Assert.Equal(0.0, density.Value(lower - 1));
        Assert.Equal(0.0, density.Value(upper + 1));

        double from = Math.Max(lower, -12);
        double to = Math.Min(upper, 15);
        double last = density.Cumulative(from);
        for (int i = 1; i <= 200; i++)
        {
            double x = from + ((to - from) * i / 200);
            double f = density.Value(x);
            double cumulative = density.Cumulative(x);
            Assert.True(f >= 0, $"f({x}) = {f}");
            Assert.True(cumulative >= last, $"F falls at {x}");
            Near.Absolute(1, cumulative + density.Survival(x), 1e-13);
            last = cumulative;
        }
    }

    // ∫ f by this test's own composite Gauss rule over the kinks of the Epanechnikov kernel, against F.
    [Theory]
    [MemberData(nameof(Cases))]
    public void Cumulative_EveryCorrection_IsTheIntegralOfTheDensity(BoundaryCorrection correction, string kernel, double lower, double upper, double h)
    {
        if (correction == BoundaryCorrection.LogScale)
        {
            // The log scale is checked on its own variable below: near the limit its curve is too steep for a fixed rule.
            return;
        }

        Density density = Make(correction, kernel, lower, upper, h);
        double from = double.IsFinite(lower) ? lower : -9;
        double[] kinks = s_values.SelectMany(v => new[] { v - h, v, v + h, -v + h, 6 - v - h, 6 - v + h }).Append(h).Append(3 - h).ToArray();
        foreach (double x in new[] { 0.01, 0.2, 0.31, 1, 2.2, 2.9 })
        {
            double expected = density.Cumulative(from) + Integrate(density.Value, from, x, kinks);
            Near.Absolute(expected, density.Cumulative(x), 2e-12, $"F({x})");
        }
    }

    // 30,000 exponential quantiles: 36,000 kinks within reach of the limit. ∫ f by the three-point rule between all of them.
    [Theory]
    [InlineData("Epanechnikov", BoundaryCorrection.LinearKernel)]
    [InlineData("Triangular", BoundaryCorrection.PositiveLinear)]
    [InlineData("Uniform", BoundaryCorrection.Renormalised)]
    public void Cumulative_ManyKinksNearTheLimit_Holds12Digits(string kernel, BoundaryCorrection correction)
    {
        const double H = 0.5;
        double[] values = [.. Enumerable.Range(0, 30_000).Select(i => -Math.Log((i + 0.5) / 30_000))];
        Density density = Density.Of(Sample.Of(values), Find(kernel), H, new DensityOptions { Support = new Interval(0, Infinity), Boundary = correction });
        double[] edges = [.. values.SelectMany(v => new[] { v - H, v, v + H }).Where(v => v is > 0 and < H).Append(0).Append(H).Distinct().Order()];
        double[] x = [.. Enumerable.Range(1, edges.Length - 1).SelectMany(i => new[] { -Math.Sqrt(0.6), 0, Math.Sqrt(0.6) }.Select(t => edges[i - 1] + ((edges[i] - edges[i - 1]) * (1 + t) / 2)))];
        var y = new double[x.Length];
        density.Values(x, y);
        double sum = 0;
        for (int i = 1; i < edges.Length; i++)
        {
            sum += (edges[i] - edges[i - 1]) / 18 * ((5 * y[(3 * i) - 3]) + (8 * y[(3 * i) - 2]) + (5 * y[(3 * i) - 1]));
        }

        Near.Absolute(sum, density.Cumulative(H), 1e-12);
        Near.Absolute(1 - sum, density.Survival(H), 1e-12);
    }

    [Theory]
    [MemberData(nameof(Cases))]
    public void Derivatives_EveryCorrection_AreDifferenceQuotients(BoundaryCorrection correction, string kernel, double lower, double upper, double h)
    {
        Density density = Make(correction, kernel, lower, upper, h);
        const double Step = 1e-4;
        foreach (double x in new[] { 0.057, 0.234, 0.97, 2.63, 2.93 })
        {
            double f = density.Value(x);

            // Five-point rule: error about step⁴ times the fifth derivative of what is differenced.
            Near.Absolute(f, Quotient(density.Cumulative, x, Step), 1e-7, $"F' at {x}");
            if (f > 0)
            {
                Near.Absolute(density.Derivative(x), Quotient(density.Value, x, Step), 1e-5 * (1 + Math.Abs(density.Derivative(x))), $"f' at {x}");
                if (kernel == "Gaussian")
                {
                    Near.Absolute(density.Derivative(x, 2), Quotient(v => density.Derivative(v), x, Step), 1e-4 * (1 + Math.Abs(density.Derivative(x, 2))), $"f'' at {x}");
                    Near.Absolute(density.Derivative(x, 3), Quotient(v => density.Derivative(v, 2), x, Step), 1e-3 * (1 + Math.Abs(density.Derivative(x, 3))), $"f''' at {x}");
                }
            }
        }
    }

    [Theory]
    [MemberData(nameof(Cases))]
    public void Quantile_EveryCorrection_InvertsBothTails(BoundaryCorrection correction, string kernel, double lower, double upper, double h)
    {
        Density density = Make(correction, kernel, lower, upper, h);
        foreach (double tail in new[] { 1e-12, 1e-9, 1e-4, 0.1, 0.5 })
        {
            double low = density.Quantile(tail);
            double high = density.UpperQuantile(tail);

            // Near an image F of the mirrored compact kernel is a difference of numbers of order 1, so 1e-15 absolute is what is left there; beside an
            // upper limit the spacing of doubles is.
            double rest = correction == BoundaryCorrection.Reflection && kernel != "Gaussian" ? 2e-15 : 0;
            // A dozen spacings of x: the rounding of x itself, of its distance to a limit, and on the log scale of log x.
            const double spacing = 2.6e-15;
            Near.Absolute(tail, density.Cumulative(low), (1e-11 * tail) + rest + (density.Value(low) * Math.Abs(low) * spacing));
            Near.Absolute(tail, density.Survival(high), (1e-11 * tail) + rest + (density.Value(high) * Math.Abs(high) * spacing));
            Assert.InRange(low, lower, upper);
            Assert.InRange(high, low - 1e-12, upper);
        }
    }

    [Theory]
    [MemberData(nameof(Cases))]
    public void Draw_EveryCorrection_FollowsTheCurveInsideTheLimits(BoundaryCorrection correction, string kernel, double lower, double upper, double h)
    {
        int count = s_everywhere.Contains(Find(kernel)) ? 600 : 60;
        Density density = Make(correction, kernel, lower, upper, h);
        double[] draws = density.Draw(count, 11);
        Array.Sort(draws);
        Assert.InRange(draws[0], lower, upper);
        Assert.InRange(draws[^1], lower, upper);
        double distance = draws.Select((x, i) => Math.Max(Math.Abs(density.Cumulative(x) - ((double)i / count)), Math.Abs(density.Cumulative(x) - ((i + 1.0) / count)))).Max();

        // 2.2/√n is passed with probability about 1e-4 (Kolmogorov's limit law); a hundred seeded cases at most.
        Assert.True(distance < 2.2 / Math.Sqrt(count), $"distance {distance}");
    }

    [Theory]
    [MemberData(nameof(Cases))]
    public void Curve_MirroredData_IsMirrored(BoundaryCorrection correction, string kernel, double lower, double upper, double h)
    {
        Density a = Make(correction, kernel, lower, upper, h);
        var options = new DensityOptions { Support = new Interval(-upper, -lower), Boundary = correction };
        Density b = Density.Of(Sample.Of(s_values.Select(v => -v).ToArray()), Find(kernel), h, options);
        foreach (double x in new[] { 0.001, 0.05, 0.41, 1.7, 2.999 })
        {
            Near.Absolute(a.Value(x), b.Value(-x), 1e-11 * (1 + a.Value(x)));
            Near.Absolute(a.Cumulative(x), b.Survival(-x), 1e-12);
        }
    }

    // a₀ = 1/2, a₁ = −3/16, a₂ = 1/10 at the limit itself; a₀a₂ − a₁² = 19/1280: by hand from ¾(1 − u²) on [−1, 0].
    [Fact]
    public void BoundaryMoments_EpanechnikovAtLimit_AreTheClosedForms()
    {
        var moments = new BoundaryMoments(Kernel.Epanechnikov, 2, new Interval(5, Infinity));
        Near.Relative(0.5, moments.Series(5, 0, 0)[0], 1e-15);
        Near.Relative(-3.0 / 16, moments.Series(5, 1, 0)[0], 1e-15);
        Near.Relative(0.1, moments.Series(5, 2, 0)[0], 1e-15);
    }

    // What a boundary kernel keeps of its moments, with both limits in reach, against quadrature of the definition by this test's own rule.
    [Fact]
    public void BoundaryMoments_EveryKernel_AreTheIntegrals()
    {
        foreach (Kernel kernel in s_kernels)
        {
            foreach ((double h, double x) in new[] { (0.2, 0.01), (0.2, 0.9), (0.9, 0.4), (3.0, 0.4), (40.0, 1.7) })
            {
                var moments = new BoundaryMoments(kernel, h, new Interval(0, 2));
                double reach = Math.Min(kernel.SupportRadius, ReferenceEquals(kernel, Kernel.Gaussian) ? 11 : 45);
                for (int l = 0; l <= 2; l++)
                {
                    double from = Math.Max((x - 2) / h, -reach), to = Math.Min(x / h, reach);
                    double expected = Integrate(v => Math.Pow(v, l) * kernel.Value(v), from, to, [0]);
                    Near.Absolute(expected, moments.Series(x, l, 0)[0], 1e-10, $"{kernel.Name} {l} {h} {x}");
                }
            }
        }
    }

    // The expectation of the raw linear curve under a constant or linear density is ∫ K_L(u) g(x − hu) du over the support: exactly g(x).
    [Theory]
    [InlineData(0.0)]
    [InlineData(0.13)]
    [InlineData(0.7)]
    [InlineData(1.9)]
    public void LinearKernel_ConstantAndLinearDensity_AreReproduced(double x)
    {
        var support = new Interval(0, 2);
        foreach (Kernel kernel in s_kernels)
        {
            foreach (double h in new[] { 0.2, 0.9, 3.0 })
            {
                var moments = new BoundaryMoments(kernel, h, support);
                double a0 = moments.Series(x, 0, 0)[0];
                double a1 = moments.Series(x, 1, 0)[0];
                double a2 = moments.Series(x, 2, 0)[0];
                double BoundaryKernel(double u) => (a2 - (a1 * u)) / ((a0 * a2) - (a1 * a1)) * kernel.Value(u);
                double from = Math.Max((x - 2) / h, -Math.Min(kernel.SupportRadius, 10));
                double to = Math.Min(x / h, Math.Min(kernel.SupportRadius, 10));
                Near.Absolute(1, Integrate(BoundaryKernel, from, to, [0]), 1e-12, "constant");
                Near.Absolute(x, Integrate(u => BoundaryKernel(u) * (x - (h * u)), from, to, [0]), 1e-11, "linear");
            }
        }
    }

    // f_L by a plain loop over the formula, renormalised by this test's own integral of its positive part.
    [Fact]
    public void LinearKernel_Epanechnikov_IsJonesFormula()
    {
        const double H = 0.6;
        double Raw(double x)
        {
            double p = Math.Min(x / H, 1);
            double Moment(int l) => Integrate(u => Math.Pow(u, l) * 0.75 * (1 - (u * u)), -1, p, []);
            (double a0, double a1, double a2) = (Moment(0), Moment(1), Moment(2));
            double sum = s_values.Select(v => (x - v) / H).Where(u => Math.Abs(u) < 1).Sum(u => (a2 - (a1 * u)) / ((a0 * a2) - (a1 * a1)) * 0.75 * (1 - (u * u)));
            return Math.Max(sum / (s_values.Length * H), 0);
        }

        Density density = Make(BoundaryCorrection.LinearKernel, "Epanechnikov", 0, Infinity, H);
        double mass = Integrate(Raw, 0, 4, s_values.SelectMany(v => new[] { v - H, v + H }).Append(H).ToArray());
        foreach (double x in new[] { 0, 0.1, 0.35, 0.59, 0.8, 2 })
        {
            Near.Absolute(Raw(x) / mass, density.Value(x), 1e-8);
        }
    }

    [Fact]
    public void Reflection_AtTheLimit_HasSlopeZeroAndTwiceThePlainValue()
    {
        Density plain = Density.Of(Sample.Of(s_values), Kernel.Gaussian, 0.3);
        Density mirrored = Make(BoundaryCorrection.Reflection, "Gaussian", 0, Infinity, 0.3);
        Near.Absolute(0, mirrored.Derivative(0), 1e-14);
        Near.Relative(2 * plain.Value(0), mirrored.Value(0), 1e-14);
        Near.Absolute(0, Make(BoundaryCorrection.Reflection, "Gaussian", 0, 3, 1).Derivative(3), 1e-14);
    }

    [Fact]
    public void LogScale_Curve_IsTheLineCurveOfTheLogarithms()
    {
        Density logs = Density.Of(Sample.Of(s_values.Select(v => Math.Log(v)).ToArray()), Kernel.Gaussian, 0.4);
        Density carried = Make(BoundaryCorrection.LogScale, "Gaussian", 0, Infinity, 0.4);
        foreach (double x in new[] { 0.003, 0.2, 2, 9 })
        {
            Near.Relative(logs.Value(Math.Log(x)) / x, carried.Value(x), 1e-13);
            Near.Relative(logs.Cumulative(Math.Log(x)), carried.Cumulative(x), 1e-13);
        }

        Assert.Equal(0.0, carried.Value(0));
        var error = Assert.Throws<ArgumentException>(() => Density.Of(Sample.Of([1, 0, 2, 0]), Kernel.Gaussian, 1, new DensityOptions { Support = new Interval(0, Infinity), Boundary = BoundaryCorrection.LogScale }));
        Assert.Contains("values[1] is 0", error.Message, StringComparison.Ordinal);
        Assert.Contains("2 of 4", error.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void None_WithSupport_ChecksTheDataAndLeavesTheCurve()
    {
        Density density = Make(BoundaryCorrection.None, "Gaussian", 0, Infinity, 0.3);
        Assert.Equal(Density.Of(Sample.Of(s_values), Kernel.Gaussian, 0.3).Value(-0.1), density.Value(-0.1));
    }

    [Fact]
    public void Of_DataOutsideSupport_NamesFirstValueAndCount()
    {
        var options = new DensityOptions { Support = new Interval(0, 10) };
        var error = Assert.Throws<ArgumentException>(() => Density.Of(Sample.Of([1, -2, 3, 11, 5]), Kernel.Gaussian, 1, options));
        Assert.Contains("values[1] is -2", error.Message, StringComparison.Ordinal);
        Assert.Contains("2 of 5", error.Message, StringComparison.Ordinal);
        Assert.Throws<ArgumentException>(() => Density.Of(Sample.Of([1]), Kernel.Gaussian, 1, new DensityOptions { Support = new Interval(1, 1) }));
    }

    [Fact]
    public void Of_OneValueOnTheLimit_Works()
    {
        foreach (BoundaryCorrection correction in new[] { BoundaryCorrection.LinearKernel, BoundaryCorrection.PositiveLinear, BoundaryCorrection.Renormalised, BoundaryCorrection.Reflection })
        {
            var options = new DensityOptions { Support = new Interval(0, Infinity), Boundary = correction };
            foreach (Kernel kernel in s_kernels)
            {
                Density density = Density.Of(Sample.Of([0.0]), kernel, 1, options);
                Near.Absolute(1, density.Cumulative(Infinity), 1e-12, correction.ToString());
                Assert.True(density.Value(0) > 0);
                Near.Absolute(0.5, density.Cumulative(density.Quantile(0.5)), 1e-12);
            }
        }
    }

    // h → ∞ on a bounded support: the cut kernel is flat, the linear boundary kernel fits the best straight line, which for one value at 0 is 4 − 6x on
    // the unit interval, cut at 2/3 and divided by its positive mass 4/3.
    [Theory]
    [InlineData(30)]
    [InlineData(1e5)]
    public void Curve_HugeBandwidth_IsFlatOrTheBestStraightLine(double h)
    {
        var unit = new Interval(0, 1);
        foreach (Kernel kernel in s_kernels)
        {
            Density flat = Density.Of(Sample.Of([0.0]), kernel, h, new DensityOptions { Support = unit, Boundary = BoundaryCorrection.Renormalised });
            Density line = Density.Of(Sample.Of([0.0]), kernel, h, new DensityOptions { Support = unit });

            // How far K falls over the whole support: first order in 1/h where K has a kink at 0, second order elsewhere.
            double fall = 1 - (kernel.Value(1 / h) / kernel.Value(0));
            foreach (double x in new[] { 0, 0.25, 0.6, 0.9 })
            {
                Near.Absolute(1, flat.Value(x), 2e-3 + fall);
                Near.Absolute(Math.Max(4 - (6 * x), 0) * 0.75, line.Value(x), 1e-2 + (4 * fall));
            }

            Near.Absolute(1, line.Cumulative(1), 1e-12);
            Near.Absolute(0.9, line.Cumulative(line.Quantile(0.9)), 1e-12);
        }
    }

    [Fact]
    public void Reflection_TinyBandwidthFarFromTheOtherLimit_KeepsItsQuantiles()
    {
        // One value on the limit, mirrored: a half-normal of scale h; its median is 0.6744897501960817 h (common tables).
        const double H = 1e-6;
        Density density = Density.Of(Sample.Of([0.0]), Kernel.Gaussian, H, new DensityOptions { Support = new Interval(0, Infinity), Boundary = BoundaryCorrection.Reflection });
        Near.Relative(0.6744897501960817 * H, density.Quantile(0.5), 1e-13);
        Near.Relative(3.2905267314919255 * H, density.UpperQuantile(0.001), 1e-12);
    }

    [Fact]
    public void Peaks_LogScaleNextToTheLimit_SurviveOverflowingDerivatives()
    {
        var options = new DensityOptions { Support = new Interval(0, Infinity), Boundary = BoundaryCorrection.LogScale };
        PeakSummary found = Density.Of(Sample.Of([1e-300, 1]), Kernel.Gaussian, 0.5, options).Peaks();
        Assert.NotEmpty(found.Peaks);
        Assert.All(found.Peaks, p => Assert.True(double.IsFinite(p.Location)));
    }

    [Fact]
    public void Curve_IntegerWeights_EqualRepeatedValues()
    {
        Sample weighted = Sample.Of([0.1, 0.5, 2], new SampleOptions { Weights = new double[] { 1, 3, 2 } });
        Sample repeated = Sample.Of([0.1, 0.5, 0.5, 0.5, 2, 2]);
        foreach (Kernel kernel in s_kernels)
        {
            var options = new DensityOptions { Support = new Interval(0, 2.5) };
            Density a = Density.Of(weighted, kernel, 0.6, options);
            Density b = Density.Of(repeated, kernel, 0.6, options);
            foreach (double x in new[] { 0, 0.3, 1, 2.4 })
            {
                Near.Relative(b.Value(x), a.Value(x), 1e-12);
                Near.Relative(b.Derivative(x), a.Derivative(x), 1e-10);
                Near.Absolute(b.Cumulative(x), a.Cumulative(x), 1e-13);
            }
        }
    }

    [Fact]
    public void Peaks_MonotoneCurveAtALimit_SitOnIt()
    {
        double[] values = Enumerable.Range(1, 200).Select(i => -Math.Log((i - 0.5) / 200)).ToArray();
        PeakSummary found = Density.Of(Sample.Of(values), Kernel.Gaussian, 0.5, new DensityOptions { Support = new Interval(0, Infinity) }).Peaks();
        Assert.Equal(0.0, found.Peaks[0].Location);
        Assert.True(found.Peaks[0].AtLimit);
        Assert.Equal(0.0, found.Highest.Location);
    }

    private static Kernel Find(string name) => s_kernels.Single(k => k.Name == name);

    private static Density Make(BoundaryCorrection correction, string kernel, double lower, double upper, double h) =>
        Density.Of(Sample.Of(s_values), Find(kernel), h, new DensityOptions { Support = new Interval(lower, upper), Boundary = correction });

    private static double Quotient(Func<double, double> f, double x, double step) =>
        (f(x - (2 * step)) - (8 * f(x - step)) + (8 * f(x + step)) - f(x + (2 * step))) / (12 * step);

    // Five-point Gauss rule on 200 equal parts, cut at the kinks.
    private static double Integrate(Func<double, double> f, double from, double to, double[] kinks)
    {
        double[] ends = [.. kinks.Where(k => k > from && k < to).Append(from).Append(to).Distinct().Order()];
        double sum = 0;
        for (int i = 1; i < ends.Length; i++)
        {
            int parts = Math.Max(2, (int)(200 * (ends[i] - ends[i - 1]) / (to - from)));
            double width = (ends[i] - ends[i - 1]) / parts;
            for (int k = 0; k < parts; k++)
            {
                double m = ends[i - 1] + (width * (k + 0.5));
                double near = width / 6 * Math.Sqrt(5 - (2 * Math.Sqrt(10 / 7.0)));
                double far = width / 6 * Math.Sqrt(5 + (2 * Math.Sqrt(10 / 7.0)));
                double inner = (322 + (13 * Math.Sqrt(70))) / 1800;
                double outer = (322 - (13 * Math.Sqrt(70))) / 1800;
                sum += width * ((outer * (f(m - far) + f(m + far))) + (inner * (f(m - near) + f(m + near))) + (64.0 / 225 * f(m)));
            }
        }

        return sum;
    }
}
