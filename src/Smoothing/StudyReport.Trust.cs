using Smoothing.Estimation;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing;

/// <content>How far the answers can be trusted.</content>
internal static partial class StudyReport
{
    private static List<ReportBlock> Trust(DensityStudy study)
    {
        Sample sample = study.Sample;
        double h = study.Bandwidth;
        string level = StudyNumbers.AsGiven(Math.Round(100 * study.Options.Level, 10));
        var blocks = new List<ReportBlock>
        {
            new ReportBlock.Paragraph(Guard.Text($"The intervals of shares and quantiles hold whatever the distribution is: in {level} of 100 such samples they cover the truth. They assume values that do not depend on each other{(study.Options.TimeOrdered ? ", or, as here, allow for neighbours that resemble each other" : "")}.")),
            new ReportBlock.Paragraph(Guard.Text($"Smoothing spreads every value over about ±{StudyNumbers.WithUnit(StudyNumbers.Significant(h, 2), study.Unit)}: it flattens peaks and fills valleys that are narrower than that. {Halved(study)}")),
        };
        if (sample.Count > 1)
        {
            blocks.Add(new ReportBlock.Paragraph(Guard.Text($"Four times as many values ({StudyNumbers.Count(4.0 * sample.Count)}) would halve the uncertainty of shares and quantiles; the height of the curve needs nearly six times as many, since its error falls only with the power 2/5 of their number.")));
        }

        return blocks;
    }

    // The highest peak at half, chosen and double smoothing: what a reader sees when the analyst is asked "and with another smoothing?"
    private static string Halved(DensityStudy study)
    {
        double h = study.Bandwidth;
        if (study.Peaks is null)
        {
            return "Compare half and double smoothing before reading details.";
        }

        double height = study.Peaks.Highest.Height;
        double half = Highest(study, h / 2);
        double twice = Highest(study, 2 * h);
        return Guard.Text($"With half the smoothing the highest peak is {Change(half / height)}, with double {Change(twice / height)}.");
    }

    private static double Highest(DensityStudy study, double h) =>
        Density.Of(study.CurveSample, study.Options.Kernel, h, study.Density.Options).Peaks().Highest.Height;

    private static string Change(double ratio)
    {
        double percent = Math.Round(100 * (ratio - 1));
        return percent == 0 ? "as high" : Guard.Text($"{Math.Abs(percent):F0} % {(percent > 0 ? "higher" : "lower")}");
    }
}
