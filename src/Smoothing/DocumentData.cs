namespace Smoothing;

/// <summary>The data of a study in a <see cref="StudyDocument"/>.</summary>
/// <param name="Count">Number of values.</param>
/// <param name="EffectiveCount">How many values of equal weight say as much.</param>
/// <param name="LeftOut">Missing values left out.</param>
/// <param name="Minimum">Smallest value.</param>
/// <param name="Maximum">Largest value.</param>
/// <param name="Mean">Mean.</param>
/// <param name="StandardDeviation">Standard deviation, divisor n − 1; the largest double where it exceeds that.</param>
/// <param name="TiedShare">Share of values that are not alone in their place.</param>
/// <param name="RoundingStep">The step the values are recorded in; null when none was found.</param>
/// <param name="HeapingStep">A coarser step that too many values sit on; null when none was found.</param>
/// <param name="Support">The declared limits of the range; null when none was declared.</param>
/// <param name="LagOneCorrelation">Lag-1 autocorrelation in the order of the rows.</param>
public sealed record DocumentData(
    long Count,
    double EffectiveCount,
    long LeftOut,
    double Minimum,
    double Maximum,
    double Mean,
    double StandardDeviation,
    double TiedShare,
    double? RoundingStep,
    double? HeapingStep,
    DocumentInterval? Support,
    double LagOneCorrelation = 0);
