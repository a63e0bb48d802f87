using Smoothing.Bandwidths;

namespace Smoothing.Inference;

/// <summary>Choices for the statements of <see cref="Uncertainty"/>.</summary>
public sealed record UncertaintyOptions
{
    /// <summary>Confidence level in (0, 1) of intervals and bands. Default 0.95.</summary>
    public double Level { get; init; } = 0.95;

    /// <summary>The choice that gave the density its bandwidth; null (the default) marks the coverage as untested.</summary>
    public BandwidthChoice? Choice { get; init; }

    /// <summary>Whether limits are widened where the data contradict the curve at finer scales. Default <see cref="FineScaleCheck.On"/>.</summary>
    public FineScaleCheck FineScale { get; init; } = FineScaleCheck.On;

    /// <summary>Smooths by 0.6 h instead of h: wider by a third, for limits of the range where the slope may be infinite. Default false.</summary>
    public bool Cautious { get; init; }

    /// <summary>What is made of the order of the values. Default <see cref="SerialDependence.Ignore"/>.</summary>
    public SerialDependence Dependence { get; init; } = SerialDependence.Ignore;
}
