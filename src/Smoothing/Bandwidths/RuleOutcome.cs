namespace Smoothing.Bandwidths;

/// <summary>What a rule found, for the Gaussian kernel (or the kernel itself where the rule is exact) and in units of the input.</summary>
internal sealed record RuleOutcome(BandwidthRule Rule, double Value, BandwidthStatus Status)
{
    public BandwidthRule? ReplacedBy { get; init; }

    /// <summary>Whether the numbers already belong to the kernel and derivative asked for; else to the Gaussian and the density.</summary>
    public bool IsExact { get; init; }

    public double Scale { get; init; } = double.NaN;

    public IReadOnlyList<double> Roots { get; init; } = [];

    public IReadOnlyList<double> Minima { get; init; } = [];

    public IReadOnlyList<(BandwidthRule Rule, double Value)> Candidates { get; init; } = [];

    /// <summary>Abscissae and ordinates of the criterion.</summary>
    public (double[] H, double[] Criterion)? Objective { get; init; }

    public IReadOnlyList<string> Notes { get; init; } = [];
}
