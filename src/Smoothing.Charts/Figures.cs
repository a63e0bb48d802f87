using Smoothing.Bandwidths;
using Smoothing.Charts.Content;
using Smoothing.Inference;
using Smoothing.Theory;

namespace Smoothing.Charts;

/// <summary>The pictures of a study, one call each.</summary>
/// <remarks>
/// Each call does the statistics and returns a <see cref="Figure"/> that writes itself as PNG or SVG. A figure always has words: where the machine
/// has no font, writing it is an error. What cannot be said from the data is said in the picture and never drawn. Pictures inform a decision and
/// replace no standard, code or licensed judgement.
/// </remarks>
public static class Figures
{
    /// <summary>The curve with its interval at each place and its simultaneous band, limits with their shares, peaks and values.</summary>
    /// <param name="study">The study.</param>
    /// <param name="options">Size, colours, words; null for the defaults.</param>
    /// <returns>The figure. A limit farther off than a third of the picture stands in the notes.</returns>
    /// <exception cref="ArgumentException">An option is unusable.</exception>
    public static Figure Density(DensityStudy study, FigureOptions? options = null) =>
        new(DensityContent.Of(Check.Given(study)), Check.Options(options));

    /// <summary>The curve with the range in which the truth probably runs, coloured by whether it is too low, too high, or neither can be told, and by how much.</summary>
    /// <remarks>The range is f̂ − bias ± 2 standard errors, both from <see cref="DensityStudy.Uncertainty"/>. Amounts are given where the curve is at least 3 % as high as its peak.</remarks>
    /// <param name="study">The study; with fewer than three values the figure says that nothing can be said.</param>
    /// <param name="options">Size, colours, words; null for the defaults.</param>
    /// <returns>The figure.</returns>
    /// <exception cref="ArgumentException">An option is unusable.</exception>
    public static Figure Bias(DensityStudy study, FigureOptions? options = null) =>
        new(BiasContent.Of(Check.Given(study)), Check.Options(options));

    /// <summary>Integrated squared bias, variance and mean squared error against h, for a density estimated from the study's values; its bandwidth is marked.</summary>
    /// <remarks>
    /// The unknown density is replaced by the values smoothed with the pilot bandwidth of the bias statement, as in a smoothed bootstrap (Faraway and Jhun 1990); the error
    /// for it is exact, by <see cref="ErrorTheory"/>. Known limits of the range are ignored. Cost: some 60 closed forms over up to 300 cells.
    /// </remarks>
    /// <param name="study">The study; with fewer than three values the figure says that nothing can be worked out.</param>
    /// <param name="options">Size, colours, words; null for the defaults.</param>
    /// <returns>The figure.</returns>
    /// <exception cref="ArgumentException">An option is unusable.</exception>
    public static Figure Error(DensityStudy study, FigureOptions? options = null) =>
        new(ErrorContent.Of(Check.Given(study)), Check.Options(options));

    /// <summary>Squared bias, variance and mean squared error against h for a known target: integrated, or at one place.</summary>
    /// <param name="theory">Kernel and target.</param>
    /// <param name="n">Number of observations, at least 1.</param>
    /// <param name="chosen">A bandwidth to mark, positive; null for none.</param>
    /// <param name="at">The place, finite; null (the default) for the integral over all places.</param>
    /// <param name="unit">Unit of the values, for the axis.</param>
    /// <param name="options">Size, colours, words; null for the defaults.</param>
    /// <returns>The figure; errors are multiples of the smallest.</returns>
    /// <exception cref="ArgumentException">An argument or an option is unusable.</exception>
    /// <exception cref="InvalidOperationException">No bandwidth has the smallest error and none was given to mark.</exception>
    public static Figure Error(ErrorTheory theory, long n, double? chosen = null, double? at = null, string unit = "", FigureOptions? options = null)
    {
        Check.Given(theory);
        Check.Count(n);
        if (chosen is { } h)
        {
            Check.Positive(h, "pass a bandwidth in the unit of the data, or null for none", nameof(chosen));
        }

        if (at is { } x)
        {
            Check.Finite(x, "pass a place on the axis, or null for the integral", nameof(at));
        }

        return new Figure(ErrorContent.Of(theory, n, chosen, at, Check.Words(Check.Given(unit))), Check.Options(options));
    }

    /// <summary>The curve as each rule would draw it, one row a rule, ordered by bandwidth; the study's own stands out.</summary>
    /// <param name="study">The study. Rules that cannot choose from its values are named in the notes.</param>
    /// <param name="rules">Which rules; null for all.</param>
    /// <param name="options">Size, colours, words; null for the defaults. Ten rules want a height of 600 or more.</param>
    /// <returns>The figure.</returns>
    /// <exception cref="ArgumentException">An option is unusable.</exception>
    public static Figure Rules(DensityStudy study, IReadOnlyList<BandwidthRule>? rules = null, FigureOptions? options = null) =>
        new(RulesContent.Of(Check.Given(study), rules ?? RulesContent.All), Check.Options(options));

    /// <summary>The share of the values up to each place, smoothed and counted, with limits, quantiles and their intervals.</summary>
    /// <param name="study">The study.</param>
    /// <param name="options">Size, colours, words; null for the defaults.</param>
    /// <returns>The figure. A quantile without a limit on one side has its bar to the edge, and a note.</returns>
    /// <exception cref="ArgumentException">An option is unusable.</exception>
    public static Figure Distribution(DensityStudy study, FigureOptions? options = null) =>
        new(DistributionContent.Of(Check.Given(study)), Check.Options(options));

    /// <summary>Two groups or periods: their curves above, the difference of their densities with its band below.</summary>
    /// <param name="first">The first, such as last year.</param>
    /// <param name="second">The second, in the same unit; differences are second less first.</param>
    /// <param name="result">The comparison of their samples; null to have it made with the level and the seed of <paramref name="second"/>, where both have three values or more.</param>
    /// <param name="options">Size, colours, words; null for the defaults.</param>
    /// <returns>The figure. Stretches where the band leaves out 0 are filled.</returns>
    /// <exception cref="ArgumentException">The units differ, or an option is unusable.</exception>
    public static Figure Difference(DensityStudy first, DensityStudy second, ComparisonResult? result = null, FigureOptions? options = null)
    {
        Check.Given(first);
        Check.Given(second);
        FigureOptions own = Check.Options(options);
        return new Figure(DifferenceContent.Of(first, second, result ?? DifferenceContent.Compare(first, second)), own);
    }

    /// <summary>Over a range of bandwidths, where the curve rises and falls beyond chance, and which of its peaks stand by themselves.</summary>
    /// <remarks>
    /// Source: Chaudhuri and Marron (1999); Gaussian kernel. From a sixth of the study's bandwidth (not finer than half a rounding step) to eight times it. Each
    /// row keeps the study's level as a whole; all rows together do not. For a test with one answer read <see cref="Groups"/>.
    /// </remarks>
    /// <param name="study">The study; with fewer than three values the figure says that nothing can be said.</param>
    /// <param name="options">Size, colours, words; null for the defaults.</param>
    /// <returns>The figure.</returns>
    /// <exception cref="ArgumentException">An option is unusable.</exception>
    public static Figure PeakEvidence(DensityStudy study, FigureOptions? options = null) =>
        new(PeakEvidenceContent.Of(Check.Given(study)), Check.Options(options));
}
