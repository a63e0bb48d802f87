namespace Smoothing;

/// <summary>The comparison with a reference in a <see cref="StudyDocument"/>; differences are studied less reference.</summary>
/// <param name="Reference">What the reference is called.</param>
/// <param name="ReferenceCount">Number of its values.</param>
/// <param name="PValue">The p-value of the permutation test; null where no comparison can be made.</param>
/// <param name="Permutations">Permutations behind it; null with it.</param>
/// <param name="Seed">Their seed.</param>
/// <param name="Shifts">Shifts of the quantiles.</param>
/// <param name="Limits">Changes of the shares beyond limits.</param>
/// <param name="X">Places of the band for the difference of the densities, in the unit of the data; null with the p-value.</param>
/// <param name="Difference">The difference there, in 1/unit, bias-corrected.</param>
/// <param name="Lower">Lower edge of its simultaneous band.</param>
/// <param name="Upper">Upper edge of its simultaneous band.</param>
/// <param name="Verdict">The finding in words.</param>
public sealed record DocumentComparison(
    string Reference,
    long ReferenceCount,
    double? PValue,
    int? Permutations,
    ulong Seed,
    IReadOnlyList<DocumentShift> Shifts,
    IReadOnlyList<DocumentLimitChange> Limits,
    IReadOnlyList<double>? X,
    IReadOnlyList<double>? Difference,
    IReadOnlyList<double>? Lower,
    IReadOnlyList<double>? Upper,
    string Verdict);
