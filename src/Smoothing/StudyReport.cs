using Smoothing.Inference;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing;

/// <summary>Turns a study into sentences and tables, in the order a reader needs them.</summary>
internal static partial class StudyReport
{
    public static ReportModel Of(DensityStudy study)
    {
        var sections = new List<ReportSection>
        {
            new("Answers", Answers(study)),
            new("How far to trust this", Trust(study)),
        };
        if (study.Cautions.Count > 0)
        {
            sections.Add(new("Cautions", [.. study.Cautions.Select(c => new ReportBlock.Paragraph(c.Text))]));
        }

        return new ReportModel(Title(study), StudyFigure.Of(study), sections, StudyMethod.Sentence(study));
    }

    public static string Noun(DensityStudy study) => study.Name.Length > 0 ? study.Name : "values";

    private static string Title(DensityStudy study)
    {
        string name = study.Name.Length > 0 ? char.ToUpperInvariant(study.Name[0]) + study.Name[1..] : "Distribution of the values";
        return study.Unit.Length > 0 ? name + ", in " + study.Unit : name;
    }

    private static List<ReportBlock> Answers(DensityStudy study)
    {
        var blocks = new List<ReportBlock> { new ReportBlock.Paragraph(Bulk(study)) };
        blocks.AddRange(study.Atoms.Select(atom => new ReportBlock.Paragraph(Atom(study, atom))));
        blocks.Add(new ReportBlock.Paragraph(StudyPeaks.Sentence(study)));
        if (study.Limits.Count > 0)
        {
            blocks.Add(LimitTable(study));
        }

        if (study.Quantiles.Count > 0)
        {
            blocks.Add(QuantileTable(study));
            foreach (QuantileEstimate quantile in study.Quantiles.Where(q => q.Notes.Count > 0))
            {
                blocks.Add(new ReportBlock.Paragraph(Guard.Text($"{StudyNumbers.AsGiven(Math.Round(100 * quantile.Probability, 10))} % quantile: {string.Join(' ', quantile.Notes)}")));
            }
        }

        return blocks;
    }

    private static string Bulk(DensityStudy study)
    {
        Sample sample = study.Sample;
        string count = StudyNumbers.Count(sample.Count) + (sample.Count == 1 ? " value" : " values");
        if (sample.Minimum == sample.Maximum)
        {
            return Guard.Text($"All {count} equal {StudyNumbers.WithUnit(StudyNumbers.AsGiven(sample.Minimum), study.Unit)}.");
        }

        double error = Resolution(sample);
        string low = StudyNumbers.Rounded(sample.Quantile(0.25), error);
        string high = StudyNumbers.Rounded(sample.Quantile(0.75), error);
        string half = low == high
            ? "at least half of them equal " + StudyNumbers.WithUnit(low, study.Unit)
            : "half of them lie from " + low + " to " + StudyNumbers.WithUnit(high, study.Unit);
        return Guard.Text($"{count} between {StudyNumbers.AsGiven(sample.Minimum)} and {StudyNumbers.WithUnit(StudyNumbers.AsGiven(sample.Maximum), study.Unit)}: {half}, four in five from {StudyNumbers.Rounded(sample.Quantile(0.1), error)} to {StudyNumbers.WithUnit(StudyNumbers.Rounded(sample.Quantile(0.9), error), study.Unit)}.");
    }

    /// <summary>The standard error of the quartiles, roughly: what the bulk's ends are rounded to.</summary>
    public static double Resolution(Sample sample)
    {
        double spread = sample.InterquartileRange > 0 ? sample.InterquartileRange : sample.StandardDeviation;

        // For a normal law a quartile's standard error is 1.36 σ/√n, near one interquartile range over √n.
        double error = spread / Math.Sqrt(Math.Max(1, sample.EffectiveCount));

        // Recorded values are not shown finer than they were recorded: ten steps have their second digit at the step.
        return Math.Max(error, 10 * (sample.RoundingUnit?.PrintedStep ?? 0));
    }

    private static string Atom(DensityStudy study, Atom atom)
    {
        ShareEstimate share = Shares.Between(study.Sample, atom.Value, atom.Value, study.Options.Level);
        string value = StudyNumbers.WithUnit(StudyNumbers.AsGiven(atom.Value), study.Unit);
        return Guard.Text($"Exactly {value}: {StudyNumbers.Percent(share.Estimate, share.Interval.Length / 2)} of the values (certainly {StudyNumbers.PercentRange(share.Interval)}). The curve shows the other {StudyNumbers.Percent(study.CurveShare, share.Interval.Length / 2)}.");
    }

    private static ReportBlock.Table LimitTable(DensityStudy study)
    {
        var rows = new List<IReadOnlyList<string>>();
        foreach (LimitAnswer answer in study.Limits)
        {
            ShareEstimate share = answer.Beyond;
            string words = StudyNumbers.OneIn(share.Estimate);
            string between = StudyNumbers.OneInRange(share.Interval);
            rows.Add(
            [
                "above " + StudyNumbers.WithUnit(StudyNumbers.AsGiven(answer.Limit), study.Unit),
                StudyNumbers.Percent(share.Estimate, share.Interval.Length / 2),
                StudyNumbers.PercentRange(share.Interval),
                string.Join(", ", new[] { words, between }.Where(w => w.Length > 0)),
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
                StudyNumbers.AsGiven(Math.Round(100 * quantile.Probability, 10)) + " % of values up to",
                StudyNumbers.WithUnit(StudyNumbers.Rounded(quantile.Estimate, error), study.Unit),
                StudyNumbers.Range(quantile.Interval, error, study.Unit),
            ]);
        }

        return new ReportBlock.Table(["quantile", "estimate", Level(study)], rows);
    }

    private static string Level(DensityStudy study) => StudyNumbers.AsGiven(Math.Round(100 * study.Options.Level, 10)) + " % interval";
}
