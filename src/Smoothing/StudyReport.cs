using Smoothing.Inference;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing;

/// <summary>Turns a study into sentences and tables, in the order a reader needs them.</summary>
internal static partial class StudyReport
{
    // A summary that lists more limits than this is no summary; the table has all.
    private const int LimitsInShort = 3;

    private const double Plenty = 100_000;

    public static ReportModel Of(DensityStudy study)
    {
        var sections = new List<ReportSection> { new("In short", [new ReportBlock.Paragraph(InShort(study))]) };
        List<ReportBlock> answers = Answers(study);
        if (answers.Count > 0)
        {
            sections.Add(new("Answers", answers));
        }

        if (study.Reference is not null)
        {
            sections.Add(new(Guard.Text($"Compared with {StudyComparison.Name(study)}"), Compared(study)));
        }

        sections.Add(new("How far to trust this", Trust(study)));
        if (study.Cautions.Count > 0)
        {
            sections.Add(new("Cautions", [.. study.Cautions.Select(c => new ReportBlock.Paragraph(c.Text))]));
        }

        return new ReportModel(Title(study), StudyFigure.Of(study), sections, StudyMethod.Sentence(study));
    }

    /// <summary>The heading of an interval's column.</summary>
    public static string Level(DensityStudy study) => LevelNumber(study) + " % interval";

    /// <summary>The standard error of the quartiles, roughly: what the bulk's ends are rounded to.</summary>
    public static double Resolution(Sample sample)
    {
        double spread = sample.InterquartileRange > 0 ? sample.InterquartileRange : sample.StandardDeviation;

        // For a normal law a quartile's standard error is 1.36 σ/√n, near one interquartile range over √n.
        double error = spread / Math.Sqrt(Math.Max(1, sample.EffectiveCount));

        // Recorded values are not shown finer than they were recorded: ten steps have their second digit at the step.
        return Math.Max(error, 10 * (sample.RoundingUnit?.PrintedStep ?? 0));
    }

    private static string LevelNumber(DensityStudy study) => StudyNumbers.AsGiven(Math.Round(100 * study.Options.Level, 10));

    private static string Title(DensityStudy study)
    {
        string name = study.Name.Length > 0 ? char.ToUpperInvariant(study.Name[0]) + study.Name[1..] : "Distribution of the values";
        return study.Unit.Length > 0 ? name + ", in " + study.Unit : name;
    }

    private static string InShort(DensityStudy study)
    {
        var sentences = new List<string> { Bulk(study) };
        sentences.AddRange(study.Atoms.Select(atom => Atom(study, atom)));
        if (study.CurveSample.Minimum < study.CurveSample.Maximum)
        {
            sentences.Add(StudyPeaks.Obstacle(study) ?? StudyGroups.Verdict(study));
        }

        sentences.AddRange(study.Limits.Take(LimitsInShort).Select(limit => Limit(study, limit)));
        if (study.Reference is not null)
        {
            sentences.Add(StudyComparison.Verdict(study));
        }

        // Who has this many values asks for no more.
        if (study.Plan.Count < Plenty && study.Sample.Minimum < study.Sample.Maximum && study.Limits.Count + study.Quantiles.Count > 0)
        {
            sentences.Add(Guard.Text($"Four times as many values, {StudyNumbers.Count(study.Plan.ForShares)}, would halve the uncertainty of {(study.Limits.Count > 0 ? "the shares" : "the quantiles")}."));
        }

        return string.Join(' ', sentences);
    }

    private static string Bulk(DensityStudy study)
    {
        Sample sample = study.Sample;
        string count = sample.Count == 1 ? "One value" : StudyNumbers.Count(sample.Count) + " values";
        if (sample.Minimum == sample.Maximum)
        {
            string value = StudyNumbers.WithUnit(StudyNumbers.AsGiven(sample.Minimum), study.Unit);
            return sample.Count == 1
                ? Guard.Text($"One value only, {value}: nothing can be said about a distribution. It takes at least three different values for a curve with a band.")
                : Guard.Text($"All {count} equal {value}: nothing can be said about a distribution.");
        }

        double error = Resolution(sample);
        string low = StudyNumbers.Rounded(sample.Quantile(0.25), error);
        string high = StudyNumbers.Rounded(sample.Quantile(0.75), error);
        string half = low == high
            ? "at least half of them equal " + StudyNumbers.WithUnit(low, study.Unit)
            : "half of them lie from " + low + " to " + StudyNumbers.WithUnit(high, study.Unit);
        string range = Guard.Text($"{End(sample, sample.Minimum)} and {StudyNumbers.WithUnit(End(sample, sample.Maximum), study.Unit)}");
        return sample.Count < 10
            ? Guard.Text($"{count} between {range}.")
            : Guard.Text($"{count} between {range}: {half}, four in five from {StudyNumbers.Rounded(sample.Quantile(0.1), error)} to {StudyNumbers.WithUnit(StudyNumbers.Rounded(sample.Quantile(0.9), error), study.Unit)}.");
    }

