using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Estimation;

/// <summary>Sixteen moments Σwbʳ of each cell of a lattice of width δ = 2ˢ, b = x/δ − k − 1/2: all that a Gaussian curve of bandwidth 16 δ or more needs.</summary>
/// <remarks>
/// Dense: one record for every cell between the outermost values. Sparse: records of the occupied cells only, with their numbers, where the range is
/// long against the bandwidth. Division by a power of two, the whole part and the rest are exact, so an offset of the data costs nothing.
/// </remarks>
internal sealed unsafe class MomentCells
{
    /// <summary>Numbers in a record.</summary>
    public const int Moments = 16;

    // Dense tables keep whole groups of four cells through three doublings of the width.
    private const int Alignment = 32;
    private const int LargestDense = 1 << 16;

    private readonly AlignedRoom _records = new();

    private MomentCells(int exponent)
    {
        Exponent = exponent;
        Width = Math.ScaleB(1, exponent);
        Inverse = Math.ScaleB(1, -exponent);
    }

    public int Exponent { get; }

    public double Width { get; }

    public double Inverse { get; }

    /// <summary>Number of the first cell of a dense table.</summary>
    public double First { get; private set; }

    /// <summary>Number of records.</summary>
    public int Count { get; private set; }

    /// <summary>Numbers of the occupied cells of a sparse table, rising, as doubles; null for a dense one.</summary>
    public double[]? Numbers { get; private set; }

    public double* Records => _records.Pointer;

    /// <summary>Whether moments beyond the given ones are zero for want of knowledge: wide cells would then lose digits.</summary>
    public bool IsTruncated { get; private init; }

    /// <summary>The width that serves a bandwidth: h/32 &lt; δ ≤ h/16.</summary>
    public static int ExponentFor(double bandwidth) => Math.ILogB(bandwidth / 16);

    /// <summary>Whether cells of that width can index the values: δ is a normal number and x/δ finite.</summary>
    public static bool CanIndex(double bandwidth, double largest)
    {
        int exponent = ExponentFor(bandwidth);
        return exponent is > -1000 and < 1000 && Math.Abs(largest) <= Math.ScaleB(1, Math.Min(1000, exponent + 900));
    }

    public static MomentCells Of(Sample sample, double bandwidth) => OfWidth(sample, ExponentFor(bandwidth));

    /// <summary>Cells 2^<paramref name="exponent"/> wide, which <see cref="CanIndex"/> has allowed.</summary>
    public static MomentCells OfWidth(Sample sample, int exponent)
    {
        var cells = new MomentCells(exponent);
        double low = Math.Floor(sample.Minimum * cells.Inverse), high = Math.Floor(sample.Maximum * cells.Inverse);
        double span = high - low + 1;
        if (span <= Math.Max(LargestDense, sample.Count / 4) && Math.Abs(low) < 4e15 && Math.Abs(high) < 4e15)
        {
            cells.MakeDense(low, high);
            fixed (double* values = sample.Values, weights = sample.Weights)
            {
                MomentScatter.Add(values, weights, sample.Count, cells.Inverse, cells.First, cells.Count, cells.Records);
            }
        }
        else
        {
            SparseCells.Fill(cells, sample);
        }

        return cells;
    }

    /// <summary>The cells of a condensed sample, whose width serves the bandwidth already; moments that it does not keep are zero. Without cells, single values get cells of h/16.</summary>
    public static MomentCells Of(CondensedSample sample, double bandwidth)
    {
        int exponent = sample.Cells.Length > 0 ? Math.ILogB(sample.CellWidth) : ExponentFor(bandwidth), kept = sample.Moments, all = sample.Cells.Length + sample.Singles.Length;
        var cells = new MomentCells(exponent) { IsTruncated = kept < Moments && sample.Cells.Length > 0 };
        var numbers = new double[all];
        var order = new int[all];
        for (int i = 0; i < all; i++)
        {
            order[i] = i;
            numbers[i] = i < sample.Cells.Length ? sample.Cells[i] : Math.Floor(sample.Singles[i - sample.Cells.Length] * cells.Inverse);
        }

        Array.Sort(numbers, order);
        double low = numbers[0], high = numbers[^1];
        bool dense = high - low + 1 <= LargestDense && Math.Abs(low) < 4e15 && Math.Abs(high) < 4e15;
        double* records;
        if (dense)
        {
            cells.MakeDense(low, high);
            records = cells.Records;
        }
        else
        {
            records = cells.MakeSparse(Distinct(numbers));
        }

        for (int i = 0, at = 0; i < all; i++)
        {
            // Single values may share a cell.
            at += i > 0 && numbers[i] != numbers[i - 1] ? 1 : 0;
            double* record = records + (Moments * (dense ? (int)(numbers[i] - cells.First) : at));
            int from = order[i];
            if (from < sample.Cells.Length)
            {
                Add(sample.Sums.Slice(from * kept, kept), record);
            }
            else
            {
                MomentScatter.AddOne(sample.Singles[from - sample.Cells.Length], sample.SingleWeights[from - sample.Cells.Length], cells.Inverse, record);
            }
        }

        return cells;
    }

    private static void Add(ReadOnlySpan<double> sums, double* record)
    {
        for (int r = 0; r < sums.Length; r++)
        {
            record[r] += sums[r];
        }
    }

    private static double[] Distinct(double[] sorted)
    {
        int count = 0;
        for (int i = 0; i < sorted.Length; i++)
        {
            count += i == 0 || sorted[i] != sorted[i - 1] ? 1 : 0;
        }

        var distinct = new double[count];
        for (int i = 0, d = 0; i < sorted.Length; i++)
        {
            if (i == 0 || sorted[i] != sorted[i - 1])
            {
                distinct[d++] = sorted[i];
            }
        }

        return distinct;
    }

    private void MakeDense(double low, double high)
    {
        First = Math.Floor(low / Alignment) * Alignment;
        Count = (int)(Math.Floor((high - First) / Alignment) + 1) * Alignment;
        new Span<double>(_records.Of((long)Count * Moments), Count * Moments).Clear();
    }

    /// <summary>Room for one empty record a number, and three more at the end, so that four can always be read.</summary>
    public double* MakeSparse(double[] numbers)
    {
        Numbers = numbers;
        Count = numbers.Length;
        double* records = _records.Of((long)(Count + 3) * Moments);
        new Span<double>(records, (Count + 3) * Moments).Clear();
        return records;
    }
}
