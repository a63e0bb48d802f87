using System.Numerics;
using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace Smoothing.Estimation;

internal sealed unsafe partial class CompactBlocks
{
    private const int Together = 8; // neighbouring values served together: two vectors, half a block

    // For value t of eight: the lanes it counts for.
    private static ReadOnlySpan<long> OtherLanes =>
    [
        0, -1, -1, -1, -1, -1, -1, -1, -1, 0, -1, -1, -1, -1, -1, -1, -1, -1, 0, -1, -1, -1, -1, -1, -1, -1, -1, 0, -1, -1, -1, -1,
        -1, -1, -1, -1, 0, -1, -1, -1, -1, -1, -1, -1, -1, 0, -1, -1, -1, -1, -1, -1, -1, -1, 0, -1, -1, -1, -1, -1, -1, -1, -1, 0,
    ];

    private static ReadOnlySpan<long> LaterLanes =>
    [
        0, -1, -1, -1, -1, -1, -1, -1, 0, 0, -1, -1, -1, -1, -1, -1, 0, 0, 0, -1, -1, -1, -1, -1, 0, 0, 0, 0, -1, -1, -1, -1,
        0, 0, 0, 0, 0, -1, -1, -1, 0, 0, 0, 0, 0, 0, -1, -1, 0, 0, 0, 0, 0, 0, 0, -1, 0, 0, 0, 0, 0, 0, 0, 0,
    ];

