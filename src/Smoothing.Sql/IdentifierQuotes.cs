using System.Data.Common;

namespace Smoothing.Sql;

/// <summary>How a database quotes a name.</summary>
/// <remarks>Method: the provider's own prefix and suffix, with the suffix doubled inside; the double quote of the SQL standard where it offers none.</remarks>
public sealed class IdentifierQuotes
{
    private readonly string _prefix;
    private readonly string _suffix;

    private IdentifierQuotes(string prefix, string suffix) => (_prefix, _suffix) = (prefix, suffix);

    /// <summary>Double quotes, as the SQL standard has them.</summary>
    public static IdentifierQuotes Standard { get; } = new("\"", "\"");

    /// <summary>The quotes of a connection's provider.</summary>
    /// <param name="connection">A connection, open or not.</param>
    /// <returns>Its quotes, or <see cref="Standard"/> where the provider names none.</returns>
    /// <exception cref="ArgumentNullException"><paramref name="connection"/> is null.</exception>
    public static IdentifierQuotes Of(DbConnection connection)
    {
        ArgumentNullException.ThrowIfNull(connection);
        try
        {
            using DbCommandBuilder? builder = DbProviderFactories.GetFactory(connection)?.CreateCommandBuilder();
            return builder is { QuotePrefix.Length: > 0, QuoteSuffix.Length: > 0 } ? new IdentifierQuotes(builder.QuotePrefix, builder.QuoteSuffix) : Standard;
        }
        catch (NotSupportedException)
        {
            return Standard;
        }
    }

    /// <summary>A name in quotes.</summary>
    /// <param name="name">The name as the database shows it.</param>
    /// <returns>The quoted name, safe to put into SQL.</returns>
    public string Quote(string name)
    {
        ArgumentNullException.ThrowIfNull(name);
        return _prefix + name.Replace(_suffix, _suffix + _suffix, StringComparison.Ordinal) + _suffix;
    }
}
