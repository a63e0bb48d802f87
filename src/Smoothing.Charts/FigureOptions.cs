namespace Smoothing.Charts;

/// <summary>Size, colours and words of a figure. Every default is usable.</summary>
public sealed record FigureOptions
{
    /// <summary>Width in pixels at scale 1, 320 to 4,000. Default 800: at half a page the text is then about 8 points high.</summary>
    public int Width { get; init; } = 800;

    /// <summary>Height in pixels at scale 1, 240 to 4,000. Default 480.</summary>
    public int Height { get; init; } = 480;

    /// <summary>Pixels of a PNG per pixel of <see cref="Width"/>, 0.5 to 8: 2 for fine screens, 3 for print. Text and lines grow with it. Default 1; an SVG has no use for it.</summary>
    public double Scale { get; init; } = 1;

    /// <summary>The colours. Default <see cref="FigureTheme.Light"/>.</summary>
    public FigureTheme Theme { get; init; } = FigureTheme.Light;

    /// <summary>Heading in place of the figure's own; empty (the default) for that. Control characters become spaces, beyond 200 characters it is cut.</summary>
    public string Title { get; init; } = "";

    /// <summary>Path of a TrueType or OpenType font file to write with; empty (the default) for a font of the machine.</summary>
    public string FontFile { get; init; } = "";
}
