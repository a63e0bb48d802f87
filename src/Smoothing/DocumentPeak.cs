namespace Smoothing;

/// <summary>A peak of the curve in a <see cref="StudyDocument"/>.</summary>
/// <param name="Location">Where, in the unit of the data.</param>
/// <param name="Height">The density there, in 1/unit.</param>
/// <param name="Prominence">How far the curve falls before it climbs higher.</param>
/// <param name="Mass">Share of the curve between the neighbouring valleys.</param>
public sealed record DocumentPeak(double Location, double Height, double Prominence, double Mass);
