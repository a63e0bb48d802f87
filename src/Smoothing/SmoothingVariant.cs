namespace Smoothing;

/// <summary>What the curve would show at another bandwidth.</summary>
/// <param name="Bandwidth">That bandwidth, in the unit of the data.</param>
/// <param name="Peaks">Peaks at least 2 % as high as the highest that stand out by as much.</param>
/// <param name="HighestLocation">Where the highest lies, in the unit of the data.</param>
/// <param name="HighestHeight">Its height, in 1/unit.</param>
/// <param name="RelativeHeight">Its height over that of the highest peak of the study's own curve.</param>
public sealed record SmoothingVariant(double Bandwidth, int Peaks, double HighestLocation, double HighestHeight, double RelativeHeight);
