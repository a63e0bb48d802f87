using SkiaSharp;

namespace Smoothing.Charts.Drawing;

/// <summary>Finds the font that a figure is written with. A picture without words would mislead, so no font is an error and never an empty place.</summary>
internal sealed class FontSource : IDisposable
{
    /// <summary>Said where no font can be found.</summary>
    public const string NoFont =
        "No font that can write digits and letters was found on this machine, so the figure would have no words: install one (most systems offer a package of the DejaVu or Liberation fonts), "
        + "or pass the path of a .ttf or .otf file in FigureOptions.FontFile.";

    // Plain sans-serif families that hold the letters and signs used here, common ones first.
    private static readonly string[] s_wanted = ["DejaVu Sans", "Liberation Sans", "Noto Sans", "Open Sans", "Segoe UI", "Helvetica Neue", "Arial", "Helvetica", "Verdana"];

    private readonly bool _own;

    private FontSource(SKTypeface regular, SKTypeface bold, bool own) => (Regular, Bold, _own) = (regular, bold, own);

    public SKTypeface Regular { get; }

    /// <summary>The bold cut; <see cref="Regular"/> again where there is none.</summary>
    public SKTypeface Bold { get; }

    /// <summary>The font in a file, or, without one, the best of the machine.</summary>
    public static FontSource Find(string file)
    {
        if (file.Length == 0)
        {
            SKFontManager machine = SKFontManager.Default;
            return Choose(machine.FontFamilies, (family, style) => machine.MatchFamily(family, style));
        }

        SKTypeface given = SKTypeface.FromFile(file)
            ?? throw new ArgumentException(Check.Text($"FontFile must name a TrueType or OpenType font, but {Path.GetFileName(file)} cannot be read as one: pass a .ttf or .otf file."), nameof(file));
        return Writes(given) ? new FontSource(given, given, own: true)
            : throw new ArgumentException(Check.Text($"FontFile must name a font with digits and Latin letters, but {Path.GetFileName(file)} has none: pass another."), nameof(file));
    }

    /// <summary>The first wanted family among those offered, else the first offered that can write.</summary>
    public static FontSource Choose(IEnumerable<string> offered, Func<string, SKFontStyle, SKTypeface?> open)
    {
        string[] families = [.. offered.Distinct(StringComparer.Ordinal).Order(StringComparer.Ordinal)];
        foreach (string family in s_wanted.Where(w => families.Contains(w, StringComparer.OrdinalIgnoreCase)).Concat(families))
        {
            if (open(family, SKFontStyle.Normal) is { } regular && Writes(regular))
            {
                return new FontSource(regular, open(family, SKFontStyle.Bold) ?? regular, own: false);
            }
        }

        throw new InvalidOperationException(NoFont);
    }

    public void Dispose()
    {
        // Fonts of the machine are shared by the font manager; only a file's own is let go.
        if (_own)
        {
            Regular.Dispose();
        }
    }

    private static bool Writes(SKTypeface typeface) => "0123456789AaZz%".All(c => typeface.GetGlyph(c) != 0);
}
