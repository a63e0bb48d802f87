using Smoothing.Numerics;

namespace Smoothing.Theory;

/// <summary>The density of factor·X + shift.</summary>
internal sealed class AffineTarget(string name, TargetDensity inner, double shift, double factor) : TargetDensity
{
    public override string Name => name;

    public override Interval Support => new(To(inner.Support.Lower), To(inner.Support.Upper));

    internal override IReadOnlyList<double> Breaks { get; } = [.. inner.Breaks.Select(b => (factor * b) + shift)];

    internal override IReadOnlyList<double> Splits { get; } = [.. inner.Splits.Select(s => (factor * s) + shift)];

    internal override double Finest => factor * inner.Finest;

    internal override double Widest => factor * inner.Widest;

    public static string NameOf(TargetDensity inner, double shift, double factor) =>
        shift == 0 ? Guard.Text($"{factor}·({inner.Name})") : factor == 1 ? Guard.Text($"({inner.Name}) + {shift}") : Guard.Text($"{factor}·({inner.Name}) + {shift}");

    internal override TargetDensity Moved(double by, double times) => new AffineTarget(NameOf(this, by, times), inner, (times * shift) + by, times * factor);

    internal override bool Knows(int order) => inner.Knows(order);

    internal override double ValueCore(double x) => inner.ValueCore(Back(x)) / factor;

    internal override double DerivativeCore(double x, int order) => inner.DerivativeCore(Back(x), order) / Math.Pow(factor, order + 1);

    internal override double CumulativeCore(double x) => inner.CumulativeCore(Back(x));

    internal override double QuantileCore(double probability) => To(inner.QuantileCore(probability));

    internal override double DrawCore(ref RandomStream random) => To(inner.DrawCore(ref random));

    internal override double JumpCore(double at, int order)
    {
        int i = BreakAt(at);
        return i < 0 ? 0 : inner.JumpCore(inner.Breaks[i], order) / Math.Pow(factor, order + 1);
    }

    internal override double RoughnessCore(int order)
    {
        RequireNoJump(order, Guard.Text($"R(f^({order}))")); // in this unit, for the message
        return inner.RoughnessCore(order) / Math.Pow(factor, (2 * order) + 1);
    }

    private double To(double x) => (factor * x) + shift;

    /// <summary>Where `x` came from; the image of an end of the support or of a break goes back to it exactly, however it was rounded.</summary>
    private double Back(double x)
    {
        int i = BreakAt(x);
        return i < 0 ? (x - shift) / factor : inner.Breaks[i];
    }

    private int BreakAt(double x)
    {
        for (int i = 0; i < Breaks.Count; i++)
        {
            if (Breaks[i] == x)
            {
                return i;
            }
        }

        return -1;
    }
}
