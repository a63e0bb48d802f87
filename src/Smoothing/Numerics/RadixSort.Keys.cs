using System.Numerics;
using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;

namespace Smoothing.Numerics;

internal static unsafe partial class RadixSort
{
    private const int Passes = 3;
    private const int ShortRun = 32; // insertion is quicker than any call

    private static void Keys(ulong* keys, ulong* other, int count)
    {
        Turn(keys, count, back: false);
        Arrange(keys, other, count);
        Turn(keys, count, back: true);
    }

    // Numbers to bit patterns that order alike, or back.
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private static void Turn(ulong* keys, int count, bool back)
    {
        const long sign = long.MinValue;
        Vector256<long> top = Vector256.Create(sign);
        Vector256<long> turned = back ? Vector256<long>.AllBitsSet : Vector256<long>.Zero;
        int i = 0;
        for (; i + 4 <= count; i += 4)
        {
            Vector256<long> key = Vector256.Load((long*)keys + i);
            (key ^ ((Vector256.LessThan(key, Vector256<long>.Zero) ^ turned) | top)).Store((long*)keys + i);
        }

        for (; i < count; i++)
        {
            long key = (long)keys[i];
            keys[i] = (ulong)(key ^ (((key >> 63) ^ (back ? -1L : 0)) | sign));
        }
    }

    private static void Arrange(ulong* keys, ulong* other, int count)
    {
        ulong differing = Differing(keys, count);
        if (differing == 0)
        {
            return;
        }

        int highest = 63 - BitOperations.LeadingZeroCount(differing);
        int lowest = BitOperations.TrailingZeroCount(differing);
        int passes = Math.Min(Passes, ((highest - lowest) / Bits) + 1);
        int shift = Math.Max(0, highest + 1 - (passes * Bits));
        ulong* sorted = Distribute(keys, other, shift, passes, count);
        if (shift > lowest)
        {
            Mend(sorted, sorted == keys ? other : keys, shift, count);
        }

        if (sorted != keys)
        {
            new Span<ulong>(sorted, count).CopyTo(new Span<ulong>(keys, count));
        }
    }

    // The bits in which not all keys agree.
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private static ulong Differing(ulong* keys, int count)
    {
        Vector256<ulong> first = Vector256.Create(keys[0]);
        Vector256<ulong> bits = Vector256<ulong>.Zero;
        int i = 0;
        for (; i + 4 <= count; i += 4)
        {
            bits |= Vector256.Load(keys + i) ^ first;
        }

        ulong result = bits[0] | bits[1] | bits[2] | bits[3];
        for (; i < count; i++)
        {
            result |= keys[i] ^ keys[0];
        }

        return result;
    }

    // Returns where the keys ended up.
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private static ulong* Distribute(ulong* keys, ulong* other, int shift, int passes, int count)
    {
        int* starts = stackalloc int[Passes * Buckets];
        new Span<int>(starts, Passes * Buckets).Clear();
        for (int i = 0; i < count; i++)
        {
            ulong key = keys[i] >> shift;
            starts[(int)key & (Buckets - 1)]++;
            starts[Buckets + ((int)(key >> Bits) & (Buckets - 1))]++;
            starts[(2 * Buckets) + ((int)(key >> (2 * Bits)) & (Buckets - 1))]++;
        }

        ulong* from = keys;
        ulong* to = other;
        for (int d = 0; d < passes; d++)
        {
            int* start = starts + (d * Buckets);
            int sum = 0;
            for (int b = 0; b < Buckets; b++)
            {
                (start[b], sum) = (sum, sum + start[b]);
            }

            int down = shift + (d * Bits);
            for (int i = 0; i < count; i++)
            {
                ulong key = from[i];
                to[start[(int)(key >> down) & (Buckets - 1)]++] = key;
            }

            ulong* swap = from;
            from = to;
            to = swap;
        }

        return from;
    }

    // Keys are in order but for the bits below the shift.
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private static void Mend(ulong* keys, ulong* other, int shift, int count)
    {
        for (int i = 1; i < count; i++)
        {
            if (keys[i] >= keys[i - 1])
            {
                continue;
            }

            ulong run = keys[i] >> shift;
            int start = i - 1;
            while (start > 0 && keys[start - 1] >> shift == run)
            {
                start--;
            }

            int end = i + 1;
            while (end < count && keys[end] >> shift == run)
            {
                end++;
            }

            if (end - start <= ShortRun)
            {
                Insert(keys + start, end - start);
            }
            else if (end - start < Shortest)
            {
                new Span<ulong>(keys + start, end - start).Sort();
            }
            else
            {
                Arrange(keys + start, other + start, end - start);
            }

            i = end;
        }
    }

    private static void Insert(ulong* keys, int count)
    {
        for (int i = 1; i < count; i++)
        {
            ulong key = keys[i];
            int k = i;
            for (; k > 0 && keys[k - 1] > key; k--)
            {
                keys[k] = keys[k - 1];
            }

            keys[k] = key;
        }
    }
}
