using System.Text;

namespace Smoothing;

/// <summary>How wide a text is in the 13-unit font of the pictures, on the wide side so that nothing is cut with another font.</summary>
internal static class SvgText
{
    /// <summary>Width of a digit, and of a letter of middle width.</summary>
    public const double Character = 8.3;

    // Bold is an eighth wider.
    private const double Bold = 1.13;

    public static double Width(string text, bool bold = false)
    {
        double sum = 0;
        foreach (Rune rune in text.EnumerateRunes())
        {
            sum += Width(rune);
        }

        return bold ? sum * Bold : sum;
    }

    /// <summary>The text, or as much of its beginning as fits with an ellipsis behind it.</summary>
    public static string Fit(string text, double width, bool bold = false)
    {
        if (Width(text, bold) <= width)
        {
            return text;
        }

        double left = (bold ? width / Bold : width) - 13;
        var kept = new StringBuilder();
        foreach (Rune rune in text.EnumerateRunes())
        {
            left -= Width(rune);
            if (left < 0)
            {
                break;
            }

            kept.Append(rune.ToString());
        }

        return kept.Append('…').ToString();
    }

    // Measured on a common sans-serif face of 13 units; from U+1100 on signs fill a square.
    private static double Width(Rune rune) => rune.Value switch
    {
        >= 0x1100 and < 0x2000 or >= 0x2E80 => 13.5,
        'm' or 'w' or 'M' or 'W' or '@' or '%' => 12.9,
        >= 'A' and <= 'Z' or >= 0xC0 and <= 0xDE => 9.5,
        'i' or 'j' or 'l' or 't' or 'f' or 'r' or 'I' or '.' or ',' or ':' or ';' or '\'' or '!' or '|' or '(' or ')' or '/' or ' ' or '-' => 5.4,
        0x200E or 0x200F => 0,
        _ => Character,
    };
}
