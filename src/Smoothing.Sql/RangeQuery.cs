using System.Globalization;
using Smoothing.Samples;

namespace Smoothing.Sql;

/// <summary>The SQL of the first pass: how many rows there are, what can be used of them, and where they lie.</summary>
/// <remarks>Portable: the same text runs on DuckDB, PostgreSQL and SQLite. One row comes back for each group and split.</remarks>
public sealed class RangeQuery
{
    private readonly ColumnSource _source;

    /// <summary>The first pass over a source.</summary>
    /// <param name="source">Table or query, columns, filter.</param>
    /// <exception cref="ArgumentException">The source names no column, both or neither of table and query, or a name with a NUL character.</exception>
    public RangeQuery(ColumnSource source)
    {
        SourceChecks.Check(source);
        _source = source;
    }

    /// <summary>The SQL text.</summary>
    /// <param name="quotes">How names are quoted; null for the double quotes of the standard.</param>
    /// <returns>One SELECT without a closing semicolon. Columns: groups and splits g0, g1, …; rows_read, missing, not_finite, kept, bad_weights, weightless, low, high, weight, first.</returns>
    public string ToSql(IdentifierQuotes? quotes = null) => ToSql(quotes, null);

    internal string ToSql(IdentifierQuotes? quotes, string? textTest)
    {
        quotes ??= IdentifierQuotes.Standard;
        string x = "t." + quotes.Quote(_source.Value);
        string? weight = _source.Weight is null ? null : "t." + quotes.Quote(_source.Weight);
        int count = _source.Groups.Count + _source.SplitBy.Count;
        string keys = SqlText.Keys(count);
        string text = textTest is null ? "0" : string.Format(CultureInfo.InvariantCulture, textTest, x);
        string textWeight = textTest is null || weight is null ? "0" : string.Format(CultureInfo.InvariantCulture, textTest, weight);
        bool counts = _source.WeightMeaning == WeightMeaning.Counts;
        string good = "w >= 0 and " + SqlText.Finite("w") + (counts ? " and floor(w) = w" : "");
        string w = weight is null ? "1" : "w";
        return $"""
            select {keys}count(*) as rows_read,
              sum(case when x is null then 1 else 0 end) as missing,
              sum(case when x is null or ok = 1 then 0 else 1 end) as not_finite,
              sum(ok) as kept,
              {(weight is null ? "0" : $"sum(case when ok = 0 or ({good}) then 0 else 1 end)")} as bad_weights,
              {(weight is null ? "0" : "sum(case when ok = 1 and w = 0 then 1 else 0 end)")} as weightless,
              min(case when ok = 1 and {w} > 0 then x end) as low,
              max(case when ok = 1 and {w} > 0 then x end) as high,
              sum(case when ok = 1 then {w} else 0 end) as weight,
              sum(case when ok = 1 then x * {w} else 0 end) as first,
              sum(is_text) as texts, sum(is_text_weight) as text_weights
            from (select {keys}x, {(weight is null ? "" : "w, ")}is_text, is_text_weight,
              case when {SqlText.Finite("x")} then 1 else 0 end as ok
              from (select {SqlText.KeyColumns(_source, quotes)}cast({x} as double precision) as x, {(weight is null ? "" : $"cast({weight} as double precision) as w, ")}
                {text} as is_text, {textWeight} as is_text_weight
                {SqlText.From(_source, quotes)}
              ) t0
            ) t1{(keys.Length > 0 ? "\ngroup by " + SqlText.Keys(count, "") : "")}
            """;
    }
}
