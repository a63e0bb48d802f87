using System.Globalization;
using Smoothing.Bandwidths;
using Smoothing.Inference;
using Smoothing.Numerics;

namespace Smoothing.Charts.Content;

/// <summary>Numbers and names as they stand in a figure: rounded to what their error supports, in the invariant culture.</summary>
internal static class Words
{
    /// <summary>To the place of the second digit of the error; twelve digits where there is none.</summary>
    public static string Rounded(double value, double error)
    {
        if (!(error > 0 && double.IsFinite(error)))
        {
            return AsGiven(value);
        }

        int decimals = 1 - (int)Math.Floor(Math.Log10(error));
        return Math.Round(error * Math.Pow(10, decimals)) >= 100 ? Fixed(value, decimals - 1) : Fixed(value, decimals);
    }

    /// <summary>A value with the digits it was given with, twelve at most.</summary>
    public static string AsGiven(double value) => Scientific(value, 6) ?? Minus(value.ToString("0.############", CultureInfo.InvariantCulture));

    /// <summary>Three significant digits.</summary>
    public static string Three(double value) =>
        value == 0 || !double.IsFinite(value) ? AsGiven(value) : Fixed(value, 2 - (int)Math.Floor(Math.Log10(Math.Abs(value))));

    public static string WithUnit(string number, string unit) => unit.Length == 0 ? number : number + " " + unit;

    public static string Count(double count) => count.ToString(count == Math.Floor(count) ? "N0" : "N1", CultureInfo.InvariantCulture);

    /// <summary>A share in percent, to the digits that its interval supports.</summary>
    public static string Percent(ShareEstimate share) => Rounded(100 * share.Estimate, 50 * share.Interval.Length) + " %";

    /// <summary>The interval of a share in percent.</summary>
    public static string PercentRange(ShareEstimate share) =>
        Rounded(100 * share.Interval.Lower, 50 * share.Interval.Length) + " to " + Rounded(100 * share.Interval.Upper, 50 * share.Interval.Length) + " %";

    public static string Level(double level) => AsGiven(Math.Round(100 * level, 8)) + " %";

    /// <summary>How the bandwidth of a study came about.</summary>
    public static string Rule(BandwidthChoice choice) => choice.Status == BandwidthStatus.Given ? "given" : BandwidthRules.NameOf(choice.Rule) + " rule";

    /// <summary>First letter in upper case.</summary>
    public static string Sentence(string words) => words.Length == 0 ? words : char.ToUpperInvariant(words[0]) + words[1..];

    private static string Fixed(double value, int decimals)
    {
        if (Scientific(value, 2) is { } far)
        {
            return far;
        }

        double unit = Math.Pow(10, -decimals);
        double rounded = decimals >= 0 ? Math.Round(value, Math.Min(decimals, 15)) : Math.Round(value / unit) * unit;
        return Minus((rounded == 0 ? 0 : rounded).ToString("F" + Math.Clamp(decimals, 0, 15).ToString(CultureInfo.InvariantCulture), CultureInfo.InvariantCulture));
    }

    private static string? Scientific(double value, int decimals) =>
        double.IsInfinity(value) ? (value > 0 ? "∞" : "−∞")
        : value != 0 && Math.Abs(value) is >= 1e12 or < 1e-9 && value != 0 ? Minus(value.ToString("0." + new string('#', decimals) + "E+0", CultureInfo.InvariantCulture))
        : null;

    private static string Minus(string number) => number.Replace("-", "−", StringComparison.Ordinal);
}
