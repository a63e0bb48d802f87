using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Bandwidths;

/// <summary>The rules that choose a bandwidth from data, one method each.</summary>
/// <remarks>
/// Every rule needs at least two different values. Rules that are defined for the Gaussian kernel serve any kernel of order 2 through
/// canonical bandwidths (Marron &amp; Nolan 1988). Weighted samples count with their effective number of observations. A
/// choice rests on the data and replaces no judgement: look at the curve at half and at twice the bandwidth too.
/// </remarks>
public static partial class BandwidthRules
{
    /// <summary>Chooses by the rule named.</summary>
    /// <param name="rule">Which rule.</param>
    /// <param name="sample">The values, with weights if any.</param>
    /// <param name="kernel">The kernel that the bandwidth is for.</param>
    /// <param name="options">Settings; null for the defaults.</param>
    /// <returns>The bandwidth and how it was chosen.</returns>
    /// <exception cref="ArgumentException">Fewer than two different values, values outside the limits, or a kernel of an order the rule does not serve.</exception>
    /// <exception cref="ArgumentOutOfRangeException">An option is out of range.</exception>
    public static BandwidthChoice Choose(BandwidthRule rule, Sample sample, Kernel kernel, BandwidthOptions? options = null) =>
        RuleDispatch.Choose(rule, SelectionInput.Of(sample, options), kernel);

    /// <summary>The default: the smaller of <see cref="DiffusionFixedPoint(Sample, Kernel, BandwidthOptions?)"/> and <see cref="SheatherJones(Sample, Kernel, BandwidthOptions?)"/>.</summary>
    /// <param name="sample">The values, with weights if any.</param>
    /// <param name="kernel">The kernel; for orders above 2 the block spectrum is used, to which the two do not extend.</param>
    /// <param name="options">Settings; null for the defaults. With <see cref="BandwidthOptions.Support"/>: the fixed point on the reflected sample.</param>
    /// <returns>The bandwidth; <see cref="BandwidthChoice.Candidates"/> keeps both values, <see cref="BandwidthChoice.CandidatesDisagree"/> flags more than 1.5 times apart.</returns>
    /// <exception cref="ArgumentException">Fewer than two different values, or values outside the limits.</exception>
    /// <remarks>Never below half the rounding step. Error against the best possible bandwidth: docs/bandwidths.md. Cost O(n log n).</remarks>
    public static BandwidthChoice Automatic(Sample sample, Kernel kernel, BandwidthOptions? options = null) =>
        Choose(BandwidthRule.Automatic, sample, kernel, options);

    /// <summary>The bandwidth that is asymptotically best for a normal law of the sample's spread; (4/3)^(1/5) σ n^(−1/5) for the Gaussian kernel.</summary>
    /// <param name="sample">The values, with weights if any.</param>
    /// <param name="kernel">The kernel, of any order.</param>
    /// <param name="options">Settings; null for the defaults. <see cref="BandwidthOptions.Scale"/> picks the spread.</param>
    /// <returns>The bandwidth.</returns>
    /// <exception cref="ArgumentException">Fewer than two different values, or values outside the limits.</exception>
    /// <remarks>Quick, and too wide for anything but one plain hill: three times the best error at n = 1,000 on average. Source: Wand &amp; Jones (1995), section 3.2.1.</remarks>
    public static BandwidthChoice NormalReference(Sample sample, Kernel kernel, BandwidthOptions? options = null) =>
        Choose(BandwidthRule.NormalReference, sample, kernel, options);

    /// <summary>The largest bandwidth that any law of the sample's standard deviation calls for: 3{R(K)/(35μ₂²)}^(1/5) s n^(−1/5).</summary>
    /// <param name="sample">The values, with weights if any.</param>
    /// <param name="kernel">A kernel of order 2.</param>
    /// <param name="options">Settings; null for the defaults.</param>
    /// <returns>The bandwidth. Structure that still shows with it is hardly an accident.</returns>
    /// <exception cref="ArgumentException">Fewer than two different values, values outside the limits, or a kernel of another order.</exception>
    /// <remarks>Source: Terrell (1990).</remarks>
    public static BandwidthChoice Oversmoothed(Sample sample, Kernel kernel, BandwidthOptions? options = null) =>
        Choose(BandwidthRule.Oversmoothed, sample, kernel, options);

