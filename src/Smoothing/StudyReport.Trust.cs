using Smoothing.Estimation;
using Smoothing.Inference;
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
        if (study.Uncertainty is { } trust && study.Band is { } band)
        {
            blocks.Insert(0, new ReportBlock.Paragraph(Promise(study, band, trust, level)));
            foreach (string sentence in Bias(study, trust))
            {
                blocks.Add(new ReportBlock.Paragraph(sentence));
            }
        }
        else
        {
            blocks.Insert(0, new ReportBlock.Paragraph("No band can be given around the curve: at least three values, not all equal, and a kernel of order 2 are needed."));
        }

        if (sample.Count > 1)
        {
            blocks.Add(new ReportBlock.Paragraph(Guard.Text($"Four times as many values ({StudyNumbers.Count(4.0 * sample.Count)}) would halve the uncertainty of shares and quantiles; the height of the curve needs nearly six times as many, since its error falls only with the power 2/5 of their number.")));
        }

        return blocks;
    }

    private static string Promise(DensityStudy study, Band band, Uncertainty trust, string level)
    {
        double peak = 0;
        double half = 0;
        for (int i = 0; i < band.X.Count; i++)
        {
            if (study.Curve.Y[i] > peak)
            {
                peak = study.Curve.Y[i];
                half = (band.Upper[i] - band.Lower[i]) / 2;
            }
        }

        string tested = trust.Status switch
        {
            CoverageStatus.UntestedBandwidth => " The bandwidth comes from no rule of this library, so that promise was not tested.",
            CoverageStatus.EquivalentBandwidth => " It is the band of the Gaussian kernel at the equivalent bandwidth.",
            _ => "",
        };
        return Guard.Text($"The band covers the whole true curve in {level} of 100 such samples, unless the truth has structure narrower than about {StudyNumbers.WithUnit(StudyNumbers.Significant(2 * study.Bandwidth, 2), study.Unit)}; at the highest point it reaches {100 * half / peak:F0} % of the height to either side.{tested}");
    }

    // What smoothing does at the highest peak, and at the deepest valley between named peaks.
    private static IEnumerable<string> Bias(DensityStudy study, Uncertainty trust)
    {
        if (study.Peaks is not { } summary)
        {
            yield break;
        }

        yield return Guard.Text($"At the highest peak ({StudyPeaks.Place(study, summary.Highest.Location)}): {Lower(trust.BiasAt(summary.Highest.Location).Sentence)}");
        IReadOnlyList<Peak> peaks = StudyPeaks.Named(study);
        Valley? valley = summary.Valleys.Where(v => peaks.Count > 1 && v.Location > peaks[0].Location && v.Location < peaks[^1].Location).MinBy(v => v.Height);
        if (valley is not null)
        {
            yield return Guard.Text($"In the valley ({StudyPeaks.Place(study, valley.Location)}): {Lower(trust.BiasAt(valley.Location).Sentence.Split(';')[0].TrimEnd('.'))}.");
        }
    }

    private static string Lower(string sentence) => char.ToLowerInvariant(sentence[0]) + sentence[1..];

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
