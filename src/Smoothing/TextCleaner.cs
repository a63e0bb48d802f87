using System.Text;

namespace Smoothing;

/// <summary>Makes names and units from outside safe to print: no control characters, no direction overrides, no lone surrogates, a bounded length.</summary>
internal static class TextCleaner
{
    /// <summary>Longest name or unit shown in a report, in UTF-16 units.</summary>
    public const int Longest = 200;

    // After a word written right to left the mark keeps the numbers behind it in their place.
    private const char LeftToRightMark = '\u200E';

    public static string Visible(string text)
    {
        var kept = new StringBuilder(Math.Min(text.Length, 1024));
        foreach (Rune rune in text.EnumerateRunes())
        {
            // U+202A–202E and U+2066–2069 reorder the text around them; a report must not be turned by a column name.
            bool turns = rune.Value is (>= 0x202A and <= 0x202E) or (>= 0x2066 and <= 0x2069);
            if (turns || Rune.IsControl(rune))
            {
                kept.Append(' ');
            }
            else
            {
                kept.Append(rune.ToString());
            }
        }

        return kept.ToString();
    }

    /// <summary>A name or unit cut to <see cref="Longest"/>, on one line.</summary>
    public static string Name(string text)
    {
        string visible = Visible(text).Trim();
        visible = visible.Length <= Longest ? visible : visible[..(char.IsHighSurrogate(visible[Longest - 2]) ? Longest - 2 : Longest - 1)] + "…";
        return visible.Any(IsRightToLeft) ? visible + LeftToRightMark : visible;
    }

    // Hebrew, Arabic and their neighbours, with the presentation forms.
    private static bool IsRightToLeft(char c) => c is (>= '\u0590' and <= '\u08FF') or (>= '\uFB1D' and <= '\uFDFF') or (>= '\uFE70' and <= '\uFEFC');
}
