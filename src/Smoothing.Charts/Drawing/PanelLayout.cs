namespace Smoothing.Charts.Drawing;

/// <summary>Gives the panels of a sheet their data areas, tick labels and inner labels; their left edges stand in one line.</summary>
internal static class PanelLayout
{
    private const float Tick = 6;

    public static PlacedPanel[] Of(IReadOnlyList<Panel> panels, Box room, float size, TextInk ink, List<PlacedText> texts)
    {
        float line = 1.35f * size;
        float labels = panels.Max(p => p.Y.Ticks.Select(t => ink.Width(t.Text, size)).DefaultIfEmpty(0).Max());
        float left = room.Left + Math.Min(labels, 0.42f * room.Width) + Tick + 3;
        float right = room.Right - Math.Min(panels.Max(p => p.Beside.Select(b => ink.Width(b.Text, size) + 8).DefaultIfEmpty(size).Max()), 0.3f * room.Width);
        float height = Math.Max(room.Height - Extras(panels, size), 20 * panels.Count);
        float share = (float)panels.Sum(p => p.Share);
        float y = room.Top;
        var placed = new PlacedPanel[panels.Count];
        for (int i = 0; i < placed.Length; i++)
        {
            Panel panel = panels[i];
            if (panel.YCaption.Length > 0)
            {
                texts.Add(LayoutMaker.Line(ink, ink.Fit(panel.YCaption, size, room.Width), room.Left, y, size, Tone.Quiet));
            }

            float top = y + Above(panel, line);
            float bottom = top + (height * (float)panel.Share / share);
            var data = new Box(left, top, right, bottom);
            Ticks(panel, data, size, ink, room, texts);
            if (panel.XCaption.Length > 0)
            {
                texts.Add(LayoutMaker.Line(ink, ink.Fit(panel.XCaption, size, data.Width), (left + right) / 2, bottom + Tick + 2 + line, size, Tone.Quiet, anchor: 0.5f));
            }

            placed[i] = new PlacedPanel(panel, data, Inner(panel, data, size, ink));
            y = bottom + Below(panel, line);
        }

        return placed;
    }

    /// <summary>Height of everything about the data areas.</summary>
    public static float Extras(IReadOnlyList<Panel> panels, float size) => panels.Sum(p => Above(p, 1.35f * size) + Below(p, 1.35f * size));

    /// <summary>A place of the axes in pixels.</summary>
    public static (float X, float Y) Pixel(Panel panel, Box data, double x, double y) =>
        (data.Left + (float)(Bound(panel.X.Place(x)) * data.Width), data.Bottom - (float)(Bound(panel.Y.Place(y)) * data.Height));

    /// <summary>Places far outside are brought near: they are cut off at the edge all the same, and single precision stays exact.</summary>
    public static double Bound(double place) => Math.Clamp(place, -3, 4);

    private static float Above(Panel panel, float line) => (panel.YCaption.Length > 0 ? 1.4f : 0.4f) * line;

    private static float Below(Panel panel, float line) => Tick + (panel.SharesX ? 0.4f * line : ((panel.XCaption.Length > 0 ? 2.1f : 1.1f) * line) + 3);

    private static void Ticks(Panel panel, Box data, float size, TextInk ink, Box room, List<PlacedText> texts)
    {
        // Every k-th label, k the smallest at which none touches its neighbour.
        (float At, string Text, float Width)[] xs = [.. panel.X.Ticks.Select(t => (Pixel(panel, data, t.At, panel.Y.From).X, t.Text, ink.Width(t.Text, size)))];
        int step = 1;
        while (step < xs.Length && Enumerable.Range(0, ((xs.Length - 1) / step)).Any(i => xs[(i + 1) * step].At - xs[i * step].At < ((xs[i * step].Width + xs[(i + 1) * step].Width) / 2) + (0.6f * size)))
        {
            step++;
        }

        for (int i = 0; i < xs.Length && !panel.SharesX; i += step)
        {
            float left = Math.Clamp(xs[i].At - (xs[i].Width / 2), 0, room.Right - xs[i].Width + 8);
            texts.Add(LayoutMaker.Line(ink, xs[i].Text, left, data.Bottom + Tick + 3, size, Tone.Quiet));
        }

        float last = float.PositiveInfinity;
        foreach ((double at, string text) in panel.Y.Ticks)
        {
            float y = Pixel(panel, data, panel.X.From, at).Y;
            if (last - y >= 1.15f * size)
            {
                texts.Add(LayoutMaker.Line(ink, ink.Fit(text, size, data.Left - room.Left - Tick - 2), data.Left - Tick - 3, y - (0.64f * size), size, Tone.Quiet, anchor: 1));
                last = y;
            }
        }

        foreach ((double at, string text) in panel.Beside)
        {
            float y = Pixel(panel, data, panel.X.From, at).Y;
            texts.Add(LayoutMaker.Line(ink, ink.Fit(text, size, room.Right - data.Right - 8), data.Right + 8, y - (0.64f * size), size, Tone.Ink));
        }
    }

    private static PlacedText[] Inner(Panel panel, Box data, float size, TextInk ink)
    {
        if (panel.Statement.Length > 0)
        {
            IReadOnlyList<string> lines = ink.Wrap(panel.Statement, size, 0.86f * data.Width, 4);
            float top = ((data.Top + data.Bottom) / 2) - (0.675f * size * lines.Count);
            return [.. lines.Select((text, i) => LayoutMaker.Line(ink, text, (data.Left + data.Right) / 2, top + (1.35f * size * i), size, Tone.Ink, anchor: 0.5f))];
        }

        var placer = new LabelPlacer(ink, new Box(data.Left + 3, data.Top + 1, data.Right - 3, data.Bottom - 1), size);
        foreach (LineMark mark in panel.Marks.OfType<LineMark>().Where(m => m.KeepClear))
        {
            placer.KeepClear([.. mark.X.Select((x, i) => Pixel(panel, data, x, mark.Y[i]))]);
        }

        return [.. panel.Labels.Select(label =>
        {
            (float x, float y) = Pixel(panel, data, label.X, label.Standing == Standing.Top ? panel.Y.To : label.Y);
            return placer.Place(label, x, y);
        })];
    }
}
