using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;

namespace Smoothing.Estimation;

/// <summary>One window end of eight points, without rounding (see <see cref="WindowEnd"/>), and distances to it in bandwidths.</summary>
internal readonly unsafe struct GroupEnd
{
    public readonly Vector256<double> FirstHigh, FirstLow, SecondHigh, SecondLow, SignedInverse;

    /// <param name="x">The eight points.</param>
    /// <param name="width">−h for lower ends, h for upper ones.</param>
    /// <param name="signedInverse">1/h for lower ends, −1/h for upper ones.</param>
    public GroupEnd(double* x, double width, double signedInverse)
    {
        SignedInverse = Vector256.Create(signedInverse);
        (FirstHigh, FirstLow) = Sum(Vector256.Load(x), Vector256.Create(width));
        (SecondHigh, SecondLow) = Sum(Vector256.Load(x + 4), Vector256.Create(width));
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public Vector256<double> First(double value) => (Vector256.Create(value) - FirstHigh - FirstLow) * SignedInverse;

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public Vector256<double> Second(double value) => (Vector256.Create(value) - SecondHigh - SecondLow) * SignedInverse;

    private static (Vector256<double> High, Vector256<double> Low) Sum(Vector256<double> x, Vector256<double> y)
    {
        Vector256<double> high = x + y;
        Vector256<double> back = high - x;
        return (high, (x - (high - back)) + (y - back));
    }
}

/// <summary>Eight sums that grow.</summary>
internal struct GroupSum
{
    public Vector256<double> First;
    public Vector256<double> Second;
}
