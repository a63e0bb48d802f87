namespace Smoothing.Inference;

/// <summary>One pair among several samples.</summary>
public sealed class PairComparison
{
    internal PairComparison(int first, int second, ComparisonResult result, double adjustedPValue) =>
        (First, Second, Result, AdjustedPValue) = (first, second, result, adjustedPValue);

    /// <summary>Index of the first sample, from 0.</summary>
    public int First { get; }

    /// <summary>Index of the second sample, larger.</summary>
    public int Second { get; }

    /// <summary>The comparison of the two by themselves; its bands are for this pair alone.</summary>
    public ComparisonResult Result { get; }

    /// <summary>Holm's (1979) adjusted p-value: compared with a level it keeps the chance of any wrong finding among all pairs below it.</summary>
    public double AdjustedPValue { get; }
}
