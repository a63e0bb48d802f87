using Smoothing.Samples;

namespace Smoothing.Inference;

/// <summary>The nodes on which a permutation test places the values of two samples: decided by all of them together.</summary>
internal sealed class PermutationGrid
{
    private readonly double _from;

    private PermutationGrid(double from, double step, int size) => (_from, Step, Size) = (from, step, size);

    public double Step { get; }

    public int Size { get; }

    public static PermutationGrid Of(Sample a, Sample b, double h, int smallest, int largest)
    {
        double low = Math.Min(a.Minimum, b.Minimum);
        double high = Math.Max(a.Maximum, b.Maximum);

        // Room for the widest kernel on the circle: six deviations of √2 · 8h, less what does no harm.
        double room = 48 * h;
        double step = h / 4;
        double longest = (largest - 2) * step;
        if (high - low + room > longest)
        {
            // Far tails do not fit: keep the middle, whose ends take in what lies beyond.
            double centre = Math.Clamp((a.Quantile(0.5) + b.Quantile(0.5)) / 2, low + ((longest - room) / 2), high - ((longest - room) / 2));
            low = centre - ((longest - room) / 2);
            high = centre + ((longest - room) / 2);
        }

        int size = smallest;
        while (size < largest && (size - 2) * step < high - low + room)
        {
            size *= 2;
        }

        return new PermutationGrid(low - step, step, size) { LastPlace = ((high - low) / step) + 1 };
    }

    private double LastPlace { get; init; }

    public (int[] Nodes, double[] Right, double[] Weights) Places(Sample a, Sample b)
    {
        int n = a.Count + b.Count;
        var nodes = new int[n];
        var right = new double[n];
        double[] weights = a.IsWeighted || b.IsWeighted ? [.. Weights(a), .. Weights(b)] : [];
        for (int i = 0; i < n; i++)
        {
            double place = Place(i < a.Count ? a.Values[i] : b.Values[i - a.Count]);
            nodes[i] = (int)place;
            right[i] = place - nodes[i];
        }

        return (nodes, right, weights);
    }

    /// <summary>Whole numbers of values at the nearest nodes: of the first sample and of both.</summary>
    public (long[] First, long[] All) Counts(Sample a, Sample b)
    {
        var first = new long[Size];
        Add(a, first);
        long[] all = [.. first];
        Add(b, all);
        return (first, all);
    }

    /// <summary>Counts as they are; relative weights with mean 1, so that those of two samples can change places.</summary>
    public static double[] Weights(Sample sample)
    {
        if (!sample.IsWeighted)
        {
            return [.. Enumerable.Repeat(1.0, sample.Count)];
        }

        double scale = sample.WeightMeaning == WeightMeaning.Counts ? 1 : sample.Count / sample.TotalWeight;
        return [.. sample.Weights.ToArray().Select(w => w * scale)];
    }

    private void Add(Sample sample, long[] counts)
    {
        for (int i = 0; i < sample.Count; i++)
        {
            counts[(int)Math.Round(Place(sample.Values[i]))] += sample.IsWeighted ? (long)Math.Round(sample.Weights[i]) : 1;
        }
    }

    private double Place(double x) => Math.Clamp((x - _from) / Step, 0, LastPlace);

}
