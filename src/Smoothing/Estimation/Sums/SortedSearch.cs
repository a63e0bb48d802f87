using System.Runtime.CompilerServices;

namespace Smoothing.Estimation;

/// <summary>Positions in ascending values, found from a near guess: constant time when the questions ascend too, O(log n) always.</summary>
internal static class SortedSearch
{
    /// <summary>How many values are below <paramref name="key"/>.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public static int Below(ReadOnlySpan<double> values, double key, int guess)
    {
        int low, high; // the answer lies in [low, high]
        if (guess < values.Length && values[guess] < key)
        {
            int step = 1;
            low = guess + 1;
            high = low;
            while (high < values.Length && values[high] < key)
            {
                low = high + 1;
                high = step < values.Length - high ? high + step : values.Length;
                step *= 2;
            }
        }
        else
        {
            int step = 1;
            high = Math.Min(guess, values.Length);
            low = high;
            while (low > 0 && !(values[low - 1] < key))
            {
                high = low - 1;
                low = Math.Max(0, high - step);
                step *= 2;
            }
        }

        while (low < high)
        {
            int middle = low + ((high - low) >> 1);
            if (values[middle] < key)
            {
                low = middle + 1;
            }
            else
            {
                high = middle;
            }
        }

        return low;
    }

    /// <summary>How many values are at most <paramref name="key"/>.</summary>
    public static int UpTo(ReadOnlySpan<double> values, double key, int guess) =>
        double.IsPositiveInfinity(key) ? values.Length : Below(values, Math.BitIncrement(key), guess);
}
