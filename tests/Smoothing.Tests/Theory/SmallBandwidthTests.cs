using System.Globalization;
using Smoothing.Kernels;
using Smoothing.Tests.Support;
using Smoothing.Theory;

namespace Smoothing.Tests.Theory;

/// <summary>Relative accuracy of the bias as h → 0, against a table in 60-digit decimal arithmetic, and the rate at which the asymptotic formulas take over.</summary>
public class SmallBandwidthTests
{
    private static readonly NormalMixture s_groups = new([0.75, 0.25], [0, 1.5], [1, 0.25]);

    public static TheoryData<string, string> Cases => new(
        from target in new[] { "normal", "two groups" }
        from kernel in new[] { "Gaussian", "Gaussian of order 4", "Epanechnikov", "Uniform", "Triangular", "Logistic", "Laplace", "Polynomial of order 4" }
        select (target, kernel));

    [Theory]
    [MemberData(nameof(Cases))]
    public void Bias_SmallBandwidths_KeepsTenDigits(string targetName, string kernelName)
    {
        NormalMixture target = targetName == "normal" ? NormalMixture.Normal() : s_groups;
        Kernel kernel = Named(kernelName);
        var theory = new ErrorTheory(kernel, target);

        // The same target as a plain function, which takes the general quadrature.
        TargetDensity plain = TargetDensity.FromFunction(targetName, target.Value, target.Support, target.Derivative);
        var general = new ErrorTheory(kernel, plain);
        List<string[]> rows = [.. Rows().Where(c => c[0] == targetName && c[1] == kernelName)];
        Assert.Equal(16, rows.Count);
        foreach (string[] c in rows)
        {
            double h = Number(c[2]);
            Near.Relative(Number(c[4]), theory.Bias(Number(c[3]), h), 1e-10, "bias at h = " + c[2]);
            Near.Relative(Number(c[5]), theory.IntegratedSquaredBias(h), 1e-10, "squared bias at h = " + c[2]);
            Near.Relative(Number(c[4]), general.Bias(Number(c[3]), h), 1e-10, "general bias at h = " + c[2]);
            if (c[3] == "0.25" && (c[2] is "1" or "0.1" or "0.0001"))
            {
                Near.Relative(Number(c[5]), general.IntegratedSquaredBias(h), 1e-10, "general squared bias at h = " + c[2]);
            }
        }
    }

    [Theory]
    [InlineData("Gaussian", 0)]
    [InlineData("Epanechnikov", 0)]
    [InlineData("Uniform", 0)]
    [InlineData("Logistic", 0)]
    [InlineData("Gaussian", 1)]
    [InlineData("Biweight", 2)]
    [InlineData("Gaussian of order 4", 0)]
    [InlineData("Polynomial of order 6", 0)]
    public void AsymptoticBias_HalvedBandwidth_ClosesInAtTheStatedOrder(string kernelName, int derivative)
    {
        // Order k formula: remainder of order k + 2; with its next term k + 4 (4 and 6 for kernels of order 2).
        Kernel kernel = Named(kernelName);
        var theory = new ErrorTheory(kernel, s_groups, derivative);
        double Remainder(double h, int terms) => Math.Abs(theory.Bias(0.4, h) - theory.AsymptoticBias(0.4, h, terms));
        double start = 0.25 / Math.Sqrt(Math.Abs(kernel.Moment(kernel.Order)) > 1 ? 10 : 1);
        for (int terms = 1; terms <= 2; terms++)
        {
            double h = start / 4;
            double order = Math.Log2(Remainder(h, terms) / Remainder(h / 2, terms));
            Near.Absolute(kernel.Order + (2 * terms), order, 0.1, FormattableString.Invariant($"{kernelName}, {terms} terms"));
        }
    }

    [Fact]
    public void AsymptoticErrors_SmallBandwidth_ApproachTheExactOnes()
    {
        var theory = new ErrorTheory(Kernel.Epanechnikov, s_groups);
        double before = double.PositiveInfinity;
        for (double h = 0.2; h > 0.01; h /= 2)
        {
            long n = (long)Math.Pow(h, -5);
            double gap = Math.Abs((theory.Amise(h, n) / theory.Mise(h, n)) - 1);
            Assert.True(gap < 0.8 * before, FormattableString.Invariant($"h = {h}: {gap} after {before}"));
            before = gap;

            // Variance: the two-term formula misses O(h/n), the one-term formula O(1/n).
            double exact = theory.Variance(0.4, h, n);
            Near.Absolute(exact, theory.AsymptoticVariance(0.4, h, n, 2), 0.5 * h / n);
            Near.Absolute(exact, theory.AsymptoticVariance(0.4, h, n), 0.2 / n);
        }

        Assert.True(before < 0.02);
    }

    private static Kernel Named(string name) =>
        Kernel.Standard.Concat([Kernel.GaussianOfOrder(4), Kernel.PolynomialOfOrder(4), Kernel.PolynomialOfOrder(6)]).Single(k => k.Name == name);

    private static double Number(string text) => double.Parse(text, CultureInfo.InvariantCulture);

    private static IEnumerable<string[]> Rows() =>
        File.ReadLines(TestData.PathOf("smoothing_bias.csv")).Skip(2).Where(line => line.Length > 0).Select(line => line.Split(','));
}
