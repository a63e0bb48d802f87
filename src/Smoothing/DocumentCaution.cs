namespace Smoothing;

/// <summary>A warning in a <see cref="StudyDocument"/>.</summary>
/// <param name="Kind">Which warning, as a name of <see cref="CautionKind"/>.</param>
/// <param name="Text">Its sentences.</param>
public sealed record DocumentCaution(string Kind, string Text);
