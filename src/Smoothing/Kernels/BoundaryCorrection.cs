namespace Smoothing.Kernels;

/// <summary>How an estimate is mended near a known limit of the range, where a plain kernel would lose mass beyond it.</summary>
public enum BoundaryCorrection
{
    /// <summary>No correction: mass leaks past the limit and the curve is too low there.</summary>
    None,

    /// <summary>Linear boundary kernel, made non-negative and renormalised. Source: Jones (1993).</summary>
    LinearKernel,

    /// <summary>The positive form of the linear boundary kernel, renormalised. Source: Jones &amp; Foster (1996).</summary>
    PositiveLinear,

    /// <summary>The kernel cut at the limit and divided by the mass that is left.</summary>
    Renormalised,

    /// <summary>The data mirrored at the limit; right where the true slope at the limit is zero.</summary>
    Reflection,

    /// <summary>Smoothing on the scale of log distance to the limit, carried back.</summary>
    LogScale,
}