    /// <summary>destination[i] = Σ_{j≠i} w_j P(s) for every sorted value, or over j &lt; i alone: the sum without the value's own term is never a difference.</summary>
    /// <param name="polynomial">Coefficients, lowest power first.</param>
    /// <param name="degree">At most <see cref="Degree"/>.</param>
    /// <param name="lowerOnly">Whether only values before the i-th count, as for sums over pairs.</param>
    /// <param name="destination">One sum per value, in sorted order.</param>
    /// <remarks>
    /// Method: as for single windows, eight neighbours at once. Whole blocks inside all eight windows enter by their moments, parts of blocks by
    /// moments taken on the spot, values that only some windows hold one by one, the eight themselves likewise. Cost: about as many single
    /// values as the eight windows differ by, per eight results.
    /// </remarks>
    public void OthersAtValues(double* polynomial, int degree, bool lowerOnly, Span<double> destination)
    {
        fixed (double* values = _sample.SortedValues, weights = _sample.SortedWeights, target = destination)
        fixed (double* leftPrefix = _leftPrefix, leftSuffix = _leftSuffix, rightPrefix = _rightPrefix, rightSuffix = _rightSuffix)
        fixed (int* firsts = _first, lasts = _last)
        {
            var lower = new Side(values, weights, firsts, lasts, leftPrefix, leftSuffix, upper: false, _stride, _inverse);
            var upper = new Side(values, weights, firsts, lasts, rightPrefix, rightSuffix, upper: true, _stride, -_inverse);
            if (degree is 1 or 2 && polynomial[0] == 0 && Degree == 2)
            {
                Others(new RisingForm(polynomial, degree), in lower, in upper, lowerOnly, target);
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
            low = Below(values, low, n, WindowEnd.Of(x[0], -Bandwidth).Ceiling);
            int inner = Below(values, low, n, WindowEnd.Of(x[Together - 1], -Bandwidth).Ceiling);

            // [low, inner) is inside some of the windows, [inner, i) inside all.
            Window(in form, in lower, in below, low, Math.Min(inner, i), i, i, ref sum);
            if (count == Together && x[Together - 1] - x[0] <= Bandwidth / 2 && lower.Weights == null)
            {
                AmongNear(in form, values + i, _inverse, lowerOnly ? LaterLanes : OtherLanes, ref sum);
            }
            else
            {
                Among(in form, in lower, in below, in above, i, count, lowerOnly, ref sum);
            }

            if (!lowerOnly)
            {
                // The first double above an end that is no double is not inside, so "below that double" is "inside".
                high = Below(values, Math.Max(high, i + count), n, Math.BitIncrement(WindowEnd.Of(x[0], Bandwidth).Floor));
                int outer = Below(values, high, n, Math.BitIncrement(WindowEnd.Of(x[Together - 1], Bandwidth).Floor));
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

    // The first position at or after the given one whose value is not below the key; steps of sixteen, for neighbours' windows differ little.
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private static int Below(double* values, int at, int count, double key)
    {
        Vector256<double> keys = Vector256.Create(key);
        while (at + 16 <= count)
        {
            uint first = Vector256.LessThan(Vector256.Load(values + at), keys).ExtractMostSignificantBits()
                | (Vector256.LessThan(Vector256.Load(values + at + 4), keys).ExtractMostSignificantBits() << 4);
            uint second = Vector256.LessThan(Vector256.Load(values + at + 8), keys).ExtractMostSignificantBits()
                | (Vector256.LessThan(Vector256.Load(values + at + 12), keys).ExtractMostSignificantBits() << 4);
            int found = BitOperations.PopCount(first | (second << 8));
            at += found;
            if (found < 16)
            {
                return at;
            }
        }

        while (at < count && values[at] < key)
        {
            at++;
        }

        return at;
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

        Loose(in form, in side, in end, from, inner, ref sum);
        Loose(in form, in side, in end, outer, to, ref sum);
        PartOfBlock(in form, in side, in end, inner, b * Size, ref sum);
        PartOfBlock(in form, in side, in end, stop * Size, outer, ref sum);
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
                PartOfBlock(in form, in side, in end, b * Size, (b + 1) * Size, ref sum);
                b++;
                continue;
            }

            Vector256<double> reference = Vector256.Create(side.Upper ? side.Values[(b * Size) - 1] : side.Values[start * Size]);
            sum.First += form.From(moments, end.First(reference));
            sum.Second += form.From(moments, end.Second(reference));
        }
    }

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private static void Loose<T>(in T form, in Side side, in GroupEnd end, int from, int to, ref GroupSum sum)
        where T : struct, IEdgeForm
    {
        T kernel = form;
        GroupEnd edge = end;
        double* values = side.Values;
        double* weights = side.Weights;
        Vector256<double> first = sum.First;
        Vector256<double> second = sum.Second;
        if (weights == null)
        {
            for (int k = from; k < to; k++)
            {
                Vector256<double> value = Vector256.Create(values[k]);
                first = kernel.Add(first, edge.First(value));
                second = kernel.Add(second, edge.Second(value));
            }
        }
        else
        {
            for (int k = from; k < to; k++)
            {
                Vector256<double> value = Vector256.Create(values[k]);
                Vector256<double> weight = Vector256.Create(weights[k]);
                first = kernel.Add(first, edge.First(value), weight);
                second = kernel.Add(second, edge.Second(value), weight);
            }
        }

        sum.First = first;
        sum.Second = second;
    }

    // Values [from, to) of one block, inside all eight windows: their moments about the outermost of them.
    [SkipLocalsInit]
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private static void PartOfBlock<T>(in T form, in Side side, in GroupEnd end, int from, int to, ref GroupSum sum)
        where T : struct, IEdgeForm
    {
        if (from >= to)
        {
            return;
        }

        double* moments = stackalloc double[EdgeMoments.MaximumDegree + 1];
        double reference = side.Values[side.Upper ? to - 1 : from];
        EdgeMoments.OfPart(side.Values, side.Weights, from, to, reference, side.SignedInverse, moments, side.Stride - 1);
        Vector256<double> origin = Vector256.Create(reference);
        sum.First += form.From(moments, end.First(origin));
        sum.Second += form.From(moments, end.Second(origin));
    }

    // Eight at most half a bandwidth apart among themselves: s = 1 − |u| is at least ½ and keeps its digits.
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private static void AmongNear<T>(in T form, double* values, double inverse, ReadOnlySpan<long> lanes, ref GroupSum sum)
        where T : struct, IEdgeForm
    {
        T kernel = form;
        Vector256<double> scale = Vector256.Create(-inverse);
        Vector256<double> first = sum.First, second = sum.Second;
        Vector256<double> x = Vector256.Load(values), y = Vector256.Load(values + 4);
        ref long mask = ref MemoryMarshal.GetReference(lanes);
        for (int t = 0; t < Together; t++)
        {
            Vector256<double> value = Vector256.Create(values[t]);
            Vector256<double> a = Vector256.MultiplyAddEstimate(Vector256.Abs(x - value), scale, Vector256<double>.One);
            Vector256<double> b = Vector256.MultiplyAddEstimate(Vector256.Abs(y - value), scale, Vector256<double>.One);
            first = kernel.AddChosen(first, a, Vector256.LoadUnsafe(ref mask, (nuint)(8 * t)).AsDouble());
            second = kernel.AddChosen(second, b, Vector256.LoadUnsafe(ref mask, (nuint)((8 * t) + 4)).AsDouble());
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
        Vector256<double> none = Vector256.Create(-1.0); // outside every window
        double* values = side.Values + start;
        for (int t = 0; t < count; t++)
        {
            Vector256<double> value = Vector256.Create(values[t]);
            Vector256<double> own = Vector256.Create((double)t);
            Vector256<double> a = Vector256.ConditionalSelect(Vector256.GreaterThan(lanes, own), below.First(value), none);
            Vector256<double> b = Vector256.ConditionalSelect(Vector256.GreaterThan(others, own), below.Second(value), none);
            if (!lowerOnly)
            {
                a = Vector256.ConditionalSelect(Vector256.LessThan(lanes, own), above.First(value), a);
                b = Vector256.ConditionalSelect(Vector256.LessThan(others, own), above.Second(value), b);
            }

            if (side.Weights == null)
            {
                sum.First = kernel.Add(sum.First, a);
                sum.Second = kernel.Add(sum.Second, b);
            }
            else
            {
                Vector256<double> weight = Vector256.Create(side.Weights[start + t]);
                sum.First = kernel.Add(sum.First, a, weight);
                sum.Second = kernel.Add(sum.Second, b, weight);
            }
        }
    }

    // Everything the inner loops read for one half of the window, pinned.
    private readonly struct Side(
        double* values, double* weights, int* firsts, int* lasts, double* prefix, double* suffix, bool upper, int stride, double signedInverse)
    {
        public readonly double* Values = values;
        public readonly double* Weights = weights;
        public readonly int* Firsts = firsts;
        public readonly int* Lasts = lasts;
        public readonly double* Prefix = prefix;
        public readonly double* Suffix = suffix;
        public readonly bool Upper = upper;
        public readonly int Stride = stride;
        public readonly double SignedInverse = signedInverse;
    }
}
