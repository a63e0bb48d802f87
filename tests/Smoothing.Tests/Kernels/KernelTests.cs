using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Kernels;

public class KernelTests
{
    // μ₂, μ₄, R(K), R(K'), R(K''), efficiency, δ₀: computed from the closed forms in 30-digit arithmetic; NaN where the roughness does not exist.
    public static TheoryData<string, double, double, double, double, double, double, double> Constants { get; } = new()
    {
        { "Uniform", 1.0 / 3, 0.2, 0.5, double.NaN, double.NaN, 0.92951600308978005244, 1.35096003852061341343 },
        { "Triangular", 1.0 / 6, 1.0 / 15, 2.0 / 3, 2, double.NaN, 0.98590060350929900422, 1.88817502258980396432 },
        { "Epanechnikov", 0.2, 3.0 / 35, 0.6, 1.5, double.NaN, 1, 1.71877192758747877701 },
        { "Biweight", 1.0 / 7, 1.0 / 21, 5.0 / 7, 15.0 / 7, 22.5, 0.99390140356073549515, 2.03616800464039801736 },
        { "Triweight", 1.0 / 9, 1.0 / 33, 350.0 / 429, 35.0 / 11, 35, 0.98668096698590720203, 2.31216676418239671732 },
        { "Tricube", 35.0 / 243, 1.0 / 22, 175.0 / 247, 420.0 / 187, 7840.0 / 243, 0.99791664684605704502, 2.02620559751110195141 },
        { "Cosine", 0.18943053086129782844, 0.07872037096657168332, 0.61685027506808491367, 1.52201704740628808181, double.NaN, 0.99945097804158290180, 1.76626540220505308808 },
        { "Gaussian", 1, 3, 0.28209479177387814347, 0.14104739588693907173, 0.21157109383040860760, 0.95119855142544264320, 0.77638835640901964121 },
        { "Logistic", 3.28986813369645287294, 45.4575758158678040436, 1.0 / 6, 1.0 / 30, 1.0 / 42, 0.88762239944855972001, 0.43400861838111956288 },
        { "Laplace", 2, 24, 0.25, 0.25, double.NaN, 0.75894663844041103967, 0.57434917749851750339 },
    };

    public static IEnumerable<TheoryDataRow<string>> Names => AllKernels.Select(k => new TheoryDataRow<string>(k.Name));

    private static IEnumerable<Kernel> AllKernels =>
        Kernel.Standard.Concat([Kernel.GaussianOfOrder(4), Kernel.GaussianOfOrder(6), Kernel.GaussianOfOrder(8), Kernel.PolynomialOfOrder(4), Kernel.PolynomialOfOrder(6)]);

    [Fact]
    public void Standard_TenKernels_StandInTheStatedOrder() =>
        Assert.Equal(["Uniform", "Triangular", "Epanechnikov", "Biweight", "Triweight", "Tricube", "Cosine", "Gaussian", "Logistic", "Laplace"], Kernel.Standard.Select(k => k.Name));

    [Theory]
    [MemberData(nameof(Constants))]
    public void Constants_StandardKernel_MatchHighPrecision(string name, double mu2, double mu4, double roughness, double first, double second, double efficiency, double canonical)
    {
        Kernel kernel = Find(name);
        Assert.Equal(2, kernel.Order);
        Near.Relative(mu2, kernel.Moment(2), 1e-14);
        Near.Relative(mu4, kernel.Moment(4), 1e-14);
        Near.Relative(roughness, kernel.Roughness(), 1e-14);
        Near.Relative(efficiency, kernel.Efficiency, 1e-14);
        Near.Relative(canonical, kernel.CanonicalBandwidth, 1e-14);
        Assert.Equal(0, kernel.Moment(3));
        if (double.IsNaN(first))
        {
            Assert.Contains("does not exist", Assert.Throws<InvalidOperationException>(() => kernel.Roughness(1)).Message, StringComparison.Ordinal);
        }
        else
        {
            Near.Relative(first, kernel.Roughness(1), 1e-14);
        }

        if (double.IsNaN(second))
        {
            Assert.Throws<InvalidOperationException>(() => kernel.Roughness(2));
        }
        else
        {
            Near.Relative(second, kernel.Roughness(2), 1e-14);
        }
    }

