using Smoothing.Estimation;
using Smoothing.Kernels;
using Smoothing.Samples;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Estimation;

// Bounds: linear binning interpolates K linearly between nodes (Jones & Lotwick 1984), so the error at a node is at most
// (δ²/8) max|K_h''|, to first order in δ at a kink, and in the integral for a jump.
public class DensityTabulateTests
{
    private static readonly double[] s_eruptions = TestData.Load("faithful_eruptions_272");

    private static readonly Kernel[] s_kernels = [.. Kernel.Standard];

    public static TheoryData<string> Smooth => Names(1);

    public static TheoryData<string> Kinked => Names(0);

    [Fact]
    public void Of_StandardKernels_KnowsTheirSmoothness()
    {
        foreach (Kernel kernel in s_kernels)
        {
            int expected = kernel.Name switch
            {
                "Uniform" => -1,
                "Triangular" or "Epanechnikov" or "Cosine" or "Laplace" => 0,
                _ => 1,
            };
            Assert.Equal(expected, KernelSmoothness.Of(kernel).ContinuousDerivatives);
        }
    }

    // max|φ''| = φ(0), max|(¾(1−u²))'| = 1.5: by hand. Sampling misses the greatest by at most one part in 10³.
    [Fact]
    public void Of_GaussianAndEpanechnikov_FindsTheLargestDerivative()
    {
        Near.Relative(0.3989422804014327, KernelSmoothness.Of(Kernel.Gaussian).Largest, 1e-3);
        Near.Relative(1.5, KernelSmoothness.Of(Kernel.Epanechnikov).Largest, 1e-3);
    }

    [Theory]
    [MemberData(nameof(Smooth))]
    public void TryFill_SmoothKernel_StaysInsideTheBoundAndFallsByFourPerHalving(string name)
    {
        Kernel kernel = Named(name);
        Sample sample = Sample.Of(s_eruptions);
        const double bandwidth = 0.3;
        double largest = KernelSmoothness.Of(kernel).Largest;
        double previous = 0;
        foreach (int refinement in new[] { 1, 2, 4, 8 })
        {
            (double error, double step) = WorstError(sample, kernel, bandwidth, refinement);
            Assert.True(error <= 1.001 * step * step / 8 * largest / (bandwidth * bandwidth * bandwidth), $"{name}: error {error:E2} at step {step:G3}");
            if (previous > 0)
            {
                Assert.InRange(previous / error, 2.5, 6.5); // 4 on average over node offsets; the triweight's curvature changes fastest
            }

            previous = error;
        }
    }

    [Theory]
    [MemberData(nameof(Kinked))]
    public void TryFill_KinkedKernel_StaysInsideTheFirstOrderBound(string name)
    {
        Kernel kernel = Named(name);
        Sample sample = Sample.Of(s_eruptions);
        const double bandwidth = 0.3;
        double largest = KernelSmoothness.Of(kernel).Largest;
        foreach (int refinement in new[] { 1, 2, 4, 8 })
        {
            (double error, double step) = WorstError(sample, kernel, bandwidth, refinement);
            // The triangular kernel is linear between nodes that h is a multiple of: nothing is lost there.
            double least = name == "Triangular" ? 0 : 1e-9;
            Assert.InRange(error, least, 1.001 * step / 2 * largest / (bandwidth * bandwidth));
        }
    }

    [Theory]
    [InlineData(2)]
    [InlineData(17)]
    [InlineData(401)]
    public void Tabulate_AnyNumberOfPoints_KeepsTheStatedError(int points)
    {
        Sample sample = Sample.Of(s_eruptions);
        Density density = Density.Of(sample, Kernel.Gaussian, 0.3);
        Curve curve = density.Tabulate(1, 6, points);
        Assert.Equal(points, curve.X.Count);
        Assert.Equal(1, curve.X[0]);
        Assert.Equal(6, curve.X[^1]);
        for (int j = 0; j < points; j++)
        {
            Near.Absolute(density.Value(curve.X[j]), curve.Y[j], BinnedTable.Aim * 0.39895 / 0.3);
        }
    }

    [Theory]
    [InlineData(0.05)]
    [InlineData(0.3)]
    [InlineData(2)]
    public void Tabulate_WideRange_HoldsMassOne(double bandwidth)
    {
        Sample sample = Sample.Of(s_eruptions);
        foreach (Kernel kernel in s_kernels.Where(k => !double.IsFinite(k.SupportRadius) && k.Name == "Gaussian"))
        {
            // Step h/4: the trapezoid sum of a Gaussian curve is then exact to exp(−2π²·16).
            int points = (int)(60 * 4 / bandwidth) + 1;
            Curve curve = Density.Of(sample, kernel, bandwidth).Tabulate(-26, 34, points);
            Near.Absolute(1, curve.Y.Sum() * (curve.X[1] - curve.X[0]), 1e-9);
            Assert.True(curve.Y.All(y => y >= 0));
        }
    }

