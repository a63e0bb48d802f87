namespace Smoothing;

/// <summary>The curve of a study in a <see cref="StudyDocument"/>; all lists have one length.</summary>
/// <param name="X">Abscissae, in the unit of the data, increasing.</param>
/// <param name="Density">The density of the values that are no atoms, in 1/unit.</param>
/// <param name="Share">Share of the values that the curve describes.</param>
/// <param name="Lower">Lower edge of the simultaneous band of the density; null where none can be given.</param>
/// <param name="Upper">Upper edge of the band; null where none can be given.</param>
/// <param name="Bias">Estimated smoothing bias of the density; null where none can be given.</param>
public sealed record DocumentCurve(
    IReadOnlyList<double> X,
    IReadOnlyList<double> Density,
    double Share,
    IReadOnlyList<double>? Lower,
    IReadOnlyList<double>? Upper,
    IReadOnlyList<double>? Bias);