    /// <summary>An extreme as it was recorded, or, where no rounding was noticed, as finely as the quartiles are given.</summary>
    public static string End(Sample sample, double value) => StudyNumbers.Rounded(value, sample.RoundingUnit is { } unit ? 10 * unit.PrintedStep : Resolution(sample));

    private static string Atom(DensityStudy study, Atom atom)
    {
        ShareEstimate share = Shares.Between(study.Sample, atom.Value, atom.Value, study.Options.Level, dependence: StudySteps.Serial(study.Options));
        string value = StudyNumbers.WithUnit(StudyNumbers.AsGiven(atom.Value), study.Unit);
        return Guard.Text($"Exactly {value}: {StudyNumbers.Percent(share.Estimate, share.Interval.Length / 2)} of the values ({StudyNumbers.PercentRange(share.Interval)} at {LevelNumber(study)} % confidence); the curve shows the others.");
    }

    // "About one in eight of the values (13.0 %) lies above 45 min, at 95 % confidence between one in ten and one in six."
    private static string Limit(DensityStudy study, LimitAnswer answer)
    {
        ShareEstimate share = answer.Beyond;
        string limit = StudyNumbers.WithUnit(StudyNumbers.AsGiven(answer.Limit), study.Unit);
        if (share.Estimate is 0 or 1)
        {
            string ends = share.Estimate == 0
                ? Guard.Text($"at most {StudyNumbers.Percent(share.Interval.Upper, share.Interval.Upper)}")
                : Guard.Text($"at least {StudyNumbers.Percent(share.Interval.Lower, 1 - share.Interval.Lower)}");
            return Guard.Text($"{(share.Estimate == 0 ? "None" : "All")} of the values {(share.Estimate == 0 ? "lies" : "lie")} above {limit}: {ends} of all such values do, at {LevelNumber(study)} % confidence.");
        }

        string percent = StudyNumbers.Percent(share.Estimate, share.Interval.Length / 2);
        string words = StudyNumbers.OneIn(share.Estimate);
        string between = words.Length > 0 && StudyNumbers.OneInRange(share.Interval) is { Length: > 0 } range ? range : StudyNumbers.PercentRange(share.Interval);
        string start = words.Length > 0
            ? Guard.Text($"{char.ToUpperInvariant(words[0])}{words[1..]} of the values ({percent}) {(words.StartsWith("about one", StringComparison.Ordinal) ? "lies" : "lie")}")
            : Guard.Text($"{percent} of the values lie");
        return Guard.Text($"{start} above {limit}, at {LevelNumber(study)} % confidence {between}.");
    }

    private static List<ReportBlock> Answers(DensityStudy study)
    {
        var blocks = new List<ReportBlock>();
        if (study.Limits.Count > 0)
        {
            blocks.Add(LimitTable(study));
            blocks.AddRange(study.Limits.SelectMany(l => Told(l.Beyond.Notes)).Select(note => new ReportBlock.Paragraph(note)));
            blocks.AddRange(study.Limits.Select(l => Ties(study, l)).Where(text => text.Length > 0).Select(text => new ReportBlock.Paragraph(text)));
        }

        if (study.Quantiles.Count > 0 && study.Sample.Minimum < study.Sample.Maximum)
        {
            blocks.Add(QuantileTable(study));
            blocks.AddRange(study.Quantiles.Where(q => Told(q.Notes).Any()).Select(q => new ReportBlock.Paragraph(Guard.Text($"{Probability(q)} % quantile: {string.Join(' ', Told(q.Notes))}"))));
        }

        if (study.Options.TimeOrdered && Independent(study) is { Length: > 0 } independent)
        {
            blocks.Add(new ReportBlock.Paragraph(independent));
        }

        if (StudyGroups.Table(study) is { } groups)
        {
            blocks.Add(groups);
            int more = StudyPeaks.Named(study).Count - groups.Rows.Count;
            if (more > 0)
            {
                blocks.Add(new ReportBlock.Paragraph(Guard.Text($"{StudyNumbers.Count(more)} smaller {(more == 1 ? "peak is" : "peaks are")} not listed.")));
            }
        }

        return blocks;
    }

