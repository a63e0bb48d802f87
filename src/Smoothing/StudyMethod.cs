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
        return Guard.Text($"{study.Options.Kernel.Name} kernel estimate of n = {StudyNumbers.Count(study.Sample.Count)} {(study.Sample.Count == 1 ? "value" : "values")}{weights}{missing}{atoms}{limits}; bandwidth h = {StudyNumbers.WithUnit(StudyNumbers.Significant(study.Bandwidth, 3), study.Unit)} ({Rule(study.Bandwidth)}){Band(study)}{Shares(study)}{Groups(study)}{Comparison(study)}; Smoothing {Version}.");
    }

    private static string Band(DensityStudy study) => study.Band is { } band
        ? Guard.Text($"; {StudyNumbers.AsGiven(Math.Round(100 * band.Level, 10))} % simultaneous band (debiased kernel, gamma limits, c = {band.CriticalValue:F2})")
        : "";

    private static string Shares(DensityStudy study)
    {
        if (study.Limits.Count + study.Quantiles.Count == 0)
        {
            return "";
        }

        string shares = study.Limits.Count > 0 ? "shares: " + study.Limits[0].Beyond.Method : "";
        string quantiles = study.Quantiles.Count > 0 && study.Sample.Minimum < study.Sample.Maximum ? "quantiles: " + char.ToLowerInvariant(study.Quantiles[0].Method[0]) + study.Quantiles[0].Method[1..] : "";
        string both = string.Join(", ", new[] { shares, quantiles }.Where(part => part.Length > 0));
        return both.Length == 0 ? "" : Guard.Text($"; {both}, level {StudyNumbers.AsGiven(Math.Round(100 * study.Options.Level, 10))} %");
    }

    private static string Groups(DensityStudy study) => study.Groups is { Tests.Count: > 0 } evidence
        ? Guard.Text($"; groups: {string.Join(", ", evidence.Tests.Select(t => t.Method.Split(',')[0]).Distinct())}{(double.IsNaN(evidence.Dip) ? "" : ", dip")}, {new Inference.GroupOptions().Resamples} resamples, seed {study.Options.Seed}")
        : "";

    private static string Comparison(DensityStudy study) => study.Comparison is { } result
        ? Guard.Text($"; comparison: {result.Permutations} permutations, seed {study.Options.Seed}")
        : "";

    /// <summary>How the bandwidth came about, in words.</summary>
    public static string Rule(BandwidthChoice choice)
    {
        if (choice.Status == BandwidthStatus.Given)
        {
            return "given by the analyst";
        }

        string name = choice.Rule == BandwidthRule.Automatic ? Automatic(choice) : BandwidthRules.NameOf(choice.Rule);
        return choice.Status switch
        {
            BandwidthStatus.Replaced when choice is { Rule: not BandwidthRule.Automatic, ReplacedBy: { } other } => Guard.Text($"{name} found nothing; {BandwidthRules.NameOf(other)} in its place"),
            BandwidthStatus.RoundingFloor => Guard.Text($"{BandwidthRules.NameOf(choice.Rule)}, kept from falling below what the rounding of the data allows"),
            BandwidthStatus.EndOfSearch => Guard.Text($"{name}, at the end of its search"),
            _ => name,
        };
    }

    // Which of its two rules the automatic one took, and why.
    private static string Automatic(BandwidthChoice choice)
    {
        if (choice.ReplacedBy is not { } taken)
        {
            return "automatic";
        }

        if (choice.Status == BandwidthStatus.Replaced)
        {
            return "automatic: " + (taken == BandwidthRule.NormalReference ? "normal reference, as nothing else was found" : BandwidthRules.NameOf(taken) + " alone, as the other rule found nothing");
        }

        string[] others = [.. choice.Candidates.Keys.Where(k => k != taken).Select(BandwidthRules.NameOf)];
        return "automatic: " + BandwidthRules.NameOf(taken) + (others.Length > 0 ? ", the smaller of it and " + others[0] : "");
    }

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
