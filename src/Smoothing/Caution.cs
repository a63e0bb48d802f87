namespace Smoothing;

/// <summary>A warning that applies to this study, with its number, its consequence and its remedy.</summary>
/// <param name="Kind">Which warning, for programs.</param>
/// <param name="Text">The sentences a reader sees.</param>
public sealed record Caution(CautionKind Kind, string Text);
