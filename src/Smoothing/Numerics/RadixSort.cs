using System.Buffers;
using System.Runtime.CompilerServices;

namespace Smoothing.Numerics;

/// <summary>Ascending sorts of finite doubles in time proportional to their number.</summary>
/// <remarks>
/// Method: least significant digit first, in digits of eleven bits, on bit patterns that order as the numbers do (sign bit turned for
/// positive, all bits for negative numbers). With items: all digits but those that all keys share; stable, equal keys keep their order. Keys alone:
/// the 33 bits from the highest in which keys differ, which part nearly all of up to ten million measured values; then one look finds what is
/// still out of order and sorts the run of keys that agree in those bits (long runs by the next 33 bits). Short arrays go to the library's sort.
/// Cost: four to eight times less than comparing from ten thousand values on.
/// </remarks>
internal static unsafe partial class RadixSort
{
    private const int Bits = 11;
    private const int Digits = 6;   // 6 · 11 ≥ 64
    private const int Buckets = 1 << Bits;
    private const int Shortest = 4096; // clearing and adding up the counts costs as much as comparing so few

    /// <summary>Sorts the keys.</summary>
    public static void Sort(Span<double> keys)
    {
        if (keys.Length < Shortest)
        {
            keys.Sort();
            return;
        }

        ulong[] scratch = ArrayPool<ulong>.Shared.Rent(keys.Length);
        fixed (double* source = keys)
        fixed (ulong* other = scratch)
        {
            Keys((ulong*)source, other, keys.Length);
        }

        ArrayPool<ulong>.Shared.Return(scratch);
    }

    /// <summary>Sorts the keys and carries an index along with each.</summary>
    public static void Sort(Span<double> keys, Span<int> items)
    {
        if (keys.Length < Shortest)
        {
            keys.Sort(items);
            return;
        }

        ulong[] scratch = ArrayPool<ulong>.Shared.Rent(keys.Length);
        int[] scratchItems = ArrayPool<int>.Shared.Rent(keys.Length);
        fixed (double* source = keys)
        fixed (ulong* other = scratch)
        fixed (int* index = items, otherIndex = scratchItems)
        {
            Run((ulong*)source, other, index, otherIndex, keys.Length);
        }

        ArrayPool<ulong>.Shared.Return(scratch);
        ArrayPool<int>.Shared.Return(scratchItems);
    }

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private static void Run(ulong* keys, ulong* other, int* items, int* otherItems, int count)
    {
        int* starts = stackalloc int[Digits * Buckets];
        new Span<int>(starts, Digits * Buckets).Clear();
        for (int i = 0; i < count; i++)
        {
            ulong key = keys[i];
            key ^= (ulong)((long)key >> 63) | 0x8000000000000000UL;
            keys[i] = key;
            for (int d = 0; d < Digits; d++)
            {
                starts[(d * Buckets) + (int)((key >> (d * Bits)) & (Buckets - 1))]++;
            }
        }

        ulong* from = keys;
        ulong* to = other;
        int* fromItems = items;
        int* toItems = otherItems;
        for (int d = 0; d < Digits; d++)
        {
            int* start = starts + (d * Buckets);
            int shift = d * Bits;
            if (start[(int)((from[0] >> shift) & (Buckets - 1))] == count)
            {
                continue; // all share this digit
            }

            int sum = 0;
            for (int b = 0; b < Buckets; b++)
            {
                (start[b], sum) = (sum, sum + start[b]);
            }

            Distribute(from, to, fromItems, toItems, start, shift, count);
            ulong* swap = from;
            from = to;
            to = swap;
            int* swapItems = fromItems;
            fromItems = toItems;
            toItems = swapItems;
        }

        for (int i = 0; i < count; i++)
        {
            ulong key = from[i];
            keys[i] = key ^ (~(ulong)((long)key >> 63) | 0x8000000000000000UL);
        }

        if (fromItems != items)
        {
            new Span<int>(fromItems, count).CopyTo(new Span<int>(items, count));
        }
    }

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private static void Distribute(ulong* from, ulong* to, int* fromItems, int* toItems, int* start, int shift, int count)
    {
        for (int i = 0; i < count; i++)
        {
            ulong key = from[i];
            int place = start[(int)((key >> shift) & (Buckets - 1))]++;
            to[place] = key;
            toItems[place] = fromItems[i];
        }
    }
}
