namespace Smoothing.Estimation;

/// <summary>A local minimum between two peaks of a curve.</summary>
/// <param name="Location">Where, in the unit of the data; the middle where the floor is flat.</param>
/// <param name="Height">f̂ there, in 1/unit.</param>
/// <param name="MassBelow">Share to the left, in [0, 1].</param>
/// <param name="MassAbove">Share to the right, in [0, 1].</param>
public sealed record Valley(double Location, double Height, double MassBelow, double MassAbove);
