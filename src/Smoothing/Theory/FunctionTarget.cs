using Smoothing.Numerics;

namespace Smoothing.Theory;

/// <summary>A target on a caller's function.</summary>
internal sealed class FunctionTarget : TargetDensity
{
    private static readonly double[] s_shares = [0.001, 0.1, 0.5, 0.9, 0.999];

    private readonly Func<double, double> _density;
    private readonly Func<double, int, double>? _derivative;

    public FunctionTarget(string name, Func<double, double> density, Interval support, Func<double, int, double>? derivative)
    {
        Name = name;
        _density = density;
        _derivative = derivative;
        Support = support;
        double mass = Quadrature.Integrate(ValueCore, support.Lower, support.Upper, double.IsFinite(support.Length) ? [] : [double.IsFinite(support.Lower) ? support.Lower + 1 : 0], 1e-11);
        if (!(Math.Abs(mass - 1) <= 1e-8))
        {
            throw new ArgumentException(Guard.Text($"density must integrate to 1 over {support}, but {name} integrates to {mass}: divide it by that number."), nameof(density));
        }

        Splits = double.IsFinite(support.Length) ? [support.Lower + (support.Length / 2)] : [];
        Splits = [.. s_shares.Select(p => TargetSearch.Quantile(this, p)).Distinct()];
    }

    public override string Name { get; }

    public override Interval Support { get; }

    internal override IReadOnlyList<double> Splits { get; }

    internal override bool Knows(int order) => order == 0 || _derivative is not null;

    internal override double ValueCore(double x)
    {
        if (!Support.Contains(x) || double.IsInfinity(x))
        {
            return 0;
        }

        double value = _density(x);
        return value >= 0 && double.IsFinite(value)
            ? value
            : throw new ArgumentException(Guard.Text($"density must be finite and not negative, but {Name} is {value} at {x}: mend the function or its support."));
    }

    internal override double DerivativeCore(double x, int order) =>
        _derivative is null
            ? throw new InvalidOperationException(Guard.Text($"Derivative {order} of {Name} is not known: pass a derivative to TargetDensity.FromFunction."))
            : Support.Contains(x) && double.IsFinite(x) ? _derivative(x, order) : 0;

    internal override double CumulativeCore(double x) =>
        x <= Support.Lower ? 0 : x >= Support.Upper ? 1 : Math.Clamp(Quadrature.Integrate(ValueCore, Support.Lower, x, Splits, 1e-11), 0, 1);
}
