namespace Smoothing.Estimation;

/// <content>What the data say about the limits of the range.</content>
public sealed partial class Density
{
    /// <summary>Sentences about declared limits at which no correction can be trusted: an unbounded density, or an infinite slope. Empty where there is nothing to say.</summary>
    /// <remarks>
    /// Judged from the 2√n values nearest to each limit; needs 49 values or more that are not mostly tied. An infinite slope close to exponent 1, such
    /// as gamma 1.3, takes some ten thousand values to be told from a jump. Source: the exponent is Hill's (1975) estimate at a finite end.
    /// </remarks>
    public IReadOnlyList<string> LimitNotes =>
        Sample is null || Options.Support is not { } support ? [] : [.. LimitEvidence.Declared(Sample, support).Select(finding => finding.Statement)];
}
