using MathNet.Numerics;
using Smoothing.Kernels;
using Smoothing.Numerics;

namespace Smoothing.Theory;

/// <summary>Any kernel on a normal mixture: pointwise as everywhere, integrated by one integral for each pair of components.</summary>
/// <remarks>
/// Method: ∫E² = ΣΣ w w' ∫ (K∗K)(u) ψ(d − hu) du and ∫Eg likewise with K, ψ = (−1)ʳ φ_√v⁽²ʳ⁾, v the sum of the two variances, d the
/// difference of the means. Where the squared bias cancels, its expansion Σⱼ h²ʲ ψ⁽²ʲ⁾(d) Mⱼ/(2j)!, Mⱼ = Σ_{0&lt;i&lt;j} C(2j, 2i) μ₂ᵢ μ₂ⱼ₋₂ᵢ,
/// in which the cancelling terms are gone; it converges for bounded kernels and is asymptotic for the others, where it is used only
/// as long as its terms fall below a rounding. Dominant error: the panels' quadrature, about 1e-13 of the largest pair.
/// </remarks>
internal sealed class MixtureKernelError : SmoothingError
{
    private const int MostTerms = 40;
    private const double Reach = 10; // φ(10) is 1e-22 of φ(0)

    private readonly QuadratureError _pointwise;
    private readonly Kernel _kernel;
    private readonly int _r;
    private readonly double _radius;
    private readonly double _longest;
    private readonly double[] _moments;
    private readonly (double Weight, double Distance, double Variance)[] _pairs;

    public MixtureKernelError(Kernel kernel, NormalMixture target, int derivative)
    {
        _pointwise = new QuadratureError(kernel, target, derivative);
        _kernel = kernel;
        _r = derivative;
        _radius = QuadratureError.Radius(kernel);
        _longest = double.IsFinite(kernel.SupportRadius) ? _radius : 4;
        _pairs = MixturePairs.Of(target);
        _moments = new double[MostTerms + 1];
        double[] mu = [.. Enumerable.Range(0, MostTerms + 1).Select(j => j > 0 && 2 * j < kernel.Order ? 0 : kernel.Moment(2 * j) / SpecialFunctions.Factorial(2 * j))];
        for (int j = 0; j < _moments.Length; j++)
        {
            for (int i = 1; i < j; i++)
            {
                _moments[j] += mu[i] * mu[j - i];
            }
        }
    }

    public override double Bias(double x, double h) => _pointwise.Bias(x, h);

    public override double BiasSlope(double x, double h) => _pointwise.BiasSlope(x, h);

    public override double Spread(double x, double h) => _pointwise.Spread(x, h);

    public override double SpreadSlope(double x, double h) => _pointwise.SpreadSlope(x, h);

    public override (double Bias2, double Mean2) Integrals(double h) => Sum(h, 0);

    public override (double Bias2, double Mean2) IntegralSlopes(double h) => Sum(h, 1);

    private (double Bias2, double Mean2) Sum(double h, int slope)
    {
        CompensatedSum bias2 = default;
        CompensatedSum mean2 = default;
        foreach ((double w, double d, double v) in _pairs)
        {
            double twice = Integral(u => _kernel.SelfConvolution(u), 2 * _radius, d, v, h, slope);
            mean2.Add(w * twice);
            double series = Series(d, v, h, slope);
            bias2.Add(w * (double.IsNaN(series) ? twice - (2 * Integral(_kernel.ValueCore, _radius, d, v, h, slope)) + (slope == 0 ? Psi(d, v, 0) : 0) : series));
        }

        return (bias2.Value, mean2.Value);
    }

    private double Psi(double d, double v, int order) => (_r % 2 == 0 ? 1 : -1) * NormalMixture.Phi(d, v, (2 * _r) + order);

    /// <summary>∫ q(u) ψ(d − hu) du, or its derivative by h, −∫ u q(u) ψ'(d − hu) du.</summary>
    private double Integral(Func<double, double> q, double radius, double d, double v, double h, int slope)
    {
        double s = Math.Sqrt(v);
        double from = Math.Max(-radius, (d - (Reach * s)) / h);
        double to = Math.Min(radius, (d + (Reach * s)) / h);
        if (from >= to)
        {
            return 0;
        }

        double[] shoulders = [-3, 0, 3];
        List<double> panels = PanelRule.Panels(from, to, [0, -_radius, _radius, .. shoulders.Select(c => (d + (c * s)) / h)], Math.Min(_longest, 3 * s / h));
        return slope == 0
            ? PanelRule.Integrate(u => q(u) * Psi(d - (h * u), v, 0), panels)
            : -PanelRule.Integrate(u => u * q(u) * Psi(d - (h * u), v, 1), panels);
    }

    /// <summary>The expansion of a pair's squared bias, or NaN where it does not settle.</summary>
    private double Series(double d, double v, double h, int slope)
    {
        CompensatedSum sum = default;
        double before = double.PositiveInfinity;
        for (int j = 1; j <= MostTerms; j++)
        {
            double term = _moments[j] * Psi(d, v, 2 * j) * (slope == 0 ? Math.Pow(h, 2 * j) : 2 * j * Math.Pow(h, (2 * j) - 1));
            sum.Add(term);
            double size = Math.Abs(term);
            if (!double.IsFinite(size) || (j > _kernel.Order + 2 && size > 1e3 * Math.Abs(sum.Value)))
            {
                break;
            }

            if (j > _kernel.Order && size + before <= 1e-17 * Math.Abs(sum.Value))
            {
                return sum.Value;
            }

            before = size;
        }

        return double.NaN;
    }
}
