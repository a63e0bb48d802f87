using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Bandwidths;

/// <content>From a sample to the input of the rules.</content>
internal sealed partial class SelectionInput
{
    public static SelectionInput Of(Sample sample, BandwidthOptions? options)
    {
        Guard.Given(sample);
        options ??= new BandwidthOptions();
        BandwidthChecks.Check(options);
        ReadOnlySpan<double> x = sample.SortedValues;
        ReadOnlySpan<double> w = sample.SortedWeights;
        var values = new List<double>(x.Length);
        var masses = new List<double>(x.Length);
        var owns = new List<double>(x.Length);
        double tied = 0;
        for (int i = 0; i < x.Length;)
        {
            double mass = 0, largest = 0, squares = 0;
            int j = i;
            for (; j < x.Length && x[j] == x[i]; j++)
            {
                double own = w.IsEmpty ? 1 : w[j];
                mass += own;
                squares += own * own;
                largest = Math.Max(largest, own);
            }

            if (mass > 0)
            {
                values.Add(x[i]);
                masses.Add(mass / sample.TotalWeight);
                bool counts = sample.IsWeighted && sample.WeightMeaning == WeightMeaning.Counts;
                owns.Add((counts ? 1 : squares / mass) / sample.TotalWeight);
                bool shared = mass > (counts ? 1 : largest);
                tied += shared ? mass / sample.TotalWeight : 0;
            }

            i = j;
        }

        BandwidthChecks.Spread(values, sample.EffectiveCount);
        // Without ties a lattice is either too fine to matter or an accident of few clusters.
        bool ties = tied > LeastSquaresRule.TieWarning;
        double step = options.RoundingUnit ?? (ties ? sample.RoundingUnit?.Step : null) ?? 0;
        double lattice = step, heapingFloor = 0;
        if (options.RoundingUnit is null && ties && sample.HeapingUnit is HeapingUnit heaping)
        {
            lattice = Math.Max(step, heaping.Step);
            heapingFloor = heaping.Step * Math.Sqrt(Math.Max(0, Math.Log(2 * heaping.Excess / Ripple)) / (2 * Math.PI * Math.PI));
        }

        double deviation = sample.StandardDeviation;
        if (!(deviation > 0 && double.IsFinite(deviation)))
        {
            // Squares of values near 1e±200 leave the range of a double; on a scale of the range they do not.
            deviation = ScaledDeviation(values, masses, sample.EffectiveCount);
        }

        return Make([.. values], [.. masses], [.. owns], sample.EffectiveCount, deviation, sample.InterquartileRange, tied, step, lattice, heapingFloor, 0, options);
    }

    /// <summary>2 exp(−2π²/4): the ripple that half a rounding step leaves.</summary>
    private const double Ripple = 0.0144;

    private static double ScaledDeviation(List<double> values, List<double> masses, double n)
    {
        double range = (0.5 * values[^1]) - (0.5 * values[0]);
        double mean = 0, square = 0;
        for (int i = 0; i < values.Count; i++)
        {
            double z = ((0.5 * values[i]) - (0.5 * values[0])) / range;
            mean += masses[i] * z;
            square += masses[i] * z * z;
        }

        return 2 * range * Math.Sqrt(Math.Max(square - (mean * mean), 1e-30) * n / (n - 1));
    }

    private static SelectionInput Make(
        double[] values, double[] masses, double[] owns, double n, double deviation, double quartiles, double tied, double rounding, double lattice, double heapingFloor, double cell, BandwidthOptions options)
    {
        double unit = quartiles > 0 ? Math.Min(deviation, quartiles) : deviation;
        // A scale of rules, not of results: its power of two keeps the division exact.
        unit = Math.ScaleB(1, Math.ILogB(unit));
        double centre = values[values.Length / 2];
        Interval support = options.Support ?? Interval.WholeLine;
        bool lower = double.IsFinite(support.Lower), upper = double.IsFinite(support.Upper);
        BandwidthChecks.Inside(values, support);
        bool mirrored = lower || upper;
        double limit = lower ? support.Lower : support.Upper;
        (double[] v, double[] m) = mirrored ? Reflect(values, masses, limit, unit, lower) : (Array.ConvertAll(values, x => (x - centre) / unit), masses);
        return new SelectionInput(v, m, n, deviation / unit, quartiles / unit, options)
        {
            Unit = unit,
            OwnMasses = mirrored ? Reflect(values, owns, limit, unit, lower).Masses : owns,
            TiedShare = tied,
            RoundingUnit = rounding / unit,
            LatticeStep = lattice / unit,
            HeapingFloor = heapingFloor / unit,
            CellFloor = CellsPerBandwidth * cell / unit,
            Reflection = mirrored ? 2 : 1,
            Circle = lower && upper ? 2 * support.Length / unit : 0,
        };
    }

    /// <summary>The values and their mirror images at a limit, each with half the mass, increasing.</summary>
    private static (double[] Values, double[] Masses) Reflect(double[] values, double[] masses, double limit, double unit, bool lower)
    {
        int n = values.Length;
        bool touching = lower ? values[0] == limit : values[^1] == limit;
        int offset = touching ? 1 : 0;
        var v = new double[(2 * n) - offset];
        var m = new double[v.Length];
        for (int i = 0; i < n; i++)
        {
            // Distances from the limit, smallest first.
            int from = lower ? i : n - 1 - i;
            double distance = Math.Abs(values[from] - limit) / unit;
            v[n - offset + i] = distance;
            m[n - offset + i] += masses[from] / 2;
            v[n - 1 - i] = -distance;
            m[n - 1 - i] += masses[from] / 2;
        }

        return (v, m);
    }
}
