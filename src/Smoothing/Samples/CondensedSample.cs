using Smoothing.Numerics;

namespace Smoothing.Samples;

/// <summary>A column of values reduced to the moments of the cells of a lattice: mergeable, small, no values kept.</summary>
/// <remarks>
/// Cell k of width δ, a power of two, holds Σw, Σwb, Σwb², … of its values, b = x/δ − k − 1/2. Two moments are linear binning; eight give a Gaussian
/// curve to about 1e-14 of its peak for bandwidths from 16 δ on. Values that lie too far out for the lattice, and few
/// distinct values, are kept singly. Immutable; safe to share between threads.
/// </remarks>
public sealed partial class CondensedSample
{
    internal CondensedSample()
    {
    }

    /// <summary>δ: the width of a cell in the unit of the data, a power of two.</summary>
    public double CellWidth => Math.ScaleB(1, Exponent);

    /// <summary>Number of sums a cell holds, 2 to 16.</summary>
    public int Moments { get; internal init; }

    /// <summary>Number of values, weights aside; at least 1. With counts as weights, n is <see cref="EffectiveCount"/>.</summary>
    public long Count { get; internal init; }

    /// <summary>Number of missing values that were left out.</summary>
    public long LeftOut { get; internal init; }

    /// <summary>Σw, above 0; the number of values without weights.</summary>
    public double TotalWeight { get; internal init; }

    /// <summary>Σw²; the number of values without weights.</summary>
    public double SquaredWeight { get; internal init; }

    /// <summary>(Σw)²/Σw² for relative weights, Σw for counts, the number of values without weights.</summary>
    public double EffectiveCount => !IsWeighted ? Count : WeightMeaning == WeightMeaning.Counts ? TotalWeight : TotalWeight / SquaredWeight * TotalWeight;

    /// <summary>Whether weights were given.</summary>
    public bool IsWeighted { get; internal init; }

    /// <summary>What the weights mean; <see cref="WeightMeaning.Relative"/> without weights.</summary>
    public WeightMeaning WeightMeaning { get; internal init; }

    /// <summary>Smallest value, exact.</summary>
    public double Minimum { get; internal init; }

    /// <summary>Largest value, exact.</summary>
    public double Maximum { get; internal init; }

    /// <summary>The limits at which weights were counted exactly, as given.</summary>
    public IReadOnlyList<double> Limits => Array.AsReadOnly(LimitArray);

    /// <summary>Numbers of the occupied cells, rising.</summary>
    public ReadOnlySpan<long> Cells => CellArray;

    /// <summary>Σw, Σwb, … of each cell of <see cref="Cells"/>, one cell after the other.</summary>
    public ReadOnlySpan<double> Sums => SumArray;

    /// <summary>Values kept singly, rising: |x| ≥ 2⁵² δ.</summary>
    public ReadOnlySpan<double> Singles => SingleArray;

    /// <summary>The weights of <see cref="Singles"/>.</summary>
    public ReadOnlySpan<double> SingleWeights => SingleWeightArray;

    internal int Exponent { get; init; }

    internal int MaximumCells { get; init; }

    internal long[] CellArray { get; init; } = [];

    internal double[] SumArray { get; init; } = [];

    internal double[] SingleArray { get; init; } = [];

    internal double[] SingleWeightArray { get; init; } = [];

    internal double[] LimitArray { get; init; } = [];

    internal double[] BelowArray { get; init; } = [];

    internal double[] AtArray { get; init; } = [];

    /// <summary>Condenses values in one pass.</summary>
    /// <param name="values">The measurements, finite; NaN is missing and handled as the options say.</param>
    /// <param name="options">Width, moments, weights, limits; null for the defaults.</param>
    /// <returns>A condensed sample; without a given width the same cells in any order of the values.</returns>
    /// <exception cref="ArgumentException">No value is left, a value is infinite, a missing one is not allowed, or weights are unusable.</exception>
    public static CondensedSample Of(ReadOnlySpan<double> values, CondensingOptions? options = null)
    {
        options ??= new CondensingOptions();
        SampleChecks.Check(
            values, options.Weights.Span, new SampleOptions { Weights = options.Weights, WeightMeaning = options.WeightMeaning, Missing = options.Missing }, out _, out _);
        var builder = new CondensedSampleBuilder(options);
        builder.Add(values, options.Weights.Span);
        return builder.Build();
    }

    /// <summary>Two samples as one; the coarser of the two widths wins.</summary>
    /// <param name="a">One sample.</param>
    /// <param name="b">Another, of the same number of moments, weight meaning and limits.</param>
    /// <returns>What condensing all values together gives, but for the rounding of the sums.</returns>
    /// <exception cref="ArgumentException">Moments, weight meaning or limits differ.</exception>
    public static CondensedSample Merge(CondensedSample a, CondensedSample b)
    {
        Guard.Given(a);
        Guard.Given(b);
        var builder = new CondensedSampleBuilder(new CondensingOptions
        {
            Moments = a.Moments, MaximumCells = Math.Max(a.MaximumCells, b.MaximumCells), WeightMeaning = a.WeightMeaning, Limits = a.LimitArray,
        });
        builder.Merge(a);
        builder.Merge(b);
        return builder.Build();
    }

    /// <summary>The same sample with cells 2^<paramref name="halvings"/> times as wide.</summary>
    /// <param name="halvings">How often the resolution is halved, 0 or more.</param>
    /// <returns>A coarser sample; 0 gives this one.</returns>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="halvings"/> is negative or the width would leave the range of a double.</exception>
    public CondensedSample Coarsen(int halvings)
    {
        Guard.InRange(halvings, 0, 971 - Exponent);
        return halvings == 0 ? this : WidenedTo(Exponent + halvings);
    }

    /// <summary>Weight of the values below a limit, counted exactly.</summary>
    /// <param name="limit">One of <see cref="Limits"/>.</param>
    /// <returns>Σw over x &lt; limit.</returns>
    /// <exception cref="ArgumentException">The limit was not counted.</exception>
    public double WeightBelow(double limit) => BelowArray[LimitIndex(limit)];

    /// <summary>Weight of the values exactly at a limit.</summary>
    /// <param name="limit">One of <see cref="Limits"/>.</param>
    /// <returns>Σw over x = limit.</returns>
    /// <exception cref="ArgumentException">The limit was not counted.</exception>
    public double WeightAt(double limit) => AtArray[LimitIndex(limit)];

    internal void AddTo(CellStore store)
    {
        store.WidenTo(Exponent);
        if (store.Exponent == Exponent)
        {
            store.AddAll(CellArray, SumArray, SingleArray, SingleWeightArray);
            return;
        }

        var part = new CellStore(Exponent, Moments, int.MaxValue);
        part.AddAll(CellArray, SumArray, SingleArray, SingleWeightArray);
        part.WidenTo(store.Exponent);
        (long[] cells, double[] sums, double[] singles, double[] weights) = part.Sorted();
        store.AddAll(cells, sums, singles, weights);
    }

    private int LimitIndex(double limit)
    {
        int at = Array.IndexOf(LimitArray, limit);
        return at >= 0 ? at
            : throw new ArgumentException(Guard.Text($"limit must be one that was counted while condensing, but is {limit}: name it in Limits when you condense."), nameof(limit));
    }

    private CondensedSample WidenedTo(int exponent)
    {
        var store = new CellStore(Exponent, Moments, int.MaxValue);
        AddTo(store);
        store.WidenTo(exponent);
        return With(store);
    }
}
