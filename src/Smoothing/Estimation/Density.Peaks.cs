namespace Smoothing.Estimation;

/// <content>Peaks, valleys and inflections.</content>
public sealed partial class Density
{
    /// <summary>Maxima, minima and inflections of the curve, located on its exact derivatives.</summary>
    /// <returns>The turning points with heights, prominences and masses.</returns>
    /// <exception cref="InvalidOperationException">The kernel jumps, so that the curve is a staircase without turning points.</exception>
    /// <remarks>
    /// Places are accurate to 1e-10 of the bandwidth where the curve turns sharply enough for the arithmetic to tell. Not missed: for smooth kernels
    /// any pair of turning points whose height difference exceeds about 1e-7 of the curve nearby; for kernels with kinks any at all up to 5000
    /// values. A peak of the curve is not yet a group in the population: read the evidence for groups beside it.
    /// Cost: some twenty to a hundred evaluations per bandwidth of occupied range.
    /// </remarks>
    public PeakSummary Peaks() => PeakSearch.Of(_form, PeakSearch.Smoothness(Kernel));
}
