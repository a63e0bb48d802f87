namespace Smoothing;

/// <summary>A quantile in a <see cref="StudyDocument"/>.</summary>
/// <param name="Probability">p in (0, 1).</param>
/// <param name="Estimate">The p-quantile, in the unit of the data.</param>
/// <param name="Interval">Its interval at the level of the study; an end may be missing.</param>
public sealed record DocumentQuantile(double Probability, double Estimate, DocumentInterval Interval);
