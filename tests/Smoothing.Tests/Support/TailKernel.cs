using Smoothing.Kernels;

namespace Smoothing.Tests.Support;

/// <summary>Kernels without polynomial form for tests of sums: two-sided exponential, logistic, cosine.</summary>
internal sealed class TailKernel(
    string name, double radius, double rate, double strip, Func<double, double> value, Func<double, int, double> derivative, Func<double, double> cumulative) : Kernel
{
    public static TailKernel TwoSided { get; } = new(
        "two-sided",
        double.PositiveInfinity,
        1,
        0,
        u => Math.Exp(-Math.Abs(u)) / 2,
        (u, r) => u == 0 && r % 2 == 1 ? 0 : Math.Exp(-Math.Abs(u)) / 2 * (r % 2 == 0 || u < 0 ? 1 : -1),
        u => u < 0 ? Math.Exp(u) / 2 : 1 - (Math.Exp(-u) / 2));

    /// <summary>e^−|u|/(1 + e^−|u|)², poles at ±πi.</summary>
    public static TailKernel Sigmoid { get; } = new(
        "sigmoid",
        double.PositiveInfinity,
        0,
        Math.PI,
        u => Math.Exp(-Math.Abs(u)) / Square(1 + Math.Exp(-Math.Abs(u))),
        (u, r) => r == 1 ? Math.Exp(-Math.Abs(u)) / Square(1 + Math.Exp(-Math.Abs(u))) * -Math.Tanh(u / 2) : throw Unasked(),
        u => u < 0 ? Math.Exp(u) / (1 + Math.Exp(u)) : 1 / (1 + Math.Exp(-u)));

    /// <summary>π/4 cos(πu/2) on [−1, 1].</summary>
    public static TailKernel Arch { get; } = new(
        "arch",
        1,
        0,
        0,
        u => Math.Abs(u) > 1 ? 0 : Math.PI / 4 * Math.Cos(Math.PI * u / 2),
        (u, r) => r == 1 && Math.Abs(u) < 1 ? -Math.PI * Math.PI / 8 * Math.Sin(Math.PI * u / 2) : 0,
        u => u <= -1 ? 0 : u >= 1 ? 1 : (1 + Math.Sin(Math.PI * u / 2)) / 2);

    public override string Name => name;

    public override double SupportRadius => radius;


    internal override double ExponentialRate => rate;

    internal override double AnalyticHalfWidth => strip;

    internal override double ValueCore(double u) => value(u);

    internal override double DerivativeCore(double u, int order) => derivative(u, order);

    internal override double CumulativeCore(double u) => cumulative(u);

    internal override double EvenMoment(int order) => throw Unasked();

    internal override double RoughnessCore(int derivative) => throw Unasked();

    // The sums under test read values, first derivatives and distribution functions alone: asking for more is a fault of theirs.
    private static InvalidOperationException Unasked() => new("a sum over values needs no constant and no higher derivative of the kernel");

    private static double Square(double x) => x * x;
}
