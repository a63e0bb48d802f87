using Smoothing.Estimation;
using Smoothing.Inference;
using Smoothing.Numerics;

namespace Smoothing;

/// <content>How far the answers can be trusted.</content>
internal static partial class StudyReport
{
    private static List<ReportBlock> Trust(DensityStudy study)
    {
        var blocks = new List<string> { Promise(study) };
        if (Bias(study) is { } bias)
        {
            blocks.Add(bias);
        }

        if (study.CurveSample.Minimum < study.CurveSample.Maximum)
        {
            blocks.Add(OtherSmoothing(study));
        }

        string dependence = study.Options.TimeOrdered ? "They allow for neighbours in time that resemble each other." : "They assume values that do not depend on each other.";
        if (study.Limits.Count + study.Quantiles.Count > 0)
        {
            blocks.Add(Guard.Text($"The intervals of shares and quantiles hold whatever the distribution is: in {LevelNumber(study)} of 100 such samples they cover the truth. {dependence}"));
        }

        if (study.Sample.Minimum < study.Sample.Maximum)
        {
            blocks.Add(Plan(study));
        }

        return [.. blocks.Select(text => new ReportBlock.Paragraph(text))];
    }

    private static string Promise(DensityStudy study)
    {
        if (study.Band is not { } band || study.Uncertainty is not { } trust)
        {
            return study.Options.Kernel.Order != 2
                ? Guard.Text($"No band can be given around the curve: the {study.Options.Kernel.Name} kernel has order {study.Options.Kernel.Order}, and bands are built for order 2.")
                : "No band can be given around the curve: at least three values, not all equal, are needed.";
        }

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
        return Guard.Text($"The band covers the whole true curve in {LevelNumber(study)} of 100 such samples, unless the truth has structure narrower than about {StudyNumbers.WithUnit(StudyNumbers.Significant(2 * study.Bandwidth, 2), study.Unit)}; at the highest point it reaches {100 * half / peak:F0} % of the height to either side.{tested}");
    }

    // What smoothing does at the highest peak, and at the deepest valley between named peaks.
    private static string? Bias(DensityStudy study)
    {
        if (study.Peaks is not { } summary || study.Uncertainty is not { } trust)
        {
            return null;
        }

        IReadOnlyList<Peak> peaks = StudyPeaks.Named(study);
        var told = new List<string>();
        bool known = Statement(told, trust.BiasAt(summary.Highest.Location), "peak at " + StudyPeaks.Place(study, summary.Highest.Location), "higher", "lower");
        Valley? valley = summary.Valleys.Where(v => peaks.Count > 1 && v.Location > peaks[0].Location && v.Location < peaks[^1].Location).MinBy(v => v.Height);
        if (valley is not null)
        {
            known |= Statement(told, trust.BiasAt(valley.Location), "valley at " + StudyPeaks.Place(study, valley.Location), "shallower", "deeper");
        }

        return string.Join(' ', told) + (known ? " Such estimates are right to about half of their size and rather understate." : "");
    }

    // True where a direction is told.
    private static bool Statement(List<string> told, BiasStatement bias, string place, string up, string down)
    {
        Interval correction = bias.RelativeCorrection;
        if (correction.Lower > 0)
        {
            told.Add(Guard.Text($"The true {place} is probably {PercentEnds(correction.Lower, correction.Upper)} {up} than drawn."));
            return true;
        }

        if (correction.Upper < 0)
        {
            told.Add(Guard.Text($"The true {place} is probably {PercentEnds(-correction.Upper, -correction.Upper >= 1 ? 1 : Math.Min(-correction.Lower, 1))} {down} than drawn."));
            return true;
        }

        told.Add(Guard.Text($"Whether the {place} is drawn too high or too low cannot be told from these values."));
        return false;
    }

    private static string PercentEnds(double low, double high)
    {
        if (low >= 1)
        {
            return "by far";
        }

        high = Math.Min(high, 10);
        string first = Guard.Text($"{100 * low:F0}");
        string last = Guard.Text($"{100 * high:F0}");
        return first == last ? (first == "0" ? "less than 1 %" : Guard.Text($"about {first} %")) : first == "0" ? Guard.Text($"up to {last} %") : Guard.Text($"{first} to {last} %");
    }

    // What a reader sees when the analyst is asked "and with another smoothing?"
    private static string OtherSmoothing(DensityStudy study)
    {
        string width = StudyNumbers.WithUnit(StudyNumbers.Significant(study.Bandwidth, 2), study.Unit);
        string start = Guard.Text($"Smoothing (h = {width}) flattens peaks and fills valleys that are narrower than that.");
        if (study.AtHalf is not { } half || study.AtDouble is not { } twice)
        {
            return start + " Compare half and double of it before reading details.";
        }

        int now = StudyPeaks.Named(study).Count;
        return Guard.Text($"{start} The curve has {Peaks(now)}; with half the smoothing it would have {Peaks(half.Peaks)}, the highest {Change(half.RelativeHeight)}; with double {Peaks(twice.Peaks)}, the highest {Change(twice.RelativeHeight)}.");
    }

    private static string Peaks(int count) => StudyNumbers.CountWord(count) + (count == 1 ? " peak" : " peaks");

    private static string Change(double ratio)
    {
        double percent = Math.Round(100 * (ratio - 1));
        return percent == 0 ? "as high" : Guard.Text($"{Math.Abs(percent):F0} % {(percent > 0 ? "higher" : "lower")}");
    }

    private static string Plan(DensityStudy study)
    {
        PrecisionPlan plan = study.Plan;
        string curve = plan.ForCurve is { } needed
            ? Guard.Text($"a band half as wide takes {StudyNumbers.Count(needed)}, since the error of a curve falls only with the power 2/5 of their number.")
            : "the curve gets no finer than the rounding of the values, however many there are.";
        return Guard.Text($"Twice the precision: intervals of shares and quantiles half as wide take {StudyNumbers.Count(plan.ForShares)} values in all, four times as many; {curve}");
    }
}
