using Smoothing.Numerics;

namespace Smoothing.Inference;

/// <summary>A quantile of the law behind a sample, with its interval.</summary>
public sealed class QuantileEstimate
{
    internal QuantileEstimate(double probability, double estimate, Interval interval, double level, double attainedLevel, double effectiveCount, string method, IReadOnlyList<string> notes)
    {
        Probability = probability;
        Estimate = estimate;
        Interval = interval;
        Level = level;
        AttainedLevel = attainedLevel;
        EffectiveCount = effectiveCount;
        Method = method;
        Notes = notes;
    }

    /// <summary>The probability asked for, in (0, 1).</summary>
    public double Probability { get; }

    /// <summary>The sample's quantile, by linear interpolation, in the unit of the data.</summary>
    public double Estimate { get; }

    /// <summary>Where the true quantile lies, at <see cref="Level"/> or better; an end that the sample can't give is infinite and said in <see cref="Notes"/>.</summary>
    public Interval Interval { get; }

    /// <summary>Confidence level asked for, two-sided.</summary>
    public double Level { get; }

    /// <summary>The exact probability that the interval covers the quantile of a continuous law; at least <see cref="Level"/>. Approximate with weights or dependent values.</summary>
    public double AttainedLevel { get; }

    /// <summary>The number of independent, equally weighted values that the interval counts on.</summary>
    public double EffectiveCount { get; }

    /// <summary>How the interval was made.</summary>
    public string Method { get; }

    /// <summary>What a reader must know beside the numbers, one sentence each; empty when there is nothing.</summary>
    public IReadOnlyList<string> Notes { get; }

    /// <summary>Estimate and interval in one line, invariant culture.</summary>
    /// <returns>Text such as <c>12.1 in [11.4, 13.0] at 95 %</c>.</returns>
    public override string ToString() => Guard.Text($"{Estimate:G5} in [{Interval.Lower:G5}, {Interval.Upper:G5}] at {100 * Level:G4} %");
}
