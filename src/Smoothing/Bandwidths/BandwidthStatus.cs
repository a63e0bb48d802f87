namespace Smoothing.Bandwidths;

/// <summary>How a bandwidth came about.</summary>
public enum BandwidthStatus
{
    /// <summary>A closed formula; nothing was searched.</summary>
    Formula,

    /// <summary>One root or minimum was found and taken.</summary>
    Found,

    /// <summary>Several roots or minima were found; the one that the rule prefers was taken, all are listed.</summary>
    SeveralFound,

    /// <summary>The rule found nothing; another rule's value stands in, named in <see cref="BandwidthChoice.ReplacedBy"/>.</summary>
    Replaced,

    /// <summary>The rule's value lay below half the rounding step and was raised to it: rounding limits the resolution.</summary>
    RoundingFloor,

    /// <summary>The search ended at its smallest or largest bandwidth without a root or minimum inside.</summary>
    EndOfSearch,

    /// <summary>Given by the caller; no rule was asked.</summary>
    Given,
}
