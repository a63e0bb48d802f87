namespace Smoothing;

/// <summary>The smoothing of a study in a <see cref="StudyDocument"/>.</summary>
/// <param name="Kernel">Name of the kernel.</param>
/// <param name="Bandwidth">h, in the unit of the data.</param>
/// <param name="Rule">The rule that was asked.</param>
/// <param name="Status">How the bandwidth came about.</param>
/// <param name="Boundary">How the curve is mended near declared limits.</param>
public sealed record DocumentSmoothing(string Kernel, double Bandwidth, string Rule, string Status, string Boundary);
