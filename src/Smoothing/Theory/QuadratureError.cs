using System.Runtime.Intrinsics;
using Smoothing.Kernels;

namespace Smoothing.Theory;

/// <summary>Any kernel on any target, by quadrature cut at kinks, jumps and features.</summary>
/// <remarks>
/// Method: bias = ∫ K(u) [g(x − hu) − g(x)] du; where this cancels and nothing jumps inside the window, hᵏ ∫ L(v) g⁽ᵏ⁾(x − hv) dv with the
/// Peano kernel L, which keeps relative accuracy as h → 0. Slopes by h: −∫ uK(u) g'(x − hu) du minus the terms of jumps. Integrals over
/// x take g and its derivatives from tables of piecewise polynomials. Dominant error: quadrature near end points where f behaves as a power.
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
    private readonly double[] _places; // features and breaks in order
    private readonly double[] _levelPoles, _densityPoles; // breaks at which g' or f' is unbounded
    private readonly bool _knowsRemainder, _knowsSlope, _knowsFirst;
    private readonly Lazy<PeanoKernel> _peano;
    private readonly Curves _exact;
    private readonly Lazy<Curves> _tabulated;

    public QuadratureError(Kernel kernel, TargetDensity target, int derivative)
    {
        _kernel = kernel;
        _target = target;
        _r = derivative;
        _radius = Radius(kernel);
        _longest = double.IsFinite(kernel.SupportRadius) ? _radius : 4; // panels of four bandwidths resolve an unbounded kernel: φ(u) on [−2, 2] leaves 1e-25 to degree 39
        _places = [.. target.Splits.Concat(target.Breaks).Distinct().Order()];
        _extent = _places.Length > 1 ? _places[^1] - _places[0] : target.Widest;
        _knowsRemainder = target.Knows(derivative + kernel.Order);
        _knowsSlope = target.Knows(derivative + 1);
        _knowsFirst = target.Knows(1);
        _levelPoles = Poles(derivative + 1);
        _densityPoles = Poles(1);
        _peano = new(() => new(kernel, _radius));
        _exact = new(x => G(x, 0), x => G(x, 1), x => G(x, kernel.Order));
        _tabulated = new(() => new(
            new PiecewiseTable(_exact.Level, _places).At,
            _knowsSlope ? new PiecewiseTable(_exact.Slope, _places).At : _exact.Slope,
            _knowsRemainder ? new PiecewiseTable(_exact.Remainder, _places).At : _exact.Remainder));
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

    public override double Bias(double x, double h) => Bias(_exact, x, h);

    public override double BiasSlope(double x, double h) => BiasSlope(_exact, x, h);

    public override double Spread(double x, double h) => Window(x, h, (u, y) => Square(K(u)) * _target.ValueCore(y)) / Math.Pow(h, (2 * _r) + 1);

    public override double SpreadSlope(double x, double h)
    {
        int p = (2 * _r) + 1;
        double scale = Math.Pow(h, p);
        if (!_knowsFirst || _densityPoles.Any(b => Math.Abs(x - b) < h * _radius))
        {
            return SlopeByKernel(x, h, u => Square(K(u)), u => 2 * K(u) * _kernel.DerivativeCore(u, _r + 1), _target.ValueCore) / scale
                - (p / h * Spread(x, h));
        }

        double slope = -Window(x, h, (u, y) => u * Square(K(u)) * (_target.Support.Contains(y) ? _target.DerivativeCore(y, 1) : 0));
        foreach (double b in _target.Breaks)
        {
            double v = (x - b) / h;
            double jump = Math.Abs(v) > _radius ? 0 : _target.JumpCore(b, 0);
            slope -= jump == 0 ? 0 : jump * v * Square(K(v)) / h;
        }

        return (slope / scale) - (p / h * Spread(x, h));
    }

    public override (double Bias2, double Mean2) Integrals(double h)
    {
        if (h > 1e15 * _extent)
        {
            // Seen from so far the target is a point: E is K⁽ʳ⁾ itself, and g a spike beside it.
            return (_target.Roughness(_r), _kernel.Roughness(_r) / Math.Pow(h, (2 * _r) + 1));
        }

        Curves curves = _tabulated.Value;
        return OverLine(
            x =>
            {
                double bias = Bias(curves, x, h);
                double mean = bias + curves.Level(x);
                return Vector128.Create(bias * bias, mean * mean);
            },
            h);
    }

    public override (double Bias2, double Mean2) IntegralSlopes(double h)
    {
        Curves curves = _tabulated.Value;
        return OverLine(
            x =>
            {
                double bias = Bias(curves, x, h);
                double slope = 2 * BiasSlope(curves, x, h);
                return Vector128.Create(slope * bias, slope * (bias + curves.Level(x)));
            },
            h);
    }

    private static double Square(double v) => v * v;

    private double Bias(Curves curves, double x, double h)
    {
        double g = curves.Level(x);
        double direct = Window(x, h, (u, y) => _kernel.ValueCore(u) * (curves.Level(y) - g), 1e-5 * Math.Abs(g)); // 1e-5: to 1e-14 of g
        if (Math.Abs(direct) > Cancelling * Math.Abs(g) || !_knowsRemainder || _target.Breaks.Any(b => Math.Abs(x - b) < h * _radius))
        {
            return direct;
        }

        PeanoKernel peano = _peano.Value;
        return Math.Pow(h, _kernel.Order) * Window(x, h, (u, y) => peano.At(u) * curves.Remainder(y));
    }

    private double BiasSlope(Curves curves, double x, double h)
    {
        if (!_knowsSlope || _levelPoles.Any(b => Math.Abs(x - b) < h * _radius))
        {
            return SlopeByKernel(x, h, _kernel.ValueCore, u => _kernel.DerivativeCore(u, 1), curves.Level);
        }

        double slope = -Window(x, h, (u, y) => u * _kernel.ValueCore(u) * curves.Slope(y));
        foreach (double b in _target.Breaks)
        {
            double v = (x - b) / h;
            double jump = Math.Abs(v) > _radius ? 0 : _target.JumpCore(b, _r);
            slope -= jump == 0 ? 0 : jump * v * _kernel.ValueCore(v) / h;
        }

        return slope;
    }

    /// <summary>d/dh ∫ q(u) g(x − hu) du = −{∫ (q + uq') g(x − hu) du − R q(R)(g(x − hR) + g(x + hR))}/h, for even q with a jump at its ends ±R at most.</summary>
    private double SlopeByKernel(double x, double h, Func<double, double> q, Func<double, double> derivative, Func<double, double> g)
    {
        double inside = Window(x, h, (u, y) => (q(u) + (u * derivative(u))) * g(y));
        double reach = h * _radius;
        double end = double.IsFinite(_kernel.SupportRadius) ? q(Math.BitDecrement(_radius)) : 0;
        return -(inside - (end == 0 ? 0 : _radius * end * (g(x - reach) + g(x + reach)))) / h;
    }

    private double[] Poles(int order) =>
        _target.Knows(order) ? [.. _target.Breaks.Where(b => !double.IsFinite(_target.JumpCore(b, order - 1)) || !double.IsFinite(_target.JumpCore(b, order)))] : [];

    private double G(double x, int order) => _r + order == 0 ? _target.ValueCore(x) : _target.Support.Contains(x) ? _target.DerivativeCore(x, _r + order) : 0;

    private double K(double u) => _r == 0 ? _kernel.ValueCore(u) : _kernel.DerivativeCore(u, _r);

    /// <summary>∫ q(u, x − hu) du. Where h is large against the target the nodes are placed in y = x − hu, which would lose its digits otherwise.</summary>
    private double Window(double x, double h, Func<double, double, double> q, double floor = 0)
    {
        var ends = new List<double>(_places.Length + 16);
        double reach = h * _radius;
        if (reach < _extent)
        {
            ends.Add(-_radius);
            bool centre = false;
            for (int i = _places.Length - 1; i >= 0; i--)
            {
                double u = (x - _places[i]) / h;
                if (u <= -_radius || u >= _radius)
                {
                    continue;
                }

                if (!centre && u >= 0)
                {
                    PanelRule.Extend(ends, 0, _longest);
                    centre = true;
                }

                PanelRule.Extend(ends, u, _longest);
            }

            if (!centre)
            {
                PanelRule.Extend(ends, 0, _longest);
            }

            PanelRule.Extend(ends, _radius, _longest);
            return PanelRule.Integrate(u => q(u, x - (h * u)), ends, floor);
        }

        // Beyond the features the target's own tails, or nothing, at the kernel's scale.
        ends = PanelRule.Panels(x - reach, x + reach, _places.Append(x), _longest * h);
        return PanelRule.Integrate(y => q((x - y) / h, y), ends, floor * h) / h;
    }

    /// <summary>∫ over x: panels at features and, for bounded kernels, at their images one radius away; open tails are mapped.</summary>
    private (double A, double B) OverLine(Func<double, Vector128<double>> f, double h)
    {
        IReadOnlyList<double> splits = _target.Splits;
        double reach = h * _radius;
        double low = Math.Max(splits[0], _target.Support.Lower) - reach;
        double high = Math.Min(splits[^1], _target.Support.Upper) + reach;
        bool bounded = double.IsFinite(_kernel.SupportRadius);
        IEnumerable<double> cuts = bounded
            ? _places.Concat(_places.SelectMany(s => new[] { s - reach, s + reach }))
            : _places.Concat(_target.Breaks.SelectMany(s => Enumerable.Range(1, 8).SelectMany(i => new[] { s - (i * h), s + (i * h) })));
        Vector128<double> sum = PanelRule.Integrate(f, PanelRule.Panels(low, high, cuts, Math.Max(2 * h, _extent / 8)), Vector128<double>.Zero);
        double tail = Math.Max(_extent / 4, h);
        Vector128<double> floor = Vector128.Abs(sum);
        if (double.IsInfinity(_target.Support.Lower))
        {
            sum += PanelRule.IntegrateTail(f, low, -tail, floor);
        }

        if (double.IsInfinity(_target.Support.Upper))
        {
            sum += PanelRule.IntegrateTail(f, high, tail, floor);
        }

        return (sum[0], sum[1]);
    }

    /// <summary>g and its derivatives of order 1 and k.</summary>
    private sealed record Curves(Func<double, double> Level, Func<double, double> Slope, Func<double, double> Remainder);
}
