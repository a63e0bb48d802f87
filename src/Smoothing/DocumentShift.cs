namespace Smoothing;

/// <summary>The shift of a quantile in a <see cref="StudyDocument"/>.</summary>
/// <param name="Probability">p in (0, 1).</param>
/// <param name="Reference">The reference's quantile, in the unit of the data.</param>
/// <param name="Studied">The studied values' quantile.</param>
/// <param name="Shift">Studied less reference.</param>
/// <param name="Interval">Its interval; an end may be missing.</param>
public sealed record DocumentShift(double Probability, double Reference, double Studied, double Shift, DocumentInterval Interval);
