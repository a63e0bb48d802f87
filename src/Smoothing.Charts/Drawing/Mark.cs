namespace Smoothing.Charts.Drawing;

/// <summary>Something drawn in a panel, in the units of its axes.</summary>
internal abstract record Mark(Tone Tone);

/// <summary>How a line is broken.</summary>
internal enum Dash
{
    None,
    Long,
    Short,
    Dots,
}

/// <summary>The shape of a point.</summary>
internal enum Shape
{
    Disc,
    Ring,
    Diamond,
    Up,
    Down,
}

/// <summary>A line through points; labels keep clear of it when asked.</summary>
internal sealed record LineMark(IReadOnlyList<double> X, IReadOnlyList<double> Y, Tone Tone, float Width, Dash Dash = Dash.None, bool KeepClear = false) : Mark(Tone)
{
    /// <summary>A straight stretch.</summary>
    public static LineMark Straight(double x1, double y1, double x2, double y2, Tone tone, float width, Dash dash = Dash.None, bool keepClear = false) =>
        new([x1, x2], [y1, y2], tone, width, dash, keepClear);
}

/// <summary>The area between two lines over the same places.</summary>
internal sealed record AreaMark(IReadOnlyList<double> X, IReadOnlyList<double> Lower, IReadOnlyList<double> Upper, Tone Tone) : Mark(Tone);

/// <summary>Upright ticks between two heights, each of its own strength.</summary>
internal sealed record TickMarks(IReadOnlyList<double> X, IReadOnlyList<byte> Strengths, double Bottom, double Top, Tone Tone) : Mark(Tone);

/// <summary>Rectangles without outline that join without seams.</summary>
internal sealed record CellMarks(IReadOnlyList<(double Left, double Right, double Bottom, double Top, Tone Tone)> Cells) : Mark(Tone.Open);

/// <summary>A point.</summary>
internal sealed record PointMark(double X, double Y, Tone Tone, Shape Shape, float Size) : Mark(Tone);

/// <summary>Many points of one kind.</summary>
internal sealed record DotMarks(IReadOnlyList<double> X, IReadOnlyList<double> Y, Tone Tone, Shape Shape, float Size) : Mark(Tone);

/// <summary>Where a label would best stand relative to its anchor.</summary>
internal enum Standing
{
    Above,
    Beside,
    Top,
}

/// <summary>Words at a place of a panel.</summary>
internal sealed record Label(string Text, double X, double Y, Standing Standing, Tone Tone = Tone.Ink);

/// <summary>The form of a legend's swatch.</summary>
internal enum Swatch
{
    Line,
    Area,
    Point,
}

/// <summary>One entry of the legend: a swatch and its words.</summary>
internal sealed record Key(string Words, Tone Tone, Swatch Swatch, Dash Dash = Dash.None, float Width = 2, Shape Shape = Shape.Disc);