    /// <summary>Solve-the-equation plug-in of Sheather and Jones.</summary>
    /// <param name="sample">The values, with weights if any.</param>
    /// <param name="kernel">A kernel of order 2.</param>
    /// <param name="options">Settings; null for the defaults. <see cref="BandwidthScale.InterquartileRange"/> gives the form as published.</param>
    /// <returns>The bandwidth; all roots are in <see cref="BandwidthChoice.Roots"/>, the largest is taken.</returns>
    /// <exception cref="ArgumentException">Fewer than two different values, values outside the limits, or a kernel of another order.</exception>
    /// <remarks>Source: Sheather &amp; Jones (1991). Pair sums are exact to 1e-10 up to 200,000 distinct values. Without a root the normal reference stands in.</remarks>
    public static BandwidthChoice SheatherJones(Sample sample, Kernel kernel, BandwidthOptions? options = null) =>
        Choose(BandwidthRule.SheatherJones, sample, kernel, options);

    /// <summary>The fixed point h² = γ(h) of Botev, Grotowski and Kroese.</summary>
    /// <param name="sample">The values, with weights if any.</param>
    /// <param name="kernel">A kernel of order 2.</param>
    /// <param name="options">Settings; null for the defaults. <see cref="BandwidthOptions.HighestDerivative"/> sets the length of the recursion.</param>
    /// <returns>The bandwidth: the smallest crossing of h² − γ(h) from − to +; all crossings are in <see cref="BandwidthChoice.Roots"/>.</returns>
    /// <exception cref="ArgumentException">Fewer than two different values, values outside the limits, or a kernel of another order.</exception>
    /// <remarks>Source: Botev, Grotowski &amp; Kroese (2010), section 5. Without a root Sheather–Jones stands in.</remarks>
    public static BandwidthChoice DiffusionFixedPoint(Sample sample, Kernel kernel, BandwidthOptions? options = null) =>
        Choose(BandwidthRule.DiffusionFixedPoint, sample, kernel, options);

    /// <summary>Direct plug-in: the asymptotically best bandwidth with an estimated ∫(f^(k+r))².</summary>
    /// <param name="sample">The values, with weights if any.</param>
    /// <param name="kernel">The kernel, of any order k.</param>
    /// <param name="options">Settings; null for the defaults. <see cref="BandwidthOptions.PlugInStages"/> sets the stages.</param>
    /// <returns>The bandwidth, exact for the kernel.</returns>
    /// <exception cref="ArgumentException">Fewer than two different values, values outside the limits, or a kernel of an order the rule does not serve.</exception>
    /// <remarks>Source: Wand &amp; Jones (1995), section 3.6.1. Too wide for laws with several hills: 1.8 times the best error at n = 1,000 on average.</remarks>
    public static BandwidthChoice DirectPlugIn(Sample sample, Kernel kernel, BandwidthOptions? options = null) =>
        Choose(BandwidthRule.DirectPlugIn, sample, kernel, options);

    /// <summary>Least-squares (unbiased) cross-validation.</summary>
    /// <param name="sample">The values, with weights if any.</param>
    /// <param name="kernel">A kernel of order 2.</param>
    /// <param name="options">Settings; null for the defaults. <see cref="BandwidthOptions.GlobalMinimum"/> takes the global minimum.</param>
    /// <returns>The bandwidth: the largest local minimum; all are in <see cref="BandwidthChoice.Minima"/>.</returns>
    /// <exception cref="ArgumentException">Fewer than two different values, values outside the limits, or a kernel of an order the rule does not serve.</exception>
    /// <remarks>Source: Rudemo (1982), Bowman (1984), Hall &amp; Marron (1991). With more than 5 % ties the criterion falls to −∞ at 0; the notes then warn.</remarks>
    public static BandwidthChoice LeastSquaresCrossValidation(Sample sample, Kernel kernel, BandwidthOptions? options = null) =>
        Choose(BandwidthRule.LeastSquaresCrossValidation, sample, kernel, options);

    /// <summary>Biased cross-validation.</summary>
    /// <param name="sample">The values, with weights if any.</param>
    /// <param name="kernel">A kernel of order 2.</param>
    /// <param name="options">Settings; null for the defaults.</param>
    /// <returns>The bandwidth: the largest local minimum not above the oversmoothed bandwidth; Sheather–Jones where there is none.</returns>
    /// <exception cref="ArgumentException">Fewer than two different values, values outside the limits, or a kernel of an order the rule does not serve.</exception>
    /// <remarks>Source: Scott &amp; Terrell (1987), with n⁻² before the double sum.</remarks>
    public static BandwidthChoice BiasedCrossValidation(Sample sample, Kernel kernel, BandwidthOptions? options = null) =>
        Choose(BandwidthRule.BiasedCrossValidation, sample, kernel, options);

