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
        int record = 2 * _side;
        long size = (long)cells * record;
        double* records = _records.Of(size);
        double* carried = _carried.Of(size);
        double* errors = _errors.Of(size);
        NativeMemory.Clear(records, (nuint)(size * sizeof(double)));
        NativeMemory.Clear(carried, (nuint)(size * sizeof(double)));
        NativeMemory.Clear(errors, (nuint)(size * sizeof(double)));
        int run = ShortestRun;
        fixed (double* data = values, mass = weights)
        {
            for (int start = 0; start < values.Length;)
            {
                int count = Math.Min(run, values.Length - start);
                AddRun(data + start, mass == null ? null : mass + start, count, records);
                run = NextRun(records, record, cells, run);
                Carry(records, carried, errors, size);
                start += count;
            }
        }

        for (long t = 0; t < size; t += 4)
        {
            (Vector256.Load(carried + t) + Vector256.Load(errors + t)).Store(carried + t);
        }
    }

    // As long as the fullest cell stays near the shortest run, at most twice the last one.
    private static int NextRun(double* records, int record, int cells, int run)
    {
        double most = 0, all = 0;
        for (int k = 0; k < cells; k++)
        {
            double inside = records[(long)k * record];
            most = Math.Max(most, inside);
            all += inside;
        }

        double next = Math.Min(2.0 * run, ShortestRun * all / most);
        return next < LongestRun ? Math.Max(ShortestRun, (int)next / Strip * Strip) : LongestRun;
    }

    // carried + errors ← carried + errors + records without loss (Knuth), records ← 0.
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private static void Carry(double* records, double* carried, double* errors, long size)
    {
        for (long t = 0; t < size; t += 4)
        {
            Vector256<double> a = Vector256.Load(carried + t);
            Vector256<double> b = Vector256.Load(records + t);
            Vector256<double> sum = a + b;
            Vector256<double> part = sum - a;
            (Vector256.Load(errors + t) + ((a - (sum - part)) + (b - part))).Store(errors + t);
            sum.Store(carried + t);
            Vector256<double>.Zero.Store(records + t);
        }
    }

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private void AddRun(double* values, double* weights, int count, double* records)
    {
        long* cells = stackalloc long[Strip];
        for (int start = 0; start < count; start += Strip)
        {
            int strip = Math.Min(Strip, count - start);
            Classify(values + start, strip, cells);
            double* mass = weights == null ? null : weights + start;
            if (_side == 4)
            {
                AddLow(values + start, mass, strip, cells, records);
            }
            else
            {
                AddHigh(values + start, mass, strip, cells, records);
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

    // Degrees up to 3: one vector (1, b, b², b³) from either end.
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private void AddLow(double* values, double* weights, int count, long* cells, double* records)
    {
        Vector256<double> odd = Vector256.Create(0L, -1, 0, -1).AsDouble();
        Vector256<double> high = Vector256.Create(0L, 0, -1, -1).AsDouble();
        Vector256<double> one = Vector256<double>.One;
        double* cut = Breakpoints;
        double* uppers = Uppers;
        double inverse = _inverse;
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
        }
    }

    // Higher degrees: further vectors, each b⁴ times the one before.
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private void AddHigh(double* values, double* weights, int count, long* cells, double* records)
    {
        Vector256<double> odd = Vector256.Create(0L, -1, 0, -1).AsDouble();
        Vector256<double> high = Vector256.Create(0L, 0, -1, -1).AsDouble();
        Vector256<double> one = Vector256<double>.One;
        double* cut = Breakpoints;
        double* uppers = Uppers;
        double inverse = _inverse;
        int side = _side;
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
        }
    }
}
