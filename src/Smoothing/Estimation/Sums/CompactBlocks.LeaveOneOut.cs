using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;

namespace Smoothing.Estimation;

internal sealed unsafe partial class CompactBlocks
{
    private const int Together = 8; // neighbouring values served together: two vectors, half a block

    /// <summary>destination[i] = Σ_{j≠i} w_j P(s) for every sorted value, or over j &lt; i alone: the sum without the value's own term is never a difference.</summary>
    /// <param name="polynomial">Coefficients, lowest power first.</param>
    /// <param name="degree">At most <see cref="Degree"/>.</param>
    /// <param name="lowerOnly">Whether only values before the i-th count, as for sums over pairs.</param>
    /// <param name="destination">One sum per value, in sorted order.</param>
    /// <remarks>
    /// Method: as for single windows, eight neighbours at once. Blocks that lie inside all eight windows enter by moments, values that
    /// only some windows hold one by one with a mask, the eight themselves likewise. Cost: about as many loose values as two
    /// blocks hold, per eight results.
    /// </remarks>
    public void OthersAtValues(double* polynomial, int degree, bool lowerOnly, Span<double> destination)
    {
        fixed (double* values = _sample.SortedValues, weights = _sample.SortedWeights, target = destination)
        fixed (double* leftPrefix = _leftPrefix, leftSuffix = _leftSuffix, rightPrefix = _rightPrefix, rightSuffix = _rightSuffix)
        fixed (int* firsts = _first, lasts = _last)
        {
            var lower = new Side(values, weights, firsts, lasts, leftPrefix, leftSuffix, upper: false, _stride);
            var upper = new Side(values, weights, firsts, lasts, rightPrefix, rightSuffix, upper: true, _stride);
            if (degree <= 2)
            {
                Others(new QuadraticForm(polynomial, degree), in lower, in upper, lowerOnly, target);
            }
            else
            {
                Others(new GeneralForm(polynomial, degree), in lower, in upper, lowerOnly, target);
            }
        }
    }

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private void Others<T>(T form, in Side lower, in Side upper, bool lowerOnly, double* destination)
        where T : struct, IEdgeForm
    {
        int n = _sample.Count;
        double* values = lower.Values;
        double* x = stackalloc double[Together];
        int low = 0, high = 0;
        for (int i = 0; i < n; i += Together)
        {
            int count = Math.Min(Together, n - i);
            for (int t = 0; t < Together; t++)
            {
                x[t] = values[i + Math.Min(t, count - 1)];
            }

            GroupSum sum = default;
            var below = new GroupEnd(x, -Bandwidth, _inverse);
            var above = new GroupEnd(x, Bandwidth, -_inverse);
            double lowest = WindowEnd.Of(x[0], -Bandwidth).Ceiling;
            double lowerEnd = WindowEnd.Of(x[Together - 1], -Bandwidth).Ceiling;
            while (values[low] < lowest)
            {
                low++;
            }

            int inner = low;
            while (values[inner] < lowerEnd)
            {
                inner++;
            }

            // [low, inner) is inside some of the windows, [inner, i) inside all.
            Window(in form, in lower, in below, low, inner, i, i, ref sum);
            Among(in form, in lower, in below, in above, i, count, lowerOnly, ref sum);
            if (!lowerOnly)
            {
                double upperEnd = WindowEnd.Of(x[0], Bandwidth).Floor;
                double highest = WindowEnd.Of(x[Together - 1], Bandwidth).Floor;
                high = Math.Max(high, i + count);
                while (high < n && values[high] <= upperEnd)
                {
                    high++;
                }

                int outer = high;
                while (outer < n && values[outer] <= highest)
                {
                    outer++;
                }

                Window(in form, in upper, in above, i + count, i + count, high, outer, ref sum);
            }

            sum.First.Store(x);
            sum.Second.Store(x + 4);
            for (int t = 0; t < count; t++)
            {
                destination[i + t] = x[t];
            }
        }
    }

