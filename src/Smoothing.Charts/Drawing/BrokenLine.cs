using ScottPlot;
using SkiaSharp;

namespace Smoothing.Charts.Drawing;

/// <summary>A dashed line whose dashes are outlines of their own: an SVG canvas knows no dash pattern and would draw it whole.</summary>
internal sealed class BrokenLine(Coordinates[] points, SKColor color, float width, Dash dash) : IPlottable
{
    public bool IsVisible { get; set; } = true;

    public IAxes Axes { get; set; } = new Axes();

    public IEnumerable<LegendItem> LegendItems => [];

    public AxisLimits GetAxisLimits() => AxisLimits.NoLimits;

    public void Render(RenderPack rp)
    {
        SKPoint[] pixels = [.. points.Select(p => Axes.GetPixel(p)).Select(p => new SKPoint(p.X, p.Y))];
        Draw(rp.Canvas, pixels, color, width, dash);
    }

    /// <summary>Draws the dashes on a canvas.</summary>
    public static void Draw(SKCanvas canvas, SKPoint[] points, SKColor color, float width, Dash dash)
    {
        using var line = new SKPath();
        line.AddPoly(points, close: false);
        using SKPathEffect effect = SKPathEffect.CreateDash(Lengths(dash), 0);
        using var stroke = new SKPaint { Style = SKPaintStyle.Stroke, StrokeWidth = width, PathEffect = effect };
        using SKPath outline = stroke.GetFillPath(line) ?? new SKPath();
        using var fill = new SKPaint { Color = color, IsAntialias = true };
        canvas.DrawPath(outline, fill);
    }

    private static float[] Lengths(Dash dash) => dash switch
    {
        Dash.Long => [8, 5],
        Dash.Short => [4, 4],
        _ => [1.5f, 4],
    };
}
