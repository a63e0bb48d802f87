using Smoothing.Kernels;
using Smoothing.Numerics;

namespace Smoothing.Estimation;

/// <summary>Choices for a density estimate beyond kernel and bandwidth.</summary>
public sealed record DensityOptions
{
    /// <summary>Known limits of the range, in the unit of the data; null (the default) for the whole line.</summary>
    public Interval? Support { get; init; }

    /// <summary>How the curve is mended near a limit. Default <see cref="BoundaryCorrection.LinearKernel"/>; ignored without <see cref="Support"/>.</summary>
    /// <remarks>
    /// With <see cref="BoundaryCorrection.LogScale"/> the bandwidth is a width on the scale of the logarithm, without unit: choose it from the logarithms
    /// of the distances to the limit. With <see cref="BoundaryCorrection.None"/> the values are checked against the support and the curve is left alone.
    /// </remarks>
    public BoundaryCorrection Boundary { get; init; } = BoundaryCorrection.LinearKernel;

    /// <summary>What happens to negative parts. Default <see cref="NegativeParts.Keep"/>; only kernels of order above 2 have any.</summary>
    public NegativeParts NegativeParts { get; init; } = NegativeParts.Keep;

    /// <summary>A bandwidth for each value, from a pilot estimate; null (the default) for one bandwidth.</summary>
    public AdaptiveBandwidth? Adaptive { get; init; }
}
