namespace Smoothing.Charts.Drawing;

/// <summary>Measures the words of a sheet and gives everything its place: the legend stands above the panels, never over a curve.</summary>
internal static class LayoutMaker
{
    // Below these sizes text shrinks with the sheet, to not less than 0.72.
    private const float FullWidth = 560;
    private const float FullHeight = 360;
    private const float LeastShrink = 0.72f;
    private const float Text = 14;
    private const float LeastData = 60;

    public static Layout Of(Sheet sheet, float width, float height, TextInk ink)
    {
        float shrink = Math.Clamp(Math.Min(width / FullWidth, height / FullHeight), LeastShrink, 1);
        float size = Text * shrink;
        float line = 1.35f * size;
        float margin = 12 * shrink;
        var texts = new List<PlacedText>();
        var swatches = new List<(Box, Key)>();
        float y = margin;
        foreach (string title in ink.Wrap(sheet.Title, 1.2f * size, width - (2 * margin), 2, bold: true))
        {
            texts.Add(Line(ink, title, margin, y, 1.2f * size, Tone.Ink, bold: true));
            y += 1.2f * line;
        }

        y = Legend(sheet.Keys, ink, margin, y + (0.2f * line), width - margin, size, texts, swatches);
        string[] notes = [.. sheet.Notes.SelectMany(note => ink.Wrap(note, 0.93f * size, width - (2 * margin), 3))];

        // The data areas keep a third of the sheet, and each a height of its own; notes that find no room are left out from the end.
        float needed = PanelLayout.Extras(sheet.Panels, size) + Math.Max(LeastData * sheet.Panels.Count, height / 3);
        int kept = Math.Clamp((int)((height - y - margin - needed - (0.4f * line)) / line), 0, notes.Length);
        float foot = height - margin - (kept * line);
        for (int i = 0; i < kept; i++)
        {
            texts.Add(Line(ink, notes[i], margin, foot + (i * line), 0.93f * size, Tone.Quiet));
        }

        PlacedPanel[] panels = PanelLayout.Of(sheet.Panels, new Box(margin, y, width - margin, foot - (kept > 0 ? 0.4f * line : 0)), size, ink, texts);
        return new Layout { Sheet = new Box(0, 0, width, height), TextSize = size, Texts = texts, Swatches = swatches, Panels = panels };
    }

    /// <summary>One line of text with its top left corner given, or its top right one.</summary>
    public static PlacedText Line(TextInk ink, string text, float x, float top, float size, Tone tone, bool bold = false, float anchor = 0)
    {
        float width = ink.Width(text, size, bold);
        float left = x - (anchor * width);
        return new PlacedText(text, new Box(left, top, left + width, top + (1.25f * size)), top + size, size, tone, bold);
    }

    private static float Legend(IReadOnlyList<Key> keys, TextInk ink, float left, float top, float right, float size, List<PlacedText> texts, List<(Box, Key)> swatches)
    {
        float swatch = 2 * size;
        float x = left;
        float y = top;
        foreach (Key key in keys)
        {
            string words = ink.Fit(key.Words, size, right - left - (1.4f * swatch));
            float width = (1.3f * swatch) + ink.Width(words, size);
            if (x > left && x + width > right)
            {
                (x, y) = (left, y + (1.35f * size));
            }

            swatches.Add((new Box(x, y, x + swatch, y + (1.25f * size)), key));
            texts.Add(Line(ink, words, x + (1.3f * swatch), y, size, Tone.Ink));
            x += width + (1.5f * size);
        }

        return keys.Count > 0 ? y + (1.5f * size) : y;
    }
}