    // Published figures, quoted from memory and reproduced to the digits printed: Silverman (1986), Table 3.1; Wand & Jones (1995), Table 2.1;
    // Marron & Nolan (1988) for the canonical bandwidths.
    [Theory]
    [InlineData("Biweight", 0.9939)]
    [InlineData("Triangular", 0.9859)]
    [InlineData("Gaussian", 0.9512)]
    [InlineData("Uniform", 0.9295)]
    [InlineData("Triweight", 0.987)]
    public void Efficiency_Published_AgreesToTheDigitsPrinted(string name, double published) =>
        Near.Absolute(published, Find(name).Efficiency, name == "Triweight" ? 5e-4 : 5e-5);

    [Theory]
    [InlineData("Gaussian", 0.7764)]
    [InlineData("Uniform", 1.3510)]
    [InlineData("Epanechnikov", 1.7188)]
    [InlineData("Biweight", 2.0362)]
    [InlineData("Triweight", 2.3122)]
    public void CanonicalBandwidth_Published_AgreesToTheDigitsPrinted(string name, double published) => Near.Absolute(published, Find(name).CanonicalBandwidth, 5e-5);

    [Theory]
    [MemberData(nameof(Names))]
    public void EveryMember_AgainstTheTestsOwnQuadrature_Agrees(string name)
    {
        Kernel kernel = Find(name);
        double end = double.IsInfinity(kernel.SupportRadius) ? (name is "Logistic" or "Laplace" ? 48 : 14) : 1;
        double scale = kernel.Roughness();
        Near.Absolute(1, Own(kernel.Value, -end, end, 0), 1e-13, "mass");
        foreach (double u in new[] { -0.97, -0.6, -0.2, 0, 0.31, 0.75, 0.999 })
        {
            double upper = u * Math.Min(end, 4);
            Near.Absolute(Own(kernel.Value, -end, upper, 0), kernel.Cumulative(upper), 1e-13, $"cumulative {upper}");
            foreach (int j in new[] { 1, 2, 3, 4 })
            {
                double whole = Math.Max(1, Math.Abs(kernel.Moment(j + (j % 2))));
                Near.Absolute(Own(v => Math.Pow(v, j) * kernel.Value(v), -end, upper, 0), kernel.IncompleteMoment(j, upper), 4e-14 * whole, $"incomplete {j} {upper}");
            }
        }

        foreach (double t in new[] { 1e-9, 0.4, 1.5, 3.0, 7.7, 23.9, 24.1, 60 })
        {
            Near.Absolute(Own(v => kernel.Value(v) * Math.Cos(t * v), -end, end, 0), kernel.FourierTransform(t), 1e-13, $"transform {t}");
            Assert.Equal(kernel.FourierTransform(t), kernel.FourierTransform(-t));
        }

        foreach (double d in new[] { 0, 1e-6, 0.2, 0.7, 1.0, 1.3, 1.9, 1.999, 2.5, 6 })
        {
            Near.Absolute(Own(v => kernel.Value(v) * kernel.Value(d - v), -end, end, 0, d, 1, d - 1, d + 1), kernel.SelfConvolution(d), 2e-14 * Math.Max(scale, 1), $"self-convolution {d}");
        }
    }

    [Theory]
    [MemberData(nameof(Names))]
    public void Identities_EveryKernel_Hold(string name)
    {
        Kernel kernel = Find(name);
        Assert.Equal(1, kernel.FourierTransform(0));
        Near.Relative(kernel.Roughness(), kernel.SelfConvolution(0), 1e-14);
        Near.Absolute(kernel.Moment(2), kernel.IncompleteMoment(2, double.PositiveInfinity), 1e-15);
        Assert.Equal(0, kernel.IncompleteMoment(3, double.NegativeInfinity));
        Assert.Equal(0, kernel.Value(double.PositiveInfinity));
        Assert.Equal(1, kernel.Cumulative(double.PositiveInfinity));
        Assert.Equal(0, kernel.Cumulative(double.NegativeInfinity));
        Near.Absolute(0.5, kernel.Cumulative(0), 1e-15);
        for (int j = 2; j < kernel.Order; j += 2)
        {
            Near.Absolute(0, kernel.Moment(j), 1e-14, $"moment {j}");
        }

        Assert.True(Math.Abs(kernel.Moment(kernel.Order)) > 1e-4);
    }

