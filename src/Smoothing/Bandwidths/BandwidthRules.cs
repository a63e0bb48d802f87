using Smoothing.Kernels;
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
}
