namespace Smoothing;

/// <summary>How many values give twice the precision, in a <see cref="StudyDocument"/>.</summary>
/// <param name="Count">n now.</param>
/// <param name="ForShares">Values in all for intervals of shares and quantiles half as wide.</param>
/// <param name="ForCurve">Values in all for a band half as wide; null where the rounding of the data sets the smoothing.</param>
public sealed record DocumentPlan(double Count, double ForShares, double? ForCurve);
