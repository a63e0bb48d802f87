using Smoothing.Numerics;

namespace Smoothing.Inference;

/// <summary>A share of the values beyond, below or between limits, with its interval.</summary>
public sealed class ShareEstimate
{
    internal ShareEstimate(double estimate, Interval interval, double level, double effectiveCount, double beyond, string method, IReadOnlyList<string> notes)
    {
        Estimate = estimate;
        Interval = interval;
        Level = level;
        EffectiveCount = effectiveCount;
        Counted = beyond;
        Method = method;
        Notes = notes;
    }

    /// <summary>The share counted in the sample, in [0, 1]; weights count as weights.</summary>
    public double Estimate { get; }

    /// <summary>Where the true share lies, at <see cref="Level"/>; inside [0, 1].</summary>
    public Interval Interval { get; }

    /// <summary>Confidence level of <see cref="Interval"/>, two-sided.</summary>
    public double Level { get; }

    /// <summary>The number of independent, equally weighted values that the interval counts on.</summary>
    public double EffectiveCount { get; }

    /// <summary>Number of values counted; the sum of their weights when there are weights.</summary>
    public double Counted { get; }

    /// <summary>How the interval was made.</summary>
    public string Method { get; }

    /// <summary>What a reader must know beside the numbers, one sentence each; empty when there is nothing.</summary>
    public IReadOnlyList<string> Notes { get; }

    /// <summary>Estimate and interval in one line, invariant culture.</summary>
    /// <returns>Text such as <c>0.05 in [0.0164, 0.1128] at 95 %, n = 100</c>.</returns>
    public override string ToString() => Guard.Text($"{Estimate:G4} in [{Interval.Lower:G4}, {Interval.Upper:G4}] at {100 * Level:G4} %, n = {EffectiveCount:G6}");
}
