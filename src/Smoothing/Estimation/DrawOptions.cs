namespace Smoothing.Estimation;

/// <summary>How draws from a curve are made.</summary>
public sealed record DrawOptions
{
    /// <summary>Which of 2⁶⁴ independent streams of the seed to use; default 0. Give each thread or batch its own number, and the same numbers give the same bits in any order.</summary>
    public ulong Stream { get; init; }

    /// <summary>Whether draws are pulled towards the mean so that their variance is that of the data, not larger by h²μ₂. Default false.</summary>
    /// <remarks>x ↦ m + (x − m)/√(1 + h²μ₂/s²), s² with divisor n. Then the draws follow a narrowed curve, not the curve itself. Source: Silverman (1986), §6.4.1. On the whole line with one bandwidth only.</remarks>
    public bool VarianceCorrected { get; init; }
}
