using System.Globalization;
using Smoothing.Numerics;

namespace Smoothing;

/// <summary>Numbers and shares as people read them: rounded to what their error supports, in the invariant culture, never in powers of ten without need.</summary>
internal static class StudyNumbers
{
    private static readonly (double Value, string Words)[] s_fractions =
    [
        (3.0 / 10, "three in ten"), (2.0 / 5, "two in five"), (1.0 / 2, "one in two"), (2.0 / 3, "two in three"), (3.0 / 4, "three in four"), (4.0 / 5, "four in five"), (9.0 / 10, "nine in ten"),
    ];

    private static readonly string[] s_small = ["zero", "one", "two", "three", "four", "five", "six", "seven", "eight", "nine", "ten", "eleven", "twelve"];

    /// <summary>The value to the place of the second digit of its error; the whole value (12 digits at most) when the error is 0.</summary>
    public static string Rounded(double value, double error) => error > 0 ? Fixed(value, Decimals(error, value)) : AsGiven(value);

    /// <summary>The two ends of an interval to the place of the second digit of the error; infinite ends as words.</summary>
    public static string Range(Interval interval, double error, string unit = "")
    {
        int decimals = Decimals(error, Math.Max(Magnitude(interval.Lower), Magnitude(interval.Upper)));
        string End(double value) => error > 0 ? Fixed(value, decimals) : AsGiven(value);
        if (double.IsInfinity(interval.Upper))
        {
            return double.IsInfinity(interval.Lower) ? "cannot be said" : "at least " + WithUnit(End(interval.Lower), unit);
        }

        return double.IsInfinity(interval.Lower) ? "at most " + WithUnit(End(interval.Upper), unit) : End(interval.Lower) + " to " + WithUnit(End(interval.Upper), unit);
    }

    /// <summary>The ends of an interval for a change, each with its sign.</summary>
    public static string SignedRange(Interval interval, double error, string unit = "")
    {
        int decimals = Decimals(error, Math.Max(Magnitude(interval.Lower), Magnitude(interval.Upper)));
        if (double.IsInfinity(interval.Upper))
        {
            return double.IsInfinity(interval.Lower) ? "any amount" : "at least " + WithUnit(Sign(interval.Lower, decimals), unit);
        }

        return double.IsInfinity(interval.Lower)
            ? "at most " + WithUnit(Sign(interval.Upper, decimals), unit)
            : Sign(interval.Lower, decimals) + " to " + WithUnit(Sign(interval.Upper, decimals), unit);
    }

    /// <summary>A change with its sign, to the place of the second digit of its error.</summary>
    public static string Signed(double value, double error) => Sign(value, Decimals(error, value));

    /// <summary>"a, b and c".</summary>
    public static string Listed(IReadOnlyList<string> parts) =>
        parts.Count < 2 ? string.Concat(parts) : string.Join(", ", parts.SkipLast(1)) + " and " + parts[^1];

    /// <summary>A count rounded up to two digits, for "about".</summary>
    public static double TwoDigits(double count)
    {
        double unit = Math.Pow(10, Math.Max(0, Exponent(Math.Max(1, count)) - 1));
        return Math.Ceiling(count / unit) * unit;
    }

    /// <summary>A number followed by its unit, if there is one.</summary>
    public static string WithUnit(string number, string unit) => unit.Length == 0 ? number : number + " " + unit;

    /// <summary>A share in percent, rounded to what its interval supports.</summary>
    public static string Percent(double share, double error) => share is 0 or 1 ? (share == 0 ? "0 %" : "100 %") : Fixed(100 * share, Math.Clamp(Decimals(100 * error, 100 * share), 0, 4)) + " %";

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
            double shown = k > 100 ? TwoDigits(k) : k;
            if (Math.Abs((1 / shown / share) - 1) < 0.06)
            {
                return "about one in " + CountWord(shown);
            }
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
        // Above one in four the next whole number is too far off.
        if (!(shares.Lower > 0 && shares.Upper < 0.25))
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

    private static string Sign(double value, int decimals)
    {
        string number = Fixed(value, decimals);
        return number.StartsWith('−') || !number.AsSpan().ContainsAnyInRange('1', '9') ? number : "+" + number;
    }

    private static double Magnitude(double value) => double.IsFinite(value) ? Math.Abs(value) : 0;

    private static int Exponent(double value) => (int)Math.Floor(Math.Log10(Math.Abs(value)));

    // Place of the second significant digit of the error.
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

        if (IsFar(value))
        {
            return Power(value, Math.Clamp(decimals + Exponent(value) + 1, 1, 12));
        }

        double rounded = decimals >= 0 ? Math.Round(value, Math.Min(decimals, 15)) : Math.Round(value / Math.Pow(10, -decimals)) * Math.Pow(10, -decimals);
        return Text(rounded, "F" + Math.Clamp(decimals, 0, 15).ToString(CultureInfo.InvariantCulture), "N" + Math.Clamp(decimals, 0, 15).ToString(CultureInfo.InvariantCulture));
    }

    private static string Plain(double value, int digits)
    {
        if (IsFar(value))
        {
            return Power(value, digits);
        }

        string places = new('#', Math.Clamp(digits - 1 - (value == 0 ? 0 : Exponent(value)), 0, 20));
        return Text(value, "0." + places, "#,##0." + places);
    }

    // Outside the numbers that people write out.
    private static bool IsFar(double value) => Math.Abs(value) >= 1e15 || (value != 0 && Math.Abs(value) < 1e-6);

    // "1.25 × 10⁻¹⁰"
    private static string Power(double value, int digits)
    {
        string[] parts = value.ToString("E" + (Math.Max(1, digits) - 1).ToString(CultureInfo.InvariantCulture), CultureInfo.InvariantCulture).Split('E');
        string mantissa = parts[0].Contains('.', StringComparison.Ordinal) ? parts[0].TrimEnd('0').TrimEnd('.') : parts[0];
        string exponent = int.Parse(parts[1], CultureInfo.InvariantCulture).ToString(CultureInfo.InvariantCulture);
        return (mantissa == "1" ? "10" : Minus(mantissa) + " × 10") + string.Concat(exponent.Select(c => c == '-' ? '⁻' : "⁰¹²³⁴⁵⁶⁷⁸⁹"[c - '0']));
    }

    // From 10,000 up thousands are set apart; 0 has no sign.
    private static string Text(double value, string small, string large)
    {
        value = value == 0 ? 0 : value;
        return Minus(value.ToString(Math.Abs(value) >= 10_000 ? large : small, CultureInfo.InvariantCulture));
    }

    // A hyphen would let a browser or a text wrap the sign off its number.
    private static string Minus(string number) => number.StartsWith('-') ? string.Concat("−", number.AsSpan(1)) : number;
}
