using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;
using Smoothing.Numerics;

namespace Smoothing.Estimation;

/// <summary>Adds (1, b, b², …, b¹⁵) of each value to the record of its cell.</summary>
/// <remarks>
/// Method: powers by the tree b^{r&amp;1} (b²)^{r>>1&amp;1} (b⁴)^{r>>2&amp;1} (b⁸)^{r>>3} without fused products, so every vector width gives the same bits.
/// Numbers and powers of the next eight values are stored before the present eight are added: an address that was stored just
/// before it is used would stall each addition. Adding the same number again and again errs in one direction, about n·1e-16 relative; full
/// cells are therefore moved to a second table before they hold more than some thousand values.
/// </remarks>
internal static unsafe class MomentScatter
{
    private const int Block = 8;
    private const int Moments = MomentCells.Moments;

    /// <summary>A cell with fewer values than this since it was last emptied may wait: 4096·1e-16 is far below the accuracy promised.</summary>
    public const int FullCell = 1 << 12;

    // Adding this number rounds to a whole one, which the low 32 bits hold.
    private const double Rounder = 6755399441055744;

    [ThreadStatic]
    private static AlignedRoom? t_room;

    public static void Add(double* values, double* weights, int count, double inverse, double first, int cells, double* records)
    {
        // How often full cells are looked for: one look a cell for every twelve values costs nothing that can be measured.
        int stretch = Math.Max(1 << 13, 12 * cells);
        if (count <= stretch)
        {
            AddStretch(values, weights, count, inverse, first, records);
            return;
        }

        // Accumulate in a table of its own, emptied into the records.
        AlignedRoom room = t_room ??= new AlignedRoom();
        double* table = room.Of((long)cells * Moments);
        new Span<double>(table, cells * Moments).Clear();
        for (int start = 0; start < count; start += stretch)
        {
            int length = Math.Min(stretch, count - start);
            AddStretch(values + start, weights == null ? null : weights + start, length, inverse, first, table);
            Empty(table, records, cells, weights != null || start + length == count ? 0 : FullCell);
        }
    }

    /// <summary>One value; the same products as the bulk form.</summary>
    public static void AddOne(double x, double weight, double inverse, double* record)
    {
        double u = x * inverse;
        double b = u - Math.Floor(u) - 0.5;
        double b2 = b * b, b4 = b2 * b2, b8 = b4 * b4;
        for (int r = 0; r < Moments; r++)
        {
            double power = (r & 1) != 0 ? b : 1;
            power = (r & 2) != 0 ? power * b2 : power;
            power *= weight;
            power = (r & 4) != 0 ? power * b4 : power;
            record[r] += (r & 8) != 0 ? power * b8 : power;
        }
    }

