using System.Runtime.CompilerServices;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Estimation;

/// <summary>Records of the occupied cells alone, for ranges far longer than the bandwidth, without sorting more than the outlying values.</summary>
/// <remarks>
/// Method: the stretch of 16,384 cells that holds most of two thousand values gets a table of its own and takes its values unsorted, as in a dense table; the
/// rest is sorted and read in turn. Which cells the table covers changes nothing but the order of additions, and depends on the values alone.
/// </remarks>
internal static unsafe class SparseCells
{
    private const int Moments = MomentCells.Moments;
    private const int Looked = 2048;
    private const int LargestCore = 1 << 14;
    private const int Block = 4096;
    private const double LargestNumber = 4e15; // whole numbers and their neighbours are doubles below

    /// <summary>Fills an empty set of cells.</summary>
    public static void Fill(MomentCells cells, Sample sample)
    {
        int count = sample.Count;
        (double first, int width) = Core(sample.Values, cells.Inverse);
        var room = new AlignedRoom();
        double* table = room.Of(2L * width * Moments), folded = table + ((long)width * Moments);
        new Span<double>(table, 2 * width * Moments).Clear();
        double[] outside = new double[Math.Min(count, 2 * Block)], outsideWeights = sample.IsWeighted ? new double[outside.Length] : [];
        int left = 0, since = 0;
        double* inside = stackalloc double[Block], insideWeights = stackalloc double[sample.IsWeighted ? Block : 1];
        fixed (double* values = sample.Values, weights = sample.Weights)
        {
            for (int start = 0; start < count; start += Block)
            {
                int length = Math.Min(Block, count - start);
                if (outside.Length - left < length)
                {
                    int larger = Math.Min(count, 2 * outside.Length);
                    Array.Resize(ref outside, larger);
                    Array.Resize(ref outsideWeights, sample.IsWeighted ? larger : 0);
                }

                int held;
                fixed (double* to = outside, toWeights = outsideWeights)
                {
                    held = Split(values + start, length, cells.Inverse, first, first + width, inside, to + left);
                    if (sample.IsWeighted)
                    {
                        SplitWeights(values + start, weights + start, length, cells.Inverse, first, first + width, insideWeights, toWeights + left);
                    }
                }

                left += length - held;
                MomentScatter.AddStretch(inside, sample.IsWeighted ? insideWeights : null, held, cells.Inverse, first, table);
                since += held;
                if (since >= 12 * width)
                {
                    MomentScatter.Empty(table, folded, width, sample.IsWeighted ? 0 : MomentScatter.FullCell);
                    since = 0;
                }
            }
        }

        MomentScatter.Empty(table, folded, width, 0);
        Join(cells, first, folded, width, outside.AsSpan(0, left), sample.IsWeighted ? outsideWeights.AsSpan(0, left) : default);
        GC.KeepAlive(room); // the pointers into it do not
    }

    // The stretch of cells that holds most of the values looked at, cut to those; none where that is less than an eighth.
    private static (double First, int Width) Core(ReadOnlySpan<double> values, double inverse)
    {
        int looked = Math.Min(Looked, values.Length);
        Span<double> cells = stackalloc double[Looked];
        for (int i = 0; i < looked; i++)
        {
            cells[i] = Math.Floor(values[(int)((long)i * values.Length / looked)] * inverse);
        }

        cells = cells[..looked];
        cells.Sort();
        int best = 0, from = 0;
        for (int start = 0, end = 0; start < looked; start++)
        {
            while (end < looked && cells[end] - cells[start] < LargestCore)
            {
                end++;
            }

            if (end - start > best)
            {
                (best, from) = (end - start, start);
            }
        }

        double first = cells[from], last = cells[from + best - 1];
        return 8 * best < looked || !(Math.Abs(first) < LargestNumber && Math.Abs(last) < LargestNumber) ? (0, 0) : (first, (int)(last - first) + 1);
    }

    // Both destinations are written each time and only one advances: no branch that random values would mispredict. Returns how many are inside.
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private static int Split(double* values, int count, double inverse, double first, double end, double* inside, double* outside)
    {
        int held = 0;
        for (int i = 0; i < count; i++)
        {
            double x = values[i], place = x * inverse;
            inside[held] = x;
            outside[i - held] = x;
            held += place >= first & place < end ? 1 : 0;
        }

        return held;
    }

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private static void SplitWeights(double* values, double* weights, int count, double inverse, double first, double end, double* inside, double* outside)
    {
        int held = 0;
        for (int i = 0; i < count; i++)
        {
            double place = values[i] * inverse;
            inside[held] = weights[i];
            outside[i - held] = weights[i];
            held += place >= first & place < end ? 1 : 0;
        }
    }

    private static void Join(MomentCells cells, double first, double* table, int width, Span<double> outside, Span<double> weights)
    {
        double[] sortedWeights = Sort(outside, weights);
        int below = width == 0 ? outside.Length : FirstAtOrAbove(outside, first, cells.Inverse), above = outside.Length - below;
        int occupied = 0;
        for (int c = 0; c < width; c++)
        {
            occupied += table[(long)c * Moments] != 0 ? 1 : 0;
        }

        fixed (double* values = outside, masses = sortedWeights)
        {
            double* highMasses = masses == null ? null : masses + below;
            int low = below == 0 ? 0 : MomentScatter.AddSorted(values, masses, below, cells.Inverse, null, null);
            int high = above == 0 ? 0 : MomentScatter.AddSorted(values + below, highMasses, above, cells.Inverse, null, null);
            var numbers = new double[low + occupied + high];
            double* records = cells.MakeSparse(numbers);
            fixed (double* into = numbers)
            {
                if (low > 0)
                {
                    MomentScatter.AddSorted(values, masses, below, cells.Inverse, into, records);
                }

                int at = low;
                for (int c = 0; c < width; c++)
                {
                    if (table[(long)c * Moments] != 0)
                    {
                        into[at] = first + c;
                        new Span<double>(table + ((long)c * Moments), Moments).CopyTo(new Span<double>(records + ((long)at * Moments), Moments));
                        at++;
                    }
                }

                if (high > 0)
                {
                    MomentScatter.AddSorted(values + below, highMasses, above, cells.Inverse, into + at, records + ((long)at * Moments));
                }
            }
        }
    }

    // Sorts the values in place; returns the weights in the same order.
    private static double[] Sort(Span<double> values, Span<double> weights)
    {
        if (weights.IsEmpty)
        {
            RadixSort.Sort(values);
            return [];
        }

        var order = new int[values.Length];
        for (int i = 0; i < order.Length; i++)
        {
            order[i] = i;
        }

        RadixSort.Sort(values, order);
        var sorted = new double[values.Length];
        for (int i = 0; i < order.Length; i++)
        {
            sorted[i] = weights[order[i]];
        }

        return sorted;
    }

    private static int FirstAtOrAbove(ReadOnlySpan<double> sorted, double place, double inverse)
    {
        int low = 0, high = sorted.Length;
        while (low < high)
        {
            int middle = (low + high) / 2;
            (low, high) = sorted[middle] * inverse < place ? (middle + 1, high) : (low, middle);
        }

        return low;
    }
}
