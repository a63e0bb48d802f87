using Smoothing.Kernels;
using MathNet.Numerics;

namespace Smoothing.Theory;

/// <summary>Any kernel on any target, by quadrature cut at kinks, jumps and features.</summary>
/// <remarks>
/// Method: bias = ∫ K(u) [g(x − hu) − g(x)] du; where this cancels and nothing jumps inside the window, the Taylor remainder
/// hᵏ ∫ uᵏK(u) ∫₀¹ (1 − t)ᵏ⁻¹/(k − 1)! g⁽ᵏ⁾(x − hut) dt du, which keeps relative accuracy as h → 0. Slopes by h:
/// −∫ uK(u) g'(x − hu) du minus the terms of jumps. Dominant error: quadrature near end points where f behaves as a power.
/// </remarks>
internal sealed class QuadratureError : SmoothingError
{
    private const double Cancelling = 1e-3; // above this share of g the plain difference keeps 1e-12

    private readonly Kernel _kernel;
    private readonly TargetDensity _target;
    private readonly int _r;
    private readonly double _radius;
    private readonly double _longest;
    private readonly double _extent;
    private readonly List<double> _unit = PanelRule.Panels(0, 1, [], 0.5);

    public QuadratureError(Kernel kernel, TargetDensity target, int derivative)
    {
        _kernel = kernel;
        _target = target;
        _r = derivative;
        _radius = Radius(kernel);
        _longest = double.IsFinite(kernel.SupportRadius) ? _radius : 2; // panels of two bandwidths resolve an unbounded kernel
        IReadOnlyList<double> splits = target.Splits;
        _extent = splits.Count > 1 ? splits[^1] - splits[0] : target.Widest;
    }

    public static double Radius(Kernel kernel)
    {
        double radius = kernel.SupportRadius;
        if (double.IsFinite(radius))
        {
            return radius;
        }

        // Beyond this |K| u^k is below a rounding of K(0).
        for (radius = 4; Math.Abs(kernel.Value(radius)) * Math.Pow(radius, kernel.Order) > 1e-17; radius++)
        {
        }

        return radius;
    }

    public override double Bias(double x, double h)
    {
        double g = G(x, 0);
        List<double> panels = Window(x, h);
        double direct = PanelRule.Integrate(u => _kernel.ValueCore(u) * (G(x - (h * u), 0) - g), panels, 1e-5 * Math.Abs(g)); // 1e-5: to 1e-14 of g
        int k = _kernel.Order;
        if (Math.Abs(direct) > Cancelling * Math.Abs(g) || !_target.Knows(_r + k) || _target.Breaks.Any(b => Math.Abs(x - b) < h * _radius))
        {
            return direct;
        }

        double scale = 1 / SpecialFunctions.Factorial(k - 1);
        return Math.Pow(h, k) * PanelRule.Integrate(
            u => Math.Pow(u, k) * _kernel.ValueCore(u) * PanelRule.Integrate(t => scale * Math.Pow(1 - t, k - 1) * G(x - (h * u * t), k), _unit),
            panels);
    }

    public override double BiasSlope(double x, double h)
    {
        if (!_target.Knows(_r + 1))
        {
            double step = 1e-4 * h; // central difference: truncation 1e-8, rounding 1e-12
            return (Bias(x, h + step) - Bias(x, h - step)) / (2 * step);
        }

        double slope = -PanelRule.Integrate(u => u * _kernel.ValueCore(u) * G(x - (h * u), 1), Window(x, h));
        foreach (double b in _target.Breaks)
        {
            double v = (x - b) / h;
            slope -= _target.JumpCore(b, _r) * v * _kernel.ValueCore(v) / h;
        }

        return slope;
    }

    public override double Spread(double x, double h) =>
        PanelRule.Integrate(u => Square(K(u)) * _target.ValueCore(x - (h * u)), Window(x, h)) / Math.Pow(h, (2 * _r) + 1);

    public override double SpreadSlope(double x, double h)
    {
        if (!_target.Knows(1))
        {
            double step = 1e-4 * h; // central difference: truncation 1e-8, rounding 1e-12
            return (Spread(x, h + step) - Spread(x, h - step)) / (2 * step);
        }

        int p = (2 * _r) + 1;
        double slope = -PanelRule.Integrate(u => u * Square(K(u)) * (_target.Support.Contains(x - (h * u)) ? _target.DerivativeCore(x - (h * u), 1) : 0), Window(x, h));
        foreach (double b in _target.Breaks)
        {
            double v = (x - b) / h;
            double jump = _target.JumpCore(b, 0);
            slope -= jump == 0 || Math.Abs(v) > _radius ? 0 : jump * v * Square(K(v)) / h;
        }

        return (slope / Math.Pow(h, p)) - (p / h * Spread(x, h));
    }

    public override (double Bias2, double Mean2) Integrals(double h) => (
        OverLine(x => Square(Bias(x, h)), h),
        OverLine(x => Square(Bias(x, h) + G(x, 0)), h));

    public override (double Bias2, double Mean2) IntegralSlopes(double h) => (
        OverLine(x => 2 * BiasSlope(x, h) * Bias(x, h), h),
        OverLine(x => 2 * BiasSlope(x, h) * (Bias(x, h) + G(x, 0)), h));

    private static double Square(double v) => v * v;

    private double G(double x, int order) => _r + order == 0 ? _target.ValueCore(x) : _target.Support.Contains(x) ? _target.DerivativeCore(x, _r + order) : 0;

    private double K(double u) => _r == 0 ? _kernel.ValueCore(u) : _kernel.DerivativeCore(u, _r);

    private List<double> Window(double x, double h) =>
        PanelRule.Panels(-_radius, _radius, _target.Splits.Concat(_target.Breaks).Select(s => (x - s) / h).Append(0), _longest);

    /// <summary>∫ over x: panels at features and, for bounded kernels, at their images one radius away; open tails are mapped.</summary>
    private double OverLine(Func<double, double> f, double h)
    {
        IReadOnlyList<double> splits = _target.Splits;
        double reach = h * _radius;
        double low = Math.Max(splits[0], _target.Support.Lower) - reach;
        double high = Math.Min(splits[^1], _target.Support.Upper) + reach;
        bool bounded = double.IsFinite(_kernel.SupportRadius);
        IEnumerable<double> cuts = splits.Concat(_target.Breaks);
        cuts = bounded
            ? cuts.Concat(cuts.SelectMany(s => new[] { s - reach, s + reach }))
            : cuts.Concat(_target.Breaks.SelectMany(s => Enumerable.Range(1, 8).SelectMany(i => new[] { s - (i * h), s + (i * h) })));
        double body = PanelRule.Integrate(f, PanelRule.Panels(low, high, cuts, Math.Max(2 * h, _extent / 8)));
        double tail = _extent / 4;
        double floor = Math.Abs(body);
        return body
            + (double.IsFinite(_target.Support.Lower) ? 0 : PanelRule.IntegrateTail(f, low, -tail, floor))
            + (double.IsFinite(_target.Support.Upper) ? 0 : PanelRule.IntegrateTail(f, high, tail, floor));
    }
}
