using System.Globalization;
using FsCheck.Xunit;
using MathNet.Numerics.Statistics;
using Smoothing.Estimation;
using Smoothing.Kernels;
using Smoothing.Samples;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Estimation;

public class DensityDistributionTests
{
    private static readonly Sample s_eruptions = Sample.Of(TestData.Load("faithful_eruptions_272"));

    public static TheoryData<string, double, string, double, double, double, double> References()
    {
        var rows = new TheoryData<string, double, string, double, double, double, double>();
        foreach (string line in File.ReadLines(TestData.PathOf("reference_densities.csv")).Skip(2))
        {
            string[] f = line.Split(',');
            double Read(int i) => f[i].Length == 0 ? double.NaN : double.Parse(f[i], CultureInfo.InvariantCulture);
            rows.Add(f[0], Read(1), f[2], Read(3), Read(4), Read(5), Read(6));
        }

        return rows;
    }

    // Source: Data/reference_densities.csv, from the definition in 40-digit arithmetic.
    [Theory]
    [MemberData(nameof(References))]
    public void ValueCumulativeDerivative_ReferencePoints_MatchHighPrecision(string data, double h, string kernel, double x, double f, double cumulative, double derivative)
    {
        Kernel k = Kernel.Standard.First(s => s.Name.Equals(kernel, StringComparison.OrdinalIgnoreCase));
        Density density = Density.Of(Sample.Of(TestData.Load(data)), k, h);
        Near.Relative(f, density.Value(x), 1e-13, "f");
        Near.Relative(cumulative, density.Cumulative(x), 1e-13, "F");
        Near.Absolute(1 - cumulative, density.Survival(x), 1e-15, "S");
        if (!double.IsNaN(derivative))
        {
            Near.Relative(derivative, density.Derivative(x), 1e-12, "f'");
        }
    }

    // Six points, x = 3.5, h = 1.5: no value within reach of a compact kernel, four of six below.
    [Fact]
    public void ValueCumulative_GapOfCompactKernel_IsExact()
    {
        Density density = Density.Of(Sample.Of(TestData.Load("six_points")), Kernel.Epanechnikov, 1.5);
        Assert.Equal(0.0, density.Value(3.5));
        Near.Relative(2.0 / 3, density.Cumulative(3.5), 1e-15);
    }

    // A second opinion: the kernel estimate of a general-purpose mathematics library.
    [Fact]
    public void Value_TenThousandPoints_AgreesWithSecondOpinion()
    {
        var random = new Random(20240);
        double[] values = Enumerable.Range(0, 10_000).Select(_ => random.NextDouble() + random.NextDouble() + random.NextDouble()).ToArray();
        Density gaussian = Density.Of(Sample.Of(values), Kernel.Gaussian, 0.07);
        Density epanechnikov = Density.Of(Sample.Of(values), Kernel.Epanechnikov, 0.15);
        for (int i = 0; i < 25; i++)
        {
            double x = -0.2 + (i * 0.14);
            Near.Absolute(KernelDensity.EstimateGaussian(x, 0.07, values), gaussian.Value(x), 1e-13);
            Near.Absolute(KernelDensity.EstimateEpanechnikov(x, 0.15, values), epanechnikov.Value(x), 1e-13);
        }
    }

    [Fact]
    public void CumulativesSurvivals_ManyPoints_EqualSinglePoints()
    {
        Density density = Density.Of(s_eruptions, Kernel.Gaussian, 0.2);
        double[] x = [6, double.NegativeInfinity, 2, double.PositiveInfinity, 3.3];
        var f = new double[7];
        var lower = new double[5];
        var upper = new double[5];
        density.Derivatives(x, 2, f);
        density.Cumulatives(x, lower);
        density.Survivals(x, upper);
        for (int i = 0; i < x.Length; i++)
        {
            Near.Absolute(density.Derivative(x[i], 2), f[i], 1e-13);
            Near.Absolute(density.Cumulative(x[i]), lower[i], 1e-15);
            Near.Absolute(density.Survival(x[i]), upper[i], 1e-15);
        }

        Assert.Equal(0.0, lower[1]);
        Assert.Equal(1.0, lower[3], 15);
        Assert.Equal(0.0, f[5]);
    }

    [Fact]
    public void Probability_Intervals_AddUpAndKeepTails()
    {
        Density density = Density.Of(s_eruptions, Kernel.Gaussian, 0.2);
        Near.Absolute(1, density.Probability(double.NegativeInfinity, double.PositiveInfinity), 1e-15);
        Near.Absolute(density.Cumulative(4) - density.Cumulative(3), density.Probability(3, 4), 1e-15);
        Near.Relative(density.Survival(6.5) - density.Survival(6.7), density.Probability(6.5, 6.7), 1e-13);
        Assert.True(density.Survival(6.5) < 1e-8);
        Assert.Equal(0.0, density.Probability(3, 3));
    }

