using Smoothing.Estimation;
using Smoothing.Inference;
using Smoothing.Numerics;

namespace Smoothing;

/// <summary>What is said about groups: how many the tests establish, which peaks, and what it would take to know more.</summary>
internal static class StudyGroups
{
    // More values than this is no plan.
    private const double MostValues = 1e7;

    // A longer list of peaks is a list of accidents; the report says how many more there are.
    public const int MostListed = 8;

    /// <summary>The verdict in one sentence.</summary>
    public static string Verdict(DensityStudy study)
    {
        if (study.Groups is not { Tests.Count: > 0 } evidence)
        {
            return study.Groups is null
                ? "Groups cannot be looked for in values so large or so small: multiply them by a power of ten."
                : "Whether there are groups cannot be said: it takes at least five different values.";
        }

        string p = StudyComparison.P(evidence.Tests[0].PValue);
        string dip = StudyComparison.P(evidence.DipPValue);
        bool dipKnown = !double.IsNaN(evidence.DipPValue);
        if (evidence.AtLeast > 1)
        {
            string count = StudyNumbers.CountWord(evidence.AtLeast);
            string where = Strongest(study, evidence.AtLeast);
            return !dipKnown || evidence.DipAgrees
                ? Guard.Text($"There are at least {count} groups{(where.Length > 0 ? ", around " + where : "")}, and that is no accident of the sample (p {p} for a single peak{(dipKnown ? "; the dip test agrees" : "")}).")
                : Guard.Text($"At least {count} groups{(where.Length > 0 ? ", around " + where + "," : "")} are likely, not certain: one test rejects a single peak (p {p}), the more cautious dip test does not (p {dip}).");
        }

        // A record in steps has a distribution function in steps, and a step of twice the critical dip is enough.
        if (evidence.DipAgrees)
        {
            string ties = study.CurveSample.TiedShare > 0.05 ? ", as it does when rounding alone makes steps" : "";
            return Guard.Text($"Whether there is more than one group cannot be said: the dip test rejects a single peak (p {dip}){ties}, the test on the curve does not (p {p}). Finer records or more values would tell.");
        }

        IReadOnlyList<Peak> named = StudyPeaks.Named(study);
        string both = Guard.Text($"p {p} for a single peak{(dipKnown ? "; the dip test agrees" : "")}");
        int apart = named.Count(peak => Match(study, peak) is { StandsApart: true });
        return named.Count == 1 ? Guard.Text($"Nothing in the values speaks for more than one group ({both}).")
            : apart > 1 ? Guard.Text($"Whether there is more than one group cannot be said: {StudyNumbers.CountWord(apart)} peaks stand apart each by itself, yet the tests of the whole do not reject a single one ({both}). More values would tell.")
            : Guard.Text($"A second group is not established: bumps like those of the curve arise by chance ({both}).{Needed(study, named)}");
    }

    /// <summary>The peaks of the curve, each with its evidence; null where there is nothing to list.</summary>
    public static ReportBlock.Table? Table(DensityStudy study)
    {
        IReadOnlyList<Peak> named = StudyPeaks.Named(study);
        if (named.Count == 0 || study.Groups is not { Tests.Count: > 0 } evidence || (named.Count == 1 && Match(study, named[0]) is null))
        {
            return null;
        }

        var rows = new List<IReadOnlyList<string>>();
        HashSet<Peak> shown = [.. Outstanding(named, MostListed)];
        HashSet<Peak> counted = [.. Outstanding(named, evidence.AtLeast > 1 ? evidence.AtLeast : 0)];
        for (int i = 0; i < named.Count; i++)
        {
            if (shown.Contains(named[i]))
            {
                rows.Add(Row(study, named, i, counted));
            }
        }

        string share = study.Atoms.Count > 0 ? "share of the others" : "share around it";
        return new ReportBlock.Table(["peak", StudyReport.Level(study), share, "established"], rows);
    }

