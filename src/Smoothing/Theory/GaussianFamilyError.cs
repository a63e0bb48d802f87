using MathNet.Numerics;
using Smoothing.Kernels;
using Smoothing.Numerics;

namespace Smoothing.Theory;

/// <summary>Gaussian-based kernels of any order k = 2s on normal mixtures, any derivative r: closed forms.</summary>
/// <remarks>
/// Method: G = Σ_{i&lt;s} cᵢ φ⁽²ⁱ⁾, so E = Σ cᵢ h²ⁱ f_τ⁽²ⁱ⁺ʳ⁾ with f_τ the mixture with all variances larger by τ = h² (Wand &amp; Schucany 1990,
/// Marron &amp; Wand 1992). Where differences cancel (h² below a component's variance v): 1 − κ(ht) is the probability that a Poisson
/// variable with mean h²t²/2 is at least s, hence −bias = (−½)ˢ ∫₀^{h²} τˢ⁻¹/(s − 1)! f_τ⁽²ˢ⁺ʳ⁾ dτ and the integrated square is a double
/// integral of the same kind with nothing to cancel. Dominant error: rounding; the Gauss rule in τ misses less than 1e-14.
/// </remarks>
internal sealed class GaussianFamilyError : SmoothingError
{
    private const int Points = 20; // the integrand in τ/v is analytic but for −1: 20 points on [0, 1] miss 6^−40 of it

    private readonly NormalMixture _target;
    private readonly int _s;
    private readonly int _r;
    private readonly double[] _c;
    private readonly double[] _cc;
    private readonly double[] _square;
    private readonly double[] _w, _m, _v;
    private readonly (double Weight, double Distance, double Variance)[] _pairs;

    public GaussianFamilyError(Kernel kernel, NormalMixture target, int derivative)
    {
        _target = target;
        _s = kernel.Order / 2;
        _r = derivative;
        _c = new double[_s];
        double term = 1;
        for (int i = 0; i < _s; i++)
        {
            _c[i] = term;
            term /= -2 * (i + 1);
        }

        _cc = Product(_c, _c);
        _square = SquareTerms(kernel, derivative);
        _w = [.. target.Weights];
        _m = [.. target.Means];
        _v = [.. target.StandardDeviations.Select(d => d * d)];
        _pairs = MixturePairs.Of(target);
    }

    public override double Bias(double x, double h)
    {
        if (h > GaussianMixtureError.Flat)
        {
            return -_target.Derivative(x, _r);
        }

        CompensatedSum sum = default;
        double end = h * h;
        for (int i = 0; i < _w.Length; i++)
        {
            double d = x - _m[i];
            double v = _v[i];
            if (end > v)
            {
                sum.Add(_w[i] * (Smoothed(d, v + end, h, _c, 0) - NormalMixture.Phi(d, v, _r)));
                continue;
            }

            double integral = GaussLegendre.Integrate(t => Math.Pow(t, _s - 1) * NormalMixture.Phi(d, v + t, (2 * _s) + _r), 0, end, Points);
            sum.Add(-_w[i] * Sign(_s) * Math.Pow(0.5, _s) / SpecialFunctions.Factorial(_s - 1) * integral);
        }

        return sum.Value;
    }

    public override double BiasSlope(double x, double h)
    {
        // d/dh of −(−½)ˢ ∫₀^{h²}: the integrand at its end times 2h.
        double sum = 0;
        for (int i = 0; i < _w.Length; i++)
        {
            sum += _w[i] * NormalMixture.Phi(x - _m[i], _v[i] + (h * h), (2 * _s) + _r);
        }

        return -Sign(_s) * Math.Pow(0.5, _s) / SpecialFunctions.Factorial(_s - 1) * 2 * Math.Pow(h, (2 * _s) - 1) * sum;
    }

    public override double Spread(double x, double h) => h > GaussianMixtureError.Flat ? 0 : SpreadTerms(x, h, 0) / Math.Pow(h, (2 * _r) + 1);

    public override double SpreadSlope(double x, double h) =>
        (SpreadTerms(x, h, 1) - (((2 * _r) + 1) / h * SpreadTerms(x, h, 0))) / Math.Pow(h, (2 * _r) + 1);

    public override (double Bias2, double Mean2) Integrals(double h)
    {
        if (h > GaussianMixtureError.Flat)
        {
            return (_target.Roughness(_r), 0);
        }

        CompensatedSum bias2 = default;
        CompensatedSum mean2 = default;
        double t = h * h;
        foreach ((double w, double d, double v) in _pairs)
        {
            double twice = Sign(_r) * Smoothed(d, v + (2 * t), h, _cc, _r);
            mean2.Add(w * twice);
            bias2.Add(w * (t > v ? twice - (2 * Sign(_r) * Smoothed(d, v + t, h, _c, _r)) + (Sign(_r) * NormalMixture.Phi(d, v, 2 * _r)) : Stable(d, v, t)));
        }

        return (bias2.Value, mean2.Value);
    }

    public override (double Bias2, double Mean2) IntegralSlopes(double h)
    {
        double bias2 = 0;
        double mean2 = 0;
        double t = h * h;
        foreach ((double w, double d, double v) in _pairs)
        {
            double twice = Sign(_r) * SmoothedSlope(d, v + (2 * t), h, _cc, 2);
            mean2 += w * twice;
            bias2 += w * (t > v ? twice - (2 * Sign(_r) * SmoothedSlope(d, v + t, h, _c, 1)) : StableSlope(d, v, h));
        }

        return (bias2, mean2);
    }

