using MathNet.Numerics;
using MathNet.Numerics.Distributions;
using Smoothing.Numerics;

namespace Smoothing.Theory;

/// <summary>The distributions of MathNet.Numerics as targets: each family by its standard member, whose density is a formula for power series.</summary>
/// <remarks>Method: f(x) written once for series gives derivatives of any order by arithmetic, rounding only; location and scale are put on afterwards.</remarks>
internal static class DistributionFamilies
{
    public static TargetDensity Of(IContinuousDistribution distribution) => distribution switch
    {
        Normal d => new NormalMixture(Guard.Text($"normal({d.Mean}, {d.StdDev})"), [1], [d.Mean], [d.StdDev]),
        Exponential d => Put(Guard.Text($"exponential(rate {d.Rate})"), new Exponential(1), (x, _) => (x * -1).Exp(), 0, 1 / d.Rate),
        Gamma d => OfGamma(Guard.Text($"gamma({d.Shape}, rate {d.Rate})"), d.Shape, 1 / d.Rate),
        Erlang d => OfGamma(Guard.Text($"Erlang({d.Shape}, rate {d.Rate})"), d.Shape, 1 / d.Rate),
        ChiSquared d => OfGamma(Guard.Text($"chi-squared({d.DegreesOfFreedom})"), d.DegreesOfFreedom / 2, 2),
        LogNormal d => Put(Guard.Text($"log-normal({d.Mu}, {d.Sigma})"), new LogNormal(0, Guard.Positive(d.Sigma)), LogNormalFormula(d.Sigma), 0, Math.Exp(d.Mu)),
        StudentT { DegreesOfFreedom: double.PositiveInfinity } d => new NormalMixture(Guard.Text($"Student(∞) at {d.Location}, scale {d.Scale}"), [1], [d.Location], [d.Scale]),
        StudentT d => Put(Guard.Text($"Student({d.DegreesOfFreedom}) at {d.Location}, scale {d.Scale}"), new StudentT(0, 1, d.DegreesOfFreedom), StudentFormula(d.DegreesOfFreedom), d.Location, d.Scale),
        Cauchy d => Put(Guard.Text($"Cauchy at {d.Location}, scale {d.Scale}"), new Cauchy(0, 1), (x, _) => (x.Power(2) + 1).Power(-1) * (1 / Math.PI), d.Location, d.Scale),
        Weibull d => Put(Guard.Text($"Weibull({d.Shape}, scale {d.Scale})"), new Weibull(d.Shape, 1), WeibullFormula(d.Shape), 0, d.Scale),
        Rayleigh d => Put(Guard.Text($"Rayleigh(scale {d.Scale})"), new Rayleigh(1), (x, _) => x * (x.Power(2) * -0.5).Exp(), 0, d.Scale),
        Beta d => new DistributionTarget(Guard.Text($"beta({d.A}, {d.B})"), d, BetaFormula(d.A, d.B)),
        BetaScaled d => Put(Guard.Text($"beta({d.A}, {d.B}) at {d.Location}, scale {d.Scale}"), new Beta(d.A, d.B), BetaFormula(d.A, d.B), d.Location, d.Scale),
        Logistic d => Put(Guard.Text($"logistic at {d.Mean}, scale {d.Scale}"), new Logistic(0, 1), (x, _) => LogisticFormula(x), d.Mean, d.Scale),
        Laplace d => Put(Guard.Text($"Laplace at {d.Location}, scale {d.Scale}"), new Laplace(0, 1), (x, side) => (x * (side > 0 ? -1 : 1)).Exp() * 0.5, d.Location, d.Scale, 0),
        Pareto d => Put(Guard.Text($"Pareto({d.Shape}, scale {d.Scale})"), new Pareto(1, d.Shape), (x, _) => x.Power(-d.Shape - 1) * d.Shape, 0, d.Scale),
        ContinuousUniform d => Put(Guard.Text($"uniform({d.LowerBound}, {d.UpperBound})"), new ContinuousUniform(0, 1), (x, _) => (x * 0) + 1, d.LowerBound, d.UpperBound - d.LowerBound),
        Triangular d => OfTriangular(d),
        _ => new DistributionTarget(distribution.GetType().Name, distribution, null),
    };

    private static TargetDensity Put(string name, IContinuousDistribution standard, Func<TaylorSeries, double, TaylorSeries> formula, double shift, double factor, double? kink = null)
    {
        Guard.Finite(shift, "pass a distribution with a finite location", name);
        Guard.Positive(factor, "pass a distribution whose scale is positive and finite", name);
        var target = new DistributionTarget(name, standard, formula, kink);
        return shift == 0 && factor == 1 ? target : new AffineTarget(name, target, shift, factor);
    }

    private static TargetDensity OfGamma(string name, double shape, double scale)
    {
        double c = Math.Exp(-SpecialFunctions.GammaLn(shape));
        return Put(name, new Gamma(shape, 1), (x, _) => x.Power(shape - 1) * (x * -1).Exp() * c, 0, scale);
    }

    private static DistributionTarget OfTriangular(Triangular d)
    {
        double width = d.UpperBound - d.LowerBound;
        double mode = d.Mode;
        return new(
            Guard.Text($"triangular({d.LowerBound}, {d.UpperBound}) with its top at {mode}"),
            d,
            (x, side) => side < mode || mode == d.UpperBound
                ? (x + -d.LowerBound) * (2 / (width * (mode - d.LowerBound)))
                : (x + -d.UpperBound) * (-2 / (width * (d.UpperBound - mode))),
            mode > d.LowerBound && mode < d.UpperBound ? mode : null);
    }

    private static Func<TaylorSeries, double, TaylorSeries> LogNormalFormula(double sigma) =>
        (x, _) => ((x.Log() * (1 / sigma)).Power(2) * -0.5).Exp() * x.Power(-1) * (NormalLaw.InverseSqrtTwoPi / sigma);

    private static Func<TaylorSeries, double, TaylorSeries> StudentFormula(double v)
    {
        double c = Math.Exp(SpecialFunctions.GammaLn((v + 1) / 2) - SpecialFunctions.GammaLn(v / 2)) / Math.Sqrt(v * Math.PI);
        return (x, _) => ((x.Power(2) * (1 / v)) + 1).Power(-(v + 1) / 2) * c;
    }

    private static Func<TaylorSeries, double, TaylorSeries> WeibullFormula(double shape) =>
        (x, _) => x.Power(shape - 1) * (x.Power(shape) * -1).Exp() * shape;

    private static Func<TaylorSeries, double, TaylorSeries> BetaFormula(double a, double b)
    {
        double c = Math.Exp(-SpecialFunctions.BetaLn(a, b));
        return (x, _) => x.Power(a - 1) * ((x * -1) + 1).Power(b - 1) * c;
    }

    private static TaylorSeries LogisticFormula(TaylorSeries x)
    {
        TaylorSeries e = (x[0] >= 0 ? x * -1 : x).Exp(); // the side on which e ≤ 1
        return e * (e + 1).Power(-2);
    }
}
