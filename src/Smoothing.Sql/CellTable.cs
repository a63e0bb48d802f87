using Smoothing.Samples;

namespace Smoothing.Sql;

/// <summary>The cells of one group while rows come in; the same cell may come more than once.</summary>
internal sealed class CellTable(double cellWidth, int moments, int limits)
{
    private readonly Dictionary<long, double[]> _cells = [];
    private long _fullest;

    public double CellWidth { get; } = cellWidth;

    public int Moments { get; } = moments;

    public int Cells => _cells.Count;

    public long Count { get; private set; }

    public double Weight => _cells.Values.Sum(sums => sums[0]);

    /// <summary>Σwx/Σw from cell centres and first moments.</summary>
    public double Mean => _cells.Sum(cell => ((cell.Key + 0.5) * cell.Value[0]) + cell.Value[1]) / Weight * CellWidth;

    public double SquaredWeights { get; private set; }

    public double Low { get; private set; } = double.PositiveInfinity;

    public double High { get; private set; } = double.NegativeInfinity;

    public double[] Below { get; } = new double[limits];

    public double[] At { get; } = new double[limits];

    public void Add(CellRow row)
    {
        if (row.Sums.Count != Moments)
        {
            throw new ArgumentException(SourceChecks.Text($"a row must hold {Moments} sums, but holds {row.Sums.Count}: run the SQL as ToSql() gives it."), nameof(row));
        }

        if (row.Below.Count != Below.Length || row.At.Count != At.Length)
        {
            throw new ArgumentException(
                SourceChecks.Text($"a row must hold {Below.Length} limits, but holds {row.Below.Count} and {row.At.Count}: run the SQL as ToSql() gives it."), nameof(row));
        }

        Check(row);
        if (!_cells.TryGetValue(row.Cell, out double[]? sums))
        {
            _cells.Add(row.Cell, sums = new double[Moments]);
        }

        for (int j = 0; j < Moments; j++)
        {
            sums[j] += row.Sums[j];
        }

        for (int i = 0; i < Below.Length; i++)
        {
            Below[i] += row.Below[i];
            At[i] += row.At[i];
        }

        Count += row.Count;
        _fullest = row.Low < row.High ? Math.Max(_fullest, row.Count) : _fullest;
        SquaredWeights += row.SquaredWeights;
        Low = Math.Min(Low, row.Low);
        High = Math.Max(High, row.High);
    }

    /// <summary>Adds the cells of another shard.</summary>
    public void Add(CellTable other)
    {
        foreach ((long cell, double[] more) in other._cells)
        {
            if (!_cells.TryGetValue(cell, out double[]? sums))
            {
                _cells.Add(cell, more);
                continue;
            }

            for (int j = 0; j < Moments; j++)
            {
                sums[j] += more[j];
            }
        }

        for (int i = 0; i < Below.Length; i++)
        {
            Below[i] += other.Below[i];
            At[i] += other.At[i];
        }

        Count += other.Count;
        _fullest = Math.Max(_fullest, other._fullest);
        SquaredWeights += other.SquaredWeights;
        Low = Math.Min(Low, other.Low);
        High = Math.Max(High, other.High);
    }

    /// <summary>The largest share of the rows that one row of the answer held, among those with more than one distinct value.</summary>
    public double FullestShare() => (double)_fullest / Count;

    public CondensedSample ToSample(ColumnRange range, bool weighted, WeightMeaning meaning, IReadOnlyList<double> limits)
    {
        (long[] cells, double[] sums) = Sorted();
        return CondensedSample.FromCells(CellWidth, Moments, cells, sums, new CellTotals
        {
            Count = Count,
            SquaredWeight = SquaredWeights,
            Minimum = Low,
            Maximum = High,
            LeftOut = range.Missing + range.NotFinite,
            IsWeighted = weighted,
            WeightMeaning = weighted ? meaning : WeightMeaning.Relative,
            Limits = limits,
            Below = Below,
            At = At,
        });
    }

    /// <summary>Cell numbers, rising, and their sums, one row after the other.</summary>
    public (long[] Cells, double[] Sums) Sorted()
    {
        long[] cells = [.. _cells.Keys];
        Array.Sort(cells);
        var sums = new double[cells.Length * Moments];
        for (int i = 0; i < cells.Length; i++)
        {
            _cells[cells[i]].CopyTo(sums, i * Moments);
        }

        return (cells, sums);
    }

    /// <summary>What cannot be true of a row: it was not made by this query, or not with this cell width.</summary>
    private void Check(CellRow row)
    {
        double weight = row.Sums[0];
        bool inside = row.Low >= row.Cell * CellWidth && row.High < (row.Cell + 1) * CellWidth && row.Low <= row.High;
        if (!inside)
        {
            throw new ArgumentException(
                SourceChecks.Text($"values of cell {row.Cell} must lie in [{row.Cell * CellWidth}, {(row.Cell + 1) * CellWidth}), but go from {row.Low} to {row.High}: pass the query with the cell width that the rows were made with."),
                nameof(row));
        }

        bool possible = row.Count > 0 && weight > 0 && double.IsFinite(weight) && row.SquaredWeights > 0 && double.IsFinite(row.SquaredWeights);
        for (int j = 1; j < Moments; j++)
        {
            // |b| ≤ 1/2, with a little for the rounding of the engine's sums.
            possible &= Math.Abs(row.Sums[j]) <= weight * Math.ScaleB(1 + 1e-9, -j);
        }

        if (!possible)
        {
            throw new ArgumentException(
                SourceChecks.Text($"the sums of cell {row.Cell} must be those of offsets within ±1/2, but are {string.Join(", ", row.Sums.Select(sum => SourceChecks.Text($"{sum}")))} for {row.Count} rows: run the SQL as ToSql() gives it."),
                nameof(row));
        }
    }
}
