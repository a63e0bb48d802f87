namespace Smoothing;

/// <summary>A vertical line with a label; without one where no row is free.</summary>
internal sealed record SvgMark(double X, double Y, string Label, double LabelX, string Anchor, bool IsAtom);
