using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Bandwidths;

/// <content>From a condensed sample to the input of the rules.</content>
internal sealed partial class SelectionInput
{
    /// <summary>Every cell counts as its weight at the mean of its values; ties and rounding are gone.</summary>
    public static SelectionInput Of(CondensedSample sample, BandwidthOptions? options)
    {
        Guard.Given(sample);
        options ??= new BandwidthOptions();
        BandwidthChecks.Check(options);
        ReadOnlySpan<long> cells = sample.Cells;
        ReadOnlySpan<double> sums = sample.Sums;
        double width = sample.CellWidth;
        var values = new List<double>(cells.Length + sample.Singles.Length);
        var masses = new List<double>(values.Capacity);
        double within = 0;
        AddSingles(sample, values, masses, negative: true);
        for (int i = 0; i < cells.Length; i++)
        {
            double weight = sums[i * sample.Moments];
            if (weight > 0)
            {
                double mean = sums[(i * sample.Moments) + 1] / weight;
                double square = sample.Moments > 2 ? (sums[(i * sample.Moments) + 2] / weight) - (mean * mean) : 1.0 / 12;
                within += weight / sample.TotalWeight * Math.Max(0, square) * width * width;
                values.Add((cells[i] + 0.5 + mean) * width);
                masses.Add(weight / sample.TotalWeight);
            }
        }

        AddSingles(sample, values, masses, negative: false);
        double n = sample.EffectiveCount;
        BandwidthChecks.Spread(values, n);
        double[] owns = [.. masses.Select(m => Math.Min(m, 1 / n))];
        double deviation = ScaledDeviation(values, masses, n);
        deviation = Math.Sqrt((deviation * deviation) + within);
        double step = options.RoundingUnit ?? 0;
        double quartiles = Quantile(values, masses, 0.75) - Quantile(values, masses, 0.25);
        SelectionInput input = Make([.. values], [.. masses], owns, n, deviation, quartiles, double.NaN, step, step, 0, width, options);
        input.Notes.Add("Chosen from cells: ties and rounding can't be seen in them; say so with RoundingUnit if the values were rounded.");
        return input;
    }

    private static void AddSingles(CondensedSample sample, List<double> values, List<double> masses, bool negative)
    {
        for (int i = 0; i < sample.Singles.Length; i++)
        {
            if (sample.Singles[i] < 0 == negative && sample.SingleWeights[i] > 0)
            {
                values.Add(sample.Singles[i]);
                masses.Add(sample.SingleWeights[i] / sample.TotalWeight);
            }
        }
    }

    /// <summary>Linear between the means of neighbouring cells, each at the middle of its share.</summary>
    private static double Quantile(List<double> values, List<double> masses, double probability)
    {
        double before = 0;
        for (int i = 0; i < values.Count; i++)
        {
            double middle = before + (0.5 * masses[i]);
            if (middle >= probability)
            {
                double last = i == 0 ? 0 : before - (0.5 * masses[i - 1]);
                return i == 0 ? values[0] : values[i - 1] + ((values[i] - values[i - 1]) * (probability - last) / (middle - last));
            }

            before += masses[i];
        }

        return values[^1];
    }
}
