using Smoothing.Numerics;

namespace Smoothing.Kernels;

/// <summary>A kernel of a caller's shape, divided by its integral and measured by quadrature.</summary>
/// <remarks>Method: the half line is cut into panels, 24 nodes each, the number doubled until integral, moments and R(K) agree to 1e-11; the claim is 1e-9.</remarks>
internal sealed class ShapeKernel : Kernel
{
    private const int CheckPoints = 512;
    private static readonly int[] s_orders = [2, 4, 6, 8];
    private readonly Func<double, double> _shape;
    private readonly Func<double, int, double>? _derivative;
    private readonly double _scale;
    private readonly double _end;
    private readonly int _panels;
    private readonly double[] _below;

    private ShapeKernel(string name, Func<double, double> shape, double radius, Func<double, int, double>? derivative, double scale, double end, int panels)
    {
        Name = name;
        SupportRadius = radius;
        _shape = shape;
        _derivative = derivative;
        _scale = scale;
        _end = end;
        _panels = panels;
        _below = new double[panels + 1];
        CompensatedSum sum = default;
        for (int i = 0; i < panels; i++)
        {
            sum.Add(GaussLegendre.Integrate(ValueCore, -end + (end * i / panels), -end + (end * (i + 1) / panels), 24));
            _below[i + 1] = sum.Value;
        }

        // The first even moment that is not zero to the accuracy of the measurement.
        Order = s_orders.FirstOrDefault(j => Math.Abs(EvenMoment(j)) > 1e-9 * Math.Pow(Spread(), j));
    }

    public override string Name { get; }

    public override int Order { get; }

    public override double SupportRadius { get; }

    private protected override double FiniteRadius => _end;

    public static ShapeKernel Make(string name, Func<double, double> shape, double radius, Func<double, int, double>? derivative)
    {
        if (!(radius > 0))
        {
            throw new ArgumentOutOfRangeException(nameof(radius), Guard.Text($"supportRadius must be above zero, or +∞, but is {radius}."));
        }

        double end = double.IsInfinity(radius) ? End(shape) : radius;
        Check(shape, end);
        int panels = 16;
        double[] measured = Measure(shape, end, panels);
        while (panels < 4096)
        {
            double[] finer = Measure(shape, end, 2 * panels);
            bool settled = Enumerable.Range(0, finer.Length).All(i => Math.Abs(finer[i] - measured[i]) <= 1e-11 * Math.Abs(finer[^1]));
            (measured, panels) = (finer, 2 * panels);
            if (settled)
            {
                break;
            }
        }

        double integral = 2 * measured[0];
        if (!(integral > 1e-12 * measured[^1]))
        {
            throw new ArgumentException(Guard.Text($"The shape's integral must be positive, but is {integral}: a kernel's weights must not cancel or sum to less than nothing."), nameof(shape));
        }

        var kernel = new ShapeKernel(name, shape, radius, derivative, 1 / integral, end, panels);
        return kernel.Order != 0 ? kernel
            : throw new ArgumentException("The shape's moments 2 to 8 are all zero: its order cannot be told. Pass a shape with some spread.", nameof(shape));
    }

    internal override double ValueCore(double u) => Math.Abs(u) > SupportRadius || double.IsInfinity(u) ? 0 : _scale * _shape(u);

    internal override double DerivativeCore(double u, int order) => _derivative is null
        ? throw new InvalidOperationException(Guard.Text($"The {Name} kernel was made without a derivative function: pass one to FromShape."))
        : Math.Abs(u) > SupportRadius || double.IsInfinity(u) ? 0 : _scale * _derivative(u, order);

    internal override double CumulativeCore(double u)
    {
        double lower = -Math.Abs(u);
        if (lower <= -_end)
        {
            return u < 0 ? 0 : 1;
        }

        double width = _end / _panels;
        int panel = Math.Min((int)((lower + _end) / width), _panels - 1);
        double start = -_end + (panel * width);
        double tail = _below[panel] + GaussLegendre.Integrate(ValueCore, start, lower, 24);
        return u <= 0 ? tail : 1 - tail;
    }

    internal override double EvenMoment(int order) => 2 * OnHalf(u => Math.Pow(u, order) * ValueCore(u));

    internal override double RoughnessCore(int derivative) => 2 * OnHalf(u =>
    {
        double k = derivative == 0 ? ValueCore(u) : DerivativeCore(u, derivative);
        return k * k;
    });

    private double Spread() => Math.Sqrt(Math.Max(2 * OnHalf(u => u * u * Math.Abs(ValueCore(u))), double.Epsilon));

    private double OnHalf(Func<double, double> f) => Sum(f, _end, _panels);

    private static double Sum(Func<double, double> f, double end, int panels)
    {
        CompensatedSum sum = default;
        for (int i = 0; i < panels; i++)
        {
            sum.Add(GaussLegendre.Integrate(f, end * i / panels, end * (i + 1) / panels, 24));
        }

        return sum.Value;
    }

    // Integral, second moment, square, and the integral of the absolute value, in units of the end.
    private static double[] Measure(Func<double, double> shape, double end, int panels) =>
    [
        Sum(shape, end, panels),
        Sum(u => u / end * (u / end) * shape(u), end, panels),
        Sum(u => Math.Abs(shape(u)), end, panels),
    ];

    // A shape without an end is followed out, by doubling, to where ten times its value times u³ is lost beside its peak.
    private static double End(Func<double, double> shape)
    {
        double peak = Math.Abs(shape(0));
        for (double end = 1; end < 1e8; end *= 2)
        {
            peak = Math.Max(peak, Math.Abs(shape(end)));
            bool gone = Enumerable.Range(0, 8).All(i => Math.Abs(shape(end * (1 + (i / 7.0)))) * Math.Pow(end, 3) <= 1e-15 * peak);
            if (gone && peak > 0)
            {
                return end;
            }
        }

        throw new ArgumentException("The shape does not fall fast enough for a second moment: give it a finite supportRadius, or a shape that falls faster than 1/|u|³.", nameof(shape));
    }

    private static void Check(Func<double, double> shape, double end)
    {
        double peak = 0;
        for (int i = 0; i <= CheckPoints; i++)
        {
            double u = end * i / CheckPoints;
            double right = shape(u);
            double left = shape(-u);
            if (!double.IsFinite(right) || !double.IsFinite(left))
            {
                double at = double.IsFinite(right) ? -u : u;
                throw new ArgumentException(Guard.Text($"The shape must be bounded and a number everywhere on its support, but is {shape(at)} at u = {at}."), nameof(shape));
            }

            peak = Math.Max(peak, Math.Max(Math.Abs(left), Math.Abs(right)));
        }

        for (int i = 1; i <= CheckPoints; i++)
        {
            double u = end * i / CheckPoints;
            if (Math.Abs(shape(u) - shape(-u)) > 1e-9 * peak)
            {
                throw new ArgumentException(Guard.Text($"The shape must be symmetric about 0, but is {shape(u)} at {u} and {shape(-u)} at {-u}."), nameof(shape));
            }
        }
    }
}
