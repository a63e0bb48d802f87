namespace Smoothing.Estimation;

/// <summary>A bandwidth for each value: narrower where a pilot estimate is high, wider where it is low.</summary>
/// <remarks>
/// hᵢ = h (f̃(Xᵢ)/g)^(−exponent) with f̃ a pilot estimate and g the geometric mean of f̃ over the values. Source: Abramson (1982), the square-root law.
/// It helps where a curve has both fine and coarse structure and in smooth tails; on smooth single peaks it gains nothing or loses. docs/limits.md
/// has the measurements. Not the default.
/// </remarks>
public sealed record AdaptiveBandwidth
{
    /// <summary>The exponent, in [0, 1]; ½ (the default) is Abramson's law, 0 leaves the bandwidth fixed.</summary>
    public double Exponent { get; init; } = 0.5;

    /// <summary>Bandwidth of the pilot estimate, in the unit of the data; null (the default) for the bandwidth of the estimate itself.</summary>
    public double? PilotBandwidth { get; init; }
}
