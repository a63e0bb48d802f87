namespace Smoothing.Sql;

/// <summary>The cell width of a table.</summary>
/// <remarks>
/// Method: the smallest power of two that divides the range into at most a quarter of the cells allowed. Heavy tails make that too wide for the bulk: as long as a
/// cell with more than one distinct value holds over 1/512 of the rows, the width is halved up to four times and the cells are asked for again; where more
/// cells come back than allowed, the wider ones stay. In process the width follows the occupied cells from the start; merging brings both to the wider one.
/// </remarks>
internal static class Widths
{
    /// <summary>Rounds of narrower cells, each a scan: 4 · 8 halvings, beyond which hardly a column needs more.</summary>
    public const int MostRounds = 8;

    private const double FullestShare = 1 / 512.0;

    /// <summary>δ ≤ h/16 gives a Gaussian curve from eight moments to about 1e-14; linear binning is taken from h/4 on.</summary>
    private static double Fraction(int moments) => moments < 4 ? 1 / 4.0 : 1 / 16.0;

    public static double Choose(IReadOnlyCollection<ColumnRange> ranges, TableOptions options)
    {
        double widest = options.Bandwidth is double h ? PowerOfTwo(h * Fraction(options.Moments)) : double.PositiveInfinity;
        if (options.CellWidth is double asked)
        {
            double width = PowerOfTwo(asked);
            return width <= widest ? width
                : throw new ArgumentException(
                    SourceChecks.Text($"CellWidth must be at most {widest} for a bandwidth of {options.Bandwidth} with {options.Moments} moments, but is {asked}: pass {widest} or less, or leave it out."),
                    nameof(options));
        }

        if (double.IsFinite(widest))
        {
            return widest;
        }

        ColumnRange all = ranges.Aggregate(new ColumnRange(), (sum, range) => sum.Add(range));
        double magnitude = Math.Max(Math.Abs(all.Low), Math.Abs(all.High));

        // 2^50 cells on either side of 0 at most, so that numbers of cells are exact; −1000 keeps 1/δ in range.
        int exponent = magnitude > 0 ? Math.Max(Math.ILogB(magnitude) - 49, -1000) : -1000;
        double target = Math.Max(1, options.MaximumCells / 4);
        while (((all.High / target) - (all.Low / target)) > Math.ScaleB(1, exponent))
        {
            exponent++;
        }

        return Math.ScaleB(1, exponent);
    }

    /// <summary>A narrower width where one cell holds too much, else null.</summary>
    public static double? Narrower(double width, IReadOnlyCollection<CellTable> tables, TableOptions options, IReadOnlyCollection<ColumnRange> ranges)
    {
        double fullest = tables.Max(table => table.FullestShare());
        double magnitude = ranges.Max(range => double.IsNaN(range.Low) ? 0 : Math.Max(Math.Abs(range.Low), Math.Abs(range.High)));
        if (options.CellWidth is not null || options.Bandwidth is not null || !(fullest > FullestShare))
        {
            return null;
        }

        int halvings = Math.Min(4, (int)Math.Ceiling(Math.Log2(fullest / FullestShare)));
        double narrower = Math.ScaleB(width, -halvings);
        return magnitude / narrower < Math.ScaleB(1, 50) && narrower >= Math.ScaleB(1, -1000) ? narrower : null;
    }

    private static double PowerOfTwo(double width) => Math.ScaleB(1, Math.Max(Math.ILogB(width), -1000));
}
