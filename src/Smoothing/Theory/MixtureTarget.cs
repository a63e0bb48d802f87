using Smoothing.Numerics;

namespace Smoothing.Theory;

/// <summary>Σ wᵢ fᵢ of any targets.</summary>
internal sealed class MixtureTarget : TargetDensity
{
    private readonly double[] _weights;
    private readonly TargetDensity[] _parts;

    private MixtureTarget(double[] weights, TargetDensity[] parts)
    {
        _weights = weights;
        _parts = parts;
        Breaks = [.. _parts.SelectMany(p => p.Breaks).Distinct().Order()];
        Splits = [.. _parts.SelectMany(p => p.Splits).Concat(Breaks).Distinct().Order()];
        Support = new Interval(_parts.Min(p => p.Support.Lower), _parts.Max(p => p.Support.Upper));
    }

    public override string Name => NameOf(_parts);

    public override Interval Support { get; }

    internal override IReadOnlyList<double> Breaks { get; }

    internal override IReadOnlyList<double> Splits { get; }

    internal override double Finest => _parts.Min(p => p.Finest);

    /// <summary>A mixture of the parts that have weight; of normal mixtures alone again a normal mixture, with its closed forms.</summary>
    public static TargetDensity Of(ReadOnlySpan<double> weights, IReadOnlyList<TargetDensity> targets)
    {
        if (weights.Length == 0 || weights.Length != targets.Count)
        {
            throw new ArgumentException(Guard.Text($"weights and targets must have one length above 0, but have {weights.Length} and {targets.Count}: pass one weight for every target."), nameof(weights));
        }

        double[] all = TargetSearch.Weights(weights);
        int[] present = [.. Enumerable.Range(0, all.Length).Where(i => Guard.Given(targets[i], Guard.Text($"targets[{i}]")) is not null && all[i] > 0)];
        double[] w = [.. present.Select(i => all[i])];
        TargetDensity[] parts = [.. present.Select(i => targets[i])];
        return parts.Length == 1 ? parts[0]
            : parts.All(p => p is NormalMixture) ? NormalMixture.Joined(NameOf(parts), w, [.. parts.Cast<NormalMixture>()])
            : new MixtureTarget(w, parts);
    }

    internal override bool Knows(int order) => _parts.All(p => p.Knows(order));

    internal override double ValueCore(double x) => Sum(p => p.ValueCore(x));

    internal override double DerivativeCore(double x, int order) => Sum(p => p.DerivativeCore(x, order));

    internal override double CumulativeCore(double x) => Sum(p => p.CumulativeCore(x));

    internal override double JumpCore(double at, int order) => Sum(p => p.Breaks.Contains(at) ? p.JumpCore(at, order) : 0);

    internal override double DrawCore(ref RandomStream random)
    {
        double u = random.NextUniform();
        int i = 0;
        while (i < _weights.Length - 1 && u >= _weights[i])
        {
            u -= _weights[i++];
        }

        return _parts[i].DrawCore(ref random);
    }

    private static string NameOf(TargetDensity[] parts) => "mixture of " + string.Join(", ", parts.Select(p => p.Name));

    private double Sum(Func<TargetDensity, double> part)
    {
        double sum = 0;
        for (int i = 0; i < _parts.Length; i++)
        {
            sum += _weights[i] * part(_parts[i]);
        }

        return sum;
    }
}
