using System.Globalization;

namespace Smoothing.Sql;

/// <summary>The checks on a source, and words shared by the messages.</summary>
internal static class SourceChecks
{
    public static string Text(FormattableString message) => message.ToString(CultureInfo.InvariantCulture);

    public static void Check(ColumnSource source)
    {
        ArgumentNullException.ThrowIfNull(source);
        if (string.IsNullOrWhiteSpace(source.Table) == string.IsNullOrWhiteSpace(source.Query))
        {
            throw new ArgumentException(
                Text($"source must name either a Table or a Query, but Table is '{source.Table}' and Query is '{source.Query}': set one of them."), nameof(source));
        }

        if (source.Schema is not null && source.Table is null)
        {
            throw new ArgumentException(Text($"Schema is '{source.Schema}' without a Table: name the table, or write the schema into the Query."), nameof(source));
        }

        Name(source.Value, "Value");
        foreach ((string? name, string what) in new[] { (source.Table, "Table"), (source.Schema, "Schema"), (source.Weight, "Weight") })
        {
            if (name is not null)
            {
                Name(name, what);
            }
        }

        for (int i = 0; i < source.Groups.Count; i++)
        {
            Name(source.Groups[i], Text($"Groups[{i}]"));
        }

        for (int i = 0; i < source.SplitBy.Count; i++)
        {
            Name(source.SplitBy[i], Text($"SplitBy[{i}]"));
        }
    }

    /// <summary>What the messages call the source.</summary>
    public static string Describe(ColumnSource source) => source.Table is null ? "the query" : source.Schema is null ? $"table '{source.Table}'" : $"table '{source.Schema}.{source.Table}'";

    private static void Name(string name, string what)
    {
        if (string.IsNullOrEmpty(name) || name.Contains('\0', StringComparison.Ordinal))
        {
            throw new ArgumentException(Text($"{what} must be a name without NUL characters, but is '{name.Replace("\0", "\\0", StringComparison.Ordinal)}': pass the name as the database shows it."), what);
        }
    }
}
