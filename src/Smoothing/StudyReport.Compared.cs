using Smoothing.Inference;
using Smoothing.Numerics;

namespace Smoothing;

/// <content>The comparison with a reference.</content>
internal static partial class StudyReport
{
    private static List<ReportBlock> Compared(DensityStudy study)
    {
        var blocks = new List<ReportBlock>();
        if (StudyFigure.Compared(study) is { } figure)
        {
            blocks.Add(new ReportBlock.Picture(figure));
        }

        blocks.Add(new ReportBlock.Paragraph(StudyComparison.Verdict(study)));
        if (study.LimitChanges.Count > 0)
        {
            blocks.Add(Changes(study));
        }

        if (study.Comparison is { } result)
        {
            blocks.Add(Shifts(study, result));
        }

        blocks.AddRange(StudyComparison.Notes(study).Select(note => new ReportBlock.Paragraph(note)));
        return blocks;
    }

    private static ReportBlock.Table Changes(DensityStudy study)
    {
        var rows = new List<IReadOnlyList<string>>();
        foreach (LimitChange change in study.LimitChanges)
        {
            double error = change.Interval.Length / 2;
            rows.Add(
            [
                "above " + StudyNumbers.WithUnit(StudyNumbers.AsGiven(change.Limit), study.Unit),
                StudyNumbers.Percent(change.Before.Estimate, error),
                StudyNumbers.Percent(change.Now.Estimate, error),
                Guard.Text($"{StudyNumbers.Signed(100 * change.Change, 100 * error)} ({StudyNumbers.SignedRange(new Interval(100 * change.Interval.Lower, 100 * change.Interval.Upper), 100 * error)}) points"),
            ]);
        }

        return new ReportBlock.Table(["limit", "reference", "now", "change (" + Level(study) + ")"], rows);
    }

    private static ReportBlock.Table Shifts(DensityStudy study, ComparisonResult result)
    {
        var rows = new List<IReadOnlyList<string>>();
        foreach (QuantileShift shift in result.Shifts)
        {
            double error = StudyComparison.ShiftError(study, shift);
            rows.Add(
            [
                StudyNumbers.AsGiven(Math.Round(100 * shift.Probability, 10)) + " % of values up to",
                StudyNumbers.WithUnit(StudyNumbers.Rounded(shift.First, error), study.Unit),
                StudyNumbers.WithUnit(StudyNumbers.Rounded(shift.Second, error), study.Unit),
                Guard.Text($"{StudyNumbers.Signed(shift.Shift, error)} ({StudyComparison.Shift(study, shift)})"),
            ]);
        }

        return new ReportBlock.Table(["quantile", "reference", "now", "shift (" + Level(study) + ")"], rows);
    }
}
