using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Inference;

/// <summary>Draws samples from a Gaussian estimate, value by value or, for many values, as counts on a grid.</summary>
/// <remarks>
/// Method: x* = X* + hε, for Silverman's form shrunk about the mean to the sample's own variance: x* = m + (y* − m + hε)/√(1 + h²/s²). Above
/// ten thousand values the counts on nodes h/16 apart are drawn as one multinomial with the estimate's own shares, whose cost does not grow with n;
/// rounding to nodes widens h by 0.02 %. Source: Silverman (1981), Efron and Tibshirani (1993), ch. 16.
/// </remarks>
internal sealed class SmoothedResamples
{
    /// <summary>From here on counts are drawn instead of values.</summary>
    public const int CountsFrom = 10_000;

    private readonly double[] _x;
    private readonly double[] _sums;
    private readonly double _mean;
    private readonly double _h;
    private readonly double _shrink;
    private readonly long _size;
    private readonly double[]? _nodes;
    private readonly double[]? _shares;

    /// <param name="sample">The values.</param>
    /// <param name="x">The same, condensed to cells where they are many, and their weights (empty for equal ones).</param>
    /// <param name="weights">See <paramref name="x"/>.</param>
    /// <param name="h">Bandwidth.</param>
    /// <param name="range">Where the estimate will be looked at: counts far from it are not drawn.</param>
    /// <param name="keepVariance">Silverman's rescaling.</param>
    public SmoothedResamples(Sample sample, double[] x, double[] weights, double h, Interval range, bool keepVariance)
    {
        _x = x;
        _h = h;
        _mean = sample.Mean;
        double ratio = h / sample.StandardDeviation;
        _shrink = keepVariance ? 1 / Math.Sqrt(1 + (ratio * ratio)) : 1;
        _size = Math.Max(2, (long)Math.Round(sample.EffectiveCount));
        _sums = [];
        if (weights.Length > 0)
        {
            _sums = new double[weights.Length];
            double sum = 0;
            for (int i = 0; i < weights.Length; i++)
            {
                sum += weights[i];
                _sums[i] = sum;
            }
        }

        if (_size >= CountsFrom)
        {
            (_nodes, _shares) = Grid(x, weights, sample.TotalWeight, h, range);
        }
    }

    /// <summary>Room for one sample: places and, when counts are drawn, their weights.</summary>
    public int Length => _nodes?.Length ?? (int)_size;

    /// <summary>Fills one sample; the weights stay empty when values are drawn.</summary>
    public ReadOnlySpan<double> Fill(ref RandomStream random, Span<double> places, Span<double> counts)
    {
        if (_nodes is not null)
        {
            BinomialDraws.Multinomial(ref random, _size, _shares, counts);
            for (int j = 0; j < _nodes.Length; j++)
            {
                places[j] = _mean + (_shrink * (_nodes[j] - _mean));
            }

            return counts[.._nodes.Length];
        }

        double mean = 0;
        for (int i = 0; i < _size; i++)
        {
            double y = _x[_sums.Length == 0 ? random.NextIndex(_x.Length) : Pick(random.NextUniform())];
            mean += y / _size;
            places[i] = y + (_h * random.NextNormal());
        }

        for (int i = 0; i < _size && _shrink < 1; i++)
        {
            places[i] = mean + (_shrink * (places[i] - mean));
        }

        return default;
    }

    private int Pick(double u)
    {
        int at = Array.BinarySearch(_sums, u * _sums[^1]);
        return Math.Min(at >= 0 ? at : ~at, _sums.Length - 1);
    }

    // Shares of the estimate in cells h/16 wide, from 9 bandwidths before the range to 9 behind it: what a count at 6 bandwidths can feel after shrinking.
    private static (double[] Nodes, double[] Shares) Grid(double[] x, double[] weights, double total, double h, Interval range)
    {
        double step = h / 16;
        double from = range.Lower - (9 * h);
        int count = (int)Math.Ceiling((range.Length + (18 * h)) / step) + 1;
        int reach = 9 * 16;
        var cells = new double[count + (2 * reach)];
        for (int i = 0; i < x.Length; i++)
        {
            double place = ((x[i] - from) / step) + reach;
            if (place >= 0 && place < cells.Length - 1)
            {
                int node = (int)place;
                double w = (weights.Length == 0 ? 1 : weights[i]) / total;
                cells[node] += w * (1 - (place - node));
                cells[node + 1] += w * (place - node);
            }
        }

        var kernel = new double[(2 * reach) + 1];
        for (int m = 0; m < kernel.Length; m++)
        {
            kernel[m] = NormalLaw.Density((m - reach) * step / h) * step / h;
        }

        var nodes = new double[count];
        var shares = new double[count];
        for (int j = 0; j < count; j++)
        {
            nodes[j] = from + (j * step);
            shares[j] = System.Numerics.Tensors.TensorPrimitives.Dot<double>(cells.AsSpan(j, kernel.Length), kernel);
        }

        return (nodes, shares);
    }
}
