using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Estimation;

/// <summary>Total weight below and from any position of the sorted values on; counts when there are no weights.</summary>
internal sealed class PrefixWeights
{
    private readonly int _count;
    private readonly double[] _below;
    private readonly double[] _from;

    public PrefixWeights(Sample sample)
    {
        _count = sample.Count;
        ReadOnlySpan<double> weights = sample.SortedWeights;
        _below = weights.IsEmpty ? [] : new double[_count + 1];
        _from = weights.IsEmpty ? [] : new double[_count + 1];
        CompensatedSum below = default, from = default;
        for (int i = 0; i < weights.Length; i++)
        {
            below.Add(weights[i]);
            from.Add(weights[_count - 1 - i]);
            _below[i + 1] = below.Value;
            _from[_count - 1 - i] = from.Value;
        }
    }

    /// <summary>Weight of the positions before <paramref name="position"/>.</summary>
    public double Below(int position) => _below.Length == 0 ? position : _below[position];

    /// <summary>Weight of <paramref name="position"/> and all after it.</summary>
    public double From(int position) => _from.Length == 0 ? _count - position : _from[position];

    /// <summary>Weight of [from, to), a short run: added up, not subtracted.</summary>
    public static double Between(ReadOnlySpan<double> weights, int from, int to)
    {
        if (weights.IsEmpty)
        {
            return to - from;
        }

        CompensatedSum sum = default;
        for (int i = from; i < to; i++)
        {
            sum.Add(weights[i]);
        }

        return sum.Value;
    }
}
