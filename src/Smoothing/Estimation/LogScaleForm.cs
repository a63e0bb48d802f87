using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Estimation;

/// <summary>Smoothing of y = log of the distance to the limit (with two limits, of the ratio of both distances), carried back: f(x) = g(y(x)) y′(x).</summary>
/// <remarks>Method: change of variable (common practice). Mass, distribution function and quantiles carry over exactly; derivatives by composed Taylor series.</remarks>
internal sealed class LogScaleForm : CurveForm
{
    private readonly LineForm _line;
    private readonly Kernel _kernel;
    private readonly double _bandwidth;
    private readonly Interval _support;

    public LogScaleForm(LineForm line, Kernel kernel, double bandwidth, Interval support, Interval range)
    {
        _line = line;
        _kernel = kernel;
        _bandwidth = bandwidth;
        _support = support;
        Core = range;
    }

    public override Interval Ends => new(Back(_line.Ends.Lower), Back(_line.Ends.Upper));

    public override Interval Core { get; }

    // The distance to the nearer limit is the length that the logarithm stretches to 1.
    public override double Scale => Math.Min(Core.Lower - _support.Lower, _support.Upper - Core.Upper) * Math.Min(1, _bandwidth);

    public override bool MayBeNegative => _line.MayBeNegative;

    /// <summary>The values on the log scale, in their order.</summary>
    public static Sample Transform(Sample sample, Interval support)
    {
        var y = new double[sample.Count];
        int first = -1;
        int count = 0;
        for (int i = 0; i < y.Length; i++)
        {
            y[i] = Forth(sample.Values[i], support);
            if (!double.IsFinite(y[i]))
            {
                first = first < 0 ? i : first;
                count++;
            }
        }

        if (count > 0)
        {
            throw new ArgumentException(Guard.Text(
                $"values[{first}] is {sample.Values[first]}, on the limit itself, as are {count} of {y.Length} values in all: they have no logarithm of their distance; use another BoundaryCorrection, or treat them apart."));
        }

        return Sample.Of(y, new SampleOptions { Weights = sample.Weights.ToArray(), WeightMeaning = sample.WeightMeaning });
    }

    public override double[] Grid(int smoothness)
    {
        IEnumerable<double> mapped = _line.Grid(smoothness).Select(Back);
        return [.. mapped.Where(x => double.IsFinite(x) && x > _support.Lower && x < _support.Upper).Distinct().Order()];
    }

    public override void Derivatives(ReadOnlySpan<double> x, int order, Span<double> destination)
    {
        var y = new double[x.Length];
        var g = new double[order + 1][];
        for (int i = 0; i < x.Length; i++)
        {
            y[i] = _support.Contains(x[i]) ? Forth(x[i], _support) : double.PositiveInfinity;
        }

        for (int j = 0; j <= order; j++)
        {
            g[j] = new double[x.Length];
            _line.Derivatives(y, j, g[j]);
        }

        for (int i = 0; i < x.Length; i++)
        {
            destination[i] = double.IsFinite(y[i]) ? Carry(x[i], order, g, i)
                : x[i] == _support.Lower || x[i] == _support.Upper ? AtLimit(x[i], order)
                : 0;
        }
    }

    public override void Cumulatives(ReadOnlySpan<double> x, bool upper, Span<double> destination)
    {
        var y = new double[x.Length];
        for (int i = 0; i < x.Length; i++)
        {
            y[i] = x[i] <= _support.Lower ? double.NegativeInfinity : x[i] >= _support.Upper ? double.PositiveInfinity : Forth(x[i], _support);
        }

        _line.Cumulatives(y, upper, destination);
    }

    public override double Quantile(double tail, bool upper) => Back(_line.Quantile(tail, upper));

    public override bool TryDraw(ref RandomStream random, Span<double> destination)
    {
        if (!_line.TryDraw(ref random, destination))
        {
            return false;
        }

        for (int i = 0; i < destination.Length; i++)
        {
            destination[i] = Back(destination[i]);
        }

        return true;
    }

    private static double Forth(double x, Interval support)
    {
        double y = double.IsFinite(support.Lower) ? Math.Log(x - support.Lower) : 0;
        return double.IsFinite(support.Upper) ? y - Math.Log(support.Upper - x) : y;
    }

    private double Back(double y)
    {
        if (double.IsInfinity(_support.Upper))
        {
            return _support.Lower + Math.Exp(y);
        }

        if (double.IsInfinity(_support.Lower))
        {
            return _support.Upper - Math.Exp(-y);
        }

        // From the nearer limit, so that the distance to it keeps its digits.
        return y < 0 ? _support.Lower + (_support.Length / (1 + Math.Exp(-y))) : _support.Upper - (_support.Length / (1 + Math.Exp(y)));
    }

    // f = g(y) y′ as a Taylor series about x; y by log(d + t) = log d + Σ (−1)^{j−1} (t/d)^j / j at each limit.
    private double Carry(double x, int order, double[][] g, int i)
    {
        var outer = new double[order + 1];
        var y = new double[order + 2];
        for (int j = 0; j <= order; j++)
        {
            outer[j] = g[j][i] / Jet.Factorial(j);
        }

        for (int j = 1; j < y.Length; j++)
        {
            double fromLower = double.IsFinite(_support.Lower) ? (j % 2 == 1 ? 1 : -1) / (j * Math.Pow(x - _support.Lower, j)) : 0;
            double fromUpper = double.IsFinite(_support.Upper) ? 1 / (j * Math.Pow(_support.Upper - x, j)) : 0;
            y[j] = fromLower + fromUpper;
        }

        var slope = new double[order + 1];
        for (int j = 0; j <= order; j++)
        {
            slope[j] = (j + 1) * y[j + 1];
        }

        return Jet.Factorial(order) * Jet.Multiply(Jet.Compose(outer, y.AsSpan(0, order + 1)), slope)[order];
    }

    // A kernel that ends, or falls like exp(−u²/2), beats every power of the distance; one that falls like exp(−u) leaves the power 1/h − 1 of it.
    private double AtLimit(double x, int order)
    {
        bool exponentialTail = double.IsInfinity(_kernel.SupportRadius) && _kernel.GaussianPolynomial.IsEmpty;
        if (!exponentialTail || (order == 0 && _bandwidth < 1))
        {
            return 0;
        }

        if (order == 0 && _bandwidth > 1)
        {
            return double.PositiveInfinity;
        }

        throw new InvalidOperationException(Guard.Text(
            $"On the log scale with the {_kernel.Name} kernel at h = {_bandwidth} the curve has no simple value or derivative at the limit {x}: ask inside it, or use the Gaussian kernel."));
    }
}
