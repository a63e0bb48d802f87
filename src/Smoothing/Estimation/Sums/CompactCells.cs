using System.Runtime.CompilerServices;
using Smoothing.Numerics;

namespace Smoothing.Estimation;

/// <summary>Exact sums of polynomial kernels at many points over unsorted values: one pass over the values, no sort of them.</summary>
/// <remarks>
/// <para>Method: the ends x ± h of all windows and the points x themselves cut the line into cells. Every cell lies wholly inside or
/// outside each half window, so its values enter by their moments about the cell's lower and upper end alone. Both come, without a
/// difference, from one set of sums Σ bᵉcᴰ⁻ᵉ, b and c the distances from the two ends as shares of the cell: every sum is positive, and b + c = 1
/// lowers the degree by adding neighbours. Values find their cell through a table of equal buckets and a few comparisons with the
/// breakpoints, which are exact: rounded to the doubles that separate inside from outside. Windows then slide over the cells
/// (<see cref="SlidingMoments"/>).</para>
/// <para>Validity: finite values, ends inside the range of doubles. Dominant error: the kernel's own condition, see
/// <see cref="EdgeMoments"/>. Many equal terms would drift; a cell's sums move to a compensated place of its own after every 256 values.</para>
/// </remarks>
internal sealed unsafe partial class CompactCells
{
    private const int BucketsPerPoint = 16;  // about five buckets a breakpoint: most hold none or one
    private const int LargestBucket = 1 << 22; // a longer table would fall out of every cache
    private const int Padding = 16;          // breakpoints +∞ after the last: comparisons may read on
    private const int CarryAfter = 256;      // values a cell takes before its sums are carried: equal terms drift by 1e-14 at most

    private readonly AlignedRoom _breakpoints = new();
    private readonly AlignedRoom _records = new();
    private readonly AlignedRoom _carried = new();
    private readonly AlignedRoom _moments = new();
    private readonly AlignedRoom _front = new();
    private double[] _sortedPoints = [];
    private int[] _order = [];
    private int[] _lower = [];
    private int[] _middle = [];
    private int[] _upper = [];
    private int[] _buckets = [];
    private int[] _places = []; // for each cell: 1 + its place among the carried, 0 without one
    private int[] _counts = []; // values taken, where weights stand in the place of the count
    private int _carries;
    private int _points;
    private int _bucketCount;
    private int _mostInBucket;
    private double _origin;
    private double _scale;
    private double _inverse;
    private int _degree;
    private int _vectors; // of four sums per record
    private int _stride;  // doubles from record to record

    private double* Breakpoints => _breakpoints.Pointer + 8; // [−1] is readable

    /// <summary>destination[j] = factor · Σ w P(s) over the closed window of half width <paramref name="bandwidth"/> about x_j, in any order of x; no infinities in x.</summary>
    public void Evaluate(
        ReadOnlySpan<double> values, ReadOnlySpan<double> weights, ReadOnlySpan<double> x, double bandwidth, double* polynomial, int degree, double factor, Span<double> destination)
    {
        _points = x.Length;
        _inverse = 1 / bandwidth;
        _degree = degree;
        _vectors = (degree + 5) / 4;
        Arrange(x);
        CutLine(bandwidth);
        FillBuckets();
        Accumulate(values, weights);
        Slide(bandwidth, polynomial, factor, destination);
    }

    private void Arrange(ReadOnlySpan<double> x)
    {
        if (_sortedPoints.Length < x.Length)
        {
            _sortedPoints = new double[x.Length];
            _order = new int[x.Length];
            _lower = new int[x.Length];
            _middle = new int[x.Length];
            _upper = new int[x.Length];
        }

        x.CopyTo(_sortedPoints);
        bool ascending = true;
        for (int j = 0; j < x.Length; j++)
        {
            _order[j] = j;
            ascending &= j == 0 || x[j - 1] <= x[j];
        }

        if (!ascending)
        {
            RadixSort.Sort(_sortedPoints.AsSpan(0, x.Length), _order.AsSpan(0, x.Length));
        }
    }

    // Three ascending lists merged: lower ends, points, first doubles beyond the upper ends.
    private void CutLine(double bandwidth)
    {
        int count = 3 * _points;
        _breakpoints.Of(8L + count + Padding);
        double* cut = Breakpoints;
        int a = 0, b = 0, c = 0;
        double lower = LowerEnd(0, bandwidth), upper = UpperEnd(0, bandwidth);
        for (int k = 0; k < count; k++)
        {
            double middle = b < _points ? _sortedPoints[b] : double.PositiveInfinity;
            if (a < _points && lower <= middle && lower <= upper)
            {
                cut[k] = lower;
                _lower[a++] = k;
                lower = a < _points ? LowerEnd(a, bandwidth) : double.PositiveInfinity;
            }
            else if (b < _points && middle <= upper)
            {
                cut[k] = middle;
                _middle[b++] = k;
            }
            else
            {
                cut[k] = upper;
                _upper[c++] = k;
                upper = c < _points ? UpperEnd(c, bandwidth) : double.PositiveInfinity;
            }
        }

        cut[-1] = cut[0];
        for (int k = 0; k < Padding; k++)
        {
            cut[count + k] = double.PositiveInfinity;
        }
    }

    private double LowerEnd(int j, double bandwidth) => WindowEnd.Of(_sortedPoints[j], -bandwidth).Ceiling;

    private double UpperEnd(int j, double bandwidth) => Math.BitIncrement(WindowEnd.Of(_sortedPoints[j], bandwidth).Floor);

    private void FillBuckets()
    {
        int count = 3 * _points;
        double* cut = Breakpoints;
        _bucketCount = (int)Math.Min(LargestBucket, (long)BucketsPerPoint * _points);
        if (_buckets.Length < _bucketCount + 1)
        {
            _buckets = new int[_bucketCount + 1];
        }

        _origin = cut[0];
        _scale = (_bucketCount - 1) / (cut[count - 1] - _origin);
        Array.Clear(_buckets, 0, _bucketCount + 1);
        for (int k = 0; k < count; k++)
        {
            _buckets[Bucket(cut[k]) + 1]++;
        }

        _mostInBucket = 0;
        for (int z = 1; z <= _bucketCount; z++)
        {
            _mostInBucket = Math.Max(_mostInBucket, _buckets[z]);
            _buckets[z] += _buckets[z - 1];
        }
    }

    // The same arithmetic as the vector loop below: rounding to the nearest bucket is monotone, and that is all it needs.
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private int Bucket(double x) => (int)BitConverter.DoubleToInt64Bits(Math.Min(Math.Max((x - _origin) * _scale, 0), _bucketCount - 1) + Rounder);
}
