using MathNet.Numerics.Distributions;
using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Tests.Support;
using Smoothing.Theory;

namespace Smoothing.Tests.Theory;

/// <summary>Targets from functions and mixtures: what they compute, and what they say to bad input.</summary>
public class TargetInputTests
{
    private static readonly Interval s_unit = new(0, 1);

    [Fact]
    public void FromFunction_QuadraticOnTheUnit_GivesMomentsQuantilesAndErrors()
    {
        // f = 6x(1 − x): F = 3x² − 2x³, R(f) = 6/5, R(f') = 12; median ½.
        TargetDensity target = TargetDensity.FromFunction("arch", x => 6 * x * (1 - x), s_unit, (x, r) => r switch { 1 => 6 - (12 * x), 2 => -12, _ => 0 });
        Near.Absolute((3 * 0.09) - (2 * 0.027), target.Cumulative(0.3), 1e-10);
        Near.Absolute(0.5, target.Quantile(0.5), 1e-9);
        Near.Relative(6 / 5.0, target.Roughness(), 1e-10);
        Near.Relative(12, target.Roughness(1), 1e-10);
        Assert.Equal((0.0, 0.0, 0.0), (target.Value(-0.1), target.Value(1.1), target.Derivative(2)));
        Assert.Contains("f^(1) jumps by 6 at 0", Assert.Throws<InvalidOperationException>(() => target.Roughness(2)).Message, StringComparison.Ordinal);

        // Inside, where the kernel doesn't reach an end, the bias is exactly h²μ₂f''/2 = −6h²/5 for the Epanechnikov kernel.
        Near.Relative(-6 * 0.04 / 5, new ErrorTheory(Kernel.Epanechnikov, target).Bias(0.5, 0.2), 1e-12);
        Near.Relative(-6e-20 / 5, new ErrorTheory(Kernel.Epanechnikov, target).Bias(0.5, 1e-10), 1e-12);
    }

    [Fact]
    public void FromFunction_WithCuts_SeesKinksPolesAndNarrowFeatures()
    {
        TargetDensity tent = TargetDensity.FromFunction("tent", x => Math.Max(0, 1 - Math.Abs(x)), new(-1, 1), (x, r) => r == 1 ? -Math.Sign(x) : 0, [0]);
        Near.Relative(2, tent.Roughness(1), 1e-10);
        Assert.Contains("f^(1) jumps by 1 at -1", Assert.Throws<InvalidOperationException>(() => tent.Roughness(2)).Message, StringComparison.Ordinal);

        TargetDensity narrow = TargetDensity.FromFunction("narrow", NormalMixture.Normal(500, 0.01).Value, Interval.WholeLine, NormalMixture.Normal(500, 0.01).Derivative, [499.9, 500, 500.1]);
        Near.Absolute(500, narrow.Quantile(0.5), 1e-9);
        Near.Relative(NormalMixture.Normal(0, 0.01).Roughness(2), narrow.Roughness(2), 1e-9);
        Assert.Contains("in cuts", Assert.Throws<ArgumentException>(() => TargetDensity.FromFunction("lost", NormalMixture.Normal(500, 0.01).Value, Interval.WholeLine)).Message, StringComparison.Ordinal);

        TargetDensity pole = TargetDensity.FromFunction("pole", x => 0.6 * Math.Pow(x, -0.4), s_unit);
        Assert.Equal(double.PositiveInfinity, pole.Value(0));
        Near.Relative(0.36 / 0.2, pole.Roughness(), 1e-8);
    }

    [Fact]
    public void FromFunction_BadInput_SaysRequirementValueAndRemedy()
    {
        static string Refused(Func<double, double> f, Interval support, IReadOnlyList<double>? cuts = null) => Assert.Throws<ArgumentException>(() => TargetDensity.FromFunction("mine", f, support, null, cuts)).Message;
        Assert.Contains("mine is -", Refused(x => Math.Sin(8 * x), s_unit), StringComparison.Ordinal);
        Assert.Contains("mine is NaN", Refused(_ => double.NaN, s_unit), StringComparison.Ordinal);
        Assert.Contains("mine integrates to", Refused(_ => 2, s_unit), StringComparison.Ordinal);
        Assert.Contains("integrates to 0.", Refused(_ => 0.9999999, s_unit), StringComparison.Ordinal);
        Assert.Contains("length above 0", Refused(_ => 1, new(1, 1)), StringComparison.Ordinal);
        Assert.Contains("cuts[1]", Refused(_ => 1, s_unit, [0.5, 2]), StringComparison.Ordinal);
        Assert.Throws<ArgumentNullException>(() => TargetDensity.FromFunction(null!, _ => 1, s_unit));
        Assert.Throws<ArgumentNullException>(() => TargetDensity.FromFunction("mine", null!, s_unit));
        Assert.Throws<ArgumentNullException>(() => TargetDensity.From(null!));
    }

