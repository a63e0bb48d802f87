using System.Runtime.Intrinsics;
using MathNet.Numerics.Integration;
using Smoothing.Numerics;

namespace Smoothing.Theory;

/// <summary>Gaussian kernel on a normal mixture: closed forms.</summary>
/// <remarks>
/// Method: Fryer (1976), Marron &amp; Wand (1992), Theorem 2.1. Where the differences cancel as h → 0 they are written with
/// eᵃ − 1 and ln(1 + a), so that bias and integrated squared bias keep their relative accuracy: with L(τ) the logarithm of
/// φ_√(v+τ)(d)/φ_√v(d), the second difference is φ_√v(d) [(e^L(τ) − 1)² + e^2L(τ) (e^(L(2τ)−2L(τ)) − 1)],
/// and, for the pairs with v ≥ 4τ, ¼∫₀^{2τ} min(s, 2τ − s) φ⁽⁴⁾_√(v+s)(d) ds by five Gauss points on each half (the nearest singularity,
/// s = −v, leaves 1e-12 of it), four pairs at a time. Dominant error:
/// rounding, times the cancellation between components that R(f'') itself has.
/// </remarks>
internal sealed class GaussianMixtureError : SmoothingError
{
    /// <summary>Bandwidths, in spreads of the target, beyond which h² may overflow and nothing of the shape is left in double precision.</summary>
    public const double Flat = 1e100;

    private static readonly GaussLegendreRule s_rule = new(0, 1, 5);

    private readonly double[] _w, _m, _v;
    private readonly double[] _pairWeight, _pairDistance2, _pairVariance;
    private readonly double _roughness;

    public GaussianMixtureError(NormalMixture target)
    {
        _w = [.. target.Weights];
        _m = [.. target.Means];
        _v = [.. target.StandardDeviations.Select(s => s * s)];
        var pairs = new List<(double W, double D2, double V)>();
        for (int i = 0; i < _w.Length; i++)
        {
            for (int j = 0; j <= i; j++)
            {
                double d = _m[i] - _m[j];
                pairs.Add(((i == j ? 1 : 2) * _w[i] * _w[j], d * d, _v[i] + _v[j]));
            }
        }

        // In order of variance, filled up to whole vectors of four with pairs of weight 0.
        pairs.Sort((a, b) => a.V.CompareTo(b.V));
        while (pairs.Count % 4 != 0)
        {
            pairs.Add((0, 0, pairs[^1].V));
        }

        _pairWeight = [.. pairs.Select(p => p.W)];
        _pairDistance2 = [.. pairs.Select(p => p.D2)];
        _pairVariance = [.. pairs.Select(p => p.V)];
        _roughness = target.Roughness();
    }

    public override double Bias(double x, double h)
    {
        if (h > Flat)
        {
            return -Smooth(x, 0, 0);
        }

        CompensatedSum sum = default;
        double t = h * h;
        for (int i = 0; i < _w.Length; i++)
        {
            double d = x - _m[i];
            double e = t / _v[i];
            double log = (d * d / _v[i] * e / (2 * (1 + e))) - (0.5 * Log1(e));
            double at = NormalMixture.Phi(d, _v[i], 0);

            // Far out φ_s is 0 in double while φ_√(s²+h²) is not: then nothing cancels.
            sum.Add(_w[i] * (Math.Abs(log) > 1 ? NormalMixture.Phi(d, _v[i] + t, 0) - at : at * Exp1(log)));
        }

        return sum.Value;
    }

    public override double BiasSlope(double x, double h) => h * Smooth(x, h * h, 2);

    public override double Spread(double x, double h) => h > Flat ? 0 : 0.5 / NormalLaw.SqrtPi / h * Smooth(x, h * h / 2, 0);

    public override double SpreadSlope(double x, double h) =>
        0.5 / NormalLaw.SqrtPi / h * ((h / 2 * Smooth(x, h * h / 2, 2)) - (Smooth(x, h * h / 2, 0) / h));

    public override (double Bias2, double Mean2) Integrals(double h)
    {
        if (h > Flat)
        {
            return (_roughness, 0);
        }

        double twice = Pairs(2 * h * h);
        double bias2 = twice - (2 * Pairs(h * h)) + _roughness;

        // Above a thousandth of R(f) the plain difference keeps 1e-12; below, the stable form takes over.
        return (bias2 > 1e-3 * _roughness ? bias2 : Stable(h * h), twice);
    }

