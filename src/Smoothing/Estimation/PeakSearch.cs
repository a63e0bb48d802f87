using Smoothing.Kernels;
using Smoothing.Numerics;

namespace Smoothing.Estimation;

/// <summary>Peaks, valleys and inflections of a curve.</summary>
/// <remarks>See <see cref="TurningPoints"/> for how the places are found and why none that matters is missed.</remarks>
internal static class PeakSearch
{
    /// <summary>The highest r ≤ 4 for which K⁽ʳ⁾ is a function: as far as the chain of derivatives may go.</summary>
    public static int Smoothness(Kernel kernel)
    {
        // R(K⁽ʳ⁾) exists exactly as long as no lower derivative jumps. The chain gains nothing beyond the fourth.
        for (int order = 1; order <= 4; order++)
        {
            try
            {
                kernel.Roughness(order);
            }
            catch (InvalidOperationException)
            {
                return order - 1;
            }
        }

        return 4;
    }

    public static PeakSummary Of(CurveForm form, int smoothness)
    {
        if (smoothness < 1)
        {
            throw new InvalidOperationException("The kernel jumps, so its curve is a staircase without turning points: use a continuous kernel, such as the Gaussian.");
        }

        var turning = new TurningPoints(form, smoothness);
        List<(double X, bool Maximum)> extrema = turning.Extrema();
        double[] maxima = [.. extrema.Where(e => e.Maximum).Select(e => e.X)];
        double[] minima = [.. extrema.Where(e => !e.Maximum).Select(e => e.X)];
        var tops = new double[maxima.Length];
        var floors = new double[minima.Length];
        form.Derivatives(maxima, 0, tops);
        form.Derivatives(minima, 0, floors);
        var valleys = new Valley[minima.Length];
        for (int i = 0; i < valleys.Length; i++)
        {
            valleys[i] = new Valley(minima[i], floors[i], form.Tail(minima[i], upper: false), form.Tail(minima[i], upper: true));
        }

        var peaks = new Peak[maxima.Length];
        for (int i = 0; i < peaks.Length; i++)
        {
            double left = i == 0 ? form.Ends.Lower : minima[i - 1];
            double right = i == peaks.Length - 1 ? form.Ends.Upper : minima[i];
            bool atLimit = maxima[i] == form.Ends.Lower || maxima[i] == form.Ends.Upper;
            peaks[i] = new Peak(maxima[i], tops[i], Prominence(tops, floors, i), form.Mass(left, right), new Interval(left, right), atLimit);
        }

        return new PeakSummary(peaks, valleys, smoothness >= 2 ? turning.Inflections() : []);
    }

    // Height less the higher of the two saddles; a side without a higher peak has none.
    private static double Prominence(double[] tops, double[] floors, int peak)
    {
        double left = Saddle(tops, floors, peak, -1);
        double right = Saddle(tops, floors, peak, 1);
        double saddle = Math.Max(left, right);
        return double.IsNegativeInfinity(saddle) ? tops[peak] : tops[peak] - saddle;
    }

    private static double Saddle(double[] tops, double[] floors, int peak, int direction)
    {
        double lowest = double.PositiveInfinity;
        for (int i = peak + direction; i >= 0 && i < tops.Length; i += direction)
        {
            lowest = Math.Min(lowest, floors[direction > 0 ? i - 1 : i]);

            // Of equals the leftmost counts as the higher one, so that exactly one has no saddle.
            if (tops[i] > tops[peak] || (tops[i] == tops[peak] && i < peak))
            {
                return lowest;
            }
        }

        return double.NegativeInfinity;
    }
}