    [Fact]
    public void FromFunction_WithoutTheDerivativeAskedFor_SaysSoAndStillGivesExactErrors()
    {
        TargetDensity bare = TargetDensity.FromFunction("bare", NormalMixture.Normal().Value, Interval.WholeLine);
        Assert.Contains("Derivative 2 of bare is not known", Assert.Throws<InvalidOperationException>(() => bare.Derivative(0, 2)).Message, StringComparison.Ordinal);
        Assert.Contains("Derivative 2 of bare", Assert.Throws<InvalidOperationException>(() => new ErrorTheory(Kernel.Gaussian, bare).Amise(0.3, 100)).Message, StringComparison.Ordinal);
        TargetDensity partial = TargetDensity.FromFunction("partial", NormalMixture.Normal().Value, Interval.WholeLine, (x, r) => r == 1 ? NormalMixture.Normal().Derivative(x) : throw new NotSupportedException("a caller's function that knows the first derivative only"));
        Assert.Contains("Derivative 2 of partial", Assert.Throws<InvalidOperationException>(() => new ErrorTheory(Kernel.Gaussian, partial).AsymptoticBias(0, 0.3)).Message, StringComparison.Ordinal);

        var exact = new ErrorTheory(Kernel.Epanechnikov, NormalMixture.Normal());
        foreach (TargetDensity target in new[] { bare, partial })
        {
            var theory = new ErrorTheory(Kernel.Epanechnikov, target);
            Near.Relative(exact.Bias(0.4, 0.5), theory.Bias(0.4, 0.5), 1e-10);
            Near.Relative(exact.OptimalBandwidthAt(0.4, 100), theory.OptimalBandwidthAt(0.4, 100), 1e-8);
        }

        Near.Relative(exact.OptimalBandwidth(100), new ErrorTheory(Kernel.Epanechnikov, bare).OptimalBandwidth(100), 1e-8);
    }

    [Fact]
    public void UniformTarget_UnboundedRoughness_NamesTheQuantityAndTheReason()
    {
        TargetDensity uniform = TargetDensity.From(new ContinuousUniform(0, 1));
        string message = Assert.Throws<InvalidOperationException>(() => uniform.Roughness(2)).Message;
        Assert.Contains("R(f^(2))", message, StringComparison.Ordinal);
        Assert.Contains("f^(0) jumps by 1 at 0", message, StringComparison.Ordinal);
        Assert.Contains("R(f^(2))", Assert.Throws<InvalidOperationException>(() => new ErrorTheory(Kernel.Gaussian, uniform).Amise(0.1, 100)).Message, StringComparison.Ordinal);
        Assert.Throws<InvalidOperationException>(() => new ErrorTheory(Kernel.Gaussian, uniform, 1));
        Assert.Contains("to the power -0.6", Assert.Throws<InvalidOperationException>(() => new ErrorTheory(Kernel.Gaussian, TargetDensity.From(new Gamma(0.4, 1))).Mise(0.1, 100)).Message, StringComparison.Ordinal);
        Assert.Contains("to the power -0.5", Assert.Throws<InvalidOperationException>(() => TargetDensity.From(new Gamma(2.5, 1)).Roughness(2)).Message, StringComparison.Ordinal);

        // The exact error exists: for the uniform kernel with h < ½ the bias is ±(1 − u)/2 at distance u·h on either side of an end, which makes 4·h/12 in all.
        Near.Relative(4 * 0.1 / 12, new ErrorTheory(Kernel.Uniform, uniform).IntegratedSquaredBias(0.1), 1e-10);
    }

