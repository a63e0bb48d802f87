namespace Smoothing;

/// <summary>The share beyond a limit in a <see cref="StudyDocument"/>.</summary>
/// <param name="Limit">The limit, in the unit of the data.</param>
/// <param name="ShareBeyond">Share of the values above it.</param>
/// <param name="Interval">Its interval at the level of the study.</param>
public sealed record DocumentLimit(double Limit, double ShareBeyond, DocumentInterval Interval);
