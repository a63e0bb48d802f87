namespace Smoothing;

/// <summary>Round tick positions on an axis: steps of 1, 2 or 5 times a power of ten.</summary>
internal static class AxisTicks
{
    /// <summary>Ticks inside [from, to], about <paramref name="wanted"/> of them, and the decimals their labels need.</summary>
    public static (double[] Positions, int Decimals) Between(double from, double to, int wanted)
    {
        double span = to - from;
        if (!(span > 0 && double.IsFinite(span)))
        {
            return ([from], 3);
        }

        double raw = span / Math.Max(1, wanted);
        double power = Math.Pow(10, Math.Floor(Math.Log10(raw)));
        double step = power * (raw / power) switch { < 1.5 => 1, < 3.5 => 2, < 7.5 => 5, _ => 10 };
        int decimals = Math.Clamp((int)-Math.Floor(Math.Log10(step) + 1e-9), 0, 15);
        var ticks = new List<double>();
        for (double k = Math.Ceiling(from / step); k * step <= to + (span * 1e-9) && ticks.Count < 50; k++)
        {
            double tick = k * step;
            ticks.Add(tick == 0 ? 0 : tick);
        }

        return ticks.Count == 0 ? ([from], decimals) : (ticks.ToArray(), decimals);
    }
}