    /// <summary>Sorted values into one record for each occupied cell, in turn; returns how many. With <paramref name="records"/> null they are only counted.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public static int AddSorted(double* values, double* weights, int count, double inverse, double* numbers, double* records)
    {
        int cells = 0;
        double last = double.NaN;
        if (records == null)
        {
            for (int i = 0; i < count; i++)
            {
                double number = Math.Floor(values[i] * inverse);
                cells += number != last ? 1 : 0;
                last = number;
            }

            return cells;
        }

        Vector256<double> ones = Vector256<double>.One;
        Vector256<double> odd = Vector256.Create(0L, -1L, 0L, -1L).AsDouble(), upper = Vector256.Create(0L, 0L, -1L, -1L).AsDouble();
        Vector256<double> s0 = default, s1 = default, s2 = default, s3 = default;
        int held = 0;
        for (int i = 0; i < count; i++)
        {
            double u = values[i] * inverse;
            double number = Math.Floor(u);
            if (number != last || held == FullCell)
            {
                Release(records + ((long)Math.Max(cells - 1, 0) * Moments), ref s0, ref s1, ref s2, ref s3);
                held = 0;
                if (number != last)
                {
                    numbers[cells++] = number;
                    last = number;
                }
            }

            double b = u - number - 0.5, b2 = b * b, b4 = b2 * b2;
            Vector256<double> low = Vector256.ConditionalSelect(odd, Vector256.Create(b), ones) * Vector256.ConditionalSelect(upper, Vector256.Create(b2), ones);
            if (weights != null)
            {
                low *= Vector256.Create(weights[i]);
            }

            Vector256<double> b8 = Vector256.Create(b4 * b4), next = low * Vector256.Create(b4);
            s0 += low;
            s1 += next;
            s2 += low * b8;
            s3 += next * b8;
            held++;
        }

        Release(records + ((long)Math.Max(cells - 1, 0) * Moments), ref s0, ref s1, ref s2, ref s3);
        return cells;
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static void Release(double* record, ref Vector256<double> s0, ref Vector256<double> s1, ref Vector256<double> s2, ref Vector256<double> s3)
    {
        (Vector256.Load(record) + s0).Store(record);
        (Vector256.Load(record + 4) + s1).Store(record + 4);
        (Vector256.Load(record + 8) + s2).Store(record + 8);
        (Vector256.Load(record + 12) + s3).Store(record + 12);
        s0 = s1 = s2 = s3 = default;
    }

    /// <summary>Moves the records of cells that hold more than <paramref name="least"/> from a table to the records.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public static void Empty(double* table, double* records, int cells, double least)
    {
        for (int c = 0; c < cells; c++)
        {
            double* from = table + (c * Moments);
            if (from[0] > least)
            {
                double* to = records + (c * Moments);
                for (int r = 0; r < Moments; r += 4)
                {
                    (Vector256.Load(to + r) + Vector256.Load(from + r)).Store(to + r);
                    Vector256<double>.Zero.Store(from + r);
                }
            }
        }
    }

    /// <summary>The bulk form for so few values that no cell needs emptying on the way.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public static void AddStretch(double* values, double* weights, int count, double inverse, double first, double* records)
    {
        // Two halves of: eight cell numbers, then b, b², b⁴, b⁸ and the weights of eight values each.
        long* numbers = stackalloc long[2 * Block];
        double* powers = stackalloc double[2 * 5 * Block];
        double* rest = stackalloc double[2 * Block];
        int whole = count / Block * Block;
        int half = 0;
        int waiting = 0;
        for (int i = 0; i <= whole; i += Block)
        {
            int ready = 0;
            if (i < whole || whole < count)
            {
                double* source = values + i;
                double* mass = weights == null ? null : weights + i;
                ready = Block;
                if (i == whole)
                {
                    // The last few, filled up with the last value, which is then not added.
                    ready = count - whole;
                    for (int k = 0; k < Block; k++)
                    {
                        rest[k] = values[Math.Min(whole + k, count - 1)];
                        rest[Block + k] = weights == null ? 1 : weights[Math.Min(whole + k, count - 1)];
                    }

                    source = rest;
                    mass = weights == null ? null : rest + Block;
                }

                Prepare(source, mass, inverse, first, numbers + (half * Block), powers + (half * 5 * Block));
            }

            half ^= 1;
            Scatter(numbers + (half * Block), powers + (half * 5 * Block), waiting, weights != null, records);
            waiting = ready;
        }

        Scatter(numbers + ((half ^ 1) * Block), powers + ((half ^ 1) * 5 * Block), waiting, weights != null, records);
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static void Prepare(double* source, double* mass, double inverse, double first, long* numbers, double* powers)
    {
        Vector256<double> scale = Vector256.Create(inverse), origin = Vector256.Create(first), rounder = Vector256.Create(Rounder), middle = Vector256.Create(0.5);
        for (int k = 0; k < Block; k += 4)
        {
            Vector256<double> u = Vector256.Load(source + k) * scale;
            Vector256<double> cell = Vector256.Floor(u);
            Vector256<double> b = u - cell - middle;
            Vector256<double> b2 = b * b;
            Vector256<double> b4 = b2 * b2;
            b.Store(powers + k);
            b2.Store(powers + Block + k);
            b4.Store(powers + (2 * Block) + k);
            (b4 * b4).Store(powers + (3 * Block) + k);
            (cell - origin + rounder).AsInt64().Store(numbers + k);
            if (mass != null)
            {
                Vector256.Load(mass + k).Store(powers + (4 * Block) + k);
            }
        }
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static void Scatter(long* numbers, double* powers, int count, bool weighted, double* records)
    {
        Vector256<double> ones = Vector256<double>.One;
        Vector256<double> odd = Vector256.Create(0L, -1L, 0L, -1L).AsDouble(), upper = Vector256.Create(0L, 0L, -1L, -1L).AsDouble();
        for (int k = 0; k < count; k++)
        {
            double* record = records + ((long)(int)numbers[k] * Moments);
            Vector256<double> low = Vector256.ConditionalSelect(odd, Vector256.Create(powers[k]), ones) * Vector256.ConditionalSelect(upper, Vector256.Create(powers[Block + k]), ones);
            if (weighted)
            {
                low *= Vector256.Create(powers[(4 * Block) + k]);
            }

            Vector256<double> b8 = Vector256.Create(powers[(3 * Block) + k]);
            Vector256<double> next = low * Vector256.Create(powers[(2 * Block) + k]);
            (Vector256.Load(record) + low).Store(record);
            (Vector256.Load(record + 4) + next).Store(record + 4);
            (Vector256.Load(record + 8) + (low * b8)).Store(record + 8);
            (Vector256.Load(record + 12) + (next * b8)).Store(record + 12);
        }
    }
}
