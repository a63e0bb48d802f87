using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;

namespace Smoothing.Estimation;

/// <summary>The window ends of eight points, without rounding (see <see cref="WindowEnd"/>), and distances to them in bandwidths.</summary>
internal readonly unsafe struct GroupEnds
{
    private readonly Vector256<double> _firstLowerHigh, _firstLowerLow, _secondLowerHigh, _secondLowerLow;
    private readonly Vector256<double> _firstUpperHigh, _firstUpperLow, _secondUpperHigh, _secondUpperLow;
    private readonly Vector256<double> _inverse;

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public GroupEnds(double* x, double bandwidth, double inverse)
    {
        Vector256<double> h = Vector256.Create(bandwidth);
        _inverse = Vector256.Create(inverse);
        (_firstLowerHigh, _firstLowerLow) = Sum(Vector256.Load(x), -h);
        (_secondLowerHigh, _secondLowerLow) = Sum(Vector256.Load(x + 4), -h);
        (_firstUpperHigh, _firstUpperLow) = Sum(Vector256.Load(x), h);
        (_secondUpperHigh, _secondUpperLow) = Sum(Vector256.Load(x + 4), h);
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public Vector256<double> FirstLower(double value) => (Vector256.Create(value) - _firstLowerHigh - _firstLowerLow) * _inverse;

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public Vector256<double> SecondLower(double value) => (Vector256.Create(value) - _secondLowerHigh - _secondLowerLow) * _inverse;

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public Vector256<double> FirstUpper(double value) => (_firstUpperHigh - Vector256.Create(value) + _firstUpperLow) * _inverse;

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public Vector256<double> SecondUpper(double value) => (_secondUpperHigh - Vector256.Create(value) + _secondUpperLow) * _inverse;

    /// <summary>w P(s) where s ≥ 0, else 0.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector256<double> Inside<T>(T form, Vector256<double> s, Vector256<double> w)
        where T : struct, IEdgeForm =>
        Vector256.GreaterThanOrEqual(s, Vector256<double>.Zero) & (form.At(s) * w);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static (Vector256<double> High, Vector256<double> Low) Sum(Vector256<double> x, Vector256<double> y)
    {
        Vector256<double> high = x + y;
        Vector256<double> back = high - x;
        return (high, (x - (high - back)) + (y - back));
    }
}
