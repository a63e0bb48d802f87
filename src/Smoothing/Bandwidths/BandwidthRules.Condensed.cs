using Smoothing.Kernels;
using Smoothing.Samples;

namespace Smoothing.Bandwidths;

/// <content>The same rules for condensed samples, whose cells count as their weight at the mean of their values. Never below two cell widths.</content>
public static partial class BandwidthRules
{
    /// <summary>Chooses by the rule named from a condensed sample.</summary>
    /// <param name="rule">Which rule.</param>
    /// <param name="sample">The cells.</param>
    /// <param name="kernel">The kernel that the bandwidth is for.</param>
    /// <param name="options">Settings; null for the defaults. Ties and rounding can't be seen in cells: give <see cref="BandwidthOptions.RoundingUnit"/> where known.</param>
    /// <returns>The bandwidth; <see cref="BandwidthChoice.TiedShare"/> is NaN.</returns>
    /// <exception cref="ArgumentException">Fewer than two cells with weight, values outside the limits, or a kernel of an order the rule does not serve.</exception>
    /// <exception cref="ArgumentOutOfRangeException">An option is out of range.</exception>
    public static BandwidthChoice Choose(BandwidthRule rule, CondensedSample sample, Kernel kernel, BandwidthOptions? options = null) =>
        RuleDispatch.Choose(rule, SelectionInput.Of(sample, options), kernel);

    /// <summary>The same as <see cref="Automatic(Sample, Kernel, BandwidthOptions?)"/>, from cells.</summary>
    /// <param name="sample">The cells.</param>
    /// <param name="kernel">The kernel that the bandwidth is for.</param>
    /// <param name="options">Settings; null for the defaults.</param>
    /// <returns>The bandwidth.</returns>
    /// <exception cref="ArgumentException">Fewer than two cells with weight, values outside the limits, or a kernel of an order the rule does not serve.</exception>
    public static BandwidthChoice Automatic(CondensedSample sample, Kernel kernel, BandwidthOptions? options = null) =>
        Choose(BandwidthRule.Automatic, sample, kernel, options);

    /// <summary>The same as <see cref="NormalReference(Sample, Kernel, BandwidthOptions?)"/>, from cells.</summary>
    /// <param name="sample">The cells.</param>
    /// <param name="kernel">The kernel that the bandwidth is for.</param>
    /// <param name="options">Settings; null for the defaults.</param>
    /// <returns>The bandwidth.</returns>
    /// <exception cref="ArgumentException">Fewer than two cells with weight, values outside the limits, or a kernel of an order the rule does not serve.</exception>
    public static BandwidthChoice NormalReference(CondensedSample sample, Kernel kernel, BandwidthOptions? options = null) =>
        Choose(BandwidthRule.NormalReference, sample, kernel, options);

    /// <summary>The same as <see cref="Oversmoothed(Sample, Kernel, BandwidthOptions?)"/>, from cells.</summary>
    /// <param name="sample">The cells.</param>
    /// <param name="kernel">The kernel that the bandwidth is for.</param>
    /// <param name="options">Settings; null for the defaults.</param>
    /// <returns>The bandwidth.</returns>
    /// <exception cref="ArgumentException">Fewer than two cells with weight, values outside the limits, or a kernel of an order the rule does not serve.</exception>
    public static BandwidthChoice Oversmoothed(CondensedSample sample, Kernel kernel, BandwidthOptions? options = null) =>
        Choose(BandwidthRule.Oversmoothed, sample, kernel, options);

    /// <summary>The same as <see cref="SheatherJones(Sample, Kernel, BandwidthOptions?)"/>, from cells.</summary>
    /// <param name="sample">The cells.</param>
    /// <param name="kernel">The kernel that the bandwidth is for.</param>
    /// <param name="options">Settings; null for the defaults.</param>
    /// <returns>The bandwidth.</returns>
    /// <exception cref="ArgumentException">Fewer than two cells with weight, values outside the limits, or a kernel of an order the rule does not serve.</exception>
    public static BandwidthChoice SheatherJones(CondensedSample sample, Kernel kernel, BandwidthOptions? options = null) =>
        Choose(BandwidthRule.SheatherJones, sample, kernel, options);

    /// <summary>The same as <see cref="DiffusionFixedPoint(Sample, Kernel, BandwidthOptions?)"/>, from cells.</summary>
    /// <param name="sample">The cells.</param>
    /// <param name="kernel">The kernel that the bandwidth is for.</param>
    /// <param name="options">Settings; null for the defaults.</param>
    /// <returns>The bandwidth.</returns>
    /// <exception cref="ArgumentException">Fewer than two cells with weight, values outside the limits, or a kernel of an order the rule does not serve.</exception>
    public static BandwidthChoice DiffusionFixedPoint(CondensedSample sample, Kernel kernel, BandwidthOptions? options = null) =>
        Choose(BandwidthRule.DiffusionFixedPoint, sample, kernel, options);

