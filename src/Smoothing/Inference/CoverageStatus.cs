namespace Smoothing.Inference;

/// <summary>How well the coverage of intervals and bands is backed by simulation.</summary>
public enum CoverageStatus
{
    /// <summary>Gaussian kernel at a bandwidth that a rule of the library chose: the setting the simulations used.</summary>
    Tested,

    /// <summary>Another kernel of order 2 at a rule's bandwidth: intervals are those of the Gaussian at the equivalent bandwidth.</summary>
    EquivalentBandwidth,

    /// <summary>The bandwidth comes from no rule of the library: coverage is untested.</summary>
    UntestedBandwidth,
}
