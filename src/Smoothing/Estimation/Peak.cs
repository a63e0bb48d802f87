using Smoothing.Numerics;

namespace Smoothing.Estimation;

/// <summary>A local maximum of a curve.</summary>
/// <param name="Location">Where, in the unit of the data; the middle where the top is flat.</param>
/// <param name="Height">f̂ there, in 1/unit.</param>
/// <param name="Prominence">How far the curve must fall before it can climb higher, in 1/unit: height less the higher of the two deepest points on the way to a higher peak; the height itself for the highest.</param>
/// <param name="Mass">Share between the neighbouring valleys, in [0, 1].</param>
/// <param name="Range">From the valley on the left to the valley on the right, or to the end of the curve.</param>
/// <param name="AtLimit">Whether the maximum sits on a declared limit, where the curve ends rather than turns.</param>
public sealed record Peak(double Location, double Height, double Prominence, double Mass, Interval Range, bool AtLimit);