    /// <summary>The same as <see cref="DirectPlugIn(Sample, Kernel, BandwidthOptions?)"/>, from cells.</summary>
    /// <param name="sample">The cells.</param>
    /// <param name="kernel">The kernel that the bandwidth is for.</param>
    /// <param name="options">Settings; null for the defaults.</param>
    /// <returns>The bandwidth.</returns>
    /// <exception cref="ArgumentException">Fewer than two cells with weight, values outside the limits, or a kernel of an order the rule does not serve.</exception>
    public static BandwidthChoice DirectPlugIn(CondensedSample sample, Kernel kernel, BandwidthOptions? options = null) =>
        Choose(BandwidthRule.DirectPlugIn, sample, kernel, options);

    /// <summary>The same as <see cref="LeastSquaresCrossValidation(Sample, Kernel, BandwidthOptions?)"/>, from cells.</summary>
    /// <param name="sample">The cells.</param>
    /// <param name="kernel">The kernel that the bandwidth is for.</param>
    /// <param name="options">Settings; null for the defaults.</param>
    /// <returns>The bandwidth.</returns>
    /// <exception cref="ArgumentException">Fewer than two cells with weight, values outside the limits, or a kernel of an order the rule does not serve.</exception>
    public static BandwidthChoice LeastSquaresCrossValidation(CondensedSample sample, Kernel kernel, BandwidthOptions? options = null) =>
        Choose(BandwidthRule.LeastSquaresCrossValidation, sample, kernel, options);

    /// <summary>The same as <see cref="BiasedCrossValidation(Sample, Kernel, BandwidthOptions?)"/>, from cells.</summary>
    /// <param name="sample">The cells.</param>
    /// <param name="kernel">The kernel that the bandwidth is for.</param>
    /// <param name="options">Settings; null for the defaults.</param>
    /// <returns>The bandwidth.</returns>
    /// <exception cref="ArgumentException">Fewer than two cells with weight, values outside the limits, or a kernel of an order the rule does not serve.</exception>
    public static BandwidthChoice BiasedCrossValidation(CondensedSample sample, Kernel kernel, BandwidthOptions? options = null) =>
        Choose(BandwidthRule.BiasedCrossValidation, sample, kernel, options);

    /// <summary>The same as <see cref="OneSidedCrossValidation(Sample, Kernel, BandwidthOptions?)"/>, from cells.</summary>
    /// <param name="sample">The cells.</param>
    /// <param name="kernel">The kernel that the bandwidth is for.</param>
    /// <param name="options">Settings; null for the defaults.</param>
    /// <returns>The bandwidth.</returns>
    /// <exception cref="ArgumentException">Fewer than two cells with weight, values outside the limits, or a kernel of an order the rule does not serve.</exception>
    public static BandwidthChoice OneSidedCrossValidation(CondensedSample sample, Kernel kernel, BandwidthOptions? options = null) =>
        Choose(BandwidthRule.OneSidedCrossValidation, sample, kernel, options);

    /// <summary>The same as <see cref="LikelihoodCrossValidation(Sample, Kernel, BandwidthOptions?)"/>, from cells.</summary>
    /// <param name="sample">The cells.</param>
    /// <param name="kernel">The kernel that the bandwidth is for.</param>
    /// <param name="options">Settings; null for the defaults.</param>
    /// <returns>The bandwidth.</returns>
    /// <exception cref="ArgumentException">Fewer than two cells with weight, values outside the limits, or a kernel of an order the rule does not serve.</exception>
    public static BandwidthChoice LikelihoodCrossValidation(CondensedSample sample, Kernel kernel, BandwidthOptions? options = null) =>
        Choose(BandwidthRule.LikelihoodCrossValidation, sample, kernel, options);

    /// <summary>The same as <see cref="BlockSpectrum(Sample, Kernel, BandwidthOptions?)"/>, from cells.</summary>
    /// <param name="sample">The cells.</param>
    /// <param name="kernel">The kernel that the bandwidth is for.</param>
    /// <param name="options">Settings; null for the defaults.</param>
    /// <returns>The bandwidth.</returns>
    /// <exception cref="ArgumentException">Fewer than two cells with weight, values outside the limits, or a kernel of an order the rule does not serve.</exception>
    public static BandwidthChoice BlockSpectrum(CondensedSample sample, Kernel kernel, BandwidthOptions? options = null) =>
        Choose(BandwidthRule.BlockSpectrum, sample, kernel, options);

    /// <summary>The same as <see cref="ForDistribution(Sample, Kernel, BandwidthOptions?)"/>, from cells.</summary>
    /// <param name="sample">The cells.</param>
    /// <param name="kernel">A kernel of order 2.</param>
    /// <param name="options">Settings; null for the defaults.</param>
    /// <returns>The bandwidth.</returns>
    /// <exception cref="ArgumentException">Fewer than two cells with weight, values outside the limits, or a kernel of another order.</exception>
    public static BandwidthChoice ForDistribution(CondensedSample sample, Kernel kernel, BandwidthOptions? options = null) =>
        RuleDispatch.ForDistribution(SelectionInput.Of(sample, options), kernel);
}
