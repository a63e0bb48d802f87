namespace Smoothing;

/// <summary>A test for a number of peaks in a <see cref="StudyDocument"/>.</summary>
/// <param name="AtMost">The hypothesis: at most this many peaks.</param>
/// <param name="CriticalBandwidth">Smallest bandwidth with that many, in the unit of the data.</param>
/// <param name="PValue">The p-value; 0.001 stands for at most that, 1 for more than 0.5 in the test for one peak.</param>
/// <param name="Rejected">Whether the hypothesis is rejected.</param>
/// <param name="Method">Which test.</param>
public sealed record DocumentGroupTest(int AtMost, double CriticalBandwidth, double PValue, bool Rejected, string Method);
