using Smoothing.Numerics;

namespace Smoothing.Inference;

/// <summary>How far a quantile has moved from the first sample to the second.</summary>
public sealed class QuantileShift
{
    internal QuantileShift(double probability, double first, double second, Interval interval) =>
        (Probability, First, Second, Interval) = (probability, first, second, interval);

    /// <summary>Probability of the quantile.</summary>
    public double Probability { get; }

    /// <summary>The first sample's quantile, in the unit of the data.</summary>
    public double First { get; }

    /// <summary>The second sample's quantile.</summary>
    public double Second { get; }

    /// <summary>Second less first.</summary>
    public double Shift => Second - First;

    /// <summary>Limits for the shift; an end is infinite where a sample is too small to limit its quantile.</summary>
    public Interval Interval { get; }
}
