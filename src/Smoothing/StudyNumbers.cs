using System.Globalization;
using Smoothing.Numerics;

namespace Smoothing;

/// <summary>Numbers and shares as people read them: rounded to what their error supports, in the invariant culture, never in powers of ten without need.</summary>
internal static class StudyNumbers
{
    private static readonly (double Value, string Words)[] s_fractions =
    [
        (1.0 / 2, "one in two"), (2.0 / 3, "two in three"), (3.0 / 4, "three in four"), (4.0 / 5, "four in five"), (9.0 / 10, "nine in ten"),
    ];

    private static readonly string[] s_small = ["zero", "one", "two", "three", "four", "five", "six", "seven", "eight", "nine", "ten", "eleven", "twelve"];

    /// <summary>The value to the place of the second digit of its error; the whole value (15 digits at most) when the error is 0.</summary>
    public static string Rounded(double value, double error) => Fixed(value, Decimals(error, value));

    /// <summary>The two ends of an interval to the place of the second digit of the error; infinite ends as words.</summary>
    public static string Range(Interval interval, double error, string unit = "")
    {
        int decimals = Decimals(error, Math.Max(Magnitude(interval.Lower), Magnitude(interval.Upper)));
        if (double.IsInfinity(interval.Upper))
        {
            return double.IsInfinity(interval.Lower) ? "anything" : "at least " + WithUnit(Fixed(interval.Lower, decimals), unit);
        }

        return double.IsInfinity(interval.Lower)
            ? "at most " + WithUnit(Fixed(interval.Upper, decimals), unit)
            : Fixed(interval.Lower, decimals) + " to " + WithUnit(Fixed(interval.Upper, decimals), unit);
    }

    /// <summary>A number followed by its unit, if there is one.</summary>
    public static string WithUnit(string number, string unit) => unit.Length == 0 ? number : number + " " + unit;

    /// <summary>A share in percent, rounded to what its interval supports.</summary>
    public static string Percent(double share, double error) => Fixed(100 * share, Math.Clamp(Decimals(100 * error, 100 * share), 0, 4)) + " %";

    /// <summary>An interval of shares in percent.</summary>
    public static string PercentRange(Interval interval)
    {
        int decimals = Math.Clamp(Decimals(100 * interval.Length / 2, 100 * interval.Upper), 0, 4);
        return Fixed(100 * interval.Lower, decimals) + " to " + Fixed(100 * interval.Upper, decimals) + " %";
    }

    /// <summary>"about one in nine" where a small fraction comes within 6 % of the share; empty otherwise.</summary>
    public static string OneIn(double share)
    {
        if (!(share > 0 && share < 1))
        {
            return share == 0 ? "none" : share == 1 ? "all" : "";
        }

        if (share < 0.45)
        {
            double k = Math.Round(1 / share);
            double shown = k > 100 ? Math.Round(k, 2 - (int)Math.Ceiling(Math.Log10(k)) < 0 ? 0 : 0) : k;
            return Math.Abs((1 / shown / share) - 1) < 0.06 ? "about one in " + CountWord(shown) : "";
        }

        foreach ((double value, string words) in s_fractions)
        {
            if (Math.Abs((share / value) - 1) < 0.03)
            {
                return "about " + words;
            }
        }

        return "";
    }

    /// <summary>"between one in ten and one in eight" for an interval of small shares; empty where that would not be read easily.</summary>
    public static string OneInRange(Interval shares)
    {
        if (!(shares.Lower > 0 && shares.Upper < 0.45))
        {
            return "";
        }

        double far = Math.Ceiling(1 / shares.Lower);
        double near = Math.Floor(1 / shares.Upper);
        return far > 200 || far == near ? "" : "between one in " + CountWord(far) + " and one in " + CountWord(near);
    }

    /// <summary>Whole numbers up to twelve as words, larger ones grouped by thousands.</summary>
    public static string CountWord(double count) => count >= 0 && count <= 12 && count == Math.Floor(count) ? s_small[(int)count] : Count(count);

    /// <summary>A count with commas between thousands.</summary>
    public static string Count(double count) => count.ToString(count == Math.Floor(count) ? "N0" : "N1", CultureInfo.InvariantCulture);

    /// <summary>A p-value: three decimals, or "below 0.001".</summary>
    public static string PValue(double p) => p < 0.001 ? "below 0.001" : Fixed(p, p < 0.1 ? 3 : 2);

    /// <summary>A value with as many digits as it was given with (up to 12 significant), such as a limit the caller typed.</summary>
    public static string AsGiven(double value) => Plain(value, 12);

    /// <summary>A value to the given number of significant digits.</summary>
    public static string Significant(double value, int digits) => value == 0 ? "0" : Fixed(value, digits - 1 - Exponent(value));

    private static double Magnitude(double value) => double.IsFinite(value) ? Math.Abs(value) : 0;

    private static int Exponent(double value) => (int)Math.Floor(Math.Log10(Math.Abs(value)));

    // Second significant digit of the error; without an error, twelve significant digits of the value.
    private static int Decimals(double error, double value)
    {
        if (!(error > 0 && double.IsFinite(error)))
        {
            return value == 0 ? 0 : Math.Max(0, 11 - Exponent(value));
        }

        int decimals = 1 - Exponent(error);

        // 0.996 with two digits is 1.0: the rounding carries into the next place.
        double carried = Math.Round(error * Math.Pow(10, decimals)) >= 100 ? 1 : 0;
        return decimals - (int)carried;
    }

    private static string Fixed(double value, int decimals)
    {
        if (!double.IsFinite(value))
        {
            return double.IsPositiveInfinity(value) ? "+∞" : "−∞";
        }

        if (Math.Abs(value) >= 1e15 || (value != 0 && Math.Abs(value) < 1e-9))
        {
            return Plain(value, 4);
        }

        double rounded = decimals >= 0 ? Math.Round(value, Math.Min(decimals, 15)) : Math.Round(value / Math.Pow(10, -decimals)) * Math.Pow(10, -decimals);
        rounded = rounded == 0 ? 0 : rounded;
        return rounded.ToString("F" + Math.Clamp(decimals, 0, 15).ToString(CultureInfo.InvariantCulture), CultureInfo.InvariantCulture);
    }

    private static string Plain(double value, int digits)
    {
        double magnitude = Math.Abs(value);
        string format = magnitude is >= 1e15 or < 1e-9 && value != 0 ? "G" + digits.ToString(CultureInfo.InvariantCulture) : "0." + new string('#', Math.Clamp(digits - 1 - (value == 0 ? 0 : Exponent(value)), 0, 20));
        return value.ToString(format, CultureInfo.InvariantCulture);
    }
}