    [Fact]
    public void Probability_NarrowInterval_KeepsRelativeAccuracy()
    {
        // ∫ over a width w about x is w f + w³ f″/24 + …; at w = 1e-6 h two terms are exact to 1e-24.
        Density density = Density.Of(s_eruptions, Kernel.Gaussian, 0.2);
        const double W = 1.0 / (1 << 23);
        double expected = (W * density.Value(3)) + (W * W * W * density.Derivative(3, 2) / 24);
        Near.Relative(expected, density.Probability(3 - (W / 2), 3 + (W / 2)), 1e-13);
    }

    [Fact]
    public void Quantiles_ManyProbabilities_EqualSingleOnes()
    {
        Density density = Density.Of(s_eruptions, Kernel.Gaussian, 0.2);
        var places = new double[4];
        density.Quantiles([0.5, 0, 0.01, 1], places);
        Assert.Equal([density.Quantile(0.5), double.NegativeInfinity, density.Quantile(0.01), double.PositiveInfinity], places);
        Assert.Contains("probabilities[1] must lie in [0, 1], but is 1.2", Assert.Throws<ArgumentException>(() => density.Quantiles([0.5, 1.2], new double[2])).Message, StringComparison.Ordinal);
        Assert.Throws<ArgumentException>(() => density.Quantiles([0.5, 0.2], new double[1]));
    }

    // One value, Gaussian kernel: the estimate is the normal law itself; printed tables for the common ones.
    [Theory]
    [InlineData(0.5, 0)]
    [InlineData(0.975, 1.959963984540054)]
    [InlineData(0.001, -3.090232306167813)]
    [InlineData(1e-12, -7.034483825301131)]
    public void Quantile_OneValue_IsTheNormalLaw(double p, double z)
    {
        Density density = Density.Of(Sample.Of([10]), Kernel.Gaussian, 2);
        Near.Relative(10 + (2 * z), density.Quantile(p), 4e-15);
        if (p < 0.5)
        {
            Near.Relative(10 - (2 * z), density.UpperQuantile(p), 4e-15);
        }
    }

    [Fact]
    public void Quantile_EndsAndFlats_AreTheInfimum()
    {
        Sample six = Sample.Of(TestData.Load("six_points"));
        Density compact = Density.Of(six, Kernel.Epanechnikov, 1.5);
        Assert.Equal(six.Minimum - 1.5, compact.Quantile(0));
        Assert.Equal(six.Maximum + 1.5, compact.Quantile(1));
        Assert.Equal(six.Maximum + 1.5, compact.UpperQuantile(0));
        Assert.Equal(double.NegativeInfinity, Density.Of(six, Kernel.Gaussian, 1).Quantile(0));
        Assert.Equal(double.PositiveInfinity, Density.Of(six, Kernel.Gaussian, 1).UpperQuantile(0));

        // Between two far values F is ½ on a long flat; its left end is 0 + h. Near it 1 − F ~ s³/8, so √(rounding) is what can be asked.
        Density two = Density.Of(Sample.Of([0, 100]), Kernel.Epanechnikov, 1);
        Near.Absolute(1, two.Quantile(0.5), 1e-7);
        Assert.True(two.Cumulative(two.Quantile(0.5)) >= 0.5);
    }

    [Property(MaxTest = 60)]
    public void Quantile_OfCumulative_IsIdentityInBothTails(byte seed, byte place)
    {
        var random = new Random(seed);
        double[] values = Enumerable.Range(0, 1 + (seed % 40)).Select(_ => Math.Round(10 * random.NextDouble(), seed % 3)).ToArray();
        foreach (Kernel kernel in new[] { Kernel.Gaussian, Kernel.Epanechnikov })
        {
            Density density = Density.Of(Sample.Of(values), kernel, 0.5 + random.NextDouble());
            double tail = Math.Pow(10, -12.0 * place / 255) / 2;
            double low = density.Quantile(tail);
            double high = density.UpperQuantile(tail);

            // What the rounding of x, of x − X (values up to 10) and of its division by h leaves: 2⁻⁵² each, times the slope.
            double Allowed(double x) => (1e-12 * tail) + (4 * density.Value(x) * Math.Pow(2, -52) * (Math.Abs(x) + 10 + density.Bandwidth));
            Near.Absolute(tail, density.Cumulative(low), Allowed(low), kernel.Name);
            Near.Absolute(tail, density.Survival(high), Allowed(high), kernel.Name);
        }
    }

