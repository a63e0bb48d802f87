using System.Numerics;
using MathNet.Numerics;
using MathNet.Numerics.Distributions;
using Smoothing.Tests.Support;
using Smoothing.Theory;

namespace Smoothing.Tests.Theory;

/// <summary>MathNet.Numerics' distributions as targets: derivatives against Cauchy's integral formula on the density written for complex numbers here.</summary>
public class DistributionTargetTests
{
    /// <summary>Name, distribution, density for complex x, nearest singularity from x.</summary>
    private static readonly (string Name, IContinuousDistribution Law, Func<Complex, Complex> Density, Func<double, double> Room)[] s_laws =
    [
        ("normal", new Normal(1, 2), x => Complex.Exp(-(x - 1) * (x - 1) / 8) / (2 * Math.Sqrt(2 * Math.PI)), _ => 4),
        ("gamma", new Gamma(2.7, 3), x => Math.Pow(3, 2.7) / SpecialFunctions.Gamma(2.7) * Complex.Pow(x, 1.7) * Complex.Exp(-3 * x), x => x),
        ("exponential", new Exponential(0.5), x => 0.5 * Complex.Exp(-0.5 * x), _ => 3),
        ("log-normal", new LogNormal(0.3, 0.7), x => Complex.Exp(-Complex.Pow((Complex.Log(x) - 0.3) / 0.7, 2) / 2) / (x * 0.7 * Math.Sqrt(2 * Math.PI)), x => x),
        ("Student", new StudentT(-1, 2, 3.5), x => SpecialFunctions.Gamma(2.25) / (SpecialFunctions.Gamma(1.75) * Math.Sqrt(3.5 * Math.PI) * 2) * Complex.Pow(1 + ((x + 1) * (x + 1) / 4 / 3.5), -2.25), x => Math.Sqrt(((x + 1) * (x + 1)) + (3.5 * 4))),
        ("Weibull", new Weibull(1.8, 2), x => 0.9 * Complex.Pow(x / 2, 0.8) * Complex.Exp(-Complex.Pow(x / 2, 1.8)), x => x),
        ("beta", new Beta(2.5, 3.5), x => SpecialFunctions.Gamma(6) / (SpecialFunctions.Gamma(2.5) * SpecialFunctions.Gamma(3.5)) * Complex.Pow(x, 1.5) * Complex.Pow(1 - x, 2.5), x => Math.Min(x, 1 - x)),
        ("logistic", new Logistic(2, 0.5), x => Complex.Exp(-(x - 2) / 0.5) / 0.5 / Complex.Pow(1 + Complex.Exp(-(x - 2) / 0.5), 2), _ => 1.5),
        ("Cauchy", new Cauchy(1, 2), x => 1 / (2 * Math.PI * (1 + ((x - 1) * (x - 1) / 4))), _ => 2),
        ("Rayleigh", new Rayleigh(1.5), x => x / 2.25 * Complex.Exp(-x * x / 4.5), _ => 2),
        ("Pareto", new Pareto(2, 3), x => 24 / Complex.Pow(x, 4), x => x),
        ("chi-squared", new ChiSquared(5), x => Complex.Pow(x, 1.5) * Complex.Exp(-x / 2) / (Math.Pow(2, 2.5) * SpecialFunctions.Gamma(2.5)), x => x),
    ];

    private static readonly (string Name, IContinuousDistribution Law, Func<Complex, Complex> Density, Func<double, double> Room)[] s_numerical =
    [
        ("inverse Gaussian", new InverseGaussian(1.5, 2), x => Complex.Sqrt(2 / (2 * Math.PI * x * x * x)) * Complex.Exp(-2 * (x - 1.5) * (x - 1.5) / (2 * 2.25 * x)), x => x),
        ("inverse gamma", new InverseGamma(3, 2), x => 8 / 2.0 * Complex.Pow(x, -4) * Complex.Exp(-2 / x), x => x),
        ("F", new FisherSnedecor(6, 9), x => Math.Pow(6.0 / 9, 3) / SpecialFunctions.Beta(3, 4.5) * x * x * Complex.Pow(1 + (6 * x / 9), -7.5), x => x),
    ];

    public static TheoryData<string> Names => new(s_laws.Select(l => l.Name));

    public static TheoryData<string> Numerical => new(s_numerical.Select(l => l.Name));

    [Theory]
    [MemberData(nameof(Names))]
    public void From_ClosedFormFamilies_GiveEveryDerivativeByRounding(string name)
    {
        (_, IContinuousDistribution law, Func<Complex, Complex> density, Func<double, double> room) = s_laws.Single(l => l.Name == name);
        TargetDensity target = TargetDensity.From(law);
        foreach (double p in new[] { 0.01, 0.2, 0.5, 0.77, 0.99 })
        {
            double x = target.Quantile(p);
            Near.Absolute(p, law.CumulativeDistribution(x), 1e-12, name + " quantile");
            Near.Relative(law.Density(x), target.Value(x), 1e-12, name);
            for (int order = 1; order <= 6; order++)
            {
                double size = Circle(density, x, 0.4 * room(x), order, out double largest);
                Near.Absolute(size, target.Derivative(x, order), 1e-11 * largest, FormattableString.Invariant($"{name}, order {order} at {x}"));
            }
        }
    }

