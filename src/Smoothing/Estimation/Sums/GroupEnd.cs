using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;

namespace Smoothing.Estimation;

/// <summary>One window end of eight points, without rounding (see <see cref="WindowEnd"/>), and distances to it in bandwidths.</summary>
/// <remarks>
/// A distance is (X − High)/h − Low/h. The first difference is exact near the end and a whole number of spacings, of which Low is at most half of
/// one: the sign is right and so are all digits.
/// </remarks>
internal readonly unsafe struct GroupEnd
{
    private readonly Vector256<double> _firstHigh, _firstLow, _secondHigh, _secondLow, _signedInverse;

    /// <param name="x">The eight points.</param>
    /// <param name="width">−h for lower ends, h for upper ones.</param>
    /// <param name="signedInverse">1/h for lower ends, −1/h for upper ones.</param>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public GroupEnd(double* x, double width, double signedInverse)
    {
        _signedInverse = Vector256.Create(signedInverse);
        Vector256<double> step = Vector256.Create(width);
        Vector256<double> first = Vector256.Load(x), second = Vector256.Load(x + 4);
        _firstHigh = first + step;
        _secondHigh = second + step;
        _firstLow = Lost(first, step, _firstHigh) * -_signedInverse;
        _secondLow = Lost(second, step, _secondHigh) * -_signedInverse;
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public Vector256<double> First(Vector256<double> value) => Vector256.MultiplyAddEstimate(value - _firstHigh, _signedInverse, _firstLow);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public Vector256<double> Second(Vector256<double> value) => Vector256.MultiplyAddEstimate(value - _secondHigh, _signedInverse, _secondLow);

    // What the sum of x and y lost in rounding (Knuth).
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static Vector256<double> Lost(Vector256<double> x, Vector256<double> y, Vector256<double> sum)
    {
        Vector256<double> back = sum - x;
        return (x - (sum - back)) + (y - back);
    }
}

/// <summary>Eight sums that grow.</summary>
internal struct GroupSum
{
    public Vector256<double> First;
    public Vector256<double> Second;
}
