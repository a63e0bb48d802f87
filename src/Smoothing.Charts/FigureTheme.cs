namespace Smoothing.Charts;

/// <summary>The colours of a figure. In each theme everything is told apart by lightness, dash or shape as well as by colour.</summary>
public enum FigureTheme
{
    /// <summary>Dark ink on white: screens and documents. The default.</summary>
    Light,

    /// <summary>Pale ink on a dark ground: dark pages and projectors.</summary>
    Dark,

    /// <summary>Greys on white: paper and copies.</summary>
    Print,
}
