using System.Runtime.InteropServices;

namespace Smoothing.Samples;

/// <summary>Occupied cells of a power-of-two lattice with their moments, and single values that the lattice can't index.</summary>
/// <remarks>
/// Method: cell k = ⌊x/δ⌋, offset b = x/δ − k − 1/2, both exact because δ is a power of two and nothing is subtracted before the
/// division; a record holds Σwb^j. Values from 2⁵² δ on, whose neighbours are further apart than a cell, are kept singly, so each distinct value
/// is a cell there too. The number of occupied cells at a width depends on the set of values alone and can't grow when δ does: widening only
/// when the limit is passed therefore ends at the same width in any order. Two cells become one by b' = (b ± 1/2)/2. Dominant error: rounding of the sums,
/// at most about n·1e-16 of a cell's weight, far less in practice.
/// </remarks>
internal sealed class CellStore
{
    /// <summary>Below this exponent 1/δ would leave the range of a double; the finest width, at which every distinct value stands alone.</summary>
    public const int FinestExponent = -1020;

    private readonly Dictionary<long, int> _slots = [];
    private Dictionary<double, double> _singles = [];
    private double[] _sums = [];
    private double _inverse;
    private double _reach;

    public CellStore(int exponent, int moments, int maximum)
    {
        Moments = moments;
        Maximum = maximum;
        SetExponent(exponent);
    }

    public int Exponent { get; private set; }

    public int Moments { get; }

    public int Maximum { get; }

    public int Occupied => _slots.Count + _singles.Count;

    public void Add(double x, double w)
    {
        Put(x, w);
        if (Occupied > Maximum)
        {
            Widen();
        }
    }

    /// <summary>Takes in cells of this width and single values; the limit is looked at once, at the end.</summary>
    public void AddAll(ReadOnlySpan<long> cells, ReadOnlySpan<double> moments, ReadOnlySpan<double> singles, ReadOnlySpan<double> weights)
    {
        for (int i = 0; i < cells.Length; i++)
        {
            Span<double> sums = Slot(cells[i]);
            for (int j = 0; j < sums.Length; j++)
            {
                sums[j] += moments[(i * Moments) + j];
            }
        }

        for (int i = 0; i < singles.Length; i++)
        {
            Put(singles[i], weights[i]);
        }

        if (Occupied > Maximum)
        {
            Widen();
        }
    }

    /// <summary>Makes the cells 2^(exponent − Exponent) times as wide.</summary>
    public void WidenTo(int exponent)
    {
        if (exponent <= Exponent)
        {
            return;
        }

        while (Exponent < exponent && _slots.Count > 0)
        {
            Halve();
        }

        SetExponent(exponent);
        Dictionary<double, double> singles = _singles;
        _singles = [];
        foreach ((double x, double w) in singles.OrderBy(pair => pair.Key))
        {
            Put(x, w);
        }
    }

    public (long[] Cells, double[] Sums, double[] Singles, double[] SingleWeights) Sorted()
    {
        long[] cells = [.. _slots.Keys];
        Array.Sort(cells);
        var sums = new double[cells.Length * Moments];
        for (int i = 0; i < cells.Length; i++)
        {
            _sums.AsSpan(_slots[cells[i]] * Moments, Moments).CopyTo(sums.AsSpan(i * Moments));
        }

        double[] singles = [.. _singles.Keys];
        double[] weights = [.. _singles.Values];
        Array.Sort(singles, weights);
        return (cells, sums, singles, weights);
    }

    private void Put(double x, double w)
    {
        if (!(Math.Abs(x) < _reach))
        {
            CollectionsMarshal.GetValueRefOrAddDefault(_singles, x, out _) += w;
        }
        else
        {
            double u = x * _inverse;
            double k = Math.Floor(u);
            double b = u - k - 0.5;
            Span<double> sums = Slot((long)k);
            double term = w;
            for (int j = 0; j < sums.Length; j++)
            {
                sums[j] += term;
                term *= b;
            }
        }
    }

    private void SetExponent(int exponent)
    {
        Exponent = exponent;
        _inverse = Math.ScaleB(1, -exponent);
        _reach = exponent <= FinestExponent ? 0 : Math.ScaleB(1, exponent + 52);
    }

    /// <summary>To the smallest width at which the limit holds.</summary>
    private void Widen()
    {
        int low = Exponent, high = 1023;
        while (high - low > 1)
        {
            int middle = low + ((high - low) / 2);
            (low, high) = OccupiedAt(middle) <= Maximum ? (low, middle) : (middle, high);
        }

        WidenTo(high);
    }

    private int OccupiedAt(int exponent)
    {
        var cells = new HashSet<long>();
        int shift = exponent - Exponent, alone = 0;
        foreach (long cell in _slots.Keys)
        {
            cells.Add(cell >> Math.Min(shift, 63));
        }

        double reach = Math.ScaleB(1, exponent + 52), inverse = Math.ScaleB(1, -exponent);
        foreach (double x in _singles.Keys)
        {
            if (Math.Abs(x) < reach)
            {
                cells.Add((long)Math.Floor(x * inverse));
            }
            else
            {
                alone++;
            }
        }

        return cells.Count + alone;
    }

    private void Halve()
    {
        (long[] cells, double[] sums, _, _) = Sorted();
        _slots.Clear();
        Exponent++;
        Span<double> shifted = stackalloc double[Moments];
        for (int i = 0; i < cells.Length; i++)
        {
            // An even cell is the left half of its parent, b' = (b − 1/2)/2; an odd one the right half.
            MomentShift.Apply(sums.AsSpan(i * Moments, Moments), (cells[i] & 1) == 0 ? -0.5 : 0.5, shifted);
            Span<double> target = Slot(cells[i] >> 1);
            for (int j = 0; j < Moments; j++)
            {
                target[j] += shifted[j];
            }
        }
    }

    private Span<double> Slot(long cell)
    {
        ref int slot = ref CollectionsMarshal.GetValueRefOrAddDefault(_slots, cell, out bool known);
        if (!known)
        {
            slot = _slots.Count - 1;
            if (_sums.Length < _slots.Count * Moments)
            {
                Array.Resize(ref _sums, Math.Max(_slots.Count, 16) * 2 * Moments);
            }

            _sums.AsSpan(slot * Moments, Moments).Clear();
        }

        return _sums.AsSpan(slot * Moments, Moments);
    }
}
