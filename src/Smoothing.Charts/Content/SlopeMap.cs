using MathNet.Numerics.Distributions;
using Smoothing.Estimation;
using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Charts.Content;

/// <summary>For each place and each bandwidth: whether the curve rises or falls beyond chance.</summary>
/// <remarks>
/// Method: Chaudhuri and Marron (1999), sections 2 and 3, with the Gaussian kernel: f̂'(x) ± q s, s² = (mean of K_h'² − f̂'²)/n; q from as many
/// independent stretches as n over the mean of the effective count n h f̂/φ(0), so that a row as a whole keeps the level; places with an effective
/// count below 5 are left open. Changes: the mean of K_h'² comes from curves at s = h/√2, since φ(u)² u² = {s⁴ f̂_s'' + s² f̂_s}/(2√π h⁵) term by
/// term; at known limits values are mirrored, where s is a little too wide. Dominant error: the normal law of f̂' with few values.
/// </remarks>
internal sealed class SlopeMap
{
    private const double FewestValues = 5;

    private SlopeMap(double[] x, double[] bandwidths, Slope[][] rows, Ridge[][] peaks) => (X, Bandwidths, Rows, Peaks) = (x, bandwidths, rows, peaks);

    /// <summary>Places, equally spaced.</summary>
    public double[] X { get; }

    /// <summary>Bandwidths, growing by one factor.</summary>
    public double[] Bandwidths { get; }

    /// <summary>One row a bandwidth, one state a place.</summary>
    public Slope[][] Rows { get; }

    /// <summary>The peaks of each row's curve.</summary>
    public Ridge[][] Peaks { get; }

    public static SlopeMap Of(Sample sample, double[] x, double[] bandwidths, double level, Interval? support)
    {
        double n = sample.EffectiveCount;
        DensityOptions? options = support is null ? null : new DensityOptions { Support = support, Boundary = BoundaryCorrection.Reflection };
        Density Curve(double h) => Density.Of(sample, Kernel.Gaussian, h, options);
        var rows = new Slope[bandwidths.Length][];
        var peaks = new Ridge[bandwidths.Length][];
        for (int r = 0; r < bandwidths.Length; r++)
        {
            (rows[r], double[] slope) = Row(Curve, x, bandwidths[r], n, level);
            peaks[r] = Ridges(x, slope, rows[r]);
        }

        return new SlopeMap(x, bandwidths, rows, peaks);
    }

    private static (Slope[] States, double[] Slopes) Row(Func<double, Density> curve, double[] x, double h, double n, double level)
    {
        int m = x.Length;
        var f = new double[m];
        var slope = new double[m];
        var narrow = new double[m];
        var bend = new double[m];
        Density own = curve(h);
        own.Values(x, f);
        own.Derivatives(x, 1, slope);
        double s = h / Math.Sqrt(2);
        Density half = curve(s);
        half.Values(x, narrow);
        half.Derivatives(x, 2, bend);
        double peak = 1 / Math.Sqrt(2 * Math.PI);
        double[] counts = [.. f.Select(v => n * h * v / peak)];
        double mean = counts.Where(c => c >= FewestValues).DefaultIfEmpty(n).Average();
        double stretches = Math.Max(1, n / mean);
        double q = Normal.InvCDF(0, 1, (1 + Math.Pow(level, 1 / stretches)) / 2);
        var states = new Slope[m];
        for (int i = 0; i < m; i++)
        {
            // In units of h, so that powers of it neither overflow nor vanish.
            double square = ((h * h * bend[i] / 4) + (narrow[i] / 2)) / (2 * Math.Sqrt(Math.PI)) * h;
            double tilt = slope[i] * h * h;
            double error = q * Math.Sqrt(Math.Max(square - (tilt * tilt), 0) / n);
            states[i] = counts[i] < FewestValues ? Slope.Sparse : tilt > error ? Slope.Rising : tilt < -error ? Slope.Falling : Slope.Open;
        }

        return (states, slope);
    }

    // A peak is established where the slope is told to rise somewhere since the last valley and to fall before the next.
    private static Ridge[] Ridges(double[] x, double[] slope, Slope[] states)
    {
        var ridges = new List<Ridge>();
        int valley = 0;
        for (int i = 1; i < x.Length; i++)
        {
            if (slope[i - 1] > 0 && slope[i] <= 0)
            {
                int next = i;
                while (next < x.Length && slope[next] <= 0)
                {
                    next++;
                }

                double at = x[i - 1] + ((x[i] - x[i - 1]) * slope[i - 1] / (slope[i - 1] - slope[i]));
                bool rises = states.AsSpan(valley, i - valley).Contains(Slope.Rising);
                bool falls = states.AsSpan(i, next - i).Contains(Slope.Falling);
                ridges.Add(new Ridge(at, rises && falls));
            }

            if (slope[i - 1] <= 0 && slope[i] > 0)
            {
                valley = i;
            }
        }

        return [.. ridges];
    }
}

/// <summary>What is known of the slope at a place.</summary>
internal enum Slope
{
    Open,
    Rising,
    Falling,
    Sparse,
}

/// <summary>A peak of a curve, and whether its two sides are told from level ground.</summary>
internal readonly record struct Ridge(double X, bool Established);
