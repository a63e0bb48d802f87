using Smoothing.Estimation;
using Smoothing.Kernels;
using Smoothing.Numerics;

namespace Smoothing.Bandwidths;

/// <summary>From a rule's name to its finding, and from the finding to the public choice: stand-ins, floor, kernel, derivative, unit.</summary>
internal static partial class RuleDispatch
{
    public static BandwidthChoice Choose(BandwidthRule rule, SelectionInput input, Kernel kernel)
    {
        Guard.Given(kernel);
        RuleOutcome outcome = Find(rule, input, kernel);
        if (!(outcome.Value > 0 && double.IsFinite(outcome.Value)))
        {
            double spread = input.ScaleFor(BandwidthScale.Robust);
            outcome = outcome with
            {
                Value = NormalReferenceRule.Bandwidth(kernel, input.Options.Derivative, spread, input.N),
                Scale = spread,
                IsExact = true,
                Status = BandwidthStatus.Replaced,
                ReplacedBy = BandwidthRule.NormalReference,
                Notes = [.. outcome.Notes, Guard.Text($"{rule} gave no usable number; the normal reference stands in.")],
            };
        }

        return Finish(outcome, input, kernel);
    }

    /// <summary>The partner of the sharp estimate, in the unit of the data: the block spectrum for the fourth-order Gaussian-based kernel, not below its floor.</summary>
    public static double SharpBandwidth(SelectionInput input)
    {
        // R of (3 − u²)φ(u)/2 is 27/(32√π); 1.9 is the ratio of normal references at n = 1000, only the range of the search rests on it.
        double h = BlockSpectrumRule.Find(input, 4, 27 / (32 * NormalLaw.SqrtPi), 1.9).Value;
        return Math.Max(h, HigherOrderFloor * input.Floor) * input.Unit;
    }

    /// <summary>The bandwidth for the smoothed distribution function.</summary>
    public static BandwidthChoice ForDistribution(SelectionInput input, Kernel kernel) => Finish(DistributionRule.Find(input, Guard.Given(kernel)), input, kernel);

    internal static RuleOutcome Find(BandwidthRule rule, SelectionInput input, Kernel kernel)
    {
        double spread = input.ScaleFor(input.Options.Scale);
        switch (rule)
        {
            case BandwidthRule.NormalReference:
                return new RuleOutcome(rule, NormalReferenceRule.Bandwidth(kernel, input.Options.Derivative, spread, input.N), BandwidthStatus.Formula) { Scale = spread, IsExact = true };
            case BandwidthRule.Oversmoothed:
                BandwidthChecks.SecondOrder(kernel, rule);
                return new RuleOutcome(rule, OversmoothedRule.Bandwidth(Kernel.Gaussian, input.Deviation, input.N), BandwidthStatus.Formula) { Scale = input.Deviation };
            case BandwidthRule.SheatherJones:
                BandwidthChecks.SecondOrder(kernel, rule);
                return WithStandIn(SheatherJonesRule.Find(input), input);
            case BandwidthRule.DiffusionFixedPoint:
                BandwidthChecks.SecondOrder(kernel, rule);
                return WithStandIn(DiffusionFixedPointRule.Find(input), input);
            case BandwidthRule.Automatic when kernel.Order > 2:
                return BlockSpectrumRule.Find(input, kernel) with { Rule = rule, ReplacedBy = BandwidthRule.BlockSpectrum };
            case BandwidthRule.Automatic:
                return WithStandIn(AutomaticRule.Find(input), input);
            case BandwidthRule.DirectPlugIn:
                return DirectPlugInRule.Find(input, kernel);
            case BandwidthRule.BlockSpectrum:
                return BlockSpectrumRule.Find(input, kernel);
            case BandwidthRule.LeastSquaresCrossValidation:
                return WithStandIn(LeastSquaresRule.Find(input, kernel), input);
            case BandwidthRule.BiasedCrossValidation:
                BandwidthChecks.SecondOrder(kernel, rule);
                return WithStandIn(BiasedCrossValidationRule.Find(input), input);
            case BandwidthRule.OneSidedCrossValidation:
                BandwidthChecks.SecondOrder(kernel, rule);
                return WithStandIn(OneSidedRule.Find(input), input);
            case BandwidthRule.LikelihoodCrossValidation:
                BandwidthChecks.SecondOrder(kernel, rule);
                return WithStandIn(LikelihoodRule.Find(input), input);
            default:
                throw new ArgumentOutOfRangeException(nameof(rule), Guard.Text($"rule must be one of the named rules, but is {rule}."));
        }
    }

