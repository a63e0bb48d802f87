namespace Smoothing;

/// <summary>What another bandwidth would show, in a <see cref="StudyDocument"/>.</summary>
/// <param name="Bandwidth">That bandwidth, in the unit of the data.</param>
/// <param name="Peaks">Number of peaks a reader would see.</param>
/// <param name="HighestLocation">Where the highest lies.</param>
/// <param name="HighestHeight">Its height, in 1/unit.</param>
public sealed record DocumentVariant(double Bandwidth, int Peaks, double HighestLocation, double HighestHeight);
