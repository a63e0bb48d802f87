using System.Globalization;

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

    /// <summary>A label with the decimals given: thousands grouped, a power of ten only where a plain number would be longer than a label can be.</summary>
    public static string Label(double value, int decimals)
    {
        string text = Math.Abs(value) >= 1e15 || (decimals >= 15 && value != 0)
            ? value.ToString("G5", CultureInfo.InvariantCulture)
            : value.ToString((Math.Abs(value) >= 10_000 ? "N" : "F") + decimals.ToString(CultureInfo.InvariantCulture), CultureInfo.InvariantCulture);
        return text.StartsWith('-') ? string.Concat("−", text.AsSpan(1)) : text;
    }

    /// <summary>As many ticks as fit beside each other: labels take <paramref name="character"/> units a sign and some air.</summary>
    public static (double[] Positions, int Decimals) Fitting(double from, double to, double length, double character)
    {
        for (int wanted = Math.Max(2, (int)(length / (8 * character))); ; wanted--)
        {
            (double[] ticks, int decimals) = Between(from, to, wanted);
            double needed = ticks.Max(t => Label(t, decimals).Length + 2) * character * ticks.Length;
            if (needed <= length || wanted <= 1)
            {
                return (ticks, decimals);
            }
        }
    }
}