    [Theory]
    [MemberData(nameof(Numerical))]
    public void From_OtherDistributions_KeepTheStatedAccuracy(string name)
    {
        (_, IContinuousDistribution law, Func<Complex, Complex> density, Func<double, double> room) = s_numerical.Single(l => l.Name == name);
        TargetDensity target = TargetDensity.From(law);
        double[] stated = [0, 1e-10, 1e-9, 1e-7, 1e-6];
        double[] points = [.. Enumerable.Range(1, 49).Select(i => target.Quantile(i / 50.0))];
        for (int order = 1; order <= 4; order++)
        {
            double[] exact = [.. points.Select(x => Circle(density, x, 0.4 * room(x), order, out _))];
            double largest = exact.Max(Math.Abs);
            for (int i = 0; i < points.Length; i++)
            {
                Near.Absolute(exact[i], target.Derivative(points[i], order), stated[order] * largest, FormattableString.Invariant($"{name}, order {order} at {points[i]}"));
            }
        }

        Assert.Contains("Derivative 5", Assert.Throws<InvalidOperationException>(() => target.Derivative(1, 5)).Message, StringComparison.Ordinal);
    }

    [Fact]
    public void From_KinksAndEnds_AreTakenFromTheirSides()
    {
        TargetDensity laplace = TargetDensity.From(new Laplace(1, 2));
        Near.Relative(0.25 * Math.Exp(-0.5) / 4, laplace.Derivative(2, 2), 1e-13);
        Assert.Equal(0, laplace.Derivative(1)); // the mean of both sides
        Assert.Contains("f^(1) jumps by -0.25 at 0", Assert.Throws<InvalidOperationException>(() => TargetDensity.From(new Laplace(0, 2)).Roughness(2)).Message, StringComparison.Ordinal);
        Near.Relative(1 / 32.0, laplace.Roughness(1), 1e-12); // ∫ (e^{−|x|/2}/8)² = 2/64
        TargetDensity triangle = TargetDensity.From(new Triangular(0, 4, 1));
        Near.Relative(0.5, triangle.Derivative(0.5), 1e-14);
        Near.Relative(-1 / 6.0, triangle.Derivative(2), 1e-14);
        Near.Relative((1 * 0.25) + (3 / 36.0), triangle.Roughness(1), 1e-12);
        Assert.Equal(double.PositiveInfinity, TargetDensity.From(new Gamma(1.5, 1)).Derivative(0));
        Assert.Equal(0, TargetDensity.From(new Gamma(2.5, 1)).Derivative(0));
        Near.Relative(1, TargetDensity.From(new Gamma(2, 1)).Derivative(0), 1e-12);
        Assert.Equal(0, TargetDensity.From(new LogNormal(0, 1)).Derivative(0, 3));
        Near.Relative(-4, TargetDensity.From(new Exponential(2)).Derivative(0), 1e-14);
    }

    [Fact]
    public void From_ScaleBeyondSquares_IsTheStandardMemberScaled()
    {
        foreach (double s in new[] { 1e-150, 1e150 })
        {
            Near.Relative(2 * Math.Exp(-2) / s, TargetDensity.From(new Gamma(3, 1 / s)).Value(2 * s), 1e-12);
            Near.Relative(1 / (Math.PI * s * 2), TargetDensity.From(new Cauchy(0, s)).Value(s), 1e-12);
            Near.Relative(Math.Log(2) * s, TargetDensity.From(new Exponential(1 / s)).Quantile(0.5), 1e-12);
        }
    }

    [Fact]
    public void Quantile_LowerTail_KeepsItsDigits()
    {
        // Weibull(½): F(x) = 1 − exp(−√x), so the quantile of 1e-9 is 1e-18 (1 + 1e-9); MathNet's cumulative keeps 7 digits there.
        Near.Relative(1e-18, TargetDensity.From(new Weibull(0.5, 1)).Quantile(1e-9), 1e-6);
    }

    [Theory]
    [MemberData(nameof(Names))]
    public void Draw_Seeded_FollowsTheLaw(string name)
    {
        TargetDensity target = TargetDensity.From(s_laws.Single(l => l.Name == name).Law);
        const int N = 2_000;
        double[] draws = target.Draw(N, 11);
        Assert.Equal(draws, target.Draw(N, 11));
        Assert.NotEqual(draws, target.Draw(N, 12));
        foreach (double p in new[] { 0.1, 0.5, 0.9 })
        {
            double x = target.Quantile(p);
            Near.Absolute(p, draws.Count(v => v <= x) / (double)N, 4 * Math.Sqrt(p * (1 - p) / N), name);
        }
    }

    /// <summary>f⁽ʳ⁾(x) = r!/(2πi) ∮ f(z)/(z − x)^(r+1) dz by the trapezoidal rule on a circle, exact to rounding for 128 points.</summary>
    private static double Circle(Func<Complex, Complex> f, double x, double radius, int order, out double largest)
    {
        Complex sum = 0;
        largest = 0;
        for (int j = 0; j < 128; j++)
        {
            var turn = Complex.FromPolarCoordinates(1, 2 * Math.PI * j / 128);
            Complex value = f(x + (radius * turn));
            largest = Math.Max(largest, value.Magnitude);
            sum += value / Complex.Pow(turn, order);
        }

        double scale = SpecialFunctions.Factorial(order) / Math.Pow(radius, order);
        largest *= scale;
        return (sum / 128).Real * scale;
    }
}
