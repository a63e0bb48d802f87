using Smoothing.Numerics;

namespace Smoothing.Samples;

/// <content>Cells computed elsewhere.</content>
public sealed partial class CondensedSample
{
    /// <summary>A condensed sample from cells that were computed elsewhere, in a database for instance.</summary>
    /// <param name="cellWidth">δ, a power of two, in the unit of the data.</param>
    /// <param name="moments">Number of sums a cell has, 2 to 16.</param>
    /// <param name="cells">Cell numbers k = ⌊x/δ⌋ in any order; repeated ones add up.</param>
    /// <param name="sums">Σw, Σwb, Σwb², … of each cell, one cell after the other, b = x/δ − k − 1/2.</param>
    /// <param name="totals">Count, Σw², range, limits; null where they follow from the cells.</param>
    /// <returns>The sample, with the given width whatever the number of cells.</returns>
    /// <exception cref="ArgumentException">The width is no power of two, lengths don't match, or sums can't be those of offsets within ±1/2.</exception>
    public static CondensedSample FromCells(double cellWidth, int moments, ReadOnlySpan<long> cells, ReadOnlySpan<double> sums, CellTotals? totals = null)
    {
        totals ??= new CellTotals();
        Guard.Positive(cellWidth, "pass a power of two such as 0.25");
        Guard.InRange(moments, 2, 16);
        int exponent = Math.ILogB(cellWidth);
        if (Math.ScaleB(1, exponent) != cellWidth || exponent <= CellStore.FinestExponent)
        {
            throw new ArgumentException(Guard.Text($"cellWidth must be a power of two above 2^{CellStore.FinestExponent}, but is {cellWidth}: pass one such as 0.25."), nameof(cellWidth));
        }

        if (cells.IsEmpty || sums.Length != (long)cells.Length * moments)
        {
            throw new ArgumentException(Guard.Text($"sums must hold {moments} numbers for each of at least one cell, but there are {cells.Length} cells and {sums.Length} sums."), nameof(sums));
        }

        CheckCells(cells, sums, moments);
        CondensingChecks.Limits(totals.Limits);
        if (totals.Below.Count != totals.Limits.Count || totals.At.Count != totals.Limits.Count)
        {
            throw new ArgumentException(
                Guard.Text($"Below and At must have one entry per limit: there are {totals.Limits.Count} limits, {totals.Below.Count} and {totals.At.Count} entries."), nameof(totals));
        }

        var store = new CellStore(exponent, moments, int.MaxValue);
        store.AddAll(cells, sums, [], []);
        (long[] sorted, double[] added, _, _) = store.Sorted();
        CompensatedSum weight = default;
        for (int i = 0; i < sorted.Length; i++)
        {
            weight.Add(added[i * moments]);
        }

        return new CondensedSample
        {
            Exponent = exponent,
            Moments = moments,
            MaximumCells = int.MaxValue,
            CellArray = sorted,
            SumArray = added,
            Count = Whole(totals.Count ?? weight.Value),
            LeftOut = totals.LeftOut,
            TotalWeight = weight.Value,
            SquaredWeight = Guard.Positive(totals.SquaredWeight ?? weight.Value, "pass the sum of the squared weights", nameof(CellTotals.SquaredWeight)),
            Minimum = Within(totals.Minimum, sorted[0] * cellWidth, (sorted[0] + 1) * cellWidth, sorted[0] * cellWidth, "Minimum"),
            Maximum = Within(totals.Maximum, sorted[^1] * cellWidth, (sorted[^1] + 1) * cellWidth, (sorted[^1] + 1) * cellWidth, "Maximum"),
            IsWeighted = totals.IsWeighted,
            WeightMeaning = totals.WeightMeaning,
            LimitArray = [.. totals.Limits],
            BelowArray = [.. totals.Below],
            AtArray = [.. totals.At],
        };
    }

    private static long Whole(double count) => count >= 1 && count == Math.Floor(count) && count < 9.2e18
        ? (long)count
        : throw new ArgumentException(Guard.Text($"the number of values must be whole and at least 1, but is {count}: pass Count beside weighted cells."), nameof(count));

    private static double Within(double? value, double low, double high, double otherwise, string name) => value is not double given ? otherwise
        : given >= low && given <= high ? given
        : throw new ArgumentException(Guard.Text($"{name} must lie in its cell, [{low}, {high}], but is {given}: pass cells and range of the same values."), name);

    private static void CheckCells(ReadOnlySpan<long> cells, ReadOnlySpan<double> sums, int moments)
    {
        for (int i = 0; i < cells.Length; i++)
        {
            double weight = sums[i * moments];

            // 2^52: beyond it neighbouring doubles are further apart than a cell.
            bool possible = Math.Abs((double)cells[i]) <= 4503599627370496 && weight > 0 && double.IsFinite(weight);
            for (int j = 1; j < moments; j++)
            {
                // |b| ≤ 1/2, with a little for the rounding of sums computed elsewhere.
                possible &= Math.Abs(sums[(i * moments) + j]) <= weight * Math.ScaleB(1 + 1e-9, -j);
            }

            if (!possible)
            {
                throw new ArgumentException(
                    Guard.Text($"cells[{i}] = {cells[i]} with weight {weight} can't be right: the weight must be above 0, the number within ±2^52, and the sums those of offsets within ±1/2; compute b = x/δ − ⌊x/δ⌋ − 1/2."),
                    nameof(sums));
            }
        }
    }

    private CondensedSample With(CellStore store)
    {
        (long[] cells, double[] sums, double[] singles, double[] weights) = store.Sorted();
        return new CondensedSample
        {
            Exponent = store.Exponent,
            Moments = Moments,
            MaximumCells = MaximumCells,
            CellArray = cells,
            SumArray = sums,
            SingleArray = singles,
            SingleWeightArray = weights,
            Count = Count,
            LeftOut = LeftOut,
            TotalWeight = TotalWeight,
            SquaredWeight = SquaredWeight,
            Minimum = Minimum,
            Maximum = Maximum,
            IsWeighted = IsWeighted,
            WeightMeaning = WeightMeaning,
            LimitArray = LimitArray,
            BelowArray = BelowArray,
            AtArray = AtArray,
        };
    }
}
