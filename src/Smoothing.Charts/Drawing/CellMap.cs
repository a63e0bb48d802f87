using ScottPlot;
using SkiaSharp;

namespace Smoothing.Charts.Drawing;

/// <summary>Rectangles that join without seams: their edges are not blended.</summary>
internal sealed class CellMap((double Left, double Right, double Bottom, double Top, SKColor Color)[] cells) : IPlottable
{
    public bool IsVisible { get; set; } = true;

    public IAxes Axes { get; set; } = new Axes();

    public IEnumerable<LegendItem> LegendItems => [];

    public AxisLimits GetAxisLimits() => AxisLimits.NoLimits;

    public void Render(RenderPack rp)
    {
        using var paint = new SKPaint { IsAntialias = false };
        foreach ((double left, double right, double bottom, double top, SKColor color) in cells)
        {
            paint.Color = color;

            // Rounded outwards: the next cell is drawn over the edge.
            float x = MathF.Floor(Axes.GetPixelX(left));
            float y = MathF.Floor(Axes.GetPixelY(top));
            rp.Canvas.DrawRect(x, y, MathF.Ceiling(Axes.GetPixelX(right)) - x, MathF.Ceiling(Axes.GetPixelY(bottom)) - y, paint);
        }
    }
}
