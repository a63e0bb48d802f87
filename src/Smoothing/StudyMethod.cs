using System.Reflection;
using Smoothing.Bandwidths;
using Smoothing.Kernels;
using Smoothing.Numerics;

namespace Smoothing;

/// <summary>Writes the footnote from which an analysis can be repeated.</summary>
internal static class StudyMethod
{
    /// <summary>The library's version, without the commit.</summary>
    public static string Version { get; } =
        (typeof(StudyMethod).Assembly.GetCustomAttribute<AssemblyInformationalVersionAttribute>()?.InformationalVersion ?? "").Split('+')[0];

    public static string Sentence(DensityStudy study)
    {
        string weights = study.Sample.IsWeighted ? Guard.Text($", weighted (effective n {StudyNumbers.Rounded(study.Sample.EffectiveCount, 0.5)})") : "";
        string missing = study.Sample.LeftOut > 0 ? Guard.Text($", {StudyNumbers.Count(study.Sample.LeftOut)} missing left out") : "";
        string atoms = study.Atoms.Count > 0 ? Guard.Text($", {StudyNumbers.CountWord(study.Atoms.Count)} point {(study.Atoms.Count == 1 ? "mass" : "masses")} shown apart") : "";
        string limits = study.Options.Support is { } support && study.Options.Boundary != BoundaryCorrection.None
            ? Guard.Text($", {Correction(study.Options.Boundary)} on {Range(support)}")
            : "";
        return Guard.Text($"{study.Options.Kernel.Name} kernel estimate of n = {StudyNumbers.Count(study.Sample.Count)} values{weights}{missing}{atoms}{limits}; bandwidth h = {StudyNumbers.WithUnit(StudyNumbers.Significant(study.Bandwidth, 3), study.Unit)} ({Rule(study.Bandwidth)}){Band(study)}; shares: exact binomial intervals, quantiles: order-statistic intervals, level {StudyNumbers.AsGiven(Math.Round(100 * study.Options.Level, 10))} %; Smoothing {Version}.");
    }

    private static string Band(DensityStudy study) => study.Band is { } band
        ? Guard.Text($"; {StudyNumbers.AsGiven(Math.Round(100 * band.Level, 10))} % simultaneous band (debiased kernel, gamma limits, c = {band.CriticalValue:F2})")
        : "";

    /// <summary>How the bandwidth came about, in words.</summary>
    public static string Rule(BandwidthChoice choice)
    {
        if (choice.Status == BandwidthStatus.Given)
        {
            return "given by the analyst";
        }

        string name = Name(choice.Rule);
        return choice.Status switch
        {
            BandwidthStatus.Replaced when choice.ReplacedBy is { } other => Guard.Text($"{name} found nothing; {Name(other)} in its place"),
            BandwidthStatus.RoundingFloor => Guard.Text($"{name}, raised because of the rounding of the data"),
            BandwidthStatus.EndOfSearch => Guard.Text($"{name}, at the end of its search"),
            _ => name,
        };
    }

    private static string Name(BandwidthRule rule) => rule switch
    {
        BandwidthRule.Automatic => "automatic: the smaller of diffusion fixed point and Sheather–Jones",
        BandwidthRule.NormalReference => "normal reference",
        BandwidthRule.Oversmoothed => "oversmoothed",
        BandwidthRule.SheatherJones => "Sheather–Jones",
        BandwidthRule.DirectPlugIn => "direct plug-in",
        BandwidthRule.DiffusionFixedPoint => "diffusion fixed point",
        BandwidthRule.LeastSquaresCrossValidation => "least-squares cross-validation",
        BandwidthRule.BiasedCrossValidation => "biased cross-validation",
        BandwidthRule.OneSidedCrossValidation => "one-sided cross-validation",
        BandwidthRule.LikelihoodCrossValidation => "likelihood cross-validation",
        _ => "block spectrum",
    };

    private static string Correction(BoundaryCorrection correction) => correction switch
    {
        BoundaryCorrection.LinearKernel => "linear boundary kernel",
        BoundaryCorrection.PositiveLinear => "positive linear boundary kernel",
        BoundaryCorrection.Renormalised => "renormalised",
        BoundaryCorrection.Reflection => "reflected",
        _ => "log scale",
    };

    private static string Range(Interval support) =>
        double.IsInfinity(support.Upper) ? Guard.Text($"[{StudyNumbers.AsGiven(support.Lower)}, ∞)")
        : double.IsInfinity(support.Lower) ? Guard.Text($"(−∞, {StudyNumbers.AsGiven(support.Upper)}]")
        : Guard.Text($"[{StudyNumbers.AsGiven(support.Lower)}, {StudyNumbers.AsGiven(support.Upper)}]");
}
