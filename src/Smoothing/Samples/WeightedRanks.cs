using Smoothing.Numerics;

namespace Smoothing.Samples;

/// <summary>The line of positions that weighted quantiles are read from.</summary>
/// <remarks>
/// Method: each distinct value is a plateau of length v − min(v, 1), v its weight scaled to sum to m, joined to the next by a
/// straight piece of length (min(v, 1) + min(u, 1))/2. Whole-number weights give plateaus of v − 1 and pieces of length 1, which is the
/// line of the repeated values; weights of 1 give the ordinary (n − 1)p. Own extension to weights below 1, chosen so that it
/// is continuous in the weights, unchanged by scaling them and by splitting a row in two equal values.
/// </remarks>
internal sealed class WeightedRanks
{
    private readonly double[] _values;
    private readonly double[] _starts;
    private readonly double[] _ends;

    public WeightedRanks(ReadOnlySpan<double> sorted, ReadOnlySpan<double> weights, double count)
    {
        CompensatedSum total = default;
        int distinct = 0;
        for (int i = 0; i < sorted.Length; i++)
        {
            total.Add(weights[i]);
            distinct += i == 0 || sorted[i] != sorted[i - 1] ? 1 : 0;
        }

        double scale = count / total.Value;
        _values = new double[distinct];
        _starts = new double[distinct];
        _ends = new double[distinct];
        double position = 0, previous = 0;
        for (int i = 0, k = 0; i < sorted.Length; k++)
        {
            double weight = 0;
            double value = sorted[i];
            for (; i < sorted.Length && sorted[i] == value; i++)
            {
                weight += weights[i];
            }

            double scaled = weight * scale;
            double own = Math.Min(scaled, 1);
            position += k == 0 ? 0 : (previous + own) / 2;
            _values[k] = value;
            _starts[k] = position;
            position += scaled - own;
            _ends[k] = position;
            previous = own;
        }
    }

    public double Quantile(double probability)
    {
        if (probability == 1)
        {
            return _values[^1];
        }

        double position = _ends[^1] * probability;
        int at = Array.BinarySearch(_starts, position);
        at = at >= 0 ? at : ~at - 1;
        at = Math.Max(at, 0);
        if (position <= _ends[at] || at == _values.Length - 1)
        {
            return _values[at];
        }

        double fraction = (position - _ends[at]) / (_starts[at + 1] - _ends[at]);
        return Sample.Between(_values[at], _values[at + 1], fraction);
    }
}
