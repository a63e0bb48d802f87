namespace Smoothing.Charts.Drawing;

/// <summary>A whole figure, ready to draw in any theme and size: no statistics happen after this.</summary>
internal sealed record Sheet
{
    /// <summary>The heading.</summary>
    public required string Title { get; init; }

    /// <summary>One sentence that says what one sees.</summary>
    public required string Alternative { get; init; }

    /// <summary>Entries of the legend, which stands between heading and panels.</summary>
    public IReadOnlyList<Key> Keys { get; init; } = [];

    /// <summary>The panels from top to bottom.</summary>
    public required IReadOnlyList<Panel> Panels { get; init; }

    /// <summary>Lines of small text at the foot.</summary>
    public IReadOnlyList<string> Notes { get; init; } = [];
}

/// <summary>One pair of axes with what is drawn between them.</summary>
internal sealed record Panel
{
    public required AxisScale X { get; init; }

    public required AxisScale Y { get; init; }

    /// <summary>Words under the axis; none where a panel below shares it.</summary>
    public string XCaption { get; init; } = "";

    /// <summary>Whether the panel below has the same horizontal axis: ticks then go without words.</summary>
    public bool SharesX { get; init; }

    /// <summary>Words above the left axis.</summary>
    public string YCaption { get; init; } = "";

    /// <summary>Height relative to the other panels.</summary>
    public double Share { get; init; } = 1;

    /// <summary>From back to front.</summary>
    public IReadOnlyList<Mark> Marks { get; init; } = [];

    public IReadOnlyList<Label> Labels { get; init; } = [];

    /// <summary>A sentence in the middle of an otherwise bare panel: why nothing can be drawn.</summary>
    public string Statement { get; init; } = "";

    /// <summary>Words to the right of the data area, by height: <see cref="AxisScale"/> y and text.</summary>
    public IReadOnlyList<(double Y, string Text)> Beside { get; init; } = [];

    /// <summary>Whether horizontal grid lines are drawn.</summary>
    public bool Grid { get; init; } = true;
}
