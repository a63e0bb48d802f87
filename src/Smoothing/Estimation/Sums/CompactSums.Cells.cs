using System.Buffers;
using Smoothing.Numerics;

namespace Smoothing.Estimation;

internal sealed unsafe partial class CompactSums
{
    private const int FewestPoints = 64;    // fewer are answered from sorted blocks, which serve all later calls too
    private const int FewestValues = 4096;  // sorting so few is quicker than setting up cells
    private const int ValuesPerPoint = 32;  // with more points than n/32 the cells outgrow the caches and sorting is quicker
    private const int FewestToSort = 1024;  // so many points in random order pay for being sorted: searches then find their way from the last place

    private CompactCells? _cells;

    /// <summary>Whether a call goes through <see cref="CompactCells"/>: many points, not too many for the values, and nothing sorted yet.</summary>
    internal bool UsesCells(ReadOnlySpan<double> x)
    {
        if (_blocks.IsValueCreated || sample.IsSorted || x.Length < FewestPoints || sample.Count < FewestValues || x.Length > sample.Count / ValuesPerPoint)
        {
            return false;
        }

        foreach (double at in x)
        {
            if (!(Math.Abs(at) < Largest))
            {
                return false;
            }
        }

        return true;
    }

    // One set of tables is kept between calls; calls at the same time on other threads make their own.
    private void CellValues(ReadOnlySpan<double> x, double* polynomial, int degree, double factor, Span<double> destination)
    {
        CompactCells cells = Interlocked.Exchange(ref _cells, null) ?? new CompactCells();
        cells.Evaluate(sample.Values, sample.Weights, x, bandwidth, polynomial, degree, factor, destination);
        Volatile.Write(ref _cells, cells);
    }

    private static bool IsAscending(ReadOnlySpan<double> x)
    {
        for (int j = 1; j < x.Length; j++)
        {
            if (!(x[j - 1] <= x[j]))
            {
                return false;
            }
        }

        return true;
    }

    private void SortedValues(ReadOnlySpan<double> x, double* polynomial, int degree, double factor, Span<double> destination)
    {
        int count = x.Length;
        double[] points = ArrayPool<double>.Shared.Rent(2 * count);
        int[] order = ArrayPool<int>.Shared.Rent(count);
        Span<double> sorted = points.AsSpan(0, count);
        Span<double> results = points.AsSpan(count, count);
        x.CopyTo(sorted);
        for (int j = 0; j < count; j++)
        {
            order[j] = j;
        }

        RadixSort.Sort(sorted, order.AsSpan(0, count));
        Values(sorted, polynomial, degree, factor, results);
        for (int j = 0; j < count; j++)
        {
            destination[order[j]] = results[j];
        }

        ArrayPool<double>.Shared.Return(points);
        ArrayPool<int>.Shared.Return(order);
    }
}
