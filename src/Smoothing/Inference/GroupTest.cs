using Smoothing.Numerics;

namespace Smoothing.Inference;

/// <summary>One rung of the ladder: does the population have at most this many peaks?</summary>
public sealed class GroupTest
{
    internal GroupTest(int peaks, double criticalBandwidth, double pValue, bool isRejected, string method) =>
        (Peaks, CriticalBandwidth, PValue, IsRejected, Method) = (peaks, criticalBandwidth, pValue, isRejected, method);

    /// <summary>k: the hypothesis is "at most k peaks".</summary>
    public int Peaks { get; }

    /// <summary>The smallest bandwidth at which the curve has at most k peaks on the central 95 % of the data, in their unit.</summary>
    public double CriticalBandwidth { get; }

    /// <summary>How often data from a population with at most k peaks look at least as divided, in (0, 1]. For one peak interpolated between 0.001 and 0.5; 0.001 stands for at most that, 1 for more than 0.5.</summary>
    public double PValue { get; }

    /// <summary>Whether the hypothesis is rejected at the significance level asked for.</summary>
    public bool IsRejected { get; }

    /// <summary>Which test.</summary>
    public string Method { get; }

    /// <summary>The result in a line, invariant culture.</summary>
    /// <returns>Text such as <c>at most 1 peak: p = 0.004, rejected (…)</c>.</returns>
    public override string ToString() => Guard.Text($"at most {Peaks} {(Peaks == 1 ? "peak" : "peaks")}: p = {PValue:G2}, {(IsRejected ? "rejected" : "not rejected")} ({Method}, critical bandwidth {CriticalBandwidth:G5})");
}