    // Closed forms of the self-convolutions, multiplied out by hand; to 1e-14 of the value at 0.
    [Fact]
    public void SelfConvolution_ClosedForms_AgreeTo1e14()
    {
        for (double u = 0; u < 2.2; u += 0.0731)
        {
            double t = Math.Max(2 - u, 0);
            Near.Absolute(t / 4, Kernel.Uniform.SelfConvolution(u), 0.5e-14);
            Near.Absolute(3.0 / 160 * t * t * t * ((u * u) + (6 * u) + 4), Kernel.Epanechnikov.SelfConvolution(u), 0.6e-14);
            Near.Absolute(5.0 / 3584 * Math.Pow(t, 5) * (16 + (40 * u) + (36 * u * u) + (10 * u * u * u) + Math.Pow(u, 4)), Kernel.Biweight.SelfConvolution(-u), 0.7e-14);
            Near.Absolute(Math.Exp(-u * u / 4) / Math.Sqrt(4 * Math.PI), Kernel.Gaussian.SelfConvolution(u), 0.28e-14);
            Near.Absolute((1 + u) * Math.Exp(-u) / 4, Kernel.Laplace.SelfConvolution(u), 0.25e-14);
        }
    }

    // Transforms: sinc for the uniform, its square for the triangular kernel, 3(sin t − t cos t)/t³ for Epanechnikov: common tables.
    [Fact]
    public void FourierTransform_ClosedForms_AgreeTo1e14()
    {
        foreach (double t in new[] { 0.8, 3.3, 11.0, 23.0, 25.0, 70.0, 500.0 })
        {
            Near.Absolute(Math.Sin(t) / t, Kernel.Uniform.FourierTransform(t), 1e-14);
            Near.Absolute(Math.Pow(Math.Sin(t / 2) / (t / 2), 2), Kernel.Triangular.FourierTransform(t), 1e-14);
            Near.Absolute(3 * (Math.Sin(t) - (t * Math.Cos(t))) / (t * t * t), Kernel.Epanechnikov.FourierTransform(t), 1e-14);
        }
    }

    // Parseval: R(K) = (1/π) ∫₀^∞ κ². Only for transforms that die off within reach of a plain sum.
    [Theory]
    [InlineData("Gaussian", 12)]
    [InlineData("Gaussian of order 6", 14)]
    [InlineData("Logistic", 16)]
    public void FourierTransform_Parseval_GivesTheRoughness(string name, double end) =>
        Near.Relative(Find(name).Roughness(), Own(t => Math.Pow(Find(name).FourierTransform(t), 2), 0, end) / Math.PI, 1e-13);

    [Theory]
    [MemberData(nameof(Names))]
    public void Derivative_EveryKernel_IsTheSlopeOfTheOneBelow(string name)
    {
        Kernel kernel = Find(name);
        foreach (double u in new[] { -0.83, -0.4, -0.11, 0.21, 0.55, 0.9 })
        {
            for (int r = 1; r <= 3; r++)
            {
                const double Step = 1e-4;
                double Below(double v) => kernel.Derivative(v, r - 1);
                double slope = ((8 * (Below(u + Step) - Below(u - Step))) - (Below(u + (2 * Step)) - Below(u - (2 * Step)))) / (12 * Step);
                Near.Absolute(slope, kernel.Derivative(u, r), 1e-8 * (1 + Math.Abs(slope)), $"{r} at {u}");
            }
        }
    }

    [Fact]
    public void Derivative_AtKinksAndJumps_IsTheMeanOrAnError()
    {
        Assert.Equal(0, Kernel.Triangular.Derivative(0));
        Assert.Equal(-0.5, Kernel.Triangular.Derivative(1));
        Assert.Equal(-0.75, Kernel.Epanechnikov.Derivative(1), 15);
        Assert.Equal(0, Kernel.Laplace.Derivative(0));
        Assert.Equal(0, Kernel.Biweight.Derivative(1));
        Assert.Throws<InvalidOperationException>(() => Kernel.Uniform.Derivative(1));
        Assert.Throws<InvalidOperationException>(() => Kernel.Triangular.Derivative(0, 2));
        Assert.Throws<InvalidOperationException>(() => Kernel.Laplace.Derivative(0, 2));
        Assert.Throws<InvalidOperationException>(() => Kernel.Epanechnikov.Derivative(-1, 2));
    }

