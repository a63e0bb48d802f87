using System.Text;
using SkiaSharp;
using SkiaSharp.HarfBuzz;

namespace Smoothing.Charts.Drawing;

/// <summary>Measures and writes text. Signs that the font lacks are taken from another font of the machine; right-to-left runs are shaped.</summary>
internal sealed class TextInk(FontSource source)
{
    private const string Ellipsis = "…";

    /// <summary>Width in pixels.</summary>
    public float Width(string text, float size, bool bold = false)
    {
        float width = 0;
        foreach (Run run in Runs(text, bold))
        {
            using SKFont font = Font(run.Typeface, size, bold);
            width += Advance(run, font);
        }

        return width;
    }

    /// <summary>Writes one line from its left end.</summary>
    public void Write(SKCanvas canvas, string text, float x, float baseline, float size, SKColor color, bool bold = false)
    {
        using var paint = new SKPaint { Color = color, IsAntialias = true };
        float at = x;
        foreach (Run run in Runs(text, bold))
        {
            using SKFont font = Font(run.Typeface, size, bold);
            if (run.RightToLeft)
            {
                using var shaper = new SKShaper(run.Typeface);
                canvas.DrawShapedText(shaper, run.Text, at, baseline, font, paint);
            }
            else
            {
                canvas.DrawText(run.Text, at, baseline, font, paint);
            }

            at += Advance(run, font);
        }
    }

    /// <summary>Breaks at spaces into at most <paramref name="lines"/> lines of the width; what does not fit ends in an ellipsis.</summary>
    public IReadOnlyList<string> Wrap(string text, float size, float width, int lines, bool bold = false)
    {
        var wrapped = new List<string>();
        string rest = text.Trim();
        while (rest.Length > 0)
        {
            if (Width(rest, size, bold) <= width)
            {
                wrapped.Add(rest);
                break;
            }

            if (wrapped.Count == lines - 1)
            {
                wrapped.Add(Fit(rest, size, width, bold));
                break;
            }

            int cut = Longest(rest, size, width, bold);
            int space = rest.LastIndexOf(' ', Math.Min(cut, rest.Length - 1));
            int end = space > 0 ? space : cut;
            wrapped.Add(rest[..end].TrimEnd());
            rest = rest[end..].TrimStart();
        }

        return wrapped;
    }

    /// <summary>The text, or its beginning with an ellipsis where it is too wide.</summary>
    public string Fit(string text, float size, float width, bool bold = false) =>
        Width(text, size, bold) <= width ? text : text[..Longest(text, size, width - Width(Ellipsis, size, bold), bold)].TrimEnd() + Ellipsis;

    // The longest beginning of whole signs that fits, at least one sign.
    private int Longest(string text, float size, float width, bool bold)
    {
        int[] starts = System.Globalization.StringInfo.ParseCombiningCharacters(text);
        int low = 1;
        int high = starts.Length;
        while (high - low > 0)
        {
            int middle = (low + high + 1) / 2;
            int end = middle < starts.Length ? starts[middle] : text.Length;
            (low, high) = Width(text[..end], size, bold) <= width ? (middle, high) : (low, middle - 1);
        }

        return low < starts.Length ? starts[low] : text.Length;
    }

    private static SKFont Font(SKTypeface typeface, float size, bool bold) =>
        new(typeface, size) { Subpixel = true, Edging = SKFontEdging.Antialias, Embolden = bold && typeface.FontWeight < (int)SKFontStyleWeight.SemiBold, Hinting = SKFontHinting.None };

    private static float Advance(Run run, SKFont font)
    {
        if (!run.RightToLeft)
        {
            return font.MeasureText(run.Text);
        }

        using var shaper = new SKShaper(run.Typeface);
        return shaper.Shape(run.Text, font).Width;
    }

    private List<Run> Runs(string text, bool bold)
    {
        SKTypeface own = bold ? source.Bold : source.Regular;
        var runs = new List<Run>();
        var pending = new StringBuilder();
        SKTypeface current = own;
        bool turned = false;
        bool? first = null;
        foreach (Rune rune in text.EnumerateRunes())
        {
            bool strong = Rune.IsLetter(rune);
            bool right = strong ? IsRightToLeft(rune.Value) : turned;
            first ??= strong ? right : null;
            SKTypeface wanted = own.ContainsGlyph(rune.Value) ? own : SKFontManager.Default.MatchCharacter(rune.Value) ?? own;
            if (pending.Length > 0 && (right != turned || wanted.Handle != current.Handle))
            {
                runs.Add(new Run(pending.ToString(), current, turned));
                pending.Clear();
            }

            (current, turned) = (wanted, right);
            pending.Append(rune.ToString());
        }

        if (pending.Length > 0)
        {
            runs.Add(new Run(pending.ToString(), current, turned));
        }

        // A text that begins from the right runs from the right as a whole.
        if (first == true)
        {
            runs.Reverse();
        }

        return runs;
    }

    // Hebrew, Arabic, Syriac, Thaana and their presentation forms.
    private static bool IsRightToLeft(int value) => value is (>= 0x0590 and <= 0x08FF) or (>= 0xFB1D and <= 0xFDFF) or (>= 0xFE70 and <= 0xFEFF);

    private readonly record struct Run(string Text, SKTypeface Typeface, bool RightToLeft);
}