    private static string Probability(QuantileEstimate quantile) => StudyNumbers.AsGiven(Math.Round(100 * quantile.Probability, 10));

    // Dependence has a sentence of its own, for all answers at once.
    private static IEnumerable<string> Told(IReadOnlyList<string> notes) => notes.Where(note => !note.StartsWith(EffectiveSize.DependenceNote, StringComparison.Ordinal) && !note.Contains(Shares.TieNote, StringComparison.Ordinal));

    private static string Ties(DensityStudy study, LimitAnswer answer)
    {
        double at = Shares.Between(study.Sample, answer.Limit, answer.Limit, study.Options.Level).Counted;
        string limit = StudyNumbers.WithUnit(StudyNumbers.AsGiven(answer.Limit), study.Unit);
        return at == 0 ? ""
            : study.Sample.IsWeighted && study.Sample.WeightMeaning == WeightMeaning.Relative ? Guard.Text($"{StudyNumbers.Percent(at / study.Sample.TotalWeight, at / study.Sample.TotalWeight)} of the weight lies at {limit} exactly and does not count as above it.")
            : Guard.Text($"{(at == 1 ? "One value equals" : StudyNumbers.Count(at) + " values equal")} {limit} exactly and {(at == 1 ? "does" : "do")} not count as above it.");
    }

    // "Since neighbours resemble each other, the 1,461 values count as 76 independent ones for the share above 30 °C, 29 for the 50 % quantile."
    private static string Independent(DensityStudy study)
    {
        static string Size(double n) => StudyNumbers.Count(Math.Max(1, Math.Floor(n)));
        string[] parts =
        [
            .. study.Limits.Select(l => Guard.Text($"{Size(l.Beyond.EffectiveCount)} for the share above {StudyNumbers.WithUnit(StudyNumbers.AsGiven(l.Limit), study.Unit)}")),
            .. study.Quantiles.Select(q => Guard.Text($"{Size(q.EffectiveCount)} for the {Probability(q)} % quantile")),
        ];
        return parts.Length == 0 ? "" : Guard.Text($"Dependence in time allowed for, the {StudyNumbers.Count(study.Sample.Count)} values count as so many independent ones: {StudyNumbers.Listed(parts)}.");
    }

    private static ReportBlock.Table LimitTable(DensityStudy study)
    {
        var rows = new List<IReadOnlyList<string>>();
        foreach (LimitAnswer answer in study.Limits)
        {
            ShareEstimate share = answer.Beyond;
            rows.Add(
            [
                "above " + StudyNumbers.WithUnit(StudyNumbers.AsGiven(answer.Limit), study.Unit),
                StudyNumbers.Percent(share.Estimate, share.Interval.Length / 2),
                StudyNumbers.PercentRange(share.Interval),
                StudyNumbers.OneIn(share.Estimate),
            ]);
        }

        return new ReportBlock.Table(["limit", "share of values", Level(study), "in words"], rows);
    }

    private static ReportBlock.Table QuantileTable(DensityStudy study)
    {
        var rows = new List<IReadOnlyList<string>>();
        foreach (QuantileEstimate quantile in study.Quantiles)
        {
            double error = double.IsFinite(quantile.Interval.Length) ? quantile.Interval.Length / 2 : Resolution(study.Sample);
            error = Math.Max(error, Resolution(study.Sample));
            rows.Add(
            [
                Probability(quantile) + " % of values up to",
                StudyNumbers.WithUnit(StudyNumbers.Rounded(quantile.Estimate, error), study.Unit),
                StudyNumbers.Range(quantile.Interval, error, study.Unit),
            ]);
        }

        return new ReportBlock.Table(["quantile", "estimate", Level(study)], rows);
    }
}