    // A jump leaves errors of the size of the jump at single nodes; in the integral the error falls with the step: at most δ/2 times the variation, 2·(1/2h) a value.
    [Fact]
    public void TryFill_Uniform_StaysInsideTheBoundInTheIntegral()
    {
        Sample sample = Sample.Of(s_eruptions);
        double previous = double.PositiveInfinity;
        foreach (int refinement in new[] { 1, 4, 16 })
        {
            const int points = 105;
            var y = new double[points];
            Assert.True(BinnedTable.TryFill(sample, Kernel.Uniform, 0.3, -0.4, 7.4, refinement, y));
            Density density = Density.Of(sample, Kernel.Uniform, 0.3);
            double asked = 7.8 / (points - 1);
            double step = asked / refinement;
            double integral = 0;
            for (int j = 0; j < points; j++)
            {
                integral += Math.Abs(y[j] - density.Value(-0.4 + (j * asked))) * asked;
            }

            // The asked nodes sample the integrand: its variation 1/h over a node spacing is what the sum can miss.
            Assert.True(integral <= (step / 2 / 0.3) + (asked / 0.3 / 4), $"{integral} at step {step}");
            Assert.True(integral < previous, $"{integral} after {previous}");
            previous = integral;
        }
    }

    // Values at both ends of the asked range must not leak to the other end of the period.
    [Fact]
    public void Tabulate_DataAtOneEndOnly_DoesNotWrapAround()
    {
        Sample sample = Sample.Of([0.0, 0.1, 0.2]);
        Curve curve = Density.Of(sample, Kernel.Gaussian, 0.5).Tabulate(0, 30, 61);
        Near.Absolute(0, curve.Y[^1], 1e-15);
        Curve compact = Density.Of(sample, Kernel.Epanechnikov, 0.5).Tabulate(0.1, 30, 300);
        Near.Absolute(0, compact.Y[^1], 1e-15);
        Curve away = Density.Of(sample, Kernel.Epanechnikov, 0.5).Tabulate(10, 30, 11);
        Assert.True(away.Y.All(y => y == 0));
    }

    [Fact]
    public void Tabulate_Weights_ActAsRepetition()
    {
        Sample weighted = Sample.Of([1.0, 2.5, 4], new SampleOptions { Weights = new double[] { 1, 3, 2 }, WeightMeaning = WeightMeaning.Counts });
        Sample repeated = Sample.Of([1.0, 2.5, 2.5, 2.5, 4, 4]);
        Curve a = Density.Of(weighted, Kernel.Gaussian, 0.4).Tabulate(-1, 6, 71);
        Curve b = Density.Of(repeated, Kernel.Gaussian, 0.4).Tabulate(-1, 6, 71);
        for (int j = 0; j < 71; j++)
        {
            Near.Absolute(b.Y[j], a.Y[j], 1e-15);
        }
    }

    [Fact]
    public void Tabulate_HeavyTails_FallsBackToExactSums()
    {
        Sample sample = Sample.Of([0.0, 0.5, 1, 1e9, -1e12]);
        Assert.False(BinnedTable.TryFill(sample, Kernel.Gaussian, 0.3, -2e12, 2e9, new double[101]));
        Density density = Density.Of(sample, Kernel.Gaussian, 0.3);
        Curve whole = density.Tabulate(-2e12, 2e9, 101);
        for (int j = 0; j < 101; j++)
        {
            Assert.Equal(density.Value(whole.X[j]), whole.Y[j]);
        }

        Curve near = density.Tabulate(-1, 2, 31); // far values are out of reach and cost nothing
        Near.Absolute(density.Value(near.X[10]), near.Y[10], 1e-5);
    }

    [Fact]
    public void Tabulate_BadArguments_Throws()
    {
        Density density = Density.Of(Sample.Of([1.0, 2]), Kernel.Gaussian, 0.3);
        Assert.Throws<ArgumentOutOfRangeException>(() => density.Tabulate(0, 1, 1));
        Assert.Throws<ArgumentOutOfRangeException>(() => density.Tabulate(double.NaN, 1));
        Assert.Throws<ArgumentOutOfRangeException>(() => density.Tabulate(0, double.PositiveInfinity));
        Assert.Throws<ArgumentException>(() => density.Tabulate(1, 1));
    }

    private static (double Error, double Step) WorstError(Sample sample, Kernel kernel, double bandwidth, int refinement)
    {
        const double from = -0.4;
        const double to = 7.4;
        const int points = 105; // δ/h = 1/4 without refinement
        var y = new double[points];
        Assert.True(BinnedTable.TryFill(sample, kernel, bandwidth, from, to, refinement, y));
        Density density = Density.Of(sample, kernel, bandwidth);
        double worst = 0;
        for (int j = 0; j < points; j++)
        {
            double x = from + (j * (to - from) / (points - 1));
            worst = Math.Max(worst, Math.Abs(y[j] - density.Value(x)));
        }

        return (worst, (to - from) / (points - 1) / refinement);
    }

    private static Kernel Named(string name) => s_kernels.Single(k => k.Name == name);

    private static TheoryData<string> Names(int continuous) =>
        [.. s_kernels.Where(k => KernelSmoothness.Of(k).ContinuousDerivatives == continuous).Select(k => k.Name)];
}