    [Fact]
    public void Hazard_OneValue_IsTheNormalLawsHazard()
    {
        Density density = Density.Of(Sample.Of([0]), Kernel.Gaussian, 1);
        // φ(0)/½ and, by the continued fraction of Mills' ratio, φ(10)/Φ(−10) = 10.098093233962511 (30-digit arithmetic).
        Near.Relative(2 * 0.3989422804014327, density.Hazard(0), 1e-14);
        Near.Relative(10.098093233962511, density.Hazard(10), 1e-12);
        Assert.Equal(0.0, density.Hazard(double.NegativeInfinity));
        Assert.Throws<InvalidOperationException>(() => density.Hazard(double.PositiveInfinity));
    }

    [Fact]
    public void Draw_OldFaithful_FollowsTheCurve()
    {
        Density density = Density.Of(s_eruptions, Kernel.Epanechnikov, 0.3);
        double[] draws = density.Draw(20_000, 7);
        Assert.Equal(draws, density.Draw(20_000, 7));
        Assert.NotEqual(draws, density.Draw(20_000, 8));

        // Kolmogorov's distance of n draws exceeds 1.95/√n with probability 0.001 (limit law, common tables).
        Array.Sort(draws);
        double distance = 0;
        for (int i = 0; i < draws.Length; i++)
        {
            double f = density.Cumulative(draws[i]);
            distance = Math.Max(distance, Math.Max(f - ((double)i / draws.Length), ((i + 1.0) / draws.Length) - f));
        }

        Assert.True(distance < 1.95 / Math.Sqrt(draws.Length), $"distance {distance}");
    }

    [Fact]
    public void Draw_Weights_NeverPicksWeightZero()
    {
        Sample sample = Sample.Of([0, 100, 200], new SampleOptions { Weights = new double[] { 1, 0, 3 } });
        double[] draws = Density.Of(sample, Kernel.Epanechnikov, 1).Draw(4000, 1);
        Assert.DoesNotContain(draws, d => Math.Abs(d - 100) < 50);

        // Binomial(4000, ¼): standard deviation 27.4; five of them.
        Assert.InRange(draws.Count(d => d < 50), 1000 - 137, 1000 + 137);
        Assert.Empty(Density.Of(sample, Kernel.Epanechnikov, 1).Draw(0, 1));
    }

    [Fact]
    public void Queries_BadInput_NameValueAndIndex()
    {
        Density density = Density.Of(Sample.Of([1, 2, 4]), Kernel.Gaussian, 1);
        Assert.Throws<ArgumentOutOfRangeException>(() => density.Cumulative(double.NaN));
        Assert.Throws<ArgumentOutOfRangeException>(() => density.Survival(double.NaN));
        Assert.Throws<ArgumentOutOfRangeException>(() => density.Derivative(double.NaN));
        Assert.Throws<ArgumentOutOfRangeException>(() => density.Derivative(1, -1));
        Assert.Throws<ArgumentOutOfRangeException>(() => density.Hazard(double.NaN));
        Assert.Throws<ArgumentOutOfRangeException>(() => density.Quantile(double.NaN));
        Assert.Contains("-0.1", Assert.Throws<ArgumentOutOfRangeException>(() => density.Quantile(-0.1)).Message, StringComparison.Ordinal);
        Assert.Contains("1.5", Assert.Throws<ArgumentOutOfRangeException>(() => density.UpperQuantile(1.5)).Message, StringComparison.Ordinal);
        Assert.Throws<ArgumentException>(() => density.Probability(2, 1));
        Assert.Throws<ArgumentOutOfRangeException>(() => density.Draw(-1, 1));
        Assert.Contains("x[1]", Assert.Throws<ArgumentException>(() => density.Cumulatives([1, double.NaN], new double[2])).Message, StringComparison.Ordinal);
        Assert.Contains("holds 1", Assert.Throws<ArgumentException>(() => density.Survivals([1, 2], new double[1])).Message, StringComparison.Ordinal);
        Assert.Throws<ArgumentException>(() => density.Derivatives([1, 2], 1, new double[1]));
        Assert.Equal(0.0, density.Value(double.PositiveInfinity));
        Assert.Equal(1.0, density.Cumulative(double.PositiveInfinity), 15);
        Assert.Equal(0.0, density.Cumulative(double.NegativeInfinity));
        Assert.Equal(0.0, density.Survival(double.PositiveInfinity));
    }
}
