using Smoothing.Numerics;

namespace Smoothing.Samples;

/// <content>Quantiles of the sample itself, unsmoothed.</content>
public sealed partial class Sample
{
    private readonly Lazy<WeightedRanks> _ranks;

    /// <summary>The p-quantile by linear interpolation at position (m − 1)p of the ordered values, m the effective count.</summary>
    /// <param name="probability">p in [0, 1]; 0 gives <see cref="Minimum"/>, 1 gives <see cref="Maximum"/>.</param>
    /// <returns>A value between <see cref="Minimum"/> and <see cref="Maximum"/>, never falling as p grows.</returns>
    /// <remarks>
    /// Counts give the same bits as the values repeated. Relative weights are scaled to sum to the effective count; a value
    /// of scaled weight v then holds v − min(v, 1) of the line of positions by itself, and between neighbours of scaled weights v and u
    /// the line runs straight over a length (min(v, 1) + min(u, 1))/2: equal weights give the unweighted quantile, and rows of
    /// equal values count as one. Cost: the first call sorts, later ones are constant (log n with weights).
    /// </remarks>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="probability"/> is outside [0, 1] or NaN.</exception>
    public double Quantile(double probability)
    {
        Guard.Probability(probability);
        if (IsWeighted)
        {
            return _ranks.Value.Quantile(probability);
        }

        ReadOnlySpan<double> x = SortedValues;
        double position = (x.Length - 1) * probability;
        int below = Math.Min((int)position, x.Length - 1);
        double fraction = position - below;
        return fraction == 0 ? x[below] : Between(x[below], x[below + 1], fraction);
    }

    /// <summary>a + fraction·(b − a) for a ≤ b, without overflow and never outside [a, b].</summary>
    internal static double Between(double a, double b, double fraction)
    {
        double gap = b - a;
        double value = double.IsFinite(gap) ? a + (fraction * gap) : ((1 - fraction) * a) + (fraction * b);
        return Math.Clamp(value, a, b);
    }
}
