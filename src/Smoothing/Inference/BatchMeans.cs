using Smoothing.Numerics;

namespace Smoothing.Inference;

/// <summary>How much less a dependent series says than as many independent values.</summary>
/// <remarks>
/// Method: block length b from the series by Politis and White (2004) with the correction of Patton, Politis and White
/// (2009), constants from memory; the long-run variance of a transformed series y by overlapping batch means of that
/// length; then n_dep = n / max(1, LRV/var(y)). Deterministic. Holds for short memory; a trend or a season makes it too small.
/// </remarks>
internal sealed class BatchMeans
{
    private readonly int _block;

    private BatchMeans(double blockLength, double lagOne)
    {
        BlockLength = blockLength;
        LagOne = lagOne;
        _block = Math.Max(1, (int)Math.Ceiling(blockLength));
    }

    /// <summary>The block length b, in observations.</summary>
    public double BlockLength { get; }

    /// <summary>The lag-1 autocorrelation of the series.</summary>
    public double LagOne { get; }

    public static BatchMeans Of(ReadOnlySpan<double> values)
    {
        int n = values.Length;
        if (n < 8)
        {
            return new BatchMeans(1, 0);   // too short for a block length: five lags must stay below the bound
        }

        // Lags that must stay below the bound in a row, and the last lag looked at.
        int run = Math.Max(5, (int)Math.Sqrt(Math.Log10(n)));
        int longest = Math.Min((int)Math.Ceiling(Math.Sqrt(n)) + run, n - run - 2);
        double[] covariance = Autocovariances(values, Math.Min((2 * longest) + run + 2, n - 1));
        if (!(covariance[0] > 0))
        {
            return new BatchMeans(1, 0);
        }

        double bound = 2 * Math.Sqrt(Math.Log10(n) / n) * covariance[0];
        int quiet = QuietLag(covariance, bound, run, longest);
        int window = Math.Clamp(2 * Math.Max(quiet, 1), 1, longest);
        double spectrum = covariance[0];
        double slope = 0;
        for (int k = 1; k <= window; k++)
        {
            double position = (double)k / window;
            double taper = position <= 0.5 ? 1 : 2 * (1 - position);   // flat-top window
            spectrum += 2 * taper * covariance[k];
            slope += 2 * taper * k * covariance[k];
        }

        // b = (2G²/D)^(1/3) n^(1/3) with D = 4g²/3 for the circular blocks.
        double b = spectrum > 0 ? Math.Cbrt(2 * slope * slope / (4.0 / 3 * spectrum * spectrum) * n) : 1;
        return new BatchMeans(Math.Clamp(b, 1, Math.Min(3 * Math.Sqrt(n), n / 3.0)), covariance[1] / covariance[0]);
    }

    /// <summary>max(1, LRV/var) of a series in time order; 1 where it doesn't vary.</summary>
    public double Inflation(ReadOnlySpan<double> series)
    {
        int n = series.Length;
        int b = _block;
        if (n <= b)
        {
            return 1;
        }

        double mean = 0;
        foreach (double y in series)
        {
            mean += y / n;
        }

        double variance = 0;
        double window = 0;
        double squares = 0;
        for (int i = 0; i < n; i++)
        {
            double d = series[i] - mean;
            variance += d * d / n;
            window += d;
            if (i >= b)
            {
                window -= series[i - b] - mean;
            }

            if (i >= b - 1)
            {
                squares += window * window;
            }
        }

        if (!(variance > 0))
        {
            return 1;
        }

        // n/(n − b) makes up for the mean that was taken from the same series.
        double longRun = squares / (n - b + 1) / b * n / (n - b);
        return Math.Max(1, longRun / variance);
    }

    private static int QuietLag(double[] covariance, double bound, int run, int longest)
    {
        for (int m = 0; m <= longest; m++)
        {
            bool quiet = true;
            for (int k = m + 1; k <= m + run && k < covariance.Length && quiet; k++)
            {
                quiet = Math.Abs(covariance[k]) < bound;
            }

            if (quiet)
            {
                return m;
            }
        }

        int last = 1;
        for (int k = 1; k <= longest; k++)
        {
            last = Math.Abs(covariance[k]) > bound ? k : last;
        }

        return last;
    }

    private static double[] Autocovariances(ReadOnlySpan<double> values, int lags)
    {
        int n = values.Length;
        int size = 1;
        while (size < n + lags + 1)
        {
            size *= 2;
        }

        double mean = 0;
        foreach (double x in values)
        {
            mean += x / n;
        }

        var real = new double[size];
        var imaginary = new double[size];
        for (int i = 0; i < n; i++)
        {
            real[i] = values[i] - mean;
        }

        FourierPlan.Forward(real, imaginary);
        for (int i = 0; i < size; i++)
        {
            real[i] = (real[i] * real[i]) + (imaginary[i] * imaginary[i]);
            imaginary[i] = 0;
        }

        FourierPlan.Inverse(real, imaginary);
        var result = new double[lags + 1];
        for (int k = 0; k <= lags; k++)
        {
            result[k] = real[k] / n;
        }

        return result;
    }
}