    /// <summary>Sheather–Jones for whatever is missing, the normal reference where that is missing too.</summary>
    private static RuleOutcome WithStandIn(RuleOutcome outcome, SelectionInput input)
    {
        if (double.IsFinite(outcome.Value) && outcome.Value > 0)
        {
            return outcome;
        }

        if (outcome.Rule is not (BandwidthRule.SheatherJones or BandwidthRule.Automatic) && SheatherJonesRule.Find(input) is { Value: > 0 } plugIn && double.IsFinite(plugIn.Value))
        {
            return outcome with
            {
                Value = plugIn.Value,
                Status = BandwidthStatus.Replaced,
                ReplacedBy = plugIn.Rule,
                Notes = [.. outcome.Notes, Guard.Text($"{outcome.Rule} found nothing in its bracket; Sheather–Jones stands in.")],
            };
        }

        double spread = input.ScaleFor(BandwidthScale.Robust);
        return outcome with
        {
            Value = NormalReferenceRule.Bandwidth(Kernel.Gaussian, 0, spread, input.N),
            Scale = spread,
            Status = BandwidthStatus.Replaced,
            ReplacedBy = BandwidthRule.NormalReference,
            Notes = [.. outcome.Notes, Guard.Text($"{outcome.Rule} found nothing in its bracket; the normal reference stands in.")],
        };
    }

    /// <summary>A fourth-order Gaussian kernel shows the lattice's ripple 2(1 + z)exp(−z), z = 2π²h²/δ², at 1.4 % with h = 0.61δ in place of 0.5δ.</summary>
    internal const double HigherOrderFloor = 1.25;

    private static BandwidthChoice Finish(RuleOutcome outcome, SelectionInput input, Kernel kernel)
    {
        int r = input.Options.Derivative;
        double factor = outcome.IsExact ? 1 : KernelFactors.FromGaussian(kernel, r) * (r == 0 ? 1 : KernelFactors.FromDensity(r, input.N));
        double floor = input.Floor * (kernel.Order == 2 ? KernelFactors.FromGaussian(kernel, 0) : HigherOrderFloor * kernel.Order / 4);
        double scaled = factor * input.Unit;
        double value = outcome.Value * factor;
        var notes = new List<string>(input.Notes);
        notes.AddRange(outcome.Notes);
        BandwidthStatus status = outcome.Status;
        // A search that starts at the floor and stays there has met it.
        if (!(value > floor * (1 + 1e-12)) && floor > 0)
        {
            value = floor;
            status = BandwidthStatus.RoundingFloor;
            notes.Add(input.CellFloor > 0.5 * input.RoundingUnit
                ? "The cells limit the resolution: the rule asks for less than two cell widths; condense with narrower cells."
                : input.HeapingFloor > 0.5 * input.RoundingUnit
                ? Guard.Text($"Heaping on multiples of {input.LatticeStep * input.Unit:G6} limits the resolution: the rule asks for a bandwidth at which the heaps show.")
                : Guard.Text($"Rounding limits the resolution: the rule asks for less than half the rounding step of {input.RoundingUnit * input.Unit:G6}."));
        }

        double[] candidates = [.. outcome.Candidates.Select(c => c.Value)];
        bool disagree = candidates.Length > 1 && candidates.Max() > AutomaticRule.Disagreement * candidates.Min();
        if (disagree)
        {
            notes.Add("The candidates differ by more than 1.5 times: structure on several scales is likely.");
        }

        return new BandwidthChoice(value * input.Unit, outcome.Rule, status, kernel)
        {
            ReplacedBy = outcome.ReplacedBy,
            EffectiveCount = input.N,
            Scale = (double.IsNaN(outcome.Scale) ? input.ScaleFor(input.Options.Scale) : outcome.Scale) * input.Unit,
            TiedShare = input.TiedShare,
            LatticeStep = input.LatticeStep > 0 ? input.LatticeStep * input.Unit : null,
            Floor = floor * input.Unit,
            Roots = Array.AsReadOnly([.. outcome.Roots.Select(h => h * scaled)]),
            Minima = Array.AsReadOnly([.. outcome.Minima.Select(h => h * scaled)]),
            Candidates = outcome.Candidates.ToDictionary(c => c.Rule, c => c.Value * scaled),
            CandidatesDisagree = disagree,
            Objective = outcome.Objective is (double[] h, double[] score) ? new Curve(Array.ConvertAll(h, x => x * scaled), score) : null,
            Notes = notes.AsReadOnly(),
        };
    }
}
