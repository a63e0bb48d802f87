using Smoothing.Numerics;

namespace Smoothing.Samples;

/// <summary>Condenses values that come in pieces: one pass, range unknown. Not safe to share between threads; give each its own and merge.</summary>
public sealed class CondensedSampleBuilder
{
    private readonly CondensingOptions _options;
    private readonly double[] _limits;
    private readonly double[] _below;
    private readonly double[] _at;
    private readonly CellStore _store;
    private CompensatedSum _weight;
    private CompensatedSum _squares;
    private bool _weighted;

    /// <summary>An empty builder.</summary>
    /// <param name="options">Width, moments, limits, what happens to NaN; its weights are not read. Null for the defaults.</param>
    /// <exception cref="ArgumentException">A width, a number of moments or a limit is unusable.</exception>
    public CondensedSampleBuilder(CondensingOptions? options = null)
    {
        _options = options ?? new CondensingOptions();
        CondensingChecks.Check(_options);
        _limits = [.. _options.Limits];
        _below = new double[_limits.Length];
        _at = new double[_limits.Length];
        int exponent = _options.CellWidth is double width ? Math.Max(Math.ILogB(width), CellStore.FinestExponent) : CellStore.FinestExponent;
        _store = new CellStore(exponent, _options.Moments, _options.CellWidth is null ? _options.MaximumCells : int.MaxValue);
    }

    /// <summary>Number of values taken in, weights aside.</summary>
    public long Count { get; private set; }

    /// <summary>Number of missing values left out.</summary>
    public long LeftOut { get; private set; }

    private double Minimum { get; set; } = double.PositiveInfinity;

    private double Maximum { get; set; } = double.NegativeInfinity;

    /// <summary>Takes in values.</summary>
    /// <param name="values">Finite; NaN is missing and handled as the options say. May be empty.</param>
    /// <param name="weights">One per value, finite and not negative; a value of weight 0 is as if it were not there. Empty for weights of 1.</param>
    /// <exception cref="ArgumentException">A value is infinite, a missing one is not allowed, or a weight is unusable; nothing of this piece is taken in.</exception>
    public void Add(ReadOnlySpan<double> values, ReadOnlySpan<double> weights = default)
    {
        CondensingChecks.Piece(values, weights, _options);
        _weighted |= !weights.IsEmpty;
        for (int i = 0; i < values.Length; i++)
        {
            double x = values[i] + 0.0, w = weights.IsEmpty ? 1 : weights[i];
            if (double.IsNaN(x))
            {
                LeftOut++;
                continue;
            }

            if (w == 0)
            {
                continue;
            }

            Count++;
            _weight.Add(w);
            _squares.Add(w * w);
            Minimum = Math.Min(Minimum, x);
            Maximum = Math.Max(Maximum, x);
            _store.Add(x, w);
            for (int j = 0; j < _limits.Length; j++)
            {
                _below[j] += x < _limits[j] ? w : 0;
                _at[j] += x == _limits[j] ? w : 0;
            }
        }
    }

    /// <summary>Takes in a condensed sample; the coarser of the two widths wins.</summary>
    /// <param name="other">Of the same number of moments, weight meaning and limits.</param>
    /// <exception cref="ArgumentException">Moments, weight meaning or limits differ.</exception>
    public void Merge(CondensedSample other)
    {
        Guard.Given(other);
        CondensingChecks.Same(other, _options.Moments, _limits, _options.WeightMeaning);
        _weighted |= other.IsWeighted;
        Count += other.Count;
        LeftOut += other.LeftOut;
        _weight.Add(other.TotalWeight);
        _squares.Add(other.SquaredWeight);
        Minimum = Math.Min(Minimum, other.Minimum);
        Maximum = Math.Max(Maximum, other.Maximum);
        for (int j = 0; j < _limits.Length; j++)
        {
            _below[j] += other.WeightBelow(_limits[j]);
            _at[j] += other.WeightAt(_limits[j]);
        }

        other.AddTo(_store);
    }

    /// <summary>The condensed sample of everything taken in so far; the builder can go on.</summary>
    /// <returns>An immutable condensed sample.</returns>
    /// <exception cref="InvalidOperationException">Nothing has been taken in.</exception>
    public CondensedSample Build()
    {
        if (Count == 0)
        {
            throw new InvalidOperationException(Guard.Text($"at least one value must have been taken in, but there are {Count} ({LeftOut} missing): add values first."));
        }

        (long[] cells, double[] sums, double[] singles, double[] singleWeights) = _store.Sorted();
        return new CondensedSample
        {
            Exponent = _store.Exponent,
            Moments = _options.Moments,
            MaximumCells = _options.MaximumCells,
            CellArray = cells,
            SumArray = sums,
            SingleArray = singles,
            SingleWeightArray = singleWeights,
            Count = Count,
            LeftOut = LeftOut,
            TotalWeight = _weight.Value,
            SquaredWeight = _squares.Value,
            Minimum = Minimum,
            Maximum = Maximum,
            IsWeighted = _weighted,
            WeightMeaning = _options.WeightMeaning,
            LimitArray = _limits,
            BelowArray = [.. _below],
            AtArray = [.. _at],
        };
    }
}
