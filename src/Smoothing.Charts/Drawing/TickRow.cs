using ScottPlot;
using SkiaSharp;

namespace Smoothing.Charts.Drawing;

/// <summary>A row of upright ticks of their own strength, one plottable for all: each plottable costs an SVG a clip path.</summary>
internal sealed class TickRow(double[] places, byte[] strengths, double bottom, double top, SKColor color) : IPlottable
{
    private const float Width = 1.3f;

    public bool IsVisible { get; set; } = true;

    public IAxes Axes { get; set; } = new Axes();

    public IEnumerable<LegendItem> LegendItems => [];

    public AxisLimits GetAxisLimits() => AxisLimits.NoLimits;

    public void Render(RenderPack rp)
    {
        using var paint = new SKPaint { StrokeWidth = Width, IsAntialias = true };
        float low = Axes.GetPixelY(bottom);
        float high = Axes.GetPixelY(top);
        for (int i = 0; i < places.Length; i++)
        {
            float x = Axes.GetPixelX(places[i]);
            paint.Color = color.WithAlpha(strengths[i]);
            rp.Canvas.DrawLine(x, low, x, high, paint);
        }
    }
}
