using Smoothing.Kernels;
using Smoothing.Numerics;

namespace Smoothing.Estimation;

/// <summary>The data mirrored at one or two limits, f(x) + f(2L − x) and so on: everything in closed form, slope 0 at the limits.</summary>
/// <remarks>
/// Method: the method of images; between two limits L and U the images repeat with period 2(U − L), and those within the kernel's reach are summed.
/// The distribution function is the plain mass in intervals centred at the images of the limit, all of them positive, so nothing cancels between
/// images. Source: common practice (Schuster 1985).
/// </remarks>
internal sealed class ReflectionForm : CurveForm
{
    // Beyond this many images on a side the kernel is so wide against the support that the curve is flat; the cost would only grow.
    private const int MostImages = 1000;

    private readonly LineForm _line;
    private readonly Interval _support;
    private readonly double _period;
    private readonly int _images;

    public ReflectionForm(LineForm line, Kernel kernel, double widest, Interval support)
    {
        _line = line;
        _support = support;
        _period = 2 * support.Length;
        double needed = double.IsFinite(_period) ? Math.Ceiling(BoundaryMoments.ReachOf(kernel) * widest / _period) + 1 : 0;
        if (!(needed <= MostImages))
        {
            throw new ArgumentException(Guard.Text(
                $"bandwidth must be of the order of the support or below for Reflection, but is {widest} against a support of length {support.Length}: choose a smaller bandwidth."));
        }

        _images = (int)needed;
    }

    public override Interval Ends => new(Math.Max(_support.Lower, _line.Ends.Lower), Math.Min(_support.Upper, _line.Ends.Upper));

    public override Interval Core => _line.Core;

    public override double Scale => _line.Scale;

    public override bool MayBeNegative => _line.MayBeNegative;

    public override double[] Grid(int smoothness)
    {
        // The plain grid and its mirror images, so that the kinks of both are cell ends.
        Interval ends = Ends;
        IEnumerable<double> plain = _line.Grid(smoothness);
        IEnumerable<double> mirrored = plain.SelectMany(x => new[] { (2 * _support.Lower) - x, (2 * _support.Upper) - x });
        return [.. plain.Concat(mirrored).Where(double.IsFinite).Append(ends.Lower).Append(ends.Upper).Where(x => double.IsFinite(x) && ends.Contains(x)).Distinct().Order()];
    }

    public override void Derivatives(ReadOnlySpan<double> x, int order, Span<double> destination)
    {
        destination[..x.Length].Clear();
        var image = new double[x.Length];
        var part = new double[x.Length];
        double mirrorSign = order % 2 == 0 ? 1 : -1;
        for (int k = -_images; k <= _images; k++)
        {
            double shift = k == 0 ? 0 : k * _period;
            AddImages(x, image, part, order, destination, 1, shift, 1);
            if (double.IsFinite(_support.Lower))
            {
                AddImages(x, image, part, order, destination, -1, (2 * _support.Lower) + shift, mirrorSign);
            }
            else
            {
                AddImages(x, image, part, order, destination, -1, 2 * _support.Upper, mirrorSign);
            }
        }

        for (int i = 0; i < x.Length; i++)
        {
            destination[i] = _support.Contains(x[i]) && double.IsFinite(x[i]) ? destination[i] : 0;
        }
    }

    public override void Cumulatives(ReadOnlySpan<double> x, bool upper, Span<double> destination)
    {
        for (int i = 0; i < x.Length; i++)
        {
            destination[i] = One(x[i], upper);
        }
    }

    public override bool TryDraw(ref RandomStream random, Span<double> destination)
    {
        if (!_line.TryDraw(ref random, destination))
        {
            return false;
        }

        for (int i = 0; i < destination.Length; i++)
        {
            while (!_support.Contains(destination[i]))
            {
                destination[i] = destination[i] < _support.Lower ? (2 * _support.Lower) - destination[i] : (2 * _support.Upper) - destination[i];
            }
        }

        return true;
    }

    private void AddImages(ReadOnlySpan<double> x, double[] image, double[] part, int order, Span<double> destination, int direction, double shift, double sign)
    {
        for (int i = 0; i < x.Length; i++)
        {
            image[i] = _support.Contains(x[i]) ? (direction * x[i]) + shift : double.PositiveInfinity;
        }

        _line.Derivatives(image, order, part);
        for (int i = 0; i < x.Length; i++)
        {
            destination[i] += sign * part[i];
        }
    }

    private double One(double x, bool upper)
    {
        if (x <= _support.Lower || x >= _support.Upper)
        {
            return x >= _support.Upper == upper ? 0 : 1;
        }

        double centre = upper ? _support.Upper : _support.Lower;
        if (double.IsInfinity(centre))
        {
            // The open side: the far tail itself and its image beyond the other limit.
            double limit = upper ? _support.Lower : _support.Upper;
            return _line.Tail(x, upper) + _line.Tail((2 * limit) - x, !upper);
        }

        // The interval about the limit itself keeps x as one end, to the last digit; its images matter only where the support is short.
        double sum = upper ? _line.Mass(x, (2 * centre) - x) : _line.Mass((2 * centre) - x, x);
        double half = Math.Abs(x - centre);
        for (int k = 1; k <= _images; k++)
        {
            sum += _line.Mass(centre - (k * _period) - half, centre - (k * _period) + half);
            sum += _line.Mass(centre + (k * _period) - half, centre + (k * _period) + half);
        }

        return _line.MayBeNegative ? sum : Math.Min(sum, 1);
    }
}
