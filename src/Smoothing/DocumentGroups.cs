namespace Smoothing;

/// <summary>The evidence for groups in a <see cref="StudyDocument"/>.</summary>
/// <param name="AtLeast">Peaks that the data establish: a lower bound.</param>
/// <param name="Significance">Level of the tests.</param>
/// <param name="Seed">Seed of the resampling.</param>
/// <param name="Tests">From one peak up to the first number that is not rejected; empty where nothing can be said.</param>
/// <param name="Dip">The dip; null where it was not asked.</param>
/// <param name="DipPValue">Its p-value; null with it.</param>
/// <param name="Peaks">Peaks of the curve on the central 95 % of the data, for the Gaussian kernel.</param>
/// <param name="Verdict">The finding in words.</param>
public sealed record DocumentGroups(
    int AtLeast,
    double Significance,
    ulong Seed,
    IReadOnlyList<DocumentGroupTest> Tests,
    double? Dip,
    double? DipPValue,
    IReadOnlyList<DocumentGroupPeak> Peaks,
    string Verdict);