    [Fact]
    public void Mixtures_BadInput_SayTheSumAndTheIndex()
    {
        Assert.Contains("sum to 0.9", Assert.Throws<ArgumentException>(() => new NormalMixture([0.5, 0.4], [0, 1], [1, 1])).Message, StringComparison.Ordinal);
        Assert.Contains("weights[1]", Assert.Throws<ArgumentException>(() => new NormalMixture([1.5, -0.5], [0, 1], [1, 1])).Message, StringComparison.Ordinal);
        Assert.Contains("standardDeviations[1]", Assert.Throws<ArgumentOutOfRangeException>(() => new NormalMixture([0.5, 0.5], [0, 1], [1, 0])).Message, StringComparison.Ordinal);
        Assert.Contains("means[0]", Assert.Throws<ArgumentOutOfRangeException>(() => new NormalMixture([1], [double.NaN], [1])).Message, StringComparison.Ordinal);
        Assert.Contains("2, 1 and 2", Assert.Throws<ArgumentException>(() => new NormalMixture([0.5, 0.5], [0], [1, 1])).Message, StringComparison.Ordinal);
        Assert.Throws<ArgumentException>(() => new NormalMixture([], [], []));
        Assert.Throws<ArgumentException>(() => new NormalMixture([1 + 2e-12], [0], [1]));
        Assert.NotNull(new NormalMixture([1 + 5e-13], [0], [1]));
        NormalMixture[] pair = [NormalMixture.Normal(), NormalMixture.Normal(1, 1)];
        Assert.Contains("sum to 1.1", Assert.Throws<ArgumentException>(() => TargetDensity.Mixture([0.5, 0.6], pair)).Message, StringComparison.Ordinal);
        Assert.Throws<ArgumentException>(() => TargetDensity.Mixture([1], pair));
        Assert.Contains("targets[1]", Assert.Throws<ArgumentNullException>(() => TargetDensity.Mixture([0.5, 0.5], [pair[0], null!])).Message, StringComparison.Ordinal);
        Assert.Throws<ArgumentOutOfRangeException>(() => pair[0].Scaled(0));
        Assert.Throws<ArgumentOutOfRangeException>(() => pair[0].Shifted(double.NaN));
    }

    [Fact]
    public void Mixture_OfUniforms_HasItsQuantilesOnTheLevelStretch()
    {
        TargetDensity two = TargetDensity.Mixture([0.5, 0.5], [TargetDensity.From(new ContinuousUniform(0, 1)), TargetDensity.From(new ContinuousUniform(2, 3))]);
        Near.Absolute(1, two.Quantile(0.5), 1e-12);
        Near.Absolute(0.5, two.Cumulative(1.7), 1e-15);
        Near.Relative(0.5, two.Roughness(), 1e-12);
        Assert.Equal((0.0, 3.0), (two.Quantile(0), two.Quantile(1)));
    }

    [Fact]
    public void ErrorTheory_BadInput_NamesTheArgument()
    {
        var theory = new ErrorTheory(Kernel.Gaussian, NormalMixture.Normal());
        foreach (double h in new[] { 0, -1, double.NaN, double.PositiveInfinity })
        {
            Assert.Equal("h", Assert.Throws<ArgumentOutOfRangeException>(() => theory.Bias(0, h)).ParamName);
            Assert.Throws<ArgumentOutOfRangeException>(() => theory.Mise(h, 10));
            Assert.Throws<ArgumentOutOfRangeException>(() => theory.Amise(h, 10));
            Assert.Throws<ArgumentOutOfRangeException>(() => theory.Variance(0, h, 10));
            Assert.Throws<ArgumentOutOfRangeException>(() => theory.EquivalentBandwidth(h, Kernel.Biweight));
        }

        Assert.Equal("n", Assert.Throws<ArgumentOutOfRangeException>(() => theory.Mise(1, 0)).ParamName);
        Assert.Throws<ArgumentOutOfRangeException>(() => theory.OptimalBandwidth(0));
        Assert.Throws<ArgumentOutOfRangeException>(() => theory.AsymptoticOptimalBandwidth(-1));
        Assert.Equal("x", Assert.Throws<ArgumentOutOfRangeException>(() => theory.Bias(double.NaN, 1)).ParamName);
        Assert.Throws<ArgumentOutOfRangeException>(() => theory.AsymptoticBias(0, 1, 3));
        Assert.Throws<ArgumentException>(() => theory.EquivalentBandwidth(1, Kernel.GaussianOfOrder(4)));
        Assert.Throws<ArgumentNullException>(() => new ErrorTheory(null!, NormalMixture.Normal()));
        Assert.Throws<ArgumentOutOfRangeException>(() => new ErrorTheory(Kernel.Gaussian, NormalMixture.Normal(), -1));
        Assert.Throws<InvalidOperationException>(() => new ErrorTheory(Kernel.Uniform, NormalMixture.Normal(), 1)); // R(K') does not exist
    }
}