    public override (double Bias2, double Mean2) IntegralSlopes(double h)
    {
        double twice = 0;
        double once = 0;
        for (int i = 0; i < _pairWeight.Length; i++)
        {
            twice += _pairWeight[i] * Curvature(_pairDistance2[i], _pairVariance[i] + (2 * h * h));
            once += _pairWeight[i] * Curvature(_pairDistance2[i], _pairVariance[i] + (h * h));
        }

        return (2 * h * (twice - once), 2 * h * twice);
    }

    private static double Exp1(double a) => 2 * Math.Sinh(a / 2) * Math.Exp(a / 2);

    private static double Log1(double a) => 2 * Math.Atanh(a / (2 + a));

    private static double Curvature(double d2, double v) => NormalLaw.InverseSqrtTwoPi / Math.Sqrt(v) * Math.Exp(-0.5 * d2 / v) * ((d2 / v) - 1) / v;

    private double Smooth(double x, double variance, int order)
    {
        double sum = 0;
        for (int i = 0; i < _w.Length; i++)
        {
            sum += _w[i] * NormalMixture.Phi(x - _m[i], _v[i] + variance, order);
        }

        return sum;
    }

    /// <summary>Σ w φ_√(v+τ)(d) over pairs, four at a time.</summary>
    private double Pairs(double tau)
    {
        var total = Vector256<double>.Zero;
        for (int i = 0; i < _pairWeight.Length; i += 4)
        {
            var inverse = Vector256<double>.One / (Vector256.Create(_pairVariance, i) + Vector256.Create(tau));
            var exponent = Vector256.Create(_pairDistance2, i) * inverse * Vector256.Create(-0.5);
            total += Vector256.Create(_pairWeight, i) * Vector256.Sqrt(inverse) * VectorExp.Of(exponent);
        }

        return NormalLaw.InverseSqrtTwoPi * Vector256.Sum(total);
    }

    /// <summary>Σ w φ⁽⁴⁾_√(v+s)(d) over the pairs from <paramref name="first"/> on, four at a time.</summary>
    private double Fourth(int first, double s)
    {
        var total = Vector256<double>.Zero;
        for (int i = first; i < _pairWeight.Length; i += 4)
        {
            var inverse = Vector256<double>.One / (Vector256.Create(_pairVariance, i) + Vector256.Create(s));
            var z = Vector256.Create(_pairDistance2, i) * inverse;
            var quartic = ((z - Vector256.Create(6.0)) * z) + Vector256.Create(3.0);
            total += Vector256.Create(_pairWeight, i) * Vector256.Sqrt(inverse) * VectorExp.Of(z * Vector256.Create(-0.5)) * quartic * inverse * inverse;
        }

        return NormalLaw.InverseSqrtTwoPi * Vector256.Sum(total);
    }

    private double Stable(double tau)
    {
        CompensatedSum sum = default;
        int narrow = Array.FindIndex(_pairVariance, v => v >= 4 * tau);
        narrow = narrow < 0 ? _pairVariance.Length : (narrow + 3) / 4 * 4;
        if (narrow < _pairVariance.Length)
        {
            for (int j = 0; j < s_rule.Order; j++)
            {
                double at = s_rule.GetAbscissa(j);
                sum.Add(0.25 * tau * tau * s_rule.GetWeight(j) * at * (Fourth(narrow, tau * at) + Fourth(narrow, tau * (2 - at))));
            }
        }

        for (int i = 0; i < narrow; i++)
        {
            double v = _pairVariance[i];
            double d2 = _pairDistance2[i];
            double e = tau / v;
            double first = (d2 / v * e / (2 * (1 + e))) - (0.5 * Log1(e));
            double rest = -(d2 / v * e * e / ((1 + (2 * e)) * (1 + e))) - (0.5 * Log1(-e * e / ((1 + e) * (1 + e))));
            double at = NormalLaw.InverseSqrtTwoPi / Math.Sqrt(v) * Math.Exp(-0.5 * d2 / v);
            double small = Exp1(first);
            sum.Add(at == 0 ? 0 : _pairWeight[i] * at * ((small * small) + (Math.Exp(2 * first) * Exp1(rest))));
        }

        return sum.Value;
    }
}
