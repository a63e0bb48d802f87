using System.Globalization;

namespace Smoothing.Charts.Drawing;

/// <summary>An axis: its two ends, whether it is logarithmic, and its ticks.</summary>
internal sealed class AxisScale
{
    private AxisScale(double from, double to, bool logarithmic, IReadOnlyList<(double At, string Text)> ticks) =>
        (From, To, IsLogarithmic, Ticks) = (from, to, logarithmic, ticks);

    public double From { get; }

    public double To { get; }

    public bool IsLogarithmic { get; }

    public IReadOnlyList<(double At, string Text)> Ticks { get; }

    /// <summary>A linear axis with about as many round ticks as wanted, none below <paramref name="least"/>.</summary>
    public static AxisScale Linear(double from, double to, int wanted, double least = double.NegativeInfinity, string suffix = "")
    {
        double span = to - from;
        if (!(span > 0 && double.IsFinite(span)))
        {
            return new AxisScale(from, Math.BitIncrement(from), false, [(from, Text(from, 3))]);
        }

        double raw = span / Math.Max(1, wanted);
        double power = Math.Pow(10, Math.Floor(Math.Log10(raw)));
        double step = power * (raw / power) switch { < 1.5 => 1, < 3.5 => 2, < 7.5 => 5, _ => 10 };
        int decimals = Math.Clamp((int)-Math.Floor(Math.Log10(step) + 1e-9), 0, 15);
        var ticks = new List<(double, string)>();
        for (double k = Math.Ceiling(Math.Max(from, least) / step); k * step <= to + (span * 1e-9) && ticks.Count < 50; k++)
        {
            double at = k * step;
            ticks.Add((at, Text(at == 0 ? 0 : at, decimals, step) + suffix));
        }

        return new AxisScale(from, to, false, ticks);
    }

    /// <summary>A logarithmic axis with ticks at 1, 2 and 5 times powers of ten; both ends above 0.</summary>
    public static AxisScale Logarithmic(double from, double to)
    {
        var ticks = new List<(double, string)>();
        bool wide = Math.Log10(to / from) > 4;
        for (double exponent = Math.Floor(Math.Log10(from)); exponent <= Math.Log10(to) && ticks.Count < 50; exponent++)
        {
            foreach (double digit in wide ? [1.0] : new[] { 1.0, 2, 5 })
            {
                double at = digit * Math.Pow(10, exponent);
                if (at >= from * (1 - 1e-12) && at <= to * (1 + 1e-12))
                {
                    ticks.Add((at, Text(at, (int)Math.Max(0, -exponent), at)));
                }
            }
        }

        return new AxisScale(from, to, true, ticks);
    }

    /// <summary>An axis with the ticks given.</summary>
    public static AxisScale Marked(double from, double to, IReadOnlyList<(double At, string Text)> ticks) => new(from, to, false, ticks);

    /// <summary>Where a value stands between the ends: 0 at <see cref="From"/>, 1 at <see cref="To"/>.</summary>
    public double Place(double value) => IsLogarithmic ? Math.Log(value / From) / Math.Log(To / From) : (value - From) / (To - From);

    private static string Text(double value, int decimals, double step = 1)
    {
        double size = Math.Max(Math.Abs(value), step);
        return value == 0 ? "0" : size >= 1e7 || step < 1e-6
            ? value.ToString("0.######E+0", CultureInfo.InvariantCulture)
            : value.ToString("N" + decimals.ToString(CultureInfo.InvariantCulture), CultureInfo.InvariantCulture).Replace("-", "−", StringComparison.Ordinal);
    }
}
