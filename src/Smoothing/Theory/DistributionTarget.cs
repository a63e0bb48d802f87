using MathNet.Numerics;
using MathNet.Numerics.Distributions;
using Smoothing.Numerics;

namespace Smoothing.Theory;

/// <summary>A target on a distribution of MathNet.Numerics.</summary>
internal sealed class DistributionTarget : TargetDensity
{
    private static readonly double[] s_shares = [1e-9, 1e-4, 0.02, 0.2, 0.5, 0.8, 0.98, 1 - 1e-4, 1 - 1e-9];

    private readonly IContinuousDistribution _distribution;
    private readonly Func<TaylorSeries, TaylorSeries>? _formula;

    public DistributionTarget(IContinuousDistribution distribution)
    {
        _distribution = distribution;
        _formula = Formula(distribution);
        Support = new Interval(distribution.Minimum, distribution.Maximum);
        double[] inner = [.. s_shares.Select(QuantileCore).Where(double.IsFinite).Distinct().Order()];

        // Steps that shrink by 4 towards a finite end, where the density may behave as a power of the distance.
        var graded = Enumerable.Range(0, 12).Select(j => Math.Pow(0.25, j));
        double low = Support.Lower;
        double high = Support.Upper;
        Splits =
        [
            .. inner
                .Concat(double.IsFinite(low) ? graded.Select(g => low + (g * (inner[^1] - low) / 4)) : [])
                .Concat(double.IsFinite(high) ? graded.Select(g => high - (g * (high - inner[0]) / 4)) : [])
                .Distinct().Order(),
        ];
    }

    public override string Name => _distribution.ToString()!;

    public override Interval Support { get; }

    internal override IReadOnlyList<double> Splits { get; }

    internal override bool Knows(int order) => order == 0 || _formula is not null;

    internal override double ValueCore(double x) => Support.Contains(x) && double.IsFinite(x) ? _distribution.Density(x) : 0;

    internal override double DerivativeCore(double x, int order)
    {
        if (!Support.Contains(x) || double.IsInfinity(x))
        {
            return 0;
        }

        if (_formula is not null)
        {
            double value = _formula(TaylorSeries.Variable(x, order))[order] * SpecialFunctions.Factorial(order);
            return double.IsNaN(value) ? 0 : value;
        }

        // Central differences: the step eps^(1/3) or eps^(1/4) of the scale balances truncation and rounding.
        double step = (Splits[^1] - Splits[0]) * (order == 1 ? 1e-6 : 1e-5);
        return order switch
        {
            1 => (ValueCore(x + step) - ValueCore(x - step)) / (2 * step),
            2 => (ValueCore(x + step) - (2 * ValueCore(x)) + ValueCore(x - step)) / (step * step),
            _ => throw new InvalidOperationException(Guard.Text($"Derivative {order} of {Name} is not known: pass it through TargetDensity.FromFunction.")),
        };
    }

    internal override double CumulativeCore(double x) =>
        x <= Support.Lower ? 0 : x >= Support.Upper ? 1 : _distribution.CumulativeDistribution(x);

    internal override double QuantileCore(double probability) => TargetSearch.Quantile(this, probability);

    /// <summary>The density as a series formula: its derivatives follow by arithmetic.</summary>
    private static Func<TaylorSeries, TaylorSeries>? Formula(IContinuousDistribution distribution)
    {
        switch (distribution)
        {
            case Normal d:
                return x => ((x + -d.Mean) * (1 / d.StdDev)).Power(2) is var q ? (q * -0.5).Exp() * (NormalLaw.InverseSqrtTwoPi / d.StdDev) : x;
            case Exponential d:
                return x => (x * -d.Rate).Exp() * d.Rate;
            case Gamma d:
                return x => x.Power(d.Shape - 1) * (x * -d.Rate).Exp() * Math.Exp((d.Shape * Math.Log(d.Rate)) - SpecialFunctions.GammaLn(d.Shape));
            case LogNormal d:
                return x => ((x.Log() + -d.Mu) * (1 / d.Sigma)).Power(2) is var q ? (q * -0.5).Exp() * x.Power(-1) * (NormalLaw.InverseSqrtTwoPi / d.Sigma) : x;
            case StudentT d:
                double v = d.DegreesOfFreedom;
                double c = Math.Exp(SpecialFunctions.GammaLn((v + 1) / 2) - SpecialFunctions.GammaLn(v / 2)) / Math.Sqrt(v * Math.PI) / d.Scale;
                return x => ((((x + -d.Location) * (1 / d.Scale)).Power(2) * (1 / v)) + 1).Power(-(v + 1) / 2) * c;
            case Weibull d:
                return x => (x * (1 / d.Scale)).Power(d.Shape - 1) * ((x * (1 / d.Scale)).Power(d.Shape) * -1).Exp() * (d.Shape / d.Scale);
            case Beta d:
                return x => x.Power(d.A - 1) * ((x * -1) + 1).Power(d.B - 1) * Math.Exp(-SpecialFunctions.BetaLn(d.A, d.B));
            case Logistic d:
                return x => ((x + -d.Mean) * (1 / d.Scale)) is var z && z[0] >= 0
                    ? (z * -1).Exp() * ((z * -1).Exp() + 1).Power(-2) * (1 / d.Scale)
                    : z.Exp() * (z.Exp() + 1).Power(-2) * (1 / d.Scale);
            case ContinuousUniform d:
                return x => (x * 0) + (1 / (d.UpperBound - d.LowerBound));
            default:
                return null;
        }
    }
}
