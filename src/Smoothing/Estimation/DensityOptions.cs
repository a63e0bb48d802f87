using Smoothing.Kernels;
using Smoothing.Numerics;

namespace Smoothing.Estimation;

/// <summary>Choices for a density estimate beyond kernel and bandwidth.</summary>
public sealed record DensityOptions
{
    /// <summary>Known limits of the range, in the unit of the data; null (the default) for the whole line.</summary>
    public Interval? Support { get; init; }

    /// <summary>How the curve is mended near a limit. Default <see cref="BoundaryCorrection.LinearKernel"/>; ignored without <see cref="Support"/>.</summary>
    public BoundaryCorrection Boundary { get; init; } = BoundaryCorrection.LinearKernel;

    /// <summary>What happens to negative parts. Default <see cref="NegativeParts.Keep"/>; only kernels of order above 2 have any.</summary>
    public NegativeParts NegativeParts { get; init; } = NegativeParts.Keep;
}
