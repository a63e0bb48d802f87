using Smoothing.Inference;
using Smoothing.Numerics;

namespace Smoothing;

/// <summary>How the share of values beyond a limit has changed from the reference to the studied values.</summary>
/// <remarks>Interval of the change: the two exact intervals combined by squaring and adding, √((p₂ − l₂)² + (u₁ − p₁)²) downwards and likewise upwards (Newcombe 1998, method 10, with exact limits).</remarks>
public sealed record LimitChange
{
    internal LimitChange(double limit, ShareEstimate before, ShareEstimate now)
    {
        (Limit, Before, Now) = (limit, before, now);
        double down = double.Hypot(now.Estimate - now.Interval.Lower, before.Interval.Upper - before.Estimate);
        double up = double.Hypot(now.Interval.Upper - now.Estimate, before.Estimate - before.Interval.Lower);
        Interval = new Interval(Math.Max(-1, Change - down), Math.Min(1, Change + up));
    }

    /// <summary>The limit, in the unit of the data.</summary>
    public double Limit { get; }

    /// <summary>Share of the reference above the limit.</summary>
    public ShareEstimate Before { get; }

    /// <summary>Share of the studied values above it.</summary>
    public ShareEstimate Now { get; }

    /// <summary>Now less before, in [−1, 1].</summary>
    public double Change => Now.Estimate - Before.Estimate;

    /// <summary>Limits for the change at the study's level.</summary>
    public Interval Interval { get; }
}
