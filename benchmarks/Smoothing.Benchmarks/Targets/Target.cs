namespace Smoothing.Benchmarks.Targets;

/// <summary>One line of the speed table: a job timed against a yardstick in the same process, in turns.</summary>
/// <param name="Id">Number of the target.</param>
/// <param name="Measurement">What is measured against what.</param>
/// <param name="Limit">The ratio that must not be exceeded.</param>
/// <param name="Reset">Run before each timing of the yardstick, not timed; may be empty.</param>
/// <param name="Yardstick">The baseline.</param>
/// <param name="Job">The work, everything included.</param>
/// <param name="Scale">What one run of the yardstick stands for, when it is a part of the baseline only.</param>
/// <param name="Measure">Where a ratio of two times is not what is asked: gives the figure itself.</param>
internal sealed record Target(string Id, string Measurement, double Limit, Action Reset, Action Yardstick, Action Job, double Scale = 1, Func<double>? Measure = null);
