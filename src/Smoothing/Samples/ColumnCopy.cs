using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;

namespace Smoothing.Samples;

/// <summary>Copies a column in one pass, checks it and finds its range on the way.</summary>
internal static unsafe class ColumnCopy
{
    /// <summary>
    /// destination[i] = source[i] + 0, so that −0 becomes +0 and equal values get equal bits. False when a value is NaN or infinite; then nothing else is to be used.
    /// </summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public static bool TryCopy(ReadOnlySpan<double> source, Span<double> destination, out double least, out double greatest)
    {
        Vector256<double> low = Vector256.Create(double.PositiveInfinity), high = Vector256.Create(double.NegativeInfinity), nothing = Vector256<double>.Zero;
        Vector256<double> low2 = low, high2 = high, odd = nothing, odd2 = nothing;
        int i = 0;
        fixed (double* from = source, to = destination)
        {
            for (; i + 8 <= source.Length; i += 8)
            {
                Vector256<double> x = Vector256.Load(from + i) + nothing, y = Vector256.Load(from + i + 4) + nothing;
                x.Store(to + i);
                y.Store(to + i + 4);

                // x − x is 0 but for NaN and ±∞; comparisons let NaN pass unseen.
                odd += x - x;
                odd2 += y - y;
                low = Vector256.ConditionalSelect(Vector256.LessThan(x, low), x, low);
                low2 = Vector256.ConditionalSelect(Vector256.LessThan(y, low2), y, low2);
                high = Vector256.ConditionalSelect(Vector256.GreaterThan(x, high), x, high);
                high2 = Vector256.ConditionalSelect(Vector256.GreaterThan(y, high2), y, high2);
            }

            double rest = 0;
            (least, greatest) = (double.PositiveInfinity, double.NegativeInfinity);
            for (; i < source.Length; i++)
            {
                double x = from[i] + 0.0;
                to[i] = x;
                rest += x - x;
                least = x < least ? x : least;
                greatest = x > greatest ? x : greatest;
            }

            for (int lane = 0; lane < 4; lane++)
            {
                least = Math.Min(least, Math.Min(low[lane], low2[lane]));
                greatest = Math.Max(greatest, Math.Max(high[lane], high2[lane]));
            }

            return Vector256.Sum(odd + odd2) + rest == 0;
        }
    }
}
