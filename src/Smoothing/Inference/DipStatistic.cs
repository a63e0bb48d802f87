using Smoothing.Numerics;

namespace Smoothing.Inference;

/// <summary>The dip: the largest distance between the empirical distribution function and the nearest one with a single mode.</summary>
/// <remarks>
/// Method: Hartigan and Hartigan (1985), algorithm of Hartigan (1985, AS 217): the greatest convex minorant and the least concave majorant over a shrinking
/// modal interval. O(n). The p-value compares with uniform samples, the least favourable single mode in the limit: never too liberal there, low power.
/// </remarks>
internal static class DipStatistic
{
    // √n·dip of uniform samples has settled to about 1 % by then (measured in the tests); larger samples are compared with samples of this size.
    private const int LargestSimulated = 2000;

    /// <param name="x">Smallest first.</param>
    public static double Of(ReadOnlySpan<double> x)
    {
        int n = x.Length;
        if (n < 4 || x[0] == x[^1])
        {
            return n == 0 ? 0 : 1 / (2.0 * n);
        }

        int[] convex = Convex(x);
        int[] concave = Concave(x);
        var minorant = new int[n + 1];
        var majorant = new int[n + 1];
        int low = 0;
        int high = n - 1;
        double dip = 1;
        while (true)
        {
            // Touch points from the high end down, and from the low end up.
            int lengthMinor = Touch(convex, high, low, minorant);
            int lengthMajor = Touch(concave, low, high, majorant);
            int atMinor = lengthMinor - 1;
            int atMajor = lengthMajor - 1;
            double distance = 0;
            if (lengthMinor == 2 && lengthMajor == 2)
            {
                distance = 1;
            }
            else
            {
                int ix = lengthMinor - 2;
                int iv = 1;
                while (true)
                {
                    int g = minorant[ix];
                    int l = majorant[iv];
                    if (g > l)
                    {
                        int below = minorant[ix + 1];
                        double d = l - below + 1 - ((x[l] - x[below]) * (g - below) / (x[g] - x[below]));
                        iv++;
                        if (d >= distance)
                        {
                            (distance, atMinor, atMajor) = (d, ix + 1, iv - 1);
                        }
                    }
                    else
                    {
                        int before = majorant[iv - 1];
                        double d = ((x[g] - x[before]) * (l - before) / (x[l] - x[before])) - (g - before - 1);
                        ix--;
                        if (d >= distance)
                        {
                            (distance, atMinor, atMajor) = (d, ix + 1, iv);
                        }
                    }

                    ix = Math.Max(ix, 0);
                    iv = Math.Min(iv, lengthMajor - 1);
                    if (minorant[ix] == majorant[iv])
                    {
                        break;
                    }
                }
            }

            if (distance < dip)
            {
                break;
            }

            double left = Inside(x, minorant, atMinor, lengthMinor - 1, convexSide: true);
            double right = Inside(x, majorant, atMajor, lengthMajor - 1, convexSide: false);
            dip = Math.Max(dip, Math.Max(left, right));
            if (low == minorant[atMinor] && high == majorant[atMajor])
            {
                break;
            }

            low = minorant[atMinor];
            high = majorant[atMajor];
        }

        return dip / (2 * n);
    }

    /// <summary>The share of uniform samples whose dip is at least as large, with one added to both counts.</summary>
    public static double PValue(double dip, long n, ulong seed, int repetitions, CancellationToken cancellation)
    {
        int size = (int)Math.Min(n, LargestSimulated);
        double bar = dip * Math.Sqrt((double)n / size);
        int above = 0;
        var x = new double[size];
        for (int r = 0; r < repetitions; r++)
        {
            cancellation.ThrowIfCancellationRequested();
            var random = new RandomStream(seed, (ulong)r);

            // Sorted uniforms from exponential spacings; the dip is the same for any scale.
            double sum = 0;
            for (int i = 0; i < size; i++)
            {
                sum -= Math.Log(random.NextUniform());
                x[i] = sum;
            }

            above += Of(x) >= bar ? 1 : 0;
        }

        return (above + 1.0) / (repetitions + 1);
    }

    // For each point the previous touch point of the convex minorant of all points up to it.
    private static int[] Convex(ReadOnlySpan<double> x)
    {
        var touch = new int[x.Length];
        for (int j = 1; j < x.Length; j++)
        {
            int k = j - 1;
            while (k > 0)
            {
                int next = touch[k];
                if ((x[j] - x[k]) * (k - next) < (x[k] - x[next]) * (j - k))
                {
                    break;
                }

                k = next;
            }

            touch[j] = k;
        }

        return touch;
    }

    // For each point the next touch point of the concave majorant of all points from it on.
    private static int[] Concave(ReadOnlySpan<double> x)
    {
        int last = x.Length - 1;
        var touch = new int[x.Length];
        touch[last] = last;
        for (int j = last - 1; j >= 0; j--)
        {
            int k = j + 1;
            while (k < last)
            {
                int next = touch[k];
                if ((x[j] - x[k]) * (k - next) < (x[k] - x[next]) * (j - k))
                {
                    break;
                }

                k = next;
            }

            touch[j] = k;
        }

        return touch;
    }

    private static int Touch(int[] next, int from, int to, int[] chain)
    {
        int length = 1;
        chain[0] = from;
        while (chain[length - 1] != to)
        {
            int k = next[chain[length - 1]];
            chain[length++] = from > to ? Math.Max(k, to) : Math.Min(k, to);
        }

        return length;
    }

    // The largest distance between the steps and the chord of any stretch outside the modal interval.
    private static double Inside(ReadOnlySpan<double> x, int[] chain, int from, int to, bool convexSide)
    {
        double largest = 0;
        for (int j = from; j < to; j++)
        {
            int start = convexSide ? chain[j + 1] : chain[j];
            int end = convexSide ? chain[j] : chain[j + 1];
            double best = 1;
            if (end - start > 1 && x[end] != x[start])
            {
                double rate = (end - start) / (x[end] - x[start]);
                for (int k = start; k <= end; k++)
                {
                    double chord = (x[k] - x[start]) * rate;
                    best = Math.Max(best, convexSide ? k - start + 1 - chord : chord - (k - start - 1));
                }
            }

            largest = Math.Max(largest, best);
        }

        return largest;
    }
}
