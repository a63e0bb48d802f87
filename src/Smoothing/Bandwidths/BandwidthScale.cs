namespace Smoothing.Bandwidths;

/// <summary>Which measure of spread a rule starts from.</summary>
public enum BandwidthScale
{
    /// <summary>The smaller of the standard deviation and IQR/1.349; the standard deviation where the IQR is 0. The default.</summary>
    Robust,

    /// <summary>The standard deviation.</summary>
    StandardDeviation,

    /// <summary>IQR/1.349. For Sheather–Jones: the form as published, with the IQR and the rounded constants 1.357, 0.920 and 0.912.</summary>
    InterquartileRange,
}
