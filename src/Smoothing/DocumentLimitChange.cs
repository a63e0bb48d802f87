namespace Smoothing;

/// <summary>The change of the share beyond a limit in a <see cref="StudyDocument"/>.</summary>
/// <param name="Limit">The limit, in the unit of the data.</param>
/// <param name="Reference">Share of the reference above it.</param>
/// <param name="Studied">Share of the studied values above it.</param>
/// <param name="Change">Studied less reference.</param>
/// <param name="Interval">Its interval.</param>
public sealed record DocumentLimitChange(double Limit, double Reference, double Studied, double Change, DocumentInterval Interval);
