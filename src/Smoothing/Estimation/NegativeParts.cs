namespace Smoothing.Estimation;

/// <summary>What happens where a kernel of order above 2 makes the curve negative.</summary>
public enum NegativeParts
{
    /// <summary>Kept: the curve is the plain sum, its integral exactly 1.</summary>
    Keep,

    /// <summary>Cut at zero and divided by the mass that is left.</summary>
    CutAndRenormalise,
}
