namespace Smoothing.Samples;

/// <summary>The distinct values of a sample in rising order, each with its share of the weight and its number of rows.</summary>
/// <remarks>Of more than 2²⁰ rows only 2²⁰ evenly spaced order statistics are looked at: shares are then exact to about one in a million.</remarks>
internal sealed class ValueTable
{
    private const int MostRows = 1 << 20;

    public ValueTable(Sample sample)
    {
        ReadOnlySpan<double> x = sample.SortedValues, w = sample.SortedWeights;
        bool counts = sample.IsWeighted && sample.WeightMeaning == WeightMeaning.Counts;
        int stride = 1 + ((x.Length - 1) / MostRows);
        var values = new List<double>();
        var masses = new List<double>();
        var rows = new List<double>();
        double total = 0;
        for (int i = stride / 2; i < x.Length; i += stride)
        {
            double weight = w.IsEmpty ? 1 : w[i];
            double row = counts ? weight : stride;
            total += weight;
            if (values.Count > 0 && values[^1] == x[i])
            {
                masses[^1] += weight;
                rows[^1] += row;
            }
            else
            {
                values.Add(x[i]);
                masses.Add(weight);
                rows.Add(row);
            }
        }

        Values = [.. values];
        Rows = [.. rows];
        Shares = masses.ConvertAll(mass => mass / total).ToArray();
        EffectiveCount = sample.EffectiveCount;
    }

    private ValueTable(double[] values, double[] shares, double[] rows, double effectiveCount) =>
        (Values, Shares, Rows, EffectiveCount) = (values, shares, rows, effectiveCount);

    public double[] Values { get; }

    /// <summary>Shares of the weight, summing to 1 (to less in a part of a table).</summary>
    public double[] Shares { get; }

    public double[] Rows { get; }

    public double EffectiveCount { get; }

    public double LargestMagnitude => Values.Length == 0 ? 0 : Math.Max(Math.Abs(Values[0]), Math.Abs(Values[^1]));

    /// <summary>Share of the weight on values that occur more than once.</summary>
    public static double TiedShare(Sample sample)
    {
        ReadOnlySpan<double> x = sample.SortedValues, w = sample.SortedWeights;
        bool counts = sample.IsWeighted && sample.WeightMeaning == WeightMeaning.Counts;
        double tied = 0, total = 0;
        for (int i = 0; i < x.Length;)
        {
            int start = i;
            double mass = 0;
            double value = x[i];
            for (; i < x.Length && x[i] == value; i++)
            {
                mass += w.IsEmpty ? 1 : w[i];
            }

            tied += i - start > 1 || (counts && mass > 1) ? mass : 0;
            total += mass;
        }

        return tied / total;
    }

    /// <summary>The part of the table that a condition on the index keeps.</summary>
    public ValueTable Where(Func<int, bool> keep)
    {
        int[] kept = Enumerable.Range(0, Values.Length).Where(keep).ToArray();
        return new ValueTable(
            Array.ConvertAll(kept, i => Values[i]), Array.ConvertAll(kept, i => Shares[i]), Array.ConvertAll(kept, i => Rows[i]), EffectiveCount);
    }

    /// <summary>The share of the weight in [from, to].</summary>
    public double ShareBetween(double from, double to)
    {
        int at = Array.BinarySearch(Values, from);
        at = at >= 0 ? at : ~at;
        double share = 0;
        for (; at < Values.Length && Values[at] <= to; at++)
        {
            share += Shares[at];
        }

        return share;
    }
}
