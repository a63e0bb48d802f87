namespace Smoothing.Tests.Support;

/// <summary>Numerical assertions that NaN never passes.</summary>
internal static class Near
{
    public static void Relative(double expected, double actual, double tolerance, string what = "")
    {
        double error = Math.Abs(actual - expected);
        Assert.True(error <= tolerance * Math.Abs(expected), FormattableString.Invariant($"{what} expected {expected:R}, got {actual:R}, relative error {error / Math.Abs(expected):E2} above {tolerance:E2}"));
    }

    public static void Absolute(double expected, double actual, double tolerance, string what = "")
    {
        double error = Math.Abs(actual - expected);
        Assert.True(error <= tolerance, FormattableString.Invariant($"{what} expected {expected:R}, got {actual:R}, error {error:E2} above {tolerance:E2}"));
    }
}
