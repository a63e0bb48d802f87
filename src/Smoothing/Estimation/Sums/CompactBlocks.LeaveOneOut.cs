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
        {
            if (degree <= 2)
            {
                Others(new QuadraticForm(polynomial, degree), values, weights, lowerOnly, target);
            }
            else
            {
                Others(new GeneralForm(polynomial, degree), values, weights, lowerOnly, target);
            }
        }
    }

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private void Others<T>(T form, double* values, double* weights, bool lowerOnly, double* destination)
        where T : struct, IEdgeForm
    {
        int n = _sample.Count;
        double* x = stackalloc double[Together];
        double* results = stackalloc double[Together];
        int low = 0, high = 0;
        for (int i = 0; i < n; i += Together)
        {
            int count = Math.Min(Together, n - i);
            for (int t = 0; t < Together; t++)
            {
                x[t] = values[i + Math.Min(t, count - 1)];
            }

            var ends = new GroupEnds(x, Bandwidth, _inverse);
            Vector256<double> first = default, second = default;
            double lowest = WindowEnd.Of(x[0], -Bandwidth).Ceiling;
            double lower = WindowEnd.Of(x[Together - 1], -Bandwidth).Ceiling;
            while (values[low] < lowest)
            {
                low++;
            }

            int inner = low;
            while (values[inner] < lower)
            {
                inner++;
            }

            LeftOf(form, values, weights, in ends, low, inner, i, ref first, ref second);
            Among(form, values, weights, in ends, i, count, lowerOnly, ref first, ref second);
            if (!lowerOnly)
            {
                int after = i + count;
                double higher = WindowEnd.Of(x[0], Bandwidth).Floor;
                double highest = WindowEnd.Of(x[Together - 1], Bandwidth).Floor;
                high = Math.Max(high, after);
                while (high < n && values[high] <= higher)
                {
                    high++;
                }

                int outer = high;
                while (outer < n && values[outer] <= highest)
                {
                    outer++;
                }

                RightOf(form, values, weights, in ends, after, high, outer, ref first, ref second);
            }

            first.Store(results);
            second.Store(results + 4);
            for (int t = 0; t < count; t++)
            {
                destination[i + t] = results[t];
            }
        }
    }

    // [low, inner) is inside some of the windows, [inner, stop) inside all.
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private void LeftOf<T>(T form, double* values, double* weights, in GroupEnds ends, int low, int inner, int stop, ref Vector256<double> first, ref Vector256<double> second)
        where T : struct, IEdgeForm
    {
        int b = (inner + Size - 1) / Size;
        int end = stop / Size;
        if (b >= end)
        {
            LooseLeft(form, values, weights, in ends, low, stop, ref first, ref second);
            return;
        }

        LooseLeft(form, values, weights, in ends, low, b * Size, ref first, ref second);
        LooseLeft(form, values, weights, in ends, end * Size, stop, ref first, ref second);
        fixed (double* prefix = _leftPrefix, suffix = _leftSuffix)
        {
            while (b < end)
            {
                int last = _last[b];
                double reference = values[b * Size];
                double* moments;
                if (_first[b] == b)
                {
                    b = Math.Min(end, last + 1);
                    moments = prefix + ((long)(b - 1) * _stride);
                }
                else if (b < last && end >= last)
                {
                    moments = suffix + ((long)b * _stride);
                    b = last;
                }
                else
                {
                    LooseLeft(form, values, weights, in ends, b * Size, (b + 1) * Size, ref first, ref second);
                    b++;
                    continue;
                }

                first += form.From(moments, ends.FirstLower(reference));
                second += form.From(moments, ends.SecondLower(reference));
            }
        }
    }

    // [start, inner) is inside all windows, [inner, outer) inside some.
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private void RightOf<T>(T form, double* values, double* weights, in GroupEnds ends, int start, int inner, int outer, ref Vector256<double> first, ref Vector256<double> second)
        where T : struct, IEdgeForm
    {
        int b = (start + Size - 1) / Size;
        int end = inner / Size;
        if (b >= end)
        {
            LooseRight(form, values, weights, in ends, start, outer, ref first, ref second);
            return;
        }

        LooseRight(form, values, weights, in ends, start, b * Size, ref first, ref second);
        LooseRight(form, values, weights, in ends, end * Size, outer, ref first, ref second);
        fixed (double* prefix = _rightPrefix, suffix = _rightSuffix)
        {
            while (b < end)
            {
                int last = _last[b];
                double reference;
                double* moments;
                if (_first[b] == b)
                {
                    b = Math.Min(end, last + 1);
                    moments = prefix + ((long)(b - 1) * _stride);
                    reference = values[(b * Size) - 1];
                }
                else if (b < last && end >= last)
                {
                    moments = suffix + ((long)b * _stride);
                    reference = values[(last * Size) - 1];
                    b = last;
                }
                else
                {
                    LooseRight(form, values, weights, in ends, b * Size, (b + 1) * Size, ref first, ref second);
                    b++;
                    continue;
                }

                first += form.From(moments, ends.FirstUpper(reference));
                second += form.From(moments, ends.SecondUpper(reference));
            }
        }
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static void LooseLeft<T>(T form, double* values, double* weights, in GroupEnds ends, int from, int to, ref Vector256<double> first, ref Vector256<double> second)
        where T : struct, IEdgeForm
    {
        for (int k = from; k < to; k++)
        {
            Vector256<double> w = weights == null ? Vector256<double>.One : Vector256.Create(weights[k]);
            first += GroupEnds.Inside(form, ends.FirstLower(values[k]), w);
            second += GroupEnds.Inside(form, ends.SecondLower(values[k]), w);
        }
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static void LooseRight<T>(T form, double* values, double* weights, in GroupEnds ends, int from, int to, ref Vector256<double> first, ref Vector256<double> second)
        where T : struct, IEdgeForm
    {
        for (int k = from; k < to; k++)
        {
            Vector256<double> w = weights == null ? Vector256<double>.One : Vector256.Create(weights[k]);
            first += GroupEnds.Inside(form, ends.FirstUpper(values[k]), w);
            second += GroupEnds.Inside(form, ends.SecondUpper(values[k]), w);
        }
    }

    // The eight among themselves: a value counts from below for those after it, from above for those before it, not for itself.
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static void Among<T>(T form, double* values, double* weights, in GroupEnds ends, int start, int count, bool lowerOnly, ref Vector256<double> first, ref Vector256<double> second)
        where T : struct, IEdgeForm
    {
        Vector256<double> lanes = Vector256.Create(0.0, 1, 2, 3);
        Vector256<double> others = lanes + Vector256.Create(4.0);
        for (int t = 0; t < count; t++)
        {
            double value = values[start + t];
            Vector256<double> w = weights == null ? Vector256<double>.One : Vector256.Create(weights[start + t]);
            Vector256<double> own = Vector256.Create((double)t);
            first += Vector256.GreaterThan(lanes, own) & GroupEnds.Inside(form, ends.FirstLower(value), w);
            second += Vector256.GreaterThan(others, own) & GroupEnds.Inside(form, ends.SecondLower(value), w);
            if (!lowerOnly)
            {
                first += Vector256.LessThan(lanes, own) & GroupEnds.Inside(form, ends.FirstUpper(value), w);
                second += Vector256.LessThan(others, own) & GroupEnds.Inside(form, ends.SecondUpper(value), w);
            }
        }
    }
}
