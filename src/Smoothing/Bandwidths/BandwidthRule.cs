namespace Smoothing.Bandwidths;

/// <summary>How a bandwidth is chosen from the data. Which to take when: docs/bandwidths.md.</summary>
public enum BandwidthRule
{
    /// <summary>The default: the smaller of <see cref="DiffusionFixedPoint"/> and <see cref="SheatherJones"/>.</summary>
    Automatic,

    /// <summary>Best for a normal law of the sample's robust scale; too wide for anything with structure.</summary>
    NormalReference,

    /// <summary>The largest bandwidth that any law of the sample's standard deviation can call for (Terrell 1990).</summary>
    Oversmoothed,

    /// <summary>Solve-the-equation plug-in of Sheather &amp; Jones (1991).</summary>
    SheatherJones,

    /// <summary>Direct plug-in with stages that start from a normal law (Wand &amp; Jones 1995, section 3.6).</summary>
    DirectPlugIn,

    /// <summary>The fixed point of Botev, Grotowski &amp; Kroese (2010).</summary>
    DiffusionFixedPoint,

    /// <summary>Least-squares cross-validation (Rudemo 1982; Bowman 1984), the largest local minimum by default (Hall &amp; Marron 1991).</summary>
    LeastSquaresCrossValidation,

    /// <summary>Biased cross-validation (Scott &amp; Terrell 1987).</summary>
    BiasedCrossValidation,

    /// <summary>One-sided cross-validation (Hart &amp; Yi 1998; Martínez-Miranda, Nielsen &amp; Sperlich 2009).</summary>
    OneSidedCrossValidation,

    /// <summary>Likelihood cross-validation (Habbema, Hermans &amp; van den Broek 1974; Duin 1976).</summary>
    LikelihoodCrossValidation,

    /// <summary>Minimiser of the exact integrated error when the true spectrum is the sample's, thresholded in blocks.</summary>
    BlockSpectrum,
}
