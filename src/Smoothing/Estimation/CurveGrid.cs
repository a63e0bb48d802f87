using Smoothing.Numerics;

namespace Smoothing.Estimation;

/// <summary>The grid on which turning points are looked for.</summary>
internal static class CurveGrid
{
    // Steps per bandwidth; see the bound in TurningPoints.
    private const int Steps = 16;

    // How far beyond the values the curve is looked at, in bandwidths: all zeros of the first two derivatives of the kernels lie nearer.
    private const double Reach = 6;

    // The most steps one grid may have; beyond, the steps widen. 2²⁰ doubles for each derivative are 8 MB.
    private const int MaximumSteps = 1 << 20;

    // Kinks are placed for at most this many values: each costs two evaluations.
    private const int MostValuesWithKinks = 5000;

    // How far on either side of a kink the curve is read, in bandwidths.
    private const double BesideKink = 1e-9;

    public static double[] Of(Interval ends, Interval core, double scale, ReadOnlySpan<double> sorted, IReadOnlyList<double> kinks)
    {
        double from = Math.Max(ends.Lower, core.Lower - (Reach * scale));
        double to = Math.Min(ends.Upper, core.Upper + (Reach * scale));
        var points = new List<double>();
        double start = from;
        for (int i = 1; i < sorted.Length; i++)
        {
            // A gap wider than twice the reach is one cell: the curve falls into it and climbs out of it.
            if (sorted[i] - sorted[i - 1] > 2 * Reach * scale)
            {
                Fill(points, start, Math.Min(sorted[i - 1] + (Reach * scale), to), scale);
                start = Math.Max(sorted[i] - (Reach * scale), from);
            }
        }

        Fill(points, start, to, scale);
        if (sorted.Length <= MostValuesWithKinks && kinks.Count > 0)
        {
            foreach (double value in sorted)
            {
                foreach (double kink in kinks)
                {
                    points.Add(value + kink - (BesideKink * scale));
                    points.Add(value + kink + (BesideKink * scale));
                }
            }

            points.RemoveAll(p => p < from || p > to);
        }

        return [.. points.Distinct().Order()];
    }

    private static void Fill(List<double> points, double from, double to, double scale)
    {
        int steps = (int)Math.Clamp(Math.Ceiling((to - from) / scale * Steps), 1, MaximumSteps);
        for (int i = 0; i <= steps; i++)
        {
            points.Add(i == steps ? to : from + ((to - from) * i / steps));
        }
    }
}
