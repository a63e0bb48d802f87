using System.Runtime.CompilerServices;

namespace Smoothing.Estimation;

internal sealed unsafe partial class CompactBlocks
{
    /// <summary>Σ w P(s) over sorted positions [from, to), s the distance to the lower end of the window in bandwidths.</summary>
    /// <param name="values">The sorted values, pinned.</param>
    /// <param name="weights">Their weights, pinned, or null.</param>
    /// <param name="end">The lower end, at or below every value asked for.</param>
    /// <param name="from">First position.</param>
    /// <param name="to">One past the last position; the values span at most h.</param>
    /// <param name="polynomial">Coefficients, lowest power first.</param>
    /// <param name="degree">At most <see cref="Degree"/>.</param>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public double Left(double* values, double* weights, WindowEnd end, int from, int to, double* polynomial, int degree)
    {
        int b = (from + Size - 1) / Size;
        int stop = to / Size;
        if (b >= stop)
        {
            return Loose(values, weights, end, _inverse, from, to, polynomial, degree);
        }

        double sum = Loose(values, weights, end, _inverse, from, b * Size, polynomial, degree)
            + Loose(values, weights, end, _inverse, stop * Size, to, polynomial, degree);
        while (b < stop)
        {
            int last = _last[b];
            double a = Distance(values[b * Size], end, _inverse);
            if (_first[b] == b)
            {
                b = Math.Min(stop, last + 1);
                sum += Piece(_leftPrefix, b - 1, a, polynomial, degree);
            }
            else if (b == last || stop >= last)
            {
                sum += Piece(_leftSuffix, b, a, polynomial, degree);
                b = b == last ? last + 1 : last;
            }
            else
            {
                sum += Loose(values, weights, end, _inverse, b * Size, (b + 1) * Size, polynomial, degree);
                b++;
            }
        }

        return sum;
    }

    /// <summary>The same with s the distance to the upper end of the window.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public double Right(double* values, double* weights, WindowEnd end, int from, int to, double* polynomial, int degree)
    {
        int b = (from + Size - 1) / Size;
        int stop = to / Size;
        if (b >= stop)
        {
            return Loose(values, weights, end, -_inverse, from, to, polynomial, degree);
        }

        double sum = Loose(values, weights, end, -_inverse, from, b * Size, polynomial, degree)
            + Loose(values, weights, end, -_inverse, stop * Size, to, polynomial, degree);
        while (b < stop)
        {
            int last = _last[b];
            if (_first[b] == b)
            {
                b = Math.Min(stop, last + 1);
                sum += Piece(_rightPrefix, b - 1, Distance(values[(b * Size) - 1], end, -_inverse), polynomial, degree);
            }
            else if (b == last || stop >= last)
            {
                int next = b == last ? last + 1 : last;
                sum += Piece(_rightSuffix, b, Distance(values[(next * Size) - 1], end, -_inverse), polynomial, degree);
                b = next;
            }
            else
            {
                sum += Loose(values, weights, end, -_inverse, b * Size, (b + 1) * Size, polynomial, degree);
                b++;
            }
        }

        return sum;
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static double Distance(double value, WindowEnd end, double signedInverse) => (value - end.High - end.Low) * signedInverse;

    private static double Loose(double* values, double* weights, WindowEnd end, double signedInverse, int from, int to, double* polynomial, int degree) =>
        from >= to ? 0 : EdgeMoments.Direct(values + from, weights == null ? null : weights + from, to - from, end, signedInverse, polynomial, degree);

    private double Piece(double[] table, int b, double a, double* polynomial, int degree)
    {
        fixed (double* moments = &table[b * _stride])
        {
            return EdgeMoments.Evaluate(moments, a, polynomial, degree);
        }
    }
}
