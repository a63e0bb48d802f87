using Smoothing.Numerics;

namespace Smoothing.Samples;

/// <summary>A checked, immutable copy of a column of measured values, in the caller's order, with optional weights.</summary>
/// <remarks>
/// Made with one of the <c>Of</c> methods, which check every value once. Values are sorted at most once, on first need, and
/// what the sample notices about itself (ties, rounding, heaping, atoms) is worked out on first need too. Safe to share
/// between threads. Memory: 8 bytes a value (16 with weights), twice that once sorted.
/// </remarks>
public sealed partial class Sample
{
    private readonly double[] _values;
    private readonly double[] _weights;
    private readonly Lazy<(double[] Values, double[] Weights)> _sorted;
    private readonly Lazy<(double Total, double Effective, double Mean, double Deviation)> _summary;

    private Sample(double[] values, double[] weights, SampleOptions options, int leftOut, int weightless, (double Least, double Greatest)? range = null)
    {
        _values = values;
        _weights = weights;
        LeftOut = leftOut;
        Weightless = weightless;
        Name = options.Name;
        Unit = options.Unit;
        WeightMeaning = options.WeightMeaning;
        _sorted = new Lazy<(double[], double[])>(Sort);
        _range = range is { } known ? new Lazy<(double, double)>(known) : new Lazy<(double, double)>(FindRange);
        _summary = new Lazy<(double Total, double Effective, double Mean, double Deviation)>(() => SampleSummary.Of(values, weights, WeightMeaning));
        (TotalWeight, EffectiveCount) = weights.Length == 0 ? (values.Length, values.Length) : (_summary.Value.Total, _summary.Value.Effective);
        _ranks = new Lazy<WeightedRanks>(() => new WeightedRanks(SortedValues, SortedWeights, WeightMeaning == WeightMeaning.Counts ? TotalWeight : EffectiveCount));
        _table = new Lazy<ValueTable>(() => new ValueTable(this));
        _tiedShare = new Lazy<double>(() => ValueTable.TiedShare(this));
        _roundingUnit = new Lazy<RoundingUnit?>(() => RoundingFinder.Find(this));
        _heapingUnit = new Lazy<HeapingUnit?>(() => HeapingFinder.Find(this));
        _atoms = new Lazy<AtomFinder>(() => new AtomFinder(this));
        _lagOne = new Lazy<double>(() => LagCorrelation.LagOne(_values));
    }

    /// <summary>Number of rows kept: neither missing nor of weight 0. At least 1. With counts as weights, n is <see cref="EffectiveCount"/>.</summary>
    public int Count => _values.Length;

    /// <summary>Number of missing values that were left out.</summary>
    public int LeftOut { get; }

    /// <summary>Number of values left out because their weight is 0: such a value is treated as if it were not there.</summary>
    public int Weightless { get; }

    /// <summary>Name of the quantity, empty when not given.</summary>
    public string Name { get; }

    /// <summary>Unit of the values, empty when not given.</summary>
    public string Unit { get; }

    /// <summary>Whether weights were given.</summary>
    public bool IsWeighted => _weights.Length > 0;

    /// <summary>What the weights mean; <see cref="WeightMeaning.Relative"/> without weights.</summary>
    public WeightMeaning WeightMeaning { get; }

    /// <summary>Σw, above 0; the number of values without weights.</summary>
    public double TotalWeight { get; }

    /// <summary>(Σw)²/Σw² for relative weights, in [1, <see cref="Count"/>]; Σw for counts; the number of values without weights.</summary>
    public double EffectiveCount { get; }

    /// <summary>Σwx/Σw, in the unit of the data.</summary>
    /// <remarks>Two passes: sums of blocks, then the mean of what is left. Error about one rounding of the largest value, also for values near ±1e308.</remarks>
    public double Mean => _summary.Value.Mean;

