using ScottPlot;
using ScottPlot.Rendering.RenderActions;
using ScottPlot.TickGenerators;
using SkiaSharp;

namespace Smoothing.Charts.Drawing;

/// <summary>Draws a laid-out sheet on a canvas: axes, curves and areas by ScottPlot, one plot a panel; words by <see cref="TextInk"/>.</summary>
internal sealed class SheetPainter(FigureTheme theme)
{
    /// <summary>Everything but the words.</summary>
    public void PaintShapes(SKCanvas canvas, Layout layout)
    {
        using (var ground = new SKPaint { Color = Palette.Of(Tone.Ground, theme) })
        {
            canvas.DrawRect(0, 0, layout.Sheet.Right, layout.Sheet.Bottom, ground);
        }

        foreach (PlacedPanel placed in layout.Panels)
        {
            Draw(canvas, placed);
        }

        foreach ((Box box, Key key) in layout.Swatches)
        {
            SwatchPainter.Paint(canvas, box, key, theme);
        }

        using var thin = new SKPaint { Color = Palette.Of(Tone.Quiet, theme), StrokeWidth = 1, IsAntialias = true };
        foreach ((float x1, float y1, float x2, float y2) in layout.Panels.SelectMany(p => p.Labels).Where(l => l.Leader is not null).Select(l => l.Leader!.Value))
        {
            canvas.DrawLine(x1, y1, x2, y2, thin);
        }

        using var veil = new SKPaint { Color = Palette.Of(Tone.Ground, theme).WithAlpha(205) };
        foreach (PlacedText text in layout.Panels.SelectMany(p => p.Labels))
        {
            canvas.DrawRect(text.Box.Left - 2, text.Box.Top, text.Box.Width + 4, text.Box.Height, veil);
        }
    }

    /// <summary>The words.</summary>
    public void PaintWords(SKCanvas canvas, Layout layout, TextInk ink)
    {
        foreach (PlacedText text in layout.Words)
        {
            ink.Write(canvas, text.Text, text.Box.Left, text.Baseline, text.Size, Palette.Of(text.Tone, theme), text.Bold);
        }
    }

    private void Draw(SKCanvas canvas, PlacedPanel placed)
    {
        const float Edge = 8;
        (Panel panel, Box data, _) = placed;
        using var plot = new Plot();

        // The sheet is painted once, before the panels: a plot that clears its canvas would wipe out its neighbours, and leaves black boxes in an SVG.
        plot.RenderManager.RenderActions.RemoveAll(action => action is ClearCanvas or RenderFigureBackground or RenderDataBackground);
        plot.HideLegend();
        plot.Axes.Title.IsVisible = false;
        Frame(plot, panel);
        plot.Axes.SetLimits(0, 1, 0, 1);
        plot.Layout.Fixed(new PixelPadding(Edge, Edge, Edge, Edge));
        var room = new PixelRect(data.Left - Edge, data.Right + Edge, data.Bottom + Edge, data.Top - Edge);

        // The first rendering of a plot draws everything twice, which would darken what is translucent: it goes nowhere, and before there are marks.
        using (var nowhere = new SKNoDrawCanvas(1, 1))
        {
            plot.Render(nowhere, room);
        }

        foreach (Mark mark in panel.Marks)
        {
            Add(plot, panel, mark);
        }

        plot.Render(canvas, room);
    }

    private void Frame(Plot plot, Panel panel)
    {
        Color quiet = Of(Tone.Quiet);
        plot.Axes.Color(quiet);
        plot.Axes.Right.FrameLineStyle.IsVisible = false;
        plot.Axes.Top.FrameLineStyle.IsVisible = false;
        plot.Axes.Bottom.TickGenerator = Unlabelled(panel.X);
        plot.Axes.Left.TickGenerator = Unlabelled(panel.Y);
        plot.Grid.XAxisStyle.IsVisible = false;
        plot.Grid.YAxisStyle.IsVisible = panel.Grid;
        plot.Grid.YAxisStyle.MajorLineStyle.Color = Of(Tone.Grid);
        plot.Grid.YAxisStyle.MajorLineStyle.Width = 1;
    }

    // The words of the ticks are measured and written with all others.
    private static NumericManual Unlabelled(AxisScale scale) =>
        new([.. scale.Ticks.Select(t => scale.Place(t.At))], [.. scale.Ticks.Select(_ => "")]);

    private void Add(Plot plot, Panel panel, Mark mark)
    {
        switch (mark)
        {
            case LineMark line:
                Add(plot, Across(panel.X, line.X), Across(panel.Y, line.Y), line);
                break;
            case AreaMark area:
                var fill = plot.Add.FillY(Across(panel.X, area.X), Across(panel.Y, area.Lower), Across(panel.Y, area.Upper));
                fill.FillColor = Of(area.Tone);
                fill.LineWidth = 0;
                fill.MarkerShape = MarkerShape.None;
                break;
            case TickMarks ticks:
                plot.Add.Plottable(new TickRow(Across(panel.X, ticks.X), [.. ticks.Strengths], Across(panel.Y, ticks.Bottom), Across(panel.Y, ticks.Top), Palette.Of(ticks.Tone, theme)));
                break;
            case CellMarks map:
                plot.Add.Plottable(new CellMap([.. map.Cells.Select(c => (Across(panel.X, c.Left), Across(panel.X, c.Right), Across(panel.Y, c.Bottom), Across(panel.Y, c.Top), Palette.Of(c.Tone, theme)))]));
                break;
            case DotMarks dots:
                // A rim in the colour of the sheet keeps them visible on dark and on pale ground.
                plot.Add.Markers(Across(panel.X, dots.X), Across(panel.Y, dots.Y), MarkerShape.FilledCircle, dots.Size + 2.5f, Of(Tone.Ground));
                var markers = plot.Add.Markers(Across(panel.X, dots.X), Across(panel.Y, dots.Y), Form(dots.Shape), dots.Size, Of(dots.Tone));
                markers.MarkerLineWidth = dots.Shape == Shape.Ring ? 1 : 0;
                break;
            case PointMark point:
                var marker = plot.Add.Marker(Across(panel.X, point.X), Across(panel.Y, point.Y), Form(point.Shape), point.Size, Of(point.Tone));
                marker.MarkerLineWidth = point.Shape == Shape.Ring ? 2 : 0;
                break;
            default:
                throw new ArgumentOutOfRangeException(nameof(mark));
        }
    }

    private void Add(Plot plot, double[] x, double[] y, LineMark line)
    {
        SKColor color = Palette.Of(line.Tone, theme);
        if (line.Dash == Dash.None)
        {
            plot.Add.ScatterLine(x, y, new Color(color)).LineWidth = line.Width;
        }
        else
        {
            plot.Add.Plottable(new BrokenLine([.. x.Select((at, i) => new Coordinates(at, y[i]))], color, line.Width, line.Dash));
        }
    }

    private static MarkerShape Form(Shape shape) => shape switch
    {
        Shape.Ring => MarkerShape.OpenCircle,
        Shape.Diamond => MarkerShape.FilledDiamond,
        Shape.Up => MarkerShape.FilledTriangleUp,
        Shape.Down => MarkerShape.FilledTriangleDown,
        _ => MarkerShape.FilledCircle,
    };

    private Color Of(Tone tone) => new(Palette.Of(tone, theme));

    private static double Across(AxisScale scale, double value) => PanelLayout.Bound(scale.Place(value));

    private static double[] Across(AxisScale scale, IReadOnlyList<double> values) => [.. values.Select(v => Across(scale, v))];
}
