using SkiaSharp;

namespace Smoothing.Charts.Drawing;

/// <summary>Draws the swatches of the legend.</summary>
internal static class SwatchPainter
{
    public static void Paint(SKCanvas canvas, Box box, Key key, FigureTheme theme)
    {
        float middle = (box.Top + box.Bottom) / 2;
        using var paint = new SKPaint { Color = Palette.Of(key.Tone, theme), IsAntialias = true };
        switch (key.Swatch)
        {
            case Swatch.Area:
                canvas.DrawRect(box.Left, box.Top + 1, box.Width, box.Height - 2, paint);
                using (var edge = new SKPaint { Color = Palette.Of(Tone.Grid, theme), Style = SKPaintStyle.Stroke, StrokeWidth = 1 })
                {
                    canvas.DrawRect(box.Left, box.Top + 1, box.Width, box.Height - 2, edge);
                }

                break;
            case Swatch.Line when key.Dash != Dash.None:
                BrokenLine.Draw(canvas, [new SKPoint(box.Left, middle), new SKPoint(box.Right, middle)], paint.Color, key.Width, key.Dash);
                break;
            case Swatch.Line:
                paint.Style = SKPaintStyle.Stroke;
                paint.StrokeWidth = key.Width;
                canvas.DrawLine(box.Left, middle, box.Right, middle, paint);
                break;
            default:
                Point(canvas, (box.Left + box.Right) / 2, middle, key.Shape, paint);
                break;
        }
    }

    private static void Point(SKCanvas canvas, float x, float y, Shape shape, SKPaint paint)
    {
        const float R = 5;
        if (shape is Shape.Disc or Shape.Ring)
        {
            paint.Style = shape == Shape.Ring ? SKPaintStyle.Stroke : SKPaintStyle.Fill;
            paint.StrokeWidth = 2;
            canvas.DrawCircle(x, y, R, paint);
            return;
        }

        SKPoint[] corners = shape switch
        {
            Shape.Up => [new(x, y - R), new(x + R, y + R), new(x - R, y + R)],
            Shape.Down => [new(x, y + R), new(x + R, y - R), new(x - R, y - R)],
            _ => [new(x, y - R), new(x + R, y), new(x, y + R), new(x - R, y)],
        };
        using var builder = new SKPath();
        builder.AddPoly(corners);
        canvas.DrawPath(builder, paint);
    }
}
