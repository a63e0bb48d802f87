using MathNet.Numerics;
using MathNet.Numerics.Distributions;
using Smoothing.Numerics;

namespace Smoothing.Theory;

/// <summary>A target on a distribution of MathNet.Numerics, families with a scale in their standard form.</summary>
internal sealed class DistributionTarget : TargetDensity
{
    private const int HighestNumerical = 4;
    private static readonly double[] s_shares = [1e-9, 1e-4, 0.02, 0.2, 0.5, 0.8, 0.98, 1 - 1e-4, 1 - 1e-9];

    private readonly IContinuousDistribution _distribution;
    private readonly Func<TaylorSeries, double, TaylorSeries>? _formula;
    private readonly double _spread;

    public DistributionTarget(string name, IContinuousDistribution distribution, Func<TaylorSeries, double, TaylorSeries>? formula, double? kink = null)
    {
        Name = name;
        _distribution = distribution;
        _formula = formula;
        Support = new Interval(distribution.Minimum, distribution.Maximum);
        double[] inner = [.. s_shares.Select(QuantileCore).Where(double.IsFinite).Distinct().Order()];
        _spread = QuantileCore(0.8) - QuantileCore(0.2);

        // Steps that shrink by 4 towards a finite end where the density behaves as a power of the distance.
        double[] graded = [.. Enumerable.Range(0, 12).Select(j => Math.Pow(0.25, j))];
        double[] Graded(double end, int side) => !double.IsFinite(end) ? [] : IsRegular(end, side) ? [1] : graded;
        double low = Support.Lower;
        double high = Support.Upper;
        Splits =
        [
            .. inner
                .Concat(Graded(low, 1).Select(g => low + (g * (inner[^1] - low) / 4)))
                .Concat(Graded(high, -1).Select(g => high - (g * (high - inner[0]) / 4)))
                .Distinct().Order(),
        ];
        Breaks = [.. new[] { low, kink ?? double.NaN, high }.Where(double.IsFinite)];
    }

    public override string Name { get; }

    public override Interval Support { get; }

    internal override IReadOnlyList<double> Breaks { get; }

    internal override IReadOnlyList<double> Splits { get; }

    internal override bool Knows(int order) => order == 0 || _formula is not null;

    internal override double ValueCore(double x)
    {
        if (!Support.Contains(x) || double.IsInfinity(x))
        {
            return 0;
        }

        double value = _distribution.Density(x);
        return double.IsNaN(value) ? 0 : value;
    }

    internal override double DerivativeCore(double x, int order)
    {
        if (!Support.Contains(x) || double.IsInfinity(x))
        {
            return 0;
        }

        if (x == Support.Lower || x == Support.Upper)
        {
            return OneSided(x, x == Support.Lower ? 1 : -1, order);
        }

        return Breaks.Contains(x) ? 0.5 * (OneSided(x, -1, order) + OneSided(x, 1, order)) : Inside(x, x, order);
    }

    internal override double JumpCore(double at, int order) =>
        (at == Support.Upper ? 0 : OneSided(at, 1, order)) - (at == Support.Lower ? 0 : OneSided(at, -1, order));

    internal override double CumulativeCore(double x) =>
        x <= Support.Lower ? 0 : x >= Support.Upper ? 1 : _distribution.CumulativeDistribution(x);

    /// <summary>Whether the density and its first derivatives have limits from inside that its formula gives.</summary>
    private bool IsRegular(double end, int side) =>
        _formula is not null && Enumerable.Range(1, 4).All(r => double.IsFinite(Inside(end, end + (side * _spread), r)) && double.IsFinite(OneSided(end, side, r)));

    /// <summary>The derivative at x by the formula that holds on the side of <paramref name="side"/>.</summary>
    private double Inside(double x, double side, int order)
    {
        if (order == 0)
        {
            return ValueCore(x);
        }

        if (_formula is not null)
        {
            return _formula(TaylorSeries.Variable(x, order), side)[order] * SpecialFunctions.Factorial(order);
        }

        if (order > HighestNumerical)
        {
            throw new InvalidOperationException(Guard.Text($"Derivative {order} of {Name} is not known, only those up to {HighestNumerical}: pass it through TargetDensity.FromFunction."));
        }

        // A third of the way to the nearer end keeps the polynomial clear of a singularity there.
        double end = Math.Min(x - Support.Lower, Support.Upper - x) / 3;
        double reach = Math.Min(_spread / 4, Math.Max(end, _spread * 1e-3));
        return LocalPolynomial.Derivative(ValueCore, x, Math.Max(Support.Lower, x - reach), Math.Min(Support.Upper, x + reach), order);
    }

    /// <summary>The limit from one side at an end or a kink: 0 or ±∞ where the density behaves there as a power that is not whole.</summary>
    private double OneSided(double x, int side, int order)
    {
        double near = x + (side * _spread * 1e-10);
        double value = Inside(x, near, order);
        double closest = Inside(near, near, order);
        double further = Inside(x + (side * _spread * 1e-7), near, order);
        double exponent = Math.Log(Math.Abs(closest / further)) / Math.Log(1e-3);
        return exponent < -0.01 ? closest * double.PositiveInfinity
            : exponent > 0.01 ? 0
            : double.IsFinite(value) && (order > 0 || value > 0) ? value : closest;
    }
}
