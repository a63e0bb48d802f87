namespace Smoothing.Samples;

/// <summary>What happens to NaN among the values.</summary>
public enum MissingValues
{
    /// <summary>An error that names the first index and the number of missing values.</summary>
    Reject,

    /// <summary>Left out, with their weights, and counted.</summary>
    LeaveOut,
}
