using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace Smoothing.Estimation;

internal sealed unsafe partial class CompactCells
{
    private const double Rounder = 6755399441055744; // 1.5·2⁵²: adding it leaves the nearest whole number in the low bits
    private const int Strip = 256;                   // values classified ahead of adding them up: fits the first cache

    private void Accumulate(ReadOnlySpan<double> values, ReadOnlySpan<double> weights)
    {
        int cells = (3 * _points) + 1;
        long size = 2L * _side * cells;
        double* records = _records.Of(size);
        NativeMemory.Clear(records, (nuint)(size * sizeof(double)));
        if (_states.Length < cells)
        {
            _states = new int[cells];
        }

        Array.Clear(_states, 0, cells);
        _carries = 0;
        _carried.Of((1L + (values.Length / CarryAfter)) * 4 * _side); // sums and their errors
        fixed (double* data = values, mass = weights)
        fixed (int* states = _states)
        {
            AddAll(data, mass, values.Length, records, states);
            for (int k = 0; k < cells; k++)
            {
                if (states[k] >= CarryAfter)
                {
                    Settle(records + (2L * _side * k), states[k] / CarryAfter);
                }
            }
        }
    }

    // place ← place + record without loss (Knuth), record ← 0.
    [MethodImpl(MethodImplOptions.NoInlining)]
    private int Carry(double* record, int state)
    {
        int place = (state / CarryAfter) - 1; // the counter has just run over into the place
        int width = 2 * _side;
        double* sums;
        if (place == 0)
        {
            place = ++_carries;
            sums = _carried.Pointer + (2L * width * (place - 1));
            new Span<double>(sums, 2 * width).Clear();
        }
        else
        {
            sums = _carried.Pointer + (2L * width * (place - 1));
        }

        for (int t = 0; t < width; t += 4)
        {
            Vector256<double> a = Vector256.Load(sums + t);
            Vector256<double> b = Vector256.Load(record + t);
            Vector256<double> sum = a + b;
            Vector256<double> part = sum - a;
            (Vector256.Load(sums + width + t) + ((a - (sum - part)) + (b - part))).Store(sums + width + t);
            sum.Store(sums + t);
            Vector256<double>.Zero.Store(record + t);
        }

        return place * CarryAfter;
    }

    private void Settle(double* record, int place)
    {
        int width = 2 * _side;
        Carry(record, (place + 1) * CarryAfter);
        double* sums = _carried.Pointer + (2L * width * (place - 1));
        for (int t = 0; t < width; t++)
        {
            record[t] = sums[t] + sums[width + t];
        }
    }

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private void AddAll(double* values, double* weights, int count, double* records, int* states)
    {
        long* cells = stackalloc long[Strip];
        for (int start = 0; start < count; start += Strip)
        {
            int strip = Math.Min(Strip, count - start);
            Classify(values + start, strip, cells);
            double* mass = weights == null ? null : weights + start;

            // A strip is no longer than the counters: each runs over at most once in it.
            int full = _side == 4
                ? AddLow(values + start, mass, strip, cells, records, states)
                : AddHigh(values + start, mass, strip, cells, records, states);
            for (int i = 0; i < full; i++)
            {
                long k = cells[i];
                states[k] = Carry(records + (2 * _side * k), states[k]) + (states[k] & (CarryAfter - 1));
            }
        }
    }

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private void Classify(double* values, int count, long* cells)
    {
        Vector256<double> origin = Vector256.Create(_origin);
        Vector256<double> scale = Vector256.Create(_scale);
        Vector256<double> last = Vector256.Create(_bucketCount - 1.0);
        Vector256<double> rounder = Vector256.Create(Rounder);
        int i = 0;
        for (; i + 4 <= count; i += 4)
        {
            Vector256<double> z = (Vector256.Load(values + i) - origin) * scale;
            (Vector256.Min(Vector256.Max(z, Vector256<double>.Zero), last) + rounder).AsInt64().Store(cells + i);
        }

        for (; i < count; i++)
        {
            cells[i] = Bucket(values[i]);
        }

        double* cut = Breakpoints;
        fixed (int* buckets = _buckets)
        {
            if (_mostInBucket <= 2)
            {
                for (i = 0; i < count; i++)
                {
                    int k = buckets[(int)cells[i]];
                    double x = values[i];
                    cells[i] = k + AtLeast(x, cut[k]) + AtLeast(x, cut[k + 1]);
                }
            }
            else if (_mostInBucket <= 4)
            {
                for (i = 0; i < count; i++)
                {
                    int k = buckets[(int)cells[i]];
                    double x = values[i];
                    cells[i] = k + AtLeast(x, cut[k]) + AtLeast(x, cut[k + 1]) + AtLeast(x, cut[k + 2]) + AtLeast(x, cut[k + 3]);
                }
            }
            else
            {
                for (i = 0; i < count; i++)
                {
                    int bucket = (int)cells[i];
                    double x = values[i];
                    int low = buckets[bucket];
                    int high = buckets[bucket + 1];
                    while (low < high)
                    {
                        int middle = (low + high) >> 1;
                        if (cut[middle] <= x)
                        {
                            low = middle + 1;
                        }
                        else
                        {
                            high = middle;
                        }
                    }

                    cells[i] = low;
                }
            }
        }
    }

