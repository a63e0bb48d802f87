namespace Smoothing.Charts.Drawing;

/// <summary>What a colour stands for; the theme decides which colour it is.</summary>
internal enum Tone
{
    /// <summary>The sheet.</summary>
    Ground,

    /// <summary>Text.</summary>
    Ink,

    /// <summary>Axes and small text.</summary>
    Quiet,

    /// <summary>Grid lines.</summary>
    Grid,

    /// <summary>The estimate.</summary>
    Curve,

    /// <summary>A simultaneous band.</summary>
    Band,

    /// <summary>Intervals at single places.</summary>
    Interval,

    /// <summary>A limit, and whatever warns.</summary>
    Limit,

    /// <summary>A second curve.</summary>
    Second,

    /// <summary>A third curve.</summary>
    Third,

    /// <summary>The truth is probably higher, or a curve rises.</summary>
    Up,

    /// <summary>The truth is probably lower, or a curve falls.</summary>
    Down,

    /// <summary>Cannot be told.</summary>
    Open,

    /// <summary>Too few values.</summary>
    Sparse,

    /// <summary>Ticks for the data.</summary>
    Strip,

    /// <summary>Lines on a coloured ground.</summary>
    Trace,
}
