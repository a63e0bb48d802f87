namespace Smoothing;

/// <summary>A tested peak in a <see cref="StudyDocument"/>.</summary>
/// <param name="Location">Where, in the unit of the data.</param>
/// <param name="LocationInterval">Where the true peak lies.</param>
/// <param name="Height">The density there, in 1/unit.</param>
/// <param name="HeightInterval">Limits for the true height.</param>
/// <param name="StandsApart">Whether the slopes on both sides are told from chance.</param>
public sealed record DocumentGroupPeak(double Location, DocumentInterval LocationInterval, double Height, DocumentInterval HeightInterval, bool StandsApart);
