using Smoothing.Samples;

namespace Smoothing.Sql.Tests;

/// <summary>Two condensed samples of the same values.</summary>
internal static class Same
{
    public static void Sample(CondensedSample expected, CondensedSample actual)
    {
        Assert.Equal(expected.CellWidth, actual.CellWidth);
        Assert.Equal(expected.Moments, actual.Moments);
        Assert.Equal(expected.Cells.ToArray(), actual.Cells.ToArray());
        Assert.Equal((expected.Count, expected.Minimum, expected.Maximum, expected.IsWeighted, expected.WeightMeaning), (actual.Count, actual.Minimum, actual.Maximum, actual.IsWeighted, actual.WeightMeaning));
        Close(expected.TotalWeight, actual.TotalWeight, 1e-13 * expected.TotalWeight);
        Close(expected.EffectiveCount, actual.EffectiveCount, 1e-12 * expected.EffectiveCount);
        for (int i = 0; i < expected.Sums.Length; i++)
        {
            Close(expected.Sums[i], actual.Sums[i], 1e-13 * expected.Sums[i - (i % expected.Moments)]);
        }

        foreach (double limit in expected.Limits)
        {
            Close(expected.WeightBelow(limit), actual.WeightBelow(limit), 1e-13 * expected.TotalWeight);
            Close(expected.WeightAt(limit), actual.WeightAt(limit), 1e-13 * expected.TotalWeight);
        }
    }

    public static void Close(double expected, double actual, double tolerance) =>
        Assert.True(Math.Abs(expected - actual) <= tolerance, FormattableString.Invariant($"expected {expected:R}, got {actual:R}"));
}
