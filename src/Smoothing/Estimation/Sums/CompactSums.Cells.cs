namespace Smoothing.Estimation;

internal sealed unsafe partial class CompactSums
{
    private const int FewestPoints = 64;    // fewer are answered from sorted blocks, which serve all later calls too
    private const int FewestValues = 4096;  // sorting so few is quicker than setting up cells
    private const int ValuesPerPoint = 8;   // with more points than n/8 the cells outgrow the caches

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
}
