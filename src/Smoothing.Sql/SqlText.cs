using System.Globalization;
using System.Text;

namespace Smoothing.Sql;

/// <summary>The pieces that both queries are made of.</summary>
internal static class SqlText
{
    /// <summary>The largest double: what lies within ± of it is a number; NaN, the infinities, NULL and text are not.</summary>
    private const double Largest = double.MaxValue;

    /// <summary>A constant with all its digits, as a double precision number on every engine.</summary>
    public static string Number(double value) => "cast(" + value.ToString("E16", CultureInfo.InvariantCulture) + " as double precision)";

    public static string Finite(string x) => $"{x} >= {Number(-Largest)} and {x} <= {Number(Largest)}";

    /// <summary>"t.g as g0, …, " for the columns to group by, renamed so that no name can clash.</summary>
    public static string KeyColumns(ColumnSource source, IdentifierQuotes quotes)
    {
        var text = new StringBuilder();
        int index = 0;
        foreach (string name in source.Groups.Concat(source.SplitBy))
        {
            text.Append(CultureInfo.InvariantCulture, $"t.{quotes.Quote(name)} as g{index++}, ");
        }

        return text.ToString();
    }

    /// <summary>"g0, g1, " or nothing.</summary>
    public static string Keys(int count, string tail = ", ") => count == 0 ? "" : string.Join(", ", Enumerable.Range(0, count).Select(i => Invariant($"g{i}"))) + tail;

    public static string From(ColumnSource source, IdentifierQuotes quotes)
    {
        string rows = source.Table is null ? "(\n" + source.Query + "\n)" : (source.Schema is null ? "" : quotes.Quote(source.Schema) + ".") + quotes.Quote(source.Table);

        // The filter ends with a line break, so that a comment at its end cannot swallow the bracket.
        return $"from {rows} t" + (string.IsNullOrWhiteSpace(source.Filter) ? "" : $"\n  where ({source.Filter}\n  )");
    }

    public static string Invariant(FormattableString text) => text.ToString(CultureInfo.InvariantCulture);
}
