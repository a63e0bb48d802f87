using Smoothing.Numerics;

namespace Smoothing.Theory;

/// <summary>A target on a caller's function.</summary>
internal sealed class FunctionTarget : TargetDensity
{
    private static readonly double[] s_shares = [0.001, 0.1, 0.5, 0.9, 0.999];

    private readonly Func<double, double> _density;
    private readonly Func<double, int, double>? _derivative;
    private readonly double[] _quantiles;

    public FunctionTarget(string name, Func<double, double> density, Interval support, Func<double, int, double>? derivative, IReadOnlyList<double> cuts)
    {
        Name = name;
        _density = density;
        _derivative = derivative;
        Support = support;
        if (!(support.Length > 0))
        {
            throw new ArgumentException(Guard.Text($"support must have a length above 0, but is {support}: pass where the density may be above 0."), nameof(support));
        }

        for (int i = 0; i < cuts.Count; i++)
        {
            if (!(support.Contains(cuts[i]) && double.IsFinite(cuts[i])))
            {
                throw new ArgumentException(Guard.Text($"cuts[{i}] must be finite and lie in the support {support}, but is {cuts[i]}: leave it out or widen the support."), nameof(cuts));
            }
        }

        Breaks = [.. cuts.Append(support.Lower).Append(support.Upper).Where(double.IsFinite).Distinct().Order()];
        double[] places = [.. Breaks.Append(double.IsFinite(support.Lower) ? double.IsFinite(support.Upper) ? support.Lower + (support.Length / 2) : support.Lower + 1 : double.IsFinite(support.Upper) ? support.Upper - 1 : 0).Distinct().Order()];
        Splits = places;
        double mass = Quadrature.Integrate(ValueCore, support.Lower, support.Upper, places, 1e-11);
        if (!(Math.Abs(mass - 1) <= 1e-8))
        {
            throw new ArgumentException(Guard.Text($"density must integrate to 1 over {support}, but {name} integrates to {mass}: divide it by that number, or, if it is right and narrow, name a point inside each of its features in cuts."), nameof(density));
        }

        _quantiles = [.. s_shares.Select(p => TargetSearch.Quantile(this, p))];
        Splits = [.. _quantiles.Concat(Breaks).Distinct().Order()];
    }

    public override string Name { get; }

    public override Interval Support { get; }

    internal override IReadOnlyList<double> Breaks { get; }

    internal override IReadOnlyList<double> Splits { get; }

    internal override bool Knows(int order) => order == 0 || (_derivative is not null && Ask(Splits[Splits.Count / 2], order) is { } v && !double.IsNaN(v));

    internal override double ValueCore(double x)
    {
        if (!Support.Contains(x) || double.IsInfinity(x))
        {
            return 0;
        }

        double value = _density(x);
        return value >= 0 && (double.IsFinite(value) || Breaks.Contains(x))
            ? value
            : throw new ArgumentException(Guard.Text($"density must be finite and not negative, but {Name} is {value} at {x}: mend the function or its support, or name the point in cuts if it is infinite there."));
    }

    internal override double DerivativeCore(double x, int order)
    {
        if (!Support.Contains(x) || double.IsInfinity(x))
        {
            return 0;
        }

        double? value = _derivative is null ? null : Ask(x, order);
        return value is { } v && !double.IsNaN(v)
            ? v
            : throw new InvalidOperationException(Guard.Text($"Derivative {order} of {Name} is not known{(value is null ? "" : Guard.Text($" at {x}"))}: pass a derivative that knows it to TargetDensity.FromFunction."));
    }

    internal override double JumpCore(double at, int order)
    {
        double Level(double x) => order == 0 ? ValueCore(x) : DerivativeCore(x, order);
        bool isEnd = at == Support.Lower || at == Support.Upper;
        double Side(double x) => isEnd && Level(at) is var end && double.IsFinite(end) ? end : Level(x);
        double left = at == Support.Lower ? 0 : Side(Math.BitDecrement(at));
        double right = at == Support.Upper ? 0 : Side(Math.BitIncrement(at));
        double jump = right - left;

        // What the rounding of one step leaves, beside the sides or beside the whole, is no jump.
        double whole = _quantiles.Max(q => Math.Abs(Level(q)));
        return Math.Abs(jump) <= (1e-9 * Math.Max(Math.Abs(left), Math.Abs(right))) + (1e-13 * whole) ? 0 : jump;
    }

    internal override double CumulativeCore(double x) =>
        x <= Support.Lower ? 0 : x >= Support.Upper ? 1 : Math.Clamp(Quadrature.Integrate(ValueCore, Support.Lower, x, Splits, 1e-11), 0, 1);

    /// <summary>The caller's derivative, null where the caller says that this order is not there.</summary>
    private double? Ask(double x, int order)
    {
        try
        {
            return _derivative!(x, order);
        }
        catch (NotSupportedException)
        {
            return null;
        }
    }
}
