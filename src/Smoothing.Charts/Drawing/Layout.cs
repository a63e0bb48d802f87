namespace Smoothing.Charts.Drawing;

/// <summary>Where everything of a sheet stands, in pixels: made before anything is drawn, so that it can be checked.</summary>
internal sealed record Layout
{
    public required Box Sheet { get; init; }

    /// <summary>Height of ordinary text.</summary>
    public required float TextSize { get; init; }

    /// <summary>Every piece of text outside the data areas.</summary>
    public required IReadOnlyList<PlacedText> Texts { get; init; }

    /// <summary>Swatches of the legend.</summary>
    public required IReadOnlyList<(Box Box, Key Key)> Swatches { get; init; }

    public required IReadOnlyList<PlacedPanel> Panels { get; init; }

    /// <summary>All text, in the order of writing.</summary>
    public IEnumerable<PlacedText> Words => Texts.Concat(Panels.SelectMany(p => p.Labels));
}

/// <summary>A panel with its data area, the ticks that are labelled and the labels inside.</summary>
internal sealed record PlacedPanel(Panel Panel, Box Data, IReadOnlyList<PlacedText> Labels);

/// <summary>A line of text with its box.</summary>
internal sealed record PlacedText(string Text, Box Box, float Baseline, float Size, Tone Tone, bool Bold = false)
{
    /// <summary>A line from the place that is meant to the words, where these had to move away from it.</summary>
    public (float X1, float Y1, float X2, float Y2)? Leader { get; init; }
}