    // 1 when x ≥ cut, without a branch: the sign bit of x − cut, which is exact in sign.
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static int AtLeast(double x, double cut) => 1 + (int)(BitConverter.DoubleToInt64Bits(x - cut) >> 63);

    // Degrees up to 3: one vector (1, b, b², b³) from either end. Leaves the cells whose counters ran over at the front of the list.
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private int AddLow(double* values, double* weights, int count, long* cells, double* records, int* states)
    {
        Vector256<double> odd = Vector256.Create(0L, -1, 0, -1).AsDouble();
        Vector256<double> high = Vector256.Create(0L, 0, -1, -1).AsDouble();
        Vector256<double> one = Vector256<double>.One;
        double* cut = Breakpoints;
        double* uppers = Uppers;
        double inverse = _inverse;
        int full = 0;
        for (int i = 0; i < count; i++)
        {
            long k = cells[i];
            double x = values[i];
            Vector256<double> b = Vector256.Create((x - cut[k - 1]) * inverse);
            Vector256<double> c = Vector256.Create((uppers[k] - x) * inverse);
            Vector256<double> up = Vector256.ConditionalSelect(odd, b, one) * Vector256.ConditionalSelect(high, b * b, one);
            Vector256<double> down = Vector256.ConditionalSelect(odd, c, one) * Vector256.ConditionalSelect(high, c * c, one);
            if (weights != null)
            {
                Vector256<double> w = Vector256.Create(weights[i]);
                up *= w;
                down *= w;
            }

            double* record = records + (8 * k);
            (Vector256.Load(record) + up).Store(record);
            (Vector256.Load(record + 4) + down).Store(record + 4);
            int state = states[k] + 1;
            states[k] = state;
            cells[full] = k;
            full += (state & (CarryAfter - 1)) == 0 ? 1 : 0;
        }

        return full;
    }

    // Higher degrees: further vectors, each b⁴ times the one before.
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private int AddHigh(double* values, double* weights, int count, long* cells, double* records, int* states)
    {
        Vector256<double> odd = Vector256.Create(0L, -1, 0, -1).AsDouble();
        Vector256<double> high = Vector256.Create(0L, 0, -1, -1).AsDouble();
        Vector256<double> one = Vector256<double>.One;
        double* cut = Breakpoints;
        double* uppers = Uppers;
        double inverse = _inverse;
        int side = _side;
        int full = 0;
        for (int i = 0; i < count; i++)
        {
            long k = cells[i];
            double x = values[i];
            Vector256<double> b = Vector256.Create((x - cut[k - 1]) * inverse);
            Vector256<double> c = Vector256.Create((uppers[k] - x) * inverse);
            Vector256<double> b2 = b * b;
            Vector256<double> c2 = c * c;
            Vector256<double> up = Vector256.ConditionalSelect(odd, b, one) * Vector256.ConditionalSelect(high, b2, one);
            Vector256<double> down = Vector256.ConditionalSelect(odd, c, one) * Vector256.ConditionalSelect(high, c2, one);
            if (weights != null)
            {
                Vector256<double> w = Vector256.Create(weights[i]);
                up *= w;
                down *= w;
            }

            Vector256<double> b4 = b2 * b2;
            Vector256<double> c4 = c2 * c2;
            double* record = records + (2 * side * k);
            (Vector256.Load(record) + up).Store(record);
            (Vector256.Load(record + side) + down).Store(record + side);
            for (int t = 4; t < side; t += 4)
            {
                up *= b4;
                down *= c4;
                (Vector256.Load(record + t) + up).Store(record + t);
                (Vector256.Load(record + side + t) + down).Store(record + side + t);
            }

            int state = states[k] + 1;
            states[k] = state;
            cells[full] = k;
            full += (state & (CarryAfter - 1)) == 0 ? 1 : 0;
        }

        return full;
    }
}
