using Smoothing.Numerics;

namespace Smoothing.Samples;

/// <summary>A checked, immutable copy of a column of measured values, in the caller's order, with optional weights.</summary>
/// <remarks>Values are sorted at most once, on first need. Safe to share between threads.</remarks>
public sealed partial class Sample
{
    private readonly double[] _values;
    private readonly double[] _weights;
    private readonly Lazy<(double[] Values, double[] Weights)> _sorted;

    private Sample(double[] values, double[] weights, SampleOptions options, int leftOut)
    {
        _values = values;
        _weights = weights;
        LeftOut = leftOut;
        Name = options.Name;
        Unit = options.Unit;
        WeightMeaning = options.WeightMeaning;
        _sorted = new Lazy<(double[], double[])>(Sort);
        (TotalWeight, EffectiveCount, Mean, StandardDeviation) = Summarise();
    }

    /// <summary>Number of values kept, weights aside.</summary>
    public int Count => _values.Length;

    /// <summary>Number of missing values that were left out.</summary>
    public int LeftOut { get; }

    /// <summary>Name of the quantity, empty when not given.</summary>
    public string Name { get; }

    /// <summary>Unit of the values, empty when not given.</summary>
    public string Unit { get; }

    /// <summary>Whether weights were given.</summary>
    public bool IsWeighted => _weights.Length > 0;

    /// <summary>What the weights mean; <see cref="WeightMeaning.Relative"/> without weights.</summary>
    public WeightMeaning WeightMeaning { get; }

    /// <summary>Σw; the number of values without weights.</summary>
    public double TotalWeight { get; }

    /// <summary>(Σw)²/Σw² for relative weights, Σw for counts, the number of values without weights.</summary>
    public double EffectiveCount { get; }

    /// <summary>Σwx/Σw, in the unit of the data.</summary>
    public double Mean { get; }

    /// <summary>√(Σw(x − mean)²/Σw · m/(m − 1)) with m = <see cref="EffectiveCount"/>; divisor n − 1 without weights. NaN-free: 0 for one value.</summary>
    public double StandardDeviation { get; }

    /// <summary>Smallest value.</summary>
    public double Minimum => SortedValues[0];

    /// <summary>Largest value.</summary>
    public double Maximum => SortedValues[^1];

    /// <summary>Quantile(0.75) − Quantile(0.25).</summary>
    public double InterquartileRange => Quantile(0.75) - Quantile(0.25);

    /// <summary>The values kept, in the caller's order.</summary>
    public ReadOnlySpan<double> Values => _values;

    /// <summary>The weights of <see cref="Values"/>, as given; empty without weights.</summary>
    public ReadOnlySpan<double> Weights => _weights;

    /// <summary>The values kept, smallest first.</summary>
    public ReadOnlySpan<double> SortedValues => _sorted.Value.Values;

    /// <summary>The weights of <see cref="SortedValues"/>; empty without weights.</summary>
    public ReadOnlySpan<double> SortedWeights => _sorted.Value.Weights;

    /// <summary>Copies and checks a column of values.</summary>
    /// <param name="values">The measurements, finite; NaN is missing and handled as the options say.</param>
    /// <param name="options">Weights, missing values, name and unit; null for the defaults.</param>
    /// <returns>An immutable sample.</returns>
    /// <exception cref="ArgumentException">No value is left, a value is infinite, a missing one is not allowed, or weights are unusable.</exception>
    public static Sample Of(ReadOnlySpan<double> values, SampleOptions? options = null)
    {
        options ??= new SampleOptions();
        ReadOnlySpan<double> weights = options.Weights.Span;
        SampleChecks.Check(values, weights, options);
        int missing = 0;
        foreach (double value in values)
        {
            missing += double.IsNaN(value) ? 1 : 0;
        }

        var kept = new double[values.Length - missing];
        var keptWeights = weights.IsEmpty ? [] : new double[kept.Length];
        for (int i = 0, k = 0; i < values.Length; i++)
        {
            if (!double.IsNaN(values[i]))
            {
                if (!weights.IsEmpty)
                {
                    keptWeights[k] = weights[i];
                }

                kept[k++] = values[i];
            }
        }

        return new Sample(kept, keptWeights, options, missing);
    }

    /// <summary>The p-quantile by linear interpolation at position (m − 1)p of the ordered values, m the count.</summary>
    /// <param name="probability">p in [0, 1].</param>
    /// <returns>A value between <see cref="Minimum"/> and <see cref="Maximum"/>.</returns>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="probability"/> is outside [0, 1] or NaN.</exception>
    public double Quantile(double probability)
    {
        Guard.Probability(probability);
        ReadOnlySpan<double> x = SortedValues;
        if (!IsWeighted)
        {
            double position = (x.Length - 1) * probability;
            int below = Math.Min((int)position, x.Length - 1);
            double fraction = position - below;
            return fraction == 0 ? x[below] : x[below] + (fraction * (x[below + 1] - x[below]));
        }

        return WeightedQuantile(probability);
    }

    private (double[] Values, double[] Weights) Sort()
    {
        var values = (double[])_values.Clone();
        if (!IsWeighted)
        {
            Array.Sort(values);
            return (values, []);
        }

        var weights = (double[])_weights.Clone();
        Array.Sort(values, weights);
        return (values, weights);
    }

    // With counts: as if each value stood w times. Relative weights: the same, the weights scaled to sum to the effective count.
    private double WeightedQuantile(double probability)
    {
        ReadOnlySpan<double> x = SortedValues;
        ReadOnlySpan<double> w = SortedWeights;
        double scale = EffectiveCount / TotalWeight;
        double position = (EffectiveCount - 1) * probability;
        double before = 0;
        double previous = x[0];
        for (int i = 0; i < x.Length; i++)
        {
            double width = w[i] * scale;
            if (width == 0)
            {
                continue;
            }

            if (position < before)
            {
                return previous + ((x[i] - previous) * (position - (before - 1)));
            }

            before += width;
            previous = x[i];
            if (position <= before - 1)
            {
                return x[i];
            }
        }

        return previous;
    }

    private (double Total, double Effective, double Mean, double Deviation) Summarise()
    {
        CompensatedSum total = default, squares = default, first = default;
        for (int i = 0; i < _values.Length; i++)
        {
            double w = IsWeighted ? _weights[i] : 1;
            total.Add(w);
            squares.Add(w * w);
        }

        for (int i = 0; i < _values.Length; i++)
        {
            first.Add((IsWeighted ? _weights[i] : 1) / total.Value * _values[i]);
        }

        double mean = first.Value;
        CompensatedSum spread = default;
        for (int i = 0; i < _values.Length; i++)
        {
            double d = _values[i] - mean;
            spread.Add((IsWeighted ? _weights[i] : 1) / total.Value * d * d);
        }

        double effective = !IsWeighted ? _values.Length
            : WeightMeaning == WeightMeaning.Counts ? total.Value
            : total.Value * total.Value / squares.Value;
        double deviation = effective > 1 ? Math.Sqrt(spread.Value * effective / (effective - 1)) : 0;
        return (total.Value, effective, mean, deviation);
    }
}
