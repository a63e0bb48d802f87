namespace Smoothing.Samples;

/// <summary>The unit that durations are read in.</summary>
public enum TimeUnit
{
    /// <summary>Thousandths of a second.</summary>
    Milliseconds,

    /// <summary>Seconds.</summary>
    Seconds,

    /// <summary>Minutes of 60 seconds.</summary>
    Minutes,

    /// <summary>Hours of 60 minutes.</summary>
    Hours,

    /// <summary>Days of 24 hours.</summary>
    Days,
}