    private static string[] Row(DensityStudy study, IReadOnlyList<Peak> named, int i, HashSet<Peak> counted)
    {
        GroupPeak? peak = Match(study, named[i]);
        double error = peak is { LocationInterval.Length: > 0 and < double.PositiveInfinity } ? peak.LocationInterval.Length / 2 : study.Bandwidth;
        string share = "all";
        if (named.Count > 1)
        {
            Interval around = Around(study, named, i);
            ShareEstimate estimate = Shares.Between(study.CurveSample, around.Lower, around.Upper, study.Options.Level, dependence: StudySteps.Serial(study.Options));
            share = Guard.Text($"{StudyNumbers.Percent(estimate.Estimate, estimate.Interval.Length / 2)} ({StudyNumbers.PercentRange(estimate.Interval)})");
        }

        return
        [
            StudyNumbers.WithUnit(StudyNumbers.Rounded(named[i].Location, error), study.Unit),
            peak is null ? "not known" : StudyNumbers.Range(peak.LocationInterval, error, study.Unit),
            share,
            peak is null ? "not tested" : peak.StandsApart ? "by itself" : counted.Contains(named[i]) ? "only by the count" : "no: may be chance",
        ];
    }

    public static IEnumerable<Peak> Outstanding(IReadOnlyList<Peak> named, int count) => named.OrderByDescending(p => p.Prominence).Take(count);

    /// <summary>The evidence for a peak of the curve; null where it was not tested.</summary>
    public static GroupPeak? Match(DensityStudy study, Peak peak) => study.Groups?.Peaks
        .Where(g => Math.Abs(g.Location - peak.Location) <= study.Bandwidth / 2)
        .MinBy(g => Math.Abs(g.Location - peak.Location));

    /// <summary>The stretch from the deepest valley left of a peak to the deepest one right of it.</summary>
    public static Interval Around(DensityStudy study, IReadOnlyList<Peak> named, int i)
    {
        double lower = i == 0 ? double.NegativeInfinity : Valley(study, named[i - 1].Location, named[i].Location);
        double upper = i == named.Count - 1 ? double.PositiveInfinity : Valley(study, named[i].Location, named[i + 1].Location);
        return new Interval(lower, Math.Max(lower, upper));
    }

    private static double Valley(DensityStudy study, double from, double to) =>
        study.Peaks!.Valleys.Where(v => v.Location > from && v.Location < to).MinBy(v => v.Height)?.Location ?? (from + to) / 2;

    // "22 and 50 min": the peaks that stand out most, left to right; empty where the curve shows fewer than the tests establish.
    private static string Strongest(DensityStudy study, int count)
    {
        Peak[] strongest = [.. Outstanding(StudyPeaks.Named(study), count).OrderBy(p => p.Location)];
        return strongest.Length < count ? "" : StudyNumbers.WithUnit(StudyNumbers.Listed([.. strongest.Select(p => StudyPeaks.Around(study, p.Location))]), study.Unit);
    }

    // The second-most prominent peak would clear its valley when the band's two half-widths together equal its prominence; half-widths fall with n^(−2/5).
    private static string Needed(DensityStudy study, IReadOnlyList<Peak> named)
    {
        Peak second = named.OrderByDescending(p => p.Prominence).ElementAt(1);
        if (study.Band is not { } band)
        {
            return "";
        }

        int at = 0;
        for (int i = 1; i < band.X.Count; i++)
        {
            at = Math.Abs(band.X[i] - second.Location) < Math.Abs(band.X[at] - second.Location) ? i : at;
        }

        double factor = Math.Pow((band.Upper[at] - band.Lower[at]) / second.Prominence, 2.5);
        double needed = factor * study.Plan.Count;
        string place = StudyNumbers.WithUnit(StudyPeaks.Around(study, second.Location), study.Unit);
        return !(factor > 1) ? "" : needed > MostValues
            ? Guard.Text($" If the bump at {place} is real, no practical number of values would show it.")
            : Guard.Text($" If the bump at {place} is real, it would take about {StudyNumbers.Count(StudyNumbers.TwoDigits(needed))} values to show.");
    }
}
