using Smoothing.Numerics;

namespace Smoothing;

/// <summary>An interval in a <see cref="StudyDocument"/>; an end that is infinite is null, since JSON has no infinity.</summary>
/// <param name="Lower">Lower end, null for −∞.</param>
/// <param name="Upper">Upper end, null for +∞.</param>
public sealed record DocumentInterval(double? Lower, double? Upper)
{
    internal static DocumentInterval Of(Interval interval) =>
        new(double.IsFinite(interval.Lower) ? interval.Lower : null, double.IsFinite(interval.Upper) ? interval.Upper : null);
}