    // R and the k-th moment of the higher-order kernels: exact fractions of the published formulas (Wand & Schucany 1990; Gasser, Müller & Mammitzsch 1985).
    [Fact]
    public void HigherOrder_ConstantsAndFormulas_AreThePublishedOnes()
    {
        Near.Relative(27 / (32 * Math.Sqrt(Math.PI)), Kernel.GaussianOfOrder(4).Roughness(), 1e-14);
        Near.Relative(2265 / (2048 * Math.Sqrt(Math.PI)), Kernel.GaussianOfOrder(6).Roughness(), 1e-14);
        Near.Relative(0.74785078617543927989, Kernel.GaussianOfOrder(8).Roughness(), 1e-14);
        Assert.Equal(-3, Kernel.GaussianOfOrder(4).Moment(4), 12);
        Assert.Equal(15, Kernel.GaussianOfOrder(6).Moment(6), 11);
        Assert.Equal(-105, Kernel.GaussianOfOrder(8).Moment(8), 10);
        Near.Relative(1.25, Kernel.PolynomialOfOrder(4).Roughness(), 1e-14);
        Near.Relative(1575.0 / 832, Kernel.PolynomialOfOrder(6).Roughness(), 1e-14);
        Near.Relative(-1.0 / 21, Kernel.PolynomialOfOrder(4).Moment(4), 1e-14);
        Near.Relative(5.0 / 429, Kernel.PolynomialOfOrder(6).Moment(6), 1e-14);
        Assert.Equal(1, Kernel.PolynomialOfOrder(4).Efficiency, 14);
        Assert.Equal(1, Kernel.PolynomialOfOrder(6).Efficiency, 14);
        Assert.InRange(Kernel.GaussianOfOrder(4).Efficiency, 0.5, 1);
        const double U = 0.7;
        double phi = Math.Exp(-U * U / 2) / Math.Sqrt(2 * Math.PI);
        Near.Relative(phi * (3 - (U * U)) / 2, Kernel.GaussianOfOrder(4).Value(U), 1e-14);
        Near.Relative(phi * (15 - (10 * U * U) + Math.Pow(U, 4)) / 8, Kernel.GaussianOfOrder(6).Value(U), 1e-14);
        Near.Relative(phi * (105 - (105 * U * U) + (21 * Math.Pow(U, 4)) - Math.Pow(U, 6)) / 48, Kernel.GaussianOfOrder(8).Value(U), 1e-14);
        Near.Relative(15.0 / 32 * (3 - (10 * U * U) + (7 * Math.Pow(U, 4))), Kernel.PolynomialOfOrder(4).Value(U), 1e-13);
        Assert.Throws<ArgumentOutOfRangeException>(() => Kernel.GaussianOfOrder(3));
        Assert.Throws<ArgumentOutOfRangeException>(() => Kernel.PolynomialOfOrder(8));
    }

    [Fact]
    public void EdgePolynomial_EveryPolynomialKernel_ReproducesTheKernel()
    {
        foreach (Kernel kernel in AllKernels.Where(k => !k.EdgePolynomial.IsEmpty))
        {
            for (double u = -1; u <= 1; u += 0.0625)
            {
                double s = 1 - Math.Abs(u);
                double sum = 0;
                for (int k = kernel.EdgePolynomial.Length - 1; k >= 0; k--)
                {
                    sum = (sum * s) + kernel.EdgePolynomial[k];
                }

                Near.Absolute(kernel.Value(u), sum, 2e-14, kernel.Name);
            }
        }
    }

    [Fact]
    public void Members_NaNOrNegativeOrder_Throw()
    {
        foreach (Kernel kernel in AllKernels)
        {
            Assert.Throws<ArgumentOutOfRangeException>(() => kernel.Value(double.NaN));
            Assert.Throws<ArgumentOutOfRangeException>(() => kernel.FourierTransform(double.NaN));
            Assert.Throws<ArgumentOutOfRangeException>(() => kernel.IncompleteMoment(-1, 0));
            Assert.Throws<ArgumentOutOfRangeException>(() => kernel.Moment(-1));
            Assert.Throws<ArgumentOutOfRangeException>(() => kernel.Roughness(-1));
        }
    }

