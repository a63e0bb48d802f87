namespace Smoothing.Estimation;

/// <summary>The turning points of a curve: peaks, the valleys between them, and inflections.</summary>
public sealed class PeakSummary
{
    internal PeakSummary(Peak[] peaks, Valley[] valleys, double[] inflections)
    {
        Peaks = Array.AsReadOnly(peaks);
        Valleys = Array.AsReadOnly(valleys);
        Inflections = Array.AsReadOnly(inflections);
    }

    /// <summary>Local maxima from left to right; at least one.</summary>
    public IReadOnlyList<Peak> Peaks { get; }

    /// <summary>Local minima between them, one fewer than the peaks.</summary>
    public IReadOnlyList<Valley> Valleys { get; }

    /// <summary>Where the curve changes the sense of its bend, from left to right; empty for kernels whose second derivative is no function.</summary>
    public IReadOnlyList<double> Inflections { get; }

    /// <summary>The highest peak; the leftmost of equals.</summary>
    public Peak Highest => Peaks.MaxBy(peak => peak.Height)!;
}
