using Smoothing.Numerics;

namespace Smoothing.Estimation;

/// <summary>Zeros of the first and second derivative of a curve.</summary>
/// <remarks>
/// Method: the chain of derivatives. Between two neighbouring zeros of f⁽ʳ⁾ lies a zero of f⁽ʳ⁺¹⁾ (Rolle), so in each cell of a grid the zeros of the
/// highest derivative of the chain are taken from its change of sign, and every lower derivative is then tested for sign at those zeros too. A pair
/// of zeros of f′ in one cell stays unseen only if f′, f″, f‴ and f⁗ all have a zero pair there; in a cell of width d the curve then varies by less
/// than d⁵ max|f⁽⁵⁾|/5!, which for d = h/16 and the Gaussian kernel is below 1e-7 of the curve nearby. Kernels with kinks have a short chain; for
/// them every kink (a value ± a breakpoint of the kernel) is a cell end, seen from both sides, and between kinks f′ has at most a few zeros.
/// Zeros are closed in by Newton steps that fall back to bisection, to the last digits. Exact flats count as one turning point in their middle.
/// </remarks>
internal sealed class TurningPoints
{
    // |f′| below this multiple of f/h is rounding: the terms of f′ are about f/h in size and cancel to some 2⁻⁵² each.
    private const double Noise = 4e-15;

    private readonly CurveForm _form;
    private readonly int _top;
    private readonly double[] _x;
    private readonly double[][] _derivatives;

    public TurningPoints(CurveForm form, int smoothness)
    {
        _form = form;
        _top = smoothness;
        double[] x = form.Grid(smoothness);
        double[][] derivatives = new double[smoothness + 1][];
        for (int order = 0; order <= smoothness; order++)
        {
            derivatives[order] = new double[x.Length];
            form.Derivatives(x, order, derivatives[order]);
        }

        // Next to a limit, on the log scale, high derivatives can leave the range of doubles: such points say nothing.
        int[] kept = [.. Enumerable.Range(0, x.Length).Where(i => derivatives.All(d => double.IsFinite(d[i])))];
        _x = kept.Length == 0 ? [form.Core.Lower + (form.Core.Length / 2)] : [.. kept.Select(i => x[i])];
        _derivatives = [.. derivatives.Select(d => kept.Length == 0 ? [0.0] : kept.Select(i => d[i]).ToArray())];
    }

    /// <summary>Maxima and minima in turn, beginning and ending with a maximum.</summary>
    public List<(double X, bool Maximum)> Extrema()
    {
        var found = new List<(double X, bool Maximum)>();
        int last = -1;
        for (int i = 0; i < _x.Length; i++)
        {
            int sign = SignAt(i);
            if (sign == 0)
            {
                continue;
            }

            if (last < 0)
            {
                // At a declared limit the curve may start with its maximum.
                if (sign < 0)
                {
                    found.Add((_x[0], true));
                }
            }
            else if (last == i - 1)
            {
                foreach (double zero in Zeros(1, _x[last], _x[i], At(last), At(i)))
                {
                    Add(found, zero);
                }
            }
            else if (sign != SignAt(last))
            {
                Add(found, (FlatEnd(last, last + 1) + FlatEnd(i, i - 1)) / 2);
            }

            last = i;
        }

        if (last >= 0 && SignAt(last) > 0)
        {
            found.Add((_x[^1], true));
        }

        return found.Count == 0 ? [(_x[_x.Length / 2], true)] : found;
    }

    public double[] Inflections()
    {
        var found = new List<double>();
        for (int i = 1; i < _x.Length; i++)
        {
            // Where the curve has run out, the sign of its bend is noise.
            if (_derivatives[0][i] > 0 && _derivatives[0][i - 1] > 0)
            {
                found.AddRange(Zeros(2, _x[i - 1], _x[i], At(i - 1), At(i)));
            }
        }

        return [.. found];
    }

    // Minima and maxima alternate; the one that would break the turn is a touching point of the curve, not an extremum.
    private static void Add(List<(double X, bool Maximum)> found, double x) => found.Add((x, found.Count == 0 || !found[^1].Maximum));

    private int SignAt(int i) => Math.Abs(_derivatives[1][i]) <= Noise * _derivatives[0][i] / _form.Scale ? 0 : Math.Sign(_derivatives[1][i]);

    private double[] At(int i) => [.. _derivatives.Select(d => d[i])];

    private double FlatEnd(int outside, int inside)
    {
        double a = _x[outside];
        double b = _x[inside];
        for (int k = 0; k < 60 && Math.Abs(b - a) > 1e-12 * _form.Scale; k++)
        {
            double middle = a + ((b - a) / 2);
            bool flat = Math.Abs(_form.Derivative(middle, 1)) <= Noise * _form.Value(middle) / _form.Scale;
            (a, b) = flat ? (a, middle) : (middle, b);
        }

        return b;
    }

    // All zeros of f⁽ʳ⁾ in (from, to] with a change of sign. The arrays hold every derivative of the chain at the ends.
    private List<double> Zeros(int order, double from, double to, double[] atFrom, double[] atTo)
    {
        var zeros = new List<double>();
        if (order < _top)
        {
            double left = from;
            double atLeft = atFrom[order];
            foreach (double turn in Zeros(order + 1, from, to, atFrom, atTo))
            {
                double atTurn = _form.Derivative(turn, order);
                Close(order, left, turn, atLeft, atTurn, zeros);
                (left, atLeft) = (turn, atTurn);
            }

            Close(order, left, to, atLeft, atTo[order], zeros);
        }
        else
        {
            Close(order, from, to, atFrom[order], atTo[order], zeros);
        }

        return zeros;
    }

    private void Close(int order, double from, double to, double atFrom, double atTo, List<double> zeros)
    {
        if ((atFrom < 0 && atTo >= 0) || (atFrom > 0 && atTo <= 0))
        {
            zeros.Add(atTo == 0 ? to : SafeguardedNewton(order, from, to, atFrom < 0));
        }
    }

    private double SafeguardedNewton(int order, double low, double high, bool rising)
    {
        double x = low + ((high - low) / 2);
        double lastWidth = high - low;
        for (int i = 0; i < 200; i++)
        {
            double y = _form.Derivative(x, order);
            if (y == 0)
            {
                return x;
            }

            (low, high) = y < 0 == rising ? (x, high) : (low, x);
            double middle = low + ((high - low) / 2);
            if (!(middle > low && middle < high))
            {
                return middle;
            }

            double step = order < _top ? y / _form.Derivative(x, order + 1) : double.NaN;
            if (Math.Abs(step) <= 1e-15 * (_form.Scale + Math.Abs(x)))
            {
                return x;
            }

            double next = x - step;
            bool slow = i % 4 == 3 && high - low > lastWidth / 2;
            lastWidth = i % 4 == 3 ? high - low : lastWidth;
            x = !slow && next > low && next < high ? next : middle;
        }

        return x;
    }
}
