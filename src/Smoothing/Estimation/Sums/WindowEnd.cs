using System.Runtime.CompilerServices;

namespace Smoothing.Estimation;

/// <summary>x ± h to twice the working precision: an end is High + Low without error, so a value lies inside or outside without doubt.</summary>
/// <remarks>
/// Method: the error-free sum of Møller and Knuth. A distance to an end is (X − High) − Low: the first difference is exact
/// where the two are near each other, so distances keep full relative accuracy down to the smallest.
/// </remarks>
internal readonly struct WindowEnd
{
    public readonly double High;
    public readonly double Low;

    private WindowEnd(double high, double low)
    {
        High = high;
        Low = low;
    }

    /// <summary>The smallest double that is not below the end.</summary>
    public double Ceiling => Low > 0 ? Math.BitIncrement(High) : High;

    /// <summary>The largest double that is not above the end.</summary>
    public double Floor => Low < 0 ? Math.BitDecrement(High) : High;

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static WindowEnd Of(double x, double signedWidth)
    {
        double high = x + signedWidth;
        double back = high - x;
        double low = (x - (high - back)) + (signedWidth - back);
        return new WindowEnd(high, double.IsFinite(low) ? low : 0); // an end beyond the largest double holds nothing back
    }
}