    [Fact]
    public void FromShape_KnownShapes_AreMeasuredTo1e9()
    {
        Kernel biweight = Kernel.FromShape("own biweight", u => 3 * Math.Pow(1 - (u * u), 2), 1, (u, r) => r == 1 ? -12 * u * (1 - (u * u)) : throw new InvalidOperationException("only the first"));
        Near.Relative(Kernel.Biweight.Moment(2), biweight.Moment(2), 1e-9);
        Near.Relative(Kernel.Biweight.Roughness(), biweight.Roughness(), 1e-9);
        Near.Relative(Kernel.Biweight.Roughness(1), biweight.Roughness(1), 1e-9);
        Near.Relative(Kernel.Biweight.Cumulative(-0.4), biweight.Cumulative(-0.4), 1e-9);
        Near.Relative(Kernel.Biweight.SelfConvolution(0.6), biweight.SelfConvolution(0.6), 1e-9);
        Kernel gaussian = Kernel.FromShape("bell", u => Math.Exp(-u * u / 2), double.PositiveInfinity);
        Near.Relative(1, gaussian.Moment(2), 1e-9);
        Near.Relative(Kernel.Gaussian.CanonicalBandwidth, gaussian.CanonicalBandwidth, 1e-9);
        Near.Absolute(Kernel.Gaussian.FourierTransform(1.3), gaussian.FourierTransform(1.3), 1e-9);
        Assert.Throws<InvalidOperationException>(() => gaussian.Derivative(0.3));
        Assert.Throws<InvalidOperationException>(() => gaussian.Roughness(1));
        Assert.Equal(4, Kernel.FromShape("fourth", u => (3 - (10 * u * u) + (7 * Math.Pow(u, 4))), 1).Order);
    }

    [Fact]
    public void FromShape_UnusableShapes_AreRefusedWithTheReason()
    {
        Refused("symmetric", u => u > 0 ? 1 : 0.5, 1);
        Refused("NaN", u => Math.Sqrt(0.25 - (u * u)), 1);
        Refused("integral must be positive", u => u * u < 0.25 ? 1 : -1, 1);
        Refused("integral must be positive", _ => -1, 1);
        Refused("bounded", u => 1 / Math.Abs(u), 1);
        Refused("second moment", u => 1 / (1 + (u * u)), double.PositiveInfinity);
        Assert.Throws<ArgumentOutOfRangeException>(() => Kernel.FromShape("none", _ => 1, 0));
        Assert.Throws<ArgumentOutOfRangeException>(() => Kernel.FromShape("none", _ => 1, double.NaN));
    }

    private static void Refused(string words, Func<double, double> shape, double radius) =>
        Assert.Contains(words, Assert.Throws<ArgumentException>(() => Kernel.FromShape("bad", shape, radius)).Message, StringComparison.Ordinal);

    private static Kernel Find(string name) => AllKernels.First(k => k.Name == name);

    // Composite five-point Gauss–Legendre, cut at the kinks: the tests' own, nothing of the library's.
    private static double Own(Func<double, double> f, double from, double to, params double[] kinks)
    {
        double[] cuts = [from, .. kinks.Append(-1).Append(1).Where(k => k > from && k < to).Distinct().Order(), to];
        double sum = 0;
        for (int i = 1; i < cuts.Length; i++)
        {
            double a = cuts[i - 1];
            double b = cuts[i];
            int panels = 64 * Math.Max(1, (int)Math.Ceiling(b - a));
            for (int p = 0; p < panels; p++)
            {
                // Five-point Gauss–Legendre nodes and weights, Abramowitz & Stegun table 25.4.
                double half = (b - a) / (2 * panels);
                double middle = a + ((2 * p) + 1) * half;
                double part = 0.568888888888888888889 * f(middle);
                part += 0.478628670499366468041 * (f(middle - (0.538469310105683091036 * half)) + f(middle + (0.538469310105683091036 * half)));
                part += 0.236926885056189087514 * (f(middle - (0.906179845938663992798 * half)) + f(middle + (0.906179845938663992798 * half)));
                sum += part * half;
            }
        }

        return sum;
    }
}
