using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;
using System.Runtime.Intrinsics.X86;

namespace Smoothing.Estimation;

internal sealed unsafe partial class CompactCells
{
    private const int Strip = 256; // values classified ahead of adding them up: fits the first cache

    private void Accumulate(ReadOnlySpan<double> values, ReadOnlySpan<double> weights)
    {
        int cells = (3 * _points) + 1;
        double* records = Measure(cells);
        if (_places.Length < cells)
        {
            _places = new int[cells];
            _counts = new int[cells];
        }

        Array.Clear(_places, 0, cells);
        Array.Clear(_counts, 0, cells);
        _carries = 0;
        _carried.Of((1L + (values.Length / CarryAfter)) * 8 * _vectors); // sums and their errors
        fixed (double* data = values, mass = weights)
        fixed (int* counts = _counts)
        {
            long* strip = stackalloc long[Strip];
            for (int start = 0; start < values.Length; start += Strip)
            {
                int length = Math.Min(Strip, values.Length - start);
                Classify(data + start, length, strip);
                double* own = mass == null ? null : mass + start;

                // A strip is no longer than what a cell takes between two carries: each comes up at most once in it.
                int full = _vectors == 1
                    ? AddLow(data + start, own, length, strip, records, counts)
                    : AddHigh(data + start, own, length, strip, records, counts, _vectors, _stride);
                for (int i = 0; i < full; i++)
                {
                    Carry(records, (int)strip[i]);
                }
            }
        }
    }

    // A record: the sums, then the cell's lower end, the largest double in it, and the reciprocal of its width, 0 where it holds one double or none, or is
    // an outer one that no window reads. Sums and ends of low degrees share one line of the cache.
    private double* Measure(int cells)
    {
        const double narrowest = 1e-290; // the reciprocal stays finite
        _stride = ((4 * _vectors) + 4 + 7) / 8 * 8;
        double* records = _records.Of((long)_stride * cells);
        NativeMemory.Clear(records, (nuint)((long)_stride * cells * sizeof(double)));
        double* cut = Breakpoints;
        for (int k = 1; k < cells - 1; k++)
        {
            double* ends = records + ((long)_stride * k) + (4 * _vectors);
            ends[0] = cut[k - 1];
            ends[1] = Math.BitDecrement(cut[k]);
            double width = ends[1] - ends[0];
            ends[2] = width > narrowest ? 1 / width : 0;
        }

        return records;
    }

    // A place of the cell's own ← place + record without loss (Knuth), record ← 0.
    private void Carry(double* records, int cell)
    {
        int width = 4 * _vectors;
        if (_places[cell] == 0)
        {
            _places[cell] = ++_carries;
            new Span<double>(_carried.Pointer + (2L * width * (_carries - 1)), 2 * width).Clear();
        }

        double* record = records + ((long)_stride * cell);
        double* sums = _carried.Pointer + (2L * width * (_places[cell] - 1));
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
    }

    // One vector (1, b², bc, c²), b and c the distances from the two ends of the cell as shares of its width. Leaves the cells to be carried at the front of the list.
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private static int AddLow(double* values, double* weights, int count, long* cells, double* records, int* counts)
    {
        int full = 0;
        for (int i = 0; i < count; i++)
        {
            double x = values[i];
            double* record = records + (8 * cells[i]);
            Vector256<double> b = Vector256.Create((x - record[4]) * record[6]);
            Vector256<double> c = Vector256.Create((record[5] - x) * record[6]);
            Vector256<double> term = Squares(b, c);
            if (weights == null)
            {
                Vector256<double> sum = Vector256.Load(record) + term;
                sum.Store(record);
                if (sum.ToScalar() == CarryAfter)
                {
                    cells[full++] = cells[i];
                }
            }
            else
            {
                (Vector256.Load(record) + (term * Vector256.Create(weights[i]))).Store(record);
                if ((++counts[cells[i]] & (CarryAfter - 1)) == 0)
                {
                    cells[full++] = cells[i];
                }
            }
        }

        return full;
    }

    // Further vectors for higher degrees: with D = 4·vectors − 2 all bᵉcᴰ⁻ᵉ, the lowest three powers of b beside the count.
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private static int AddHigh(double* values, double* weights, int count, long* cells, double* records, int* counts, int vectors, int stride)
    {
        int full = 0;
        Vector256<double> one = Vector256<double>.One;
        for (int i = 0; i < count; i++)
        {
            double x = values[i];
            double* record = records + (stride * cells[i]);
            double* ends = record + (4 * vectors);
            Vector256<double> mass = weights == null ? one : Vector256.Create(weights[i]);
            Vector256<double> b = Vector256.Create((x - ends[0]) * ends[2]);
            Vector256<double> c = Vector256.Create((ends[1] - x) * ends[2]);
            Vector256<double> b2 = b * b, c2 = c * c;
            Vector256<double> b4 = b2 * b2, c4 = c2 * c2;
            Vector256<double> high = Cubes(b, c) * (b2 * b) * mass;
            Vector256<double> power = c4; // of c beside the lowest three of b

            // Each vector has b⁴ for the c⁴ of the one before.
            for (int r = 1; r < vectors; r++)
            {
                Vector256<double> term = high;
                for (int q = r; q < vectors - 1; q++)
                {
                    term *= c4;
                }

                (Vector256.Load(record + (4 * r)) + term).Store(record + (4 * r));
                high *= b4;
                power = r == 1 ? power : power * c4;
            }

            Vector256<double> low = Squares(b, c) * CountFirst(power) * mass;
            Vector256<double> sum = Vector256.Load(record) + low;
            sum.Store(record);
            if (weights == null ? sum.ToScalar() == CarryAfter : (++counts[cells[i]] & (CarryAfter - 1)) == 0)
            {
                cells[full++] = cells[i];
            }
        }

        return full;
    }

    // (1, b², bc, c²)
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static Vector256<double> Squares(Vector256<double> b, Vector256<double> c) => CountFirst(Mix(b, c, 8)) * CountFirst(Mix(b, c, 12));

    // (b³, b²c, bc², c³)
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static Vector256<double> Cubes(Vector256<double> b, Vector256<double> c) => Mix(b, c, 14) * Mix(b, c, 12) * Mix(b, c, 8);

    // 1 in the first lane, which counts.
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static Vector256<double> CountFirst(Vector256<double> a) => Avx.IsSupported
        ? Avx.Blend(a, Vector256<double>.One, 1)
        : a.WithElement(0, 1);

    // The lanes of b but for those of c that the bits name.
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static Vector256<double> Mix(Vector256<double> b, Vector256<double> c, [System.Diagnostics.CodeAnalysis.ConstantExpected] byte bits) => Avx.IsSupported
        ? Avx.Blend(b, c, bits)
        : Vector256.ConditionalSelect(Vector256.Create(-(bits & 1L), -((bits >> 1) & 1L), -((bits >> 2) & 1L), -((bits >> 3) & 1L)).AsDouble(), c, b);
}
