using Smoothing.Estimation;
using Smoothing.Kernels;
using Smoothing.Numerics;

namespace Smoothing.Bandwidths;

/// <summary>A bandwidth together with how it was chosen. Stands for its number wherever a <see cref="double"/> is wanted.</summary>
public sealed record BandwidthChoice
{
    internal BandwidthChoice(double value, BandwidthRule rule, BandwidthStatus status, Kernel kernel)
    {
        Value = value;
        Rule = rule;
        Status = status;
        Kernel = kernel;
    }

    /// <summary>h: the scale of <see cref="Kernel"/> as written, in the unit of the data; positive and finite.</summary>
    public double Value { get; internal init; }

    /// <summary>The rule that was asked.</summary>
    public BandwidthRule Rule { get; internal init; }

    /// <summary>How the value came about.</summary>
    public BandwidthStatus Status { get; internal init; }

    /// <summary>The kernel that h belongs to.</summary>
    public Kernel Kernel { get; internal init; }

    /// <summary>The rule whose value was taken: by <see cref="BandwidthRule.Automatic"/> the one with the smaller value, otherwise the stand-in; null when the rule's own value stands.</summary>
    public BandwidthRule? ReplacedBy { get; internal init; }

    /// <summary>n as the rule used it: the number of observations, for weighted data the effective number.</summary>
    public double EffectiveCount { get; internal init; }

    /// <summary>The measure of spread used, in the unit of the data.</summary>
    public double Scale { get; internal init; }

    /// <summary>Share of the observations that share their value with another one, in [0, 1]; NaN when the data kept no values.</summary>
    public double TiedShare { get; internal init; }

    /// <summary>The coarsest step that many values are multiples of, in the unit of the data; null when none was noticed.</summary>
    public double? LatticeStep { get; internal init; }

    /// <summary>The floor below which h was not let, in the unit of the data and for <see cref="Kernel"/>; 0 without one.</summary>
    public double Floor { get; internal init; }

    /// <summary>Every root found, smallest first, for <see cref="Kernel"/>; empty for rules that solve no equation.</summary>
    public IReadOnlyList<double> Roots { get; internal init; } = [];

    /// <summary>Every local minimum found, smallest bandwidth first, for <see cref="Kernel"/>; empty for rules that minimise nothing.</summary>
    public IReadOnlyList<double> Minima { get; internal init; } = [];

    /// <summary>Values of other rules that took part, for <see cref="Kernel"/>; <see cref="BandwidthRule.Automatic"/> lists both of its own.</summary>
    public IReadOnlyDictionary<BandwidthRule, double> Candidates { get; internal init; } = new Dictionary<BandwidthRule, double>();

    /// <summary>Whether the candidates differ by more than 1.5 times, a sign of structure on several scales.</summary>
    public bool CandidatesDisagree { get; internal init; }

    /// <summary>The criterion against h (for <see cref="Kernel"/>) when <see cref="BandwidthOptions.KeepObjective"/> asked for it: a difference whose zero is the root, or a score whose minimum is taken.</summary>
    public Curve? Objective { get; internal init; }

    /// <summary>What a reader should know, in sentences; empty when there is nothing to say.</summary>
    public IReadOnlyList<string> Notes { get; internal init; } = [];

    /// <summary>A bandwidth of the caller's own.</summary>
    internal static BandwidthChoice Given(double value, Kernel kernel, double effectiveCount) =>
        new(value, BandwidthRule.Automatic, BandwidthStatus.Given, kernel) { EffectiveCount = effectiveCount };

    /// <summary>The number h.</summary>
    /// <param name="choice">A choice.</param>
    public static implicit operator double(BandwidthChoice choice) => Guard.Given(choice).Value;

    /// <summary>The number h, for languages without implicit conversions.</summary>
    /// <returns><see cref="Value"/>.</returns>
    public double ToDouble() => Value;

    /// <summary>The bandwidth of another kernel of the same order that smooths alike: h δ₀(other)/δ₀(kernel).</summary>
    /// <param name="other">The kernel to convert to.</param>
    /// <returns>A bandwidth in the unit of the data.</returns>
    /// <exception cref="ArgumentException">The orders differ: no factor makes such kernels alike.</exception>
    public double EquivalentFor(Kernel other)
    {
        Guard.Given(other);
        if (other.Order != Kernel.Order)
        {
            throw new ArgumentException(
                Guard.Text($"Both kernels must have the same order, but {Kernel.Name} has {Kernel.Order} and {other.Name} has {other.Order}: choose a bandwidth for {other.Name} by itself."),
                nameof(other));
        }

        return Value * other.CanonicalBandwidth / Kernel.CanonicalBandwidth;
    }

    /// <summary>One line that states the value and where it comes from.</summary>
    /// <returns>Text in the invariant culture.</returns>
    public override string ToString() => Guard.Text($"h = {Value:G6} ({Rule}, {Kernel.Name}, {Status})");
}
