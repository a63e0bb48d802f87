using System.Globalization;
using System.Text;

namespace Smoothing.Sql;

/// <summary>The SQL of the second pass: the moments of the values in each cell of a lattice, by one GROUP BY.</summary>
/// <remarks>
/// <para>With δ the cell width, a power of two, a value x lies in cell k = ⌊x/δ⌋ at offset b = x/δ − k − 1/2. Nothing is subtracted before
/// the division and the division by a power of two is exact, so every engine, and this library in process, puts a value into the same cell with the same
/// offset. A row of the answer holds k and Σw, Σwb, Σwb², … of its cell.</para>
/// <para>The text filters on the value and never on the cell number, which planners cannot estimate. It runs unchanged on DuckDB, PostgreSQL and SQLite.
/// The same cell may come back more than once (from several partitions or runs): such rows add up.</para>
/// </remarks>
public sealed class CellQuery
{
    private readonly ColumnSource _source;
    private readonly double _cellWidth;
    private readonly int _moments;
    private readonly double[] _limits;

    /// <summary>The second pass over a source.</summary>
    /// <param name="source">Table or query, columns, filter.</param>
    /// <param name="cellWidth">δ, a power of two in the unit of the data, such as 0.25.</param>
    /// <param name="moments">How many sums a cell gets, 2 to 16; 8 gives the exact curve to about 1e-14 for usual bandwidths, 2 is linear binning.</param>
    /// <param name="limits">Finite limits at which values below and at are counted exactly; null for none.</param>
    /// <exception cref="ArgumentException">The source is unusable, the width no power of two, or a limit not finite.</exception>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="moments"/> is outside 2 to 16.</exception>
    public CellQuery(ColumnSource source, double cellWidth, int moments = 8, IReadOnlyList<double>? limits = null)
    {
        SourceChecks.Check(source);
        if (!(cellWidth > 0 && double.IsFinite(cellWidth) && double.IsNormal(cellWidth) && Math.ScaleB(1, Math.ILogB(cellWidth)) == cellWidth && double.IsFinite(1 / cellWidth)))
        {
            throw new ArgumentException(SourceChecks.Text($"cellWidth must be a power of two such as 0.25, but is {cellWidth}: round it down to one."), nameof(cellWidth));
        }

        if (moments is < 2 or > 16)
        {
            throw new ArgumentOutOfRangeException(nameof(moments), SourceChecks.Text($"moments must lie between 2 and 16, but is {moments}: 8 gives the exact curve, 2 linear binning."));
        }

        _source = source;
        _cellWidth = cellWidth;
        _moments = moments;
        _limits = limits is null ? [] : [.. limits];
        for (int i = 0; i < _limits.Length; i++)
        {
            if (!double.IsFinite(_limits[i]))
            {
                throw new ArgumentException(SourceChecks.Text($"limits[{i}] must be finite, but is {_limits[i]}: leave it out."), nameof(limits));
            }
        }
    }

    /// <summary>Number of columns to group by that come first in a row: those of the groups, then those of the split.</summary>
    internal int KeyCount => _source.Groups.Count + _source.SplitBy.Count;

    internal int GroupCount => _source.Groups.Count;

    internal ColumnSource Source => _source;

    internal double CellWidth => _cellWidth;

    internal int Moments => _moments;

    internal double[] Limits => _limits;

    /// <summary>The SQL text.</summary>
    /// <param name="quotes">How names are quoted; null for the double quotes of the standard.</param>
    /// <returns>
    /// One SELECT without a closing semicolon. Columns, in this order: groups and splits g0, g1, …; k; n (rows); m0, m1, … (moments);
    /// w2 (Σw²); low, high (of the values in the cell); below0, at0, below1, … (weight below and at each limit).
    /// </returns>
    public string ToSql(IdentifierQuotes? quotes = null)
    {
        quotes ??= IdentifierQuotes.Standard;
        bool weighted = _source.Weight is not null;
        string keys = SqlText.Keys(KeyCount);
        string w = weighted ? "w" : "1";
        string positive = weighted ? " and w > 0 and w <= " + SqlText.Number(double.MaxValue) : "";
        var text = new StringBuilder();
        text.Append(CultureInfo.InvariantCulture, $"select {keys}k, count(*) as n,\n  ");
        for (int j = 0; j < _moments; j++)
        {
            text.Append(CultureInfo.InvariantCulture, $"sum({Power(j, weighted)}) as m{j}, ");
        }

        text.Append(weighted ? "sum(w * w) as w2" : "count(*) as w2");
        text.Append(", min(x) as low, max(x) as high");
        for (int i = 0; i < _limits.Length; i++)
        {
            string limit = SqlText.Number(_limits[i]);
            text.Append(CultureInfo.InvariantCulture, $",\n  sum(case when x < {limit} then {w} else 0 end) as below{i}, sum(case when x = {limit} then {w} else 0 end) as at{i}");
        }

        text.Append(CultureInfo.InvariantCulture, $"""

            from (select {keys}x, {(weighted ? "w, " : "")}k, b, b * b as b2
              from (select {keys}x, {(weighted ? "w, " : "")}floor(u) as k, u - floor(u) - {SqlText.Number(0.5)} as b
                from (select {keys}x, {(weighted ? "w, " : "")}x * {SqlText.Number(1 / _cellWidth)} as u
                  from (select {SqlText.KeyColumns(_source, quotes)}cast(t.{quotes.Quote(_source.Value)} as double precision) as x{(weighted ? $", cast(t.{quotes.Quote(_source.Weight!)} as double precision) as w" : "")}
                    {SqlText.From(_source, quotes)}
                  ) t0
                  where {SqlText.Finite("x")}{positive}
                ) t1
              ) t2
            ) t3
            group by {keys}k
            """);
        return text.ToString().Replace("\r\n", "\n", StringComparison.Ordinal);
    }

    /// <summary>b to a power, as products of b and b².</summary>
    private static string Power(int power, bool weighted)
    {
        IEnumerable<string> factors = Enumerable.Repeat("b2", power / 2).Concat(Enumerable.Repeat("b", power % 2));
        string product = string.Join(" * ", weighted ? factors.Prepend("w") : factors);
        return product.Length == 0 ? "1" : product;
    }
}
