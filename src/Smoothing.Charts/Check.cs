using System.Diagnostics.CodeAnalysis;
using System.Runtime.CompilerServices;
using System.Text;

namespace Smoothing.Charts;

/// <summary>The one place where arguments are checked. Every condition is written so that NaN fails it.</summary>
internal static class Check
{
    private const int LongestWords = 200;

    /// <summary>An interpolated message in the invariant culture.</summary>
    public static string Text(FormattableString message) => FormattableString.Invariant(message);

    /// <summary>Not null.</summary>
    public static T Given<T>([NotNull] T? value, [CallerArgumentExpression(nameof(value))] string name = "")
        where T : class
    {
        ArgumentNullException.ThrowIfNull(value, name);
        return value;
    }

    /// <summary>Usable options; the defaults for null.</summary>
    public static FigureOptions Options(FigureOptions? options)
    {
        options ??= new FigureOptions();
        Between(options.Width, 320, 4000, nameof(FigureOptions.Width));
        Between(options.Height, 240, 4000, nameof(FigureOptions.Height));
        if (!(options.Scale >= 0.5 && options.Scale <= 8))
        {
            throw new ArgumentOutOfRangeException(nameof(options), Text($"Scale must lie between 0.5 and 8, but is {options.Scale}: pass 1, or 2 for fine screens."));
        }

        if (!Enum.IsDefined(options.Theme))
        {
            throw new ArgumentOutOfRangeException(nameof(options), Text($"Theme must be one of the themes named, but is {(int)options.Theme}."));
        }

        Given(options.Title, nameof(FigureOptions.Title));
        Given(options.FontFile, nameof(FigureOptions.FontFile));
        return options.FontFile.Length == 0 || File.Exists(options.FontFile)
            ? options with { Title = Words(options.Title) }
            : throw new ArgumentException(Text($"FontFile must name a file, but there is none at {options.FontFile}: pass the path of a .ttf or .otf file."), nameof(options));
    }

    /// <summary>A finite number above zero.</summary>
    public static double Positive(double value, string remedy, [CallerArgumentExpression(nameof(value))] string name = "") =>
        value > 0 && double.IsFinite(value) ? value : throw new ArgumentOutOfRangeException(name, Text($"{name} must be positive and finite, but is {value}: {remedy}."));

    /// <summary>A finite number.</summary>
    public static double Finite(double value, string remedy, [CallerArgumentExpression(nameof(value))] string name = "") =>
        double.IsFinite(value) ? value : throw new ArgumentOutOfRangeException(name, Text($"{name} must be finite, but is {value}: {remedy}."));

    /// <summary>A count of at least 1.</summary>
    public static long Count(long value, [CallerArgumentExpression(nameof(value))] string name = "") =>
        value >= 1 ? value : throw new ArgumentOutOfRangeException(name, Text($"{name} must be at least 1, but is {value}."));

    /// <summary>Words from outside on one line: no control signs, no direction overrides, no lone surrogates, a bounded length.</summary>
    public static string Words(string text)
    {
        var kept = new StringBuilder();
        foreach (Rune rune in text.EnumerateRunes())
        {
            bool turns = rune.Value is (>= 0x202A and <= 0x202E) or (>= 0x2066 and <= 0x2069);
            kept.Append(turns || Rune.IsControl(rune) ? " " : rune.ToString());
            if (kept.Length > LongestWords)
            {
                kept.Append('…');
                break;
            }
        }

        return kept.ToString().Trim();
    }

    private static void Between(int value, int least, int most, string name)
    {
        if (value < least || value > most)
        {
            throw new ArgumentOutOfRangeException(name, Text($"{name} must lie between {least} and {most} pixels, but is {value}."));
        }
    }
}