    /// <summary>√(Σw(x − mean)²/Σw · m/(m − 1)) with m = <see cref="EffectiveCount"/>, in the unit of the data; divisor n − 1 without weights.</summary>
    /// <remarks>0 for one value, for equal values and where the effective count is 1. Squares neither overflow nor vanish; +∞ only where the result itself exceeds a double.</remarks>
    public double StandardDeviation => _summary.Value.Deviation;

    /// <summary>Smallest value, among those of weight above 0.</summary>
    public double Minimum => IsSorted ? SortedValues[0] : _range.Value.Least;

    /// <summary>Largest value, among those of weight above 0.</summary>
    public double Maximum => IsSorted ? SortedValues[^1] : _range.Value.Greatest;

    /// <summary>Quantile(0.75) − Quantile(0.25), in the unit of the data, not negative; 0 where half the weight or more is tied at one value.</summary>
    public double InterquartileRange => Quantile(0.75) - Quantile(0.25);

    /// <summary>The values kept, in the caller's order. −0 is stored as 0.</summary>
    public ReadOnlySpan<double> Values => _values;

    /// <summary>The weights of <see cref="Values"/>, as given; empty without weights.</summary>
    public ReadOnlySpan<double> Weights => _weights;

    /// <summary>The values kept, smallest first. The first call sorts: n log n.</summary>
    public ReadOnlySpan<double> SortedValues => _sorted.Value.Values;

    /// <summary>The weights of <see cref="SortedValues"/>; empty without weights.</summary>
    public ReadOnlySpan<double> SortedWeights => _sorted.Value.Weights;

    /// <summary>Copies and checks a column of values.</summary>
    /// <param name="values">The measurements, finite; NaN is missing and handled as the options say.</param>
    /// <param name="options">Weights, missing values, name and unit; null for the defaults.</param>
    /// <returns>An immutable sample.</returns>
    /// <exception cref="ArgumentException">No value is left, a value is infinite, a missing one is not allowed, or weights are unusable.</exception>
    /// <remarks>Cost: one vectorised pass that copies, checks and finds the range, a few more with weights or missing values; the mean and the rest are worked out on first need; nothing is sorted.</remarks>
    public static Sample Of(ReadOnlySpan<double> values, SampleOptions? options = null)
    {
        options ??= new SampleOptions();
        ReadOnlySpan<double> weights = options.Weights.Span;
        if (weights.IsEmpty && !values.IsEmpty && SampleChecks.Options(options))
        {
            var copy = GC.AllocateUninitializedArray<double>(values.Length);
            if (ColumnCopy.TryCopy(values, copy, out double least, out double greatest))
            {
                return new Sample(copy, [], options, 0, 0, (least, greatest));
            }
        }

        SampleChecks.Check(values, weights, options, out int missing, out int weightless);
        var kept = new double[values.Length - missing - weightless];
        var keptWeights = weights.IsEmpty ? [] : new double[kept.Length];
        if (kept.Length == values.Length)
        {
            values.CopyTo(kept);
            weights.CopyTo(keptWeights);
        }
        else
        {
            for (int i = 0, k = 0; i < values.Length; i++)
            {
                if (double.IsNaN(values[i]) || (!weights.IsEmpty && weights[i] == 0))
                {
                    continue;
                }

                if (!weights.IsEmpty)
                {
                    keptWeights[k] = weights[i];
                }

                kept[k++] = values[i];
            }
        }

        // −0 + 0 is +0: equal values get equal bits, whatever the order of the rows.
        System.Numerics.Tensors.TensorPrimitives.Add(kept, 0.0, kept);
        return new Sample(kept, keptWeights, options, missing, weightless);
    }

    private (double[] Values, double[] Weights) Sort()
    {
        var values = (double[])_values.Clone();
        if (!IsWeighted)
        {
            RadixSort.Sort(values);
            return (values, []);
        }

        var order = new int[values.Length];
        var weights = new double[values.Length];
        for (int i = 0; i < order.Length; i++)
        {
            order[i] = i;
        }

        RadixSort.Sort(values, order);
        for (int i = 0; i < order.Length; i++)
        {
            weights[i] = _weights[order[i]];
        }

        return (values, weights);
    }
}
