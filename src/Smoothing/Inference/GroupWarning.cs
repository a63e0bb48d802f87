namespace Smoothing.Inference;

/// <summary>What a warning about the tests for groups is about.</summary>
internal enum GroupWarning
{
    /// <summary>Rounding kept further peaks from being tested.</summary>
    RoundingStops,

    /// <summary>The distribution is nearly flat.</summary>
    Flat,

    /// <summary>The values seem to end at a limit nobody declared.</summary>
    End,

    /// <summary>Fewer than fifty values.</summary>
    Few,

    /// <summary>Relative weights.</summary>
    Weights,

    /// <summary>Neighbouring values are correlated.</summary>
    Dependence,
}
