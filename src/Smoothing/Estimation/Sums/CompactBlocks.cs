using System.Runtime.CompilerServices;
using Smoothing.Samples;

namespace Smoothing.Estimation;

/// <summary>Sorted values in blocks, with running edge moments that answer any window of width h in a few steps.</summary>
/// <remarks>
/// <para>Method: the two stacks of a sliding window (suffix sums of the front, prefix sums of the back), laid out once for all windows.
/// Blocks of 16 values are grouped into cells: a cell holds the blocks whose first value lies at most h beyond the cell's
/// own first value. First values of cells are more than h apart, so a window of width h holds at most one of them and falls
/// into a suffix of one cell and a prefix of the next, plus loose values of the blocks that its ends cut. Each suffix and
/// prefix is stored twice, as moments about its lower end (for the half window left of x) and about its upper end.</para>
/// <para>The last block of a cell may stretch past the cell; it is left out of the suffixes and summed value by value.</para>
/// <para>Validity: ascending finite values, no end of a window beyond the largest double. Running sums carry their rounding
/// error along, so ten million equal values are as exact as ten. Source of the two-stack idea: common practice.</para>
/// </remarks>
internal sealed unsafe partial class CompactBlocks
{
    /// <summary>Values per block: loose values cost about as much as the moments of a cubic.</summary>
    public const int Size = 16;

    private readonly Sample _sample;
    private readonly int _stride;
    private readonly double _inverse;
    private readonly int[] _first;
    private readonly int[] _last;
    private readonly double[] _leftPrefix;
    private readonly double[] _leftSuffix;
    private readonly double[] _rightPrefix;
    private readonly double[] _rightSuffix;

    public CompactBlocks(Sample sample, double bandwidth, int degree)
    {
        _sample = sample;
        Bandwidth = bandwidth;
        Degree = degree;
        _stride = degree + 1;
        _inverse = 1 / bandwidth;
        int blocks = sample.Count / Size;
        _first = new int[blocks];
        _last = new int[blocks];
        _leftPrefix = new double[blocks * _stride];
        _leftSuffix = new double[blocks * _stride];
        _rightPrefix = new double[blocks * _stride];
        _rightSuffix = new double[blocks * _stride];
        Group();
        fixed (double* values = sample.SortedValues, weights = sample.SortedWeights)
        {
            for (int first = 0; first < blocks; first = _last[first] + 1)
            {
                FillCell(values, weights, first, _last[first]);
            }
        }
    }

    public double Bandwidth { get; }

    /// <summary>Highest power of s in the moments.</summary>
    public int Degree { get; }

    private void Group()
    {
        ReadOnlySpan<double> values = _sample.SortedValues;
        int first = 0;
        while (first < _first.Length)
        {
            double end = WindowEnd.Of(values[first * Size], Bandwidth).Floor;
            int next = first + 1;
            while (next < _first.Length && values[next * Size] <= end)
            {
                next++;
            }

            for (int b = first; b < next; b++)
            {
                _first[b] = first;
                _last[b] = next - 1;
            }

            first = next;
        }
    }

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private void FillCell(double* values, double* weights, int first, int last)
    {
        double* block = stackalloc double[EdgeMoments.MaximumDegree + 1];
        var left = new RunningMoments(stackalloc double[2 * _stride]);
        var right = new RunningMoments(stackalloc double[2 * _stride]);
        double start = values[first * Size];
        double stop = values[(last * Size) - (last > first ? 1 : 0)]; // upper end of the block before the last
        for (int b = first; b <= last; b++)
        {
            double lower = values[b * Size];
            double upper = values[(b * Size) + Size - 1];
            Moments(values, weights, b, lower, _inverse, block);
            EdgeMoments.Shift(block, Degree, (lower - start) * _inverse);
            left.Add(block);
            left.Store(_leftPrefix.AsSpan(b * _stride, _stride));
            Moments(values, weights, b, upper, -_inverse, block);
            right.Shift(b == first ? 0 : (upper - values[(b * Size) - 1]) * _inverse);
            right.Add(block);
            right.Store(_rightPrefix.AsSpan(b * _stride, _stride));
        }

        left.Clear();
        right.Clear();
        for (int b = last - 1; b >= first; b--)
        {
            double lower = values[b * Size];
            double upper = values[(b * Size) + Size - 1];
            Moments(values, weights, b, lower, _inverse, block);
            left.Shift(b == last - 1 ? 0 : (values[(b + 1) * Size] - lower) * _inverse);
            left.Add(block);
            left.Store(_leftSuffix.AsSpan(b * _stride, _stride));
            Moments(values, weights, b, upper, -_inverse, block);
            EdgeMoments.Shift(block, Degree, (stop - upper) * _inverse);
            right.Add(block);
            right.Store(_rightSuffix.AsSpan(b * _stride, _stride));
        }
    }

    private void Moments(double* values, double* weights, int b, double reference, double signedInverse, double* block) =>
        EdgeMoments.OfBlock(values + ((long)b * Size), weights == null ? null : weights + ((long)b * Size), Size, reference, signedInverse, block, Degree);
}
