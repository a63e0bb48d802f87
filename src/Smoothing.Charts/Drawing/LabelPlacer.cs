namespace Smoothing.Charts.Drawing;

/// <summary>Finds places for the labels of a panel: inside the data area, off each other and off the curves.</summary>
internal sealed class LabelPlacer(TextInk ink, Box data, float size)
{
    private const int Rows = 8;
    private const float Gap = 7;

    private readonly List<Box> _taken = [];
    private readonly List<(float X, float Y)[]> _lines = [];

    /// <summary>A line that labels keep off.</summary>
    public void KeepClear((float X, float Y)[] line) => _lines.Add(line);

    /// <summary>The label at its best free place; where none is free, at the one that meets least.</summary>
    public PlacedText Place(Label label, float x, float y)
    {
        string text = ink.Fit(label.Text, size, data.Width);
        float width = ink.Width(text, size);
        float height = 1.25f * size;
        Box best = default;
        int fewest = int.MaxValue;
        foreach ((float left, float top) in Candidates(label.Standing, x, y, width, height))
        {
            float shifted = Math.Clamp(left, data.Left, Math.Max(data.Left, data.Right - width));
            float lowered = Math.Clamp(top, data.Top, Math.Max(data.Top, data.Bottom - height));
            var box = new Box(shifted, lowered, shifted + width, lowered + height);

            // A label pushed back inside may come to lie on its own anchor: that counts as a conflict too.
            int conflicts = Conflicts(box) + (shifted == left && lowered == top ? 0 : label.Standing == Standing.Above && lowered == top ? 0 : 1);
            if (conflicts < fewest)
            {
                (best, fewest) = (box, conflicts);
            }

            if (conflicts == 0)
            {
                break;
            }
        }

        _taken.Add(best);
        return new PlacedText(text, best, best.Top + size, size, label.Tone) { Leader = label.Standing == Standing.Top ? null : Leader(best, x, y, height) };
    }

    private static IEnumerable<(float Left, float Top)> Candidates(Standing standing, float x, float y, float width, float height)
    {
        if (standing == Standing.Top)
        {
            for (int row = 0; row < Rows; row++)
            {
                yield return (x + Gap, y + 2 + (row * height));
                yield return (x - Gap - width, y + 2 + (row * height));
            }

            yield break;
        }

        float[] lifts = [Gap, Gap + height, Gap + (2 * height), Gap + (3 * height)];
        if (standing == Standing.Beside)
        {
            foreach (float lift in (float[])[height / 2, height + 3, 0, 2 * height])
            {
                yield return (x + Gap + 3, y - lift);
                yield return (x - Gap - 3 - width, y - lift);
            }
        }

        foreach (float lift in lifts)
        {
            yield return (x - (width / 2), y - lift - height);
            yield return (x + Gap, y - lift - height);
            yield return (x - Gap - width, y - lift - height);
        }

        foreach (float lift in lifts)
        {
            yield return (x - (width / 2), y + lift);
        }
    }

    private static (float, float, float, float)? Leader(Box box, float x, float y, float height)
    {
        float nearX = Math.Clamp(x, box.Left, box.Right);
        float nearY = Math.Clamp(y, box.Top, box.Bottom);
        return float.Hypot(nearX - x, nearY - y) > height ? (x, y, nearX, nearY) : null;
    }

    private int Conflicts(Box box)
    {
        var wide = new Box(box.Left - 2, box.Top - 1, box.Right + 2, box.Bottom + 1);
        int met = 3 * _taken.Count(wide.Meets);
        foreach ((float X, float Y)[] line in _lines)
        {
            for (int i = 1; i < line.Length; i++)
            {
                if (wide.Meets(line[i - 1].X, line[i - 1].Y, line[i].X, line[i].Y))
                {
                    met++;
                    break;
                }
            }
        }

        return met;
    }
}