    private static double Sign(int power) => power % 2 == 0 ? 1 : -1;

    private static double[] Product(double[] a, double[] b)
    {
        var c = new double[a.Length + b.Length - 1];
        for (int i = 0; i < a.Length; i++)
        {
            for (int j = 0; j < b.Length; j++)
            {
                c[i + j] += a[i] * b[j];
            }
        }

        return c;
    }

    /// <summary>(G⁽ʳ⁾)² as Σ aₘ φ_{1/√2}⁽²ᵐ⁾: powers of u written in the Hermite polynomials of variance ½.</summary>
    private static double[] SquareTerms(Kernel kernel, int derivative)
    {
        // G = φ q(u²); one derivative takes φ p to φ (p' − u p).
        double[] p = new double[(2 * kernel.GaussianPolynomial.Length) - 1];
        for (int i = 0; i < kernel.GaussianPolynomial.Length; i++)
        {
            p[2 * i] = kernel.GaussianPolynomial[i];
        }

        for (int r = 0; r < derivative; r++)
        {
            var next = new double[p.Length + 1];
            for (int i = 0; i < p.Length; i++)
            {
                next[i + 1] -= p[i];
                if (i > 0)
                {
                    next[i - 1] += i * p[i];
                }
            }

            p = next;
        }

        double[] square = Product(p, p);
        var terms = new double[((square.Length - 1) / 2) + 1];
        for (int j = 0; j < square.Length; j += 2)
        {
            // uʲ = σʲ Σᵢ j!/(2ⁱ i! (j − 2i)!) He_{j−2i}(u/σ), and He_m(u/σ) φ_σ = (−σ)ᵐ φ_σ⁽ᵐ⁾; σ² = ½.
            for (int i = 0; i <= j / 2; i++)
            {
                double hermite = SpecialFunctions.Factorial(j) / (Math.Pow(2, i) * SpecialFunctions.Factorial(i) * SpecialFunctions.Factorial(j - (2 * i)));
                terms[(j / 2) - i] += square[j] * hermite * Math.Pow(0.5, j - i);
            }
        }

        return [.. terms.Select(a => a * 0.5 / NormalLaw.SqrtPi)]; // φ(u)² = φ_{1/√2}(u)/(2√π)
    }

    /// <summary>Σ cᵢ h²ⁱ φ⁽²ⁱ⁺ʳ⁺ᵉ⁾ at d with variance v.</summary>
    private double Smoothed(double d, double v, double h, double[] c, int extra)
    {
        double sum = 0;
        double power = 1;
        for (int i = 0; i < c.Length; i++, power *= h * h)
        {
            sum += c[i] * power * NormalMixture.Phi(d, v, (2 * i) + _r + extra);
        }

        return sum;
    }

    /// <summary>d/dh of Σ cᵢ h²ⁱ φ⁽²ⁱ⁺²ʳ⁾ where the variance grows as <paramref name="rate"/>·h².</summary>
    private double SmoothedSlope(double d, double v, double h, double[] c, int rate)
    {
        double sum = 0;
        double power = 1;
        for (int i = 0; i < c.Length; i++, power *= h * h)
        {
            int order = 2 * (i + _r);
            sum += c[i] * power * ((2 * i / h * NormalMixture.Phi(d, v, order)) + (rate * h * NormalMixture.Phi(d, v, order + 2)));
        }

        return sum;
    }

    private double Stable(double d, double v, double end)
    {
        double scale = 1 / SpecialFunctions.Factorial(_s - 1);
        int order = (2 * _r) + (4 * _s);
        double integral = GaussLegendre.Integrate(
            a => Math.Pow(a, _s - 1) * GaussLegendre.Integrate(b => Math.Pow(b, _s - 1) * NormalMixture.Phi(d, v + a + b, order), 0, end, Points),
            0,
            end,
            Points);
        return Sign(_r) * Math.Pow(0.25, _s) * scale * scale * integral;
    }

    private double StableSlope(double d, double v, double h)
    {
        double scale = 1 / SpecialFunctions.Factorial(_s - 1);
        double end = h * h;
        int order = (2 * _r) + (4 * _s);
        double integral = GaussLegendre.Integrate(b => Math.Pow(b, _s - 1) * NormalMixture.Phi(d, v + end + b, order), 0, end, Points);
        return Sign(_r) * Math.Pow(0.25, _s) * scale * scale * 4 * Math.Pow(h, (2 * _s) - 1) * integral;
    }

    /// <summary>Σ aₘ h²ᵐ f⁽²ᵐ⁾ with variances larger by h²/2, or its derivative by h.</summary>
    private double SpreadTerms(double x, double h, int slope)
    {
        CompensatedSum sum = default;
        for (int i = 0; i < _w.Length; i++)
        {
            double power = 1;
            double v = _v[i] + (h * h / 2);
            for (int m = 0; m < _square.Length; m++, power *= h * h)
            {
                double at = NormalMixture.Phi(x - _m[i], v, 2 * m);
                sum.Add(_w[i] * _square[m] * power * (slope == 0 ? at : (2 * m / h * at) + (h / 2 * NormalMixture.Phi(x - _m[i], v, (2 * m) + 2))));
            }
        }

        return sum.Value;
    }
}