    // Values [from, to): those in [inner, outer) are inside all eight half windows, the others inside some.
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private static void Window<T>(in T form, in Side side, in GroupEnd end, int from, int inner, int outer, int to, ref GroupSum sum)
        where T : struct, IEdgeForm
    {
        int b = (inner + Size - 1) / Size;
        int stop = outer / Size;
        if (b >= stop)
        {
            Loose(in form, in side, in end, from, to, ref sum);
            return;
        }

        Loose(in form, in side, in end, from, b * Size, ref sum);
        Loose(in form, in side, in end, stop * Size, to, ref sum);
        while (b < stop)
        {
            int last = side.Lasts[b];
            int start = b;
            double* moments;
            if (side.Firsts[b] == b)
            {
                b = Math.Min(stop, last + 1);
                moments = side.Prefix + ((long)(b - 1) * side.Stride);
            }
            else if (b == last || stop >= last)
            {
                moments = side.Suffix + ((long)b * side.Stride);
                b = b == last ? last + 1 : last;
            }
            else
            {
                Loose(in form, in side, in end, b * Size, (b + 1) * Size, ref sum);
                b++;
                continue;
            }

            double reference = side.Upper ? side.Values[(b * Size) - 1] : side.Values[start * Size];
            sum.First += form.From(moments, end.First(reference));
            sum.Second += form.From(moments, end.Second(reference));
        }
    }

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private static void Loose<T>(in T form, in Side side, in GroupEnd end, int from, int to, ref GroupSum sum)
        where T : struct, IEdgeForm
    {
        T kernel = form;
        double* values = side.Values;
        double* weights = side.Weights;
        Vector256<double> first = sum.First;
        Vector256<double> second = sum.Second;
        Vector256<double> firstHigh = end.FirstHigh, firstLow = end.FirstLow, secondHigh = end.SecondHigh, secondLow = end.SecondLow;
        Vector256<double> inverse = end.SignedInverse;
        for (int k = from; k < to; k++)
        {
            Vector256<double> value = Vector256.Create(values[k]);
            Vector256<double> a = (value - firstHigh - firstLow) * inverse;
            Vector256<double> b = (value - secondHigh - secondLow) * inverse;
            a = Vector256.GreaterThanOrEqual(a, Vector256<double>.Zero) & kernel.At(a);
            b = Vector256.GreaterThanOrEqual(b, Vector256<double>.Zero) & kernel.At(b);
            if (weights != null)
            {
                a *= Vector256.Create(weights[k]);
                b *= Vector256.Create(weights[k]);
            }

            first += a;
            second += b;
        }

        sum.First = first;
        sum.Second = second;
    }

    // The eight among themselves: a value counts from below for those after it, from above for those before it, not for itself.
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private static void Among<T>(in T form, in Side side, in GroupEnd below, in GroupEnd above, int start, int count, bool lowerOnly, ref GroupSum sum)
        where T : struct, IEdgeForm
    {
        T kernel = form;
        Vector256<double> lanes = Vector256.Create(0.0, 1, 2, 3);
        Vector256<double> others = Vector256.Create(4.0, 5, 6, 7);
        double* values = side.Values + start;
        for (int t = 0; t < count; t++)
        {
            double value = values[t];
            Vector256<double> own = Vector256.Create((double)t);
            Vector256<double> a = below.First(value);
            Vector256<double> b = below.Second(value);
            Vector256<double> use = Vector256.GreaterThan(lanes, own);
            Vector256<double> useOther = Vector256.GreaterThan(others, own);
            if (!lowerOnly)
            {
                a = Vector256.ConditionalSelect(use, a, above.First(value));
                b = Vector256.ConditionalSelect(useOther, b, above.Second(value));
                use = ~Vector256.Equals(lanes, own);
                useOther = ~Vector256.Equals(others, own);
            }

            a = use & Vector256.GreaterThanOrEqual(a, Vector256<double>.Zero) & kernel.At(a);
            b = useOther & Vector256.GreaterThanOrEqual(b, Vector256<double>.Zero) & kernel.At(b);
            if (side.Weights != null)
            {
                a *= Vector256.Create(side.Weights[start + t]);
                b *= Vector256.Create(side.Weights[start + t]);
            }

            sum.First += a;
            sum.Second += b;
        }
    }

    // Everything the inner loops read for one half of the window, pinned.
    private readonly struct Side(double* values, double* weights, int* firsts, int* lasts, double* prefix, double* suffix, bool upper, int stride)
    {
        public readonly double* Values = values;
        public readonly double* Weights = weights;
        public readonly int* Firsts = firsts;
        public readonly int* Lasts = lasts;
        public readonly double* Prefix = prefix;
        public readonly double* Suffix = suffix;
        public readonly bool Upper = upper;
        public readonly int Stride = stride;
    }
}
