namespace Smoothing;

/// <summary>The warnings a study can give.</summary>
public enum CautionKind
{
    /// <summary>Missing values were left out.</summary>
    LeftOut,

    /// <summary>Few values: the curve shows little more than their broad place.</summary>
    FewValues,

    /// <summary>Values are rounded so coarsely that the rounding sets the smoothing.</summary>
    Rounding,

    /// <summary>More values than chance allows sit on round numbers.</summary>
    Heaping,

    /// <summary>One value holds a share of its own and was taken out of the curve.</summary>
    Atom,

    /// <summary>Values pile up at the smallest or largest one: a limit or a censoring point.</summary>
    PiledUp,

    /// <summary>The data end as if at a limit that was not declared.</summary>
    UndeclaredLimit,

    /// <summary>The bandwidth rule did not find what it looks for, or the rules disagree.</summary>
    Smoothing,

    /// <summary>Neighbours in time resemble each other: the data say less than their number.</summary>
    Dependence,

    /// <summary>Uneven weights: the data say less than their number.</summary>
    Weights,

    /// <summary>Values lie outside the picture.</summary>
    OutsidePicture,

    /// <summary>The data contradict the smooth curve at a finer scale, and the limits are widened there.</summary>
    FineStructure,

    /// <summary>Smoothing moves the curve by more than the half-width of its band somewhere.</summary>
    SmoothingBias,

    /// <summary>The tests for groups are known to err on such values, or stopped early.</summary>
    Groups,

    /// <summary>A part of the answer cannot be given from condensed data.</summary>
    Condensed,
}
