using SkiaSharp;

namespace Smoothing.Charts.Tests.Support;

/// <summary>Reads a PNG back.</summary>
internal sealed class Pixels(byte[] png) : IDisposable
{
    private readonly SKBitmap _bitmap = SKBitmap.Decode(png) ?? throw new InvalidDataException("not a picture");

    public int Width => _bitmap.Width;

    public int Height => _bitmap.Height;

    public SKColor this[int x, int y] => _bitmap.GetPixel(x, y);

    /// <summary>How many pixels have this colour.</summary>
    public int Count(SKColor color)
    {
        int count = 0;
        foreach (SKColor pixel in _bitmap.Pixels)
        {
            count += pixel == color ? 1 : 0;
        }

        return count;
    }

    /// <summary>Whether a pixel close to the colour lies within the distance of a place.</summary>
    public bool Has(SKColor color, float x, float y, int distance)
    {
        for (int dy = -distance; dy <= distance; dy++)
        {
            for (int dx = -distance; dx <= distance; dx++)
            {
                int px = (int)Math.Round(x) + dx;
                int py = (int)Math.Round(y) + dy;
                if (px >= 0 && py >= 0 && px < Width && py < Height && Near(this[px, py], color))
                {
                    return true;
                }
            }
        }

        return false;
    }

    public void Dispose() => _bitmap.Dispose();

    private static bool Near(SKColor a, SKColor b) => Math.Abs(a.Red - b.Red) + Math.Abs(a.Green - b.Green) + Math.Abs(a.Blue - b.Blue) < 40;
}
