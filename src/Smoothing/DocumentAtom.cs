namespace Smoothing;

/// <summary>A value that holds a share of its own, in a <see cref="StudyDocument"/>.</summary>
/// <param name="Value">The value.</param>
/// <param name="Share">Its share of the weight.</param>
/// <param name="Interval">The interval of the share.</param>
public sealed record DocumentAtom(double Value, double Share, DocumentInterval Interval);
