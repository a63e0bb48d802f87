using System.Globalization;
using System.Text;
using System.Text.RegularExpressions;
using SkiaSharp;

namespace Smoothing.Charts.Drawing;

/// <summary>Makes a document of the shapes that the canvas wrote: a text alternative, names of its own for its clip paths, and the words as text.</summary>
/// <remarks>
/// Words are not left to the canvas: it places every letter by itself, which falls apart where the viewer has another font. Here a line states its
/// length, and the viewer fits its own font into it.
/// </remarks>
internal static partial class SvgDocument
{
    private const string Families = "'DejaVu Sans', 'Liberation Sans', 'Segoe UI', Helvetica, Arial, sans-serif";

    public static string Finish(string shapes, Figure figure, Layout layout)
    {
        int open = shapes.IndexOf("<svg", StringComparison.Ordinal);
        int begin = shapes.IndexOf('>', open) + 1;
        int end = shapes.LastIndexOf("</svg>", StringComparison.Ordinal);
        string body = shapes[begin..end].Trim();

        // The canvas counts its clip paths through all figures of the process: counted anew, the same figure gives the same text.
        var names = new Dictionary<string, string>(StringComparer.Ordinal);
        body = Names().Replace(body, match => match.Groups["before"].Value + "!" + Numbered(names, match.Groups["name"].Value));

        // Two figures may stand in one page: clip paths of the same name would cut each other's curves.
        string own = Check.Text($"f{Fingerprint(body + figure.Title + figure.Options):x8}-");
        body = body.Replace("=\"!", "=\"" + own, StringComparison.Ordinal).Replace("#!", "#" + own, StringComparison.Ordinal);

        var svg = new StringBuilder();
        svg.Append(CultureInfo.InvariantCulture, $"<svg xmlns=\"http://www.w3.org/2000/svg\" viewBox=\"0 0 {figure.Options.Width} {figure.Options.Height}\" width=\"{figure.Options.Width}\" height=\"{figure.Options.Height}\" role=\"img\" aria-labelledby=\"{own}t {own}d\">");
        svg.Append(CultureInfo.InvariantCulture, $"<title id=\"{own}t\">{Escaped(figure.Title)}</title><desc id=\"{own}d\">{Escaped(figure.Alternative)}</desc>\n{body}\n<g font-family=\"{Families}\">\n");
        foreach (PlacedText text in layout.Words.Where(w => w.Text.Length > 0))
        {
            SKColor color = Palette.Of(text.Tone, figure.Options.Theme);
            svg.Append(CultureInfo.InvariantCulture, $"<text x=\"{text.Box.Left:0.##}\" y=\"{text.Baseline:0.##}\" font-size=\"{text.Size:0.##}\"{(text.Bold ? " font-weight=\"600\"" : "")} fill=\"#{color.Red:x2}{color.Green:x2}{color.Blue:x2}\" textLength=\"{text.Box.Width:0.##}\" lengthAdjust=\"spacingAndGlyphs\" xml:space=\"preserve\">{Escaped(text.Text)}</text>\n");
        }

        return svg.Append("</g>\n</svg>\n").ToString();
    }

    private static string Numbered(Dictionary<string, string> names, string name)
    {
        if (!names.TryGetValue(name, out string? number))
        {
            number = names.Count.ToString(CultureInfo.InvariantCulture);
            names.Add(name, number);
        }

        return number;
    }

    // FNV-1a, 32 bits.
    private static uint Fingerprint(string text)
    {
        uint hash = 2166136261;
        foreach (char c in text)
        {
            hash = (hash ^ c) * 16777619;
        }

        return hash;
    }

    private static string Escaped(string text)
    {
        var escaped = new StringBuilder(text.Length);
        foreach (Rune rune in text.EnumerateRunes())
        {
            escaped.Append(rune.Value switch
            {
                '&' => "&amp;",
                '<' => "&lt;",
                '>' => "&gt;",
                '"' => "&quot;",
                0xFFFE or 0xFFFF => "\uFFFD", // not allowed in XML
                _ => rune.ToString(),
            });
        }

        return escaped.ToString();
    }

    [GeneratedRegex("(?<before>id=\"|url\\(#)(?<name>[^\")]+)")]
    private static partial Regex Names();
}
