using Smoothing.Numerics;

namespace Smoothing.Theory;

/// <summary>A target on a caller's function.</summary>
internal sealed class FunctionTarget : TargetDensity
{
    private static readonly double[] s_shares = [0.001, 0.1, 0.5, 0.9, 0.999];

    private readonly Func<double, double> _density;
    private readonly Func<double, int, double>? _derivative;
    private readonly double[] _quantiles;
    private readonly double[] _places; // where integration is cut
    private readonly double[] _below; // ∫ f up to each place

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
        _below = new double[places.Length];
        _below[0] = double.IsFinite(support.Lower) ? 0 : PanelRule.IntegrateTail(ValueCore, places[0], -TailScale);
        for (int i = 1; i < places.Length; i++)
        {
            _below[i] = _below[i - 1] + Piece(places[i - 1], places[i]);
        }

        double mass = _below[^1] + (double.IsFinite(support.Upper) ? 0 : PanelRule.IntegrateTail(ValueCore, places[^1], TailScale));
        _places = places;
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
        return Math.Abs(jump) <= (1e-9 * Math.Max(Math.Abs(left), Math.Abs(right))) + (1e-9 * whole) ? 0 : jump;
    }

    internal override double CumulativeCore(double x)
    {
        if (x <= Support.Lower || x >= Support.Upper)
        {
            return x <= Support.Lower ? 0 : 1;
        }

        int i = Array.BinarySearch(_places, x);
        if (i >= 0)
        {
            return Math.Min(1, _below[i]);
        }

        // Beyond the outer places from the open tail on that side, so that a small share keeps its digits.
        i = ~i;
        double value = i == 0 ? PanelRule.IntegrateTail(ValueCore, x, -TailScale)
            : i == _places.Length ? 1 - PanelRule.IntegrateTail(ValueCore, x, TailScale)
            : _below[i - 1] + Piece(_places[i - 1], x);
        return Math.Clamp(value, 0, 1);
    }

    private double TailScale => _places is { Length: > 1 } ? _places[^1] - _places[0] : Splits.Count > 1 ? Splits[^1] - Splits[0] : 1;

    /// <summary>∫ f between two places; where f may have a pole, from there by a substitution.</summary>
    private double Piece(double from, double to)
    {
        double middle = from + ((to - from) / 2);
        return (Breaks.Contains(from) ? PanelRule.IntegrateFromPower(ValueCore, from, middle) : PanelRule.Integrate(ValueCore, [from, middle]))
            + (Breaks.Contains(to) ? PanelRule.IntegrateFromPower(ValueCore, to, middle) : PanelRule.Integrate(ValueCore, [middle, to]));
    }

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