    /// <summary>Least-squares cross-validation with a one-sided kernel, carried over by a factor.</summary>
    /// <param name="sample">The values, with weights if any.</param>
    /// <param name="kernel">A kernel of order 2.</param>
    /// <param name="options">Settings; null for the defaults.</param>
    /// <returns>The bandwidth, never above the oversmoothed one.</returns>
    /// <exception cref="ArgumentException">Fewer than two different values, values outside the limits, or a kernel of an order the rule does not serve.</exception>
    /// <remarks>Source: Hart &amp; Yi (1998), Martínez-Miranda, Nielsen &amp; Sperlich (2009). Nearly always one minimum; a robust second opinion.</remarks>
    public static BandwidthChoice OneSidedCrossValidation(Sample sample, Kernel kernel, BandwidthOptions? options = null) =>
        Choose(BandwidthRule.OneSidedCrossValidation, sample, kernel, options);

    /// <summary>Likelihood cross-validation.</summary>
    /// <param name="sample">The values, with weights if any.</param>
    /// <param name="kernel">A kernel of order 2.</param>
    /// <param name="options">Settings; null for the defaults.</param>
    /// <returns>The bandwidth with the largest left-out likelihood among the local maxima, the largest of them by default.</returns>
    /// <exception cref="ArgumentException">Fewer than two different values, values outside the limits, or a kernel of an order the rule does not serve.</exception>
    /// <remarks>Source: Habbema, Hermans &amp; van den Broek (1974), Duin (1976). One far value makes it far too wide.</remarks>
    public static BandwidthChoice LikelihoodCrossValidation(Sample sample, Kernel kernel, BandwidthOptions? options = null) =>
        Choose(BandwidthRule.LikelihoodCrossValidation, sample, kernel, options);

    /// <summary>Minimiser of the exact integrated error over the block-thresholded spectrum.</summary>
    /// <param name="sample">The values, with weights if any.</param>
    /// <param name="kernel">The kernel; exact for Gaussian-based kernels of order 2 to 8, by canonical bandwidths for others of order 2.</param>
    /// <param name="options">Settings; null for the defaults.</param>
    /// <returns>The bandwidth. With a fourth-order kernel it is the partner of the sharp estimate.</returns>
    /// <exception cref="ArgumentException">Fewer than two different values, values outside the limits, or a kernel of an order the rule does not serve.</exception>
    /// <remarks>Blocks of Efromovich (1985), cut spectrum of Chiu (1991).</remarks>
    public static BandwidthChoice BlockSpectrum(Sample sample, Kernel kernel, BandwidthOptions? options = null) =>
        Choose(BandwidthRule.BlockSpectrum, sample, kernel, options);

    /// <summary>A bandwidth for the smoothed distribution function, which wants less smoothing than the density.</summary>
    /// <param name="sample">The values, with weights if any.</param>
    /// <param name="kernel">A kernel of order 2.</param>
    /// <param name="options">Settings; null for the defaults. <see cref="BandwidthOptions.PlugInStages"/> sets the stages.</param>
    /// <returns>The bandwidth {ρ/(n μ₂² ∫f′²)}^(1/3), ρ = 2∫uK(u)W(u)du, W = ∫K; its rule reads <see cref="BandwidthRule.DirectPlugIn"/>.</returns>
    /// <exception cref="ArgumentException">Fewer than two different values, values outside the limits, or a kernel of another order.</exception>
    /// <remarks>Source: Polansky &amp; Baker (2000). The gain over the step function is 5 to 20 % of its integrated squared error.</remarks>
    public static BandwidthChoice ForDistribution(Sample sample, Kernel kernel, BandwidthOptions? options = null) =>
        RuleDispatch.ForDistribution(SelectionInput.Of(sample, options), kernel);

    /// <summary>A rule's usual name, for reports and figures.</summary>
    /// <param name="rule">One of the named rules.</param>
    /// <returns>Lower case but for persons' names, such as "Sheather–Jones" or "direct plug-in".</returns>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="rule"/> is none of them.</exception>
    public static string NameOf(BandwidthRule rule) => rule switch
    {
        BandwidthRule.Automatic => "automatic",
        BandwidthRule.NormalReference => "normal reference",
        BandwidthRule.Oversmoothed => "oversmoothed",
        BandwidthRule.SheatherJones => "Sheather–Jones",
        BandwidthRule.DirectPlugIn => "direct plug-in",
        BandwidthRule.DiffusionFixedPoint => "diffusion fixed point",
        BandwidthRule.LeastSquaresCrossValidation => "least-squares cross-validation",
        BandwidthRule.BiasedCrossValidation => "biased cross-validation",
        BandwidthRule.OneSidedCrossValidation => "one-sided cross-validation",
        BandwidthRule.LikelihoodCrossValidation => "likelihood cross-validation",
        BandwidthRule.BlockSpectrum => "block spectrum",
        _ => throw new ArgumentOutOfRangeException(nameof(rule), Guard.Text($"rule must be one of the named rules, but is {rule}.")),
    };
}
