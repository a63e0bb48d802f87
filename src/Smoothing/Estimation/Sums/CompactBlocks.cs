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
/// <para>The last block of a cell may stretch past the cell; it is left out of the suffixes and its own moments stand beside them.</para>
/// <para>Validity: ascending finite values, no end of a window beyond the largest double. Running sums carry their rounding
/// error along, so ten million equal values are as exact as ten. Source of the two-stack idea: common practice.</para>
/// </remarks>
internal sealed unsafe partial class CompactBlocks
{
    /// <summary>Values per block: loose values cost about as much as the moments of a cubic.</summary>
    public const int Size = 16;

    private readonly Sample _sample;
    private readonly int _stride;
    private readonly int[] _first;
    private readonly int[] _last;
    private readonly double[] _leftPrefix;
    private readonly double[] _leftSuffix;
    private readonly double[] _rightPrefix;
    private readonly double[] _rightSuffix;
    private double _inverse;

    public CompactBlocks(Sample sample, double bandwidth, int degree)
    {
        _sample = sample;
        Degree = degree;
        _stride = degree + 1;
        int blocks = sample.Count / Size;
        _first = new int[blocks];
        _last = new int[blocks];
        _leftPrefix = new double[blocks * _stride];
        _leftSuffix = new double[blocks * _stride];
        _rightPrefix = new double[blocks * _stride];
        _rightSuffix = new double[blocks * _stride];
        Fill(bandwidth);
    }

    public double Bandwidth { get; private set; }

    /// <summary>Highest power of s in the moments.</summary>
    public int Degree { get; }

    /// <summary>Lays the tables out anew for another bandwidth; not while others read them.</summary>
    public void Fill(double bandwidth)
    {
        Bandwidth = bandwidth;
        _inverse = 1 / bandwidth;
        Group();
        fixed (double* values = _sample.SortedValues, weights = _sample.SortedWeights)
        fixed (double* leftPrefix = _leftPrefix, leftSuffix = _leftSuffix, rightPrefix = _rightPrefix, rightSuffix = _rightSuffix)
        {
            for (int first = 0; first < _first.Length; first = _last[first] + 1)
            {
                FillPrefixes(values, weights, first, _last[first], leftPrefix, leftSuffix, rightPrefix, rightSuffix);
                FillSuffixes(values, first, _last[first], leftSuffix, rightSuffix);
            }
        }
    }

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

    // Leaves the plain moments of every block in the tables of suffixes, where the second pass finds them.
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private void FillPrefixes(
        double* values, double* weights, int first, int last, double* leftPrefix, double* leftSuffix, double* rightPrefix, double* rightSuffix)
    {
        double* block = stackalloc double[EdgeMoments.MaximumDegree + 1];
        double* room = stackalloc double[4 * (EdgeMoments.MaximumDegree + 1)];
        int degree = Degree;
        var left = new RunningMoments(room, degree);
        var right = new RunningMoments(room + (2 * (degree + 1)), degree);
        double start = values[first * Size];
        for (int b = first; b <= last; b++)
        {
            double* x = values + ((long)b * Size);
            double* w = weights == null ? null : weights + ((long)b * Size);
            double* below = leftSuffix + ((long)b * _stride);
            double* above = rightSuffix + ((long)b * _stride);
            EdgeMoments.OfBlock(x, w, Size, x[0], _inverse, below, degree);
            EdgeMoments.OfBlock(x, w, Size, x[Size - 1], -_inverse, above, degree);
            for (int k = 0; k <= degree; k++)
            {
                block[k] = below[k];
            }

            EdgeMoments.Shift(block, degree, (x[0] - start) * _inverse);
            left.Add(block);
            left.Store(leftPrefix + ((long)b * _stride));
            if (b > first)
            {
                right.Shift((x[Size - 1] - x[-1]) * _inverse);
            }

            right.Add(above);
            right.Store(rightPrefix + ((long)b * _stride));
        }
    }

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private void FillSuffixes(double* values, int first, int last, double* leftSuffix, double* rightSuffix)
    {
        double* room = stackalloc double[4 * (EdgeMoments.MaximumDegree + 1)];
        int degree = Degree;
        var left = new RunningMoments(room, degree);
        var right = new RunningMoments(room + (2 * (degree + 1)), degree);
        double stop = last > first ? values[(last * Size) - 1] : 0; // upper end of the block before the last
        for (int b = last - 1; b >= first; b--)
        {
            double* x = values + ((long)b * Size);
            double* below = leftSuffix + ((long)b * _stride);
            double* above = rightSuffix + ((long)b * _stride);
            if (b < last - 1)
            {
                left.Shift((x[Size] - x[0]) * _inverse);
            }

            left.Add(below);
            left.Store(below);
            EdgeMoments.Shift(above, degree, (stop - x[Size - 1]) * _inverse);
            right.Add(above);
            right.Store(above);
        }
    }
}
