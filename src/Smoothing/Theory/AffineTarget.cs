using Smoothing.Numerics;

namespace Smoothing.Theory;

/// <summary>The density of factor·X + shift.</summary>
internal sealed class AffineTarget(TargetDensity inner, double shift, double factor) : TargetDensity
{
    public override string Name => Guard.Text($"{factor}·({inner.Name}) + {shift}");

    public override Interval Support => new(To(inner.Support.Lower), To(inner.Support.Upper));

    internal override IReadOnlyList<double> Breaks => [.. inner.Breaks.Select(To)];

    internal override IReadOnlyList<double> Splits => [.. inner.Splits.Select(To)];

    internal override double Finest => factor * inner.Finest;

    internal override double Widest => factor * inner.Widest;

    internal override bool Knows(int order) => inner.Knows(order);

    internal override double ValueCore(double x) => inner.ValueCore(Back(x)) / factor;

    internal override double DerivativeCore(double x, int order) => inner.DerivativeCore(Back(x), order) / Math.Pow(factor, order + 1);

    internal override double CumulativeCore(double x) => inner.CumulativeCore(Back(x));

    internal override double QuantileCore(double probability) => To(inner.QuantileCore(probability));

    internal override double DrawCore(ref RandomStream random) => To(inner.DrawCore(ref random));

    internal override double JumpCore(double at, int order)
    {
        // The break whose image is `at`; mapping back could miss it by a rounding.
        foreach (double b in inner.Breaks)
        {
            if (To(b) == at)
            {
                return inner.JumpCore(b, order) / Math.Pow(factor, order + 1);
            }
        }

        return 0;
    }

    internal override double RoughnessCore(int order) => inner.RoughnessCore(order) / Math.Pow(factor, (2 * order) + 1);

    private double To(double x) => (factor * x) + shift;

    private double Back(double x) => (x - shift) / factor;
}
