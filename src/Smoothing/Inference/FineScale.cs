using Smoothing.Numerics;

namespace Smoothing.Inference;

/// <summary>Looks where the data contradict the curve at half and a quarter of its bandwidth.</summary>
/// <remarks>
/// Method: z_k(x) = [f̃_{h/k} − f̃_h]/√(max(f̃_h, R(M)/(nh)) D_k/(nh)), D_k = ∫(M(u) − kM(ku))² du; a place is flagged where |z_k| exceeds the tube value at
/// h/k over the range, and every flagged set grows by 1.5 h on both sides. In the spirit of Lepski (1991); the limits there become the hull of those at
/// h and at the finer scales. It repairs structure that holds a few per cent of the data, not single points.
/// </remarks>
internal sealed class FineScale
{
    private const double Widening = 1.5;

    private readonly List<(double From, double To, int Divisor)> _flags = [];

    public static FineScale None { get; } = new();

    /// <summary>D_k of the two scales: ∫(M(u) − kM(ku))² du, by quadrature; recomputed in the tests.</summary>
    public static (int Divisor, double Size)[] Scales { get; } = [(2, 0.27199), (4, 1.18694)];

    public IReadOnlyList<Interval> Flagged => [.. _flags.OrderBy(f => f.From).Select(f => new Interval(f.From, f.To))];

    public static FineScale Of(Func<double, DebiasedCurve> at, double bandwidth, double effectiveCount, Interval range, double alpha, double smallest)
    {
        var result = new FineScale();

        // A quarter of the finest scale between points sees every excursion of a curve that smooth.
        int points = (int)Math.Clamp(Math.Ceiling(range.Length / (bandwidth / 16)), 50, 4000) + 1;
        var x = new double[points];
        for (int i = 0; i < points; i++)
        {
            x[i] = range.Lower + (range.Length * i / (points - 1));
        }

        var coarse = new double[points];
        var fine = new double[points];
        var size = new double[points];
        var near = new double[points];
        at(bandwidth).Evaluate(x, coarse, size, near);
        double one = 27 / (32 * NormalLaw.SqrtPi) / (effectiveCount * bandwidth);
        foreach ((int divisor, double spread) in Scales)
        {
            double h = bandwidth / divisor;
            if (h < smallest)
            {
                continue;
            }

            at(h).Evaluate(x, fine, size, near);
            double critical = TubeValue.Of(range.Length, h, TubeValue.Debiased, alpha);
            for (int i = 0; i < points; i++)
            {
                double z = (fine[i] - coarse[i]) / Math.Sqrt(Math.Max(coarse[i], one) * spread / (effectiveCount * bandwidth));
                if (Math.Abs(z) > critical)
                {
                    result.Flag(x[i] - (Widening * bandwidth), x[i] + (Widening * bandwidth), divisor);
                }
            }
        }

        return result;
    }

    public bool Has(double x, int divisor)
    {
        foreach ((double from, double to, int k) in _flags)
        {
            if (k == divisor && x >= from && x <= to)
            {
                return true;
            }
        }

        return false;
    }

    private void Flag(double from, double to, int divisor)
    {
        int last = _flags.FindLastIndex(f => f.Divisor == divisor);
        if (last >= 0 && _flags[last].To >= from)
        {
            _flags[last] = (_flags[last].From, to, divisor);
        }
        else
        {
            _flags.Add((from, to, divisor));
        }
    }
}
