using Smoothing.Bandwidths;
using Smoothing.Estimation;
using Smoothing.Inference;
using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing;

/// <summary>Decides which warnings apply, each with its number, its consequence and its remedy.</summary>
internal static class StudyCautions
{
    // Common practice, without a source: below fifty values a curve shows the broad place of the data and little more.
    private const int Few = 50;

    // So many peaks beyond those established and the picture is mostly accidents.
    private const int Accidents = 5;

    public static IReadOnlyList<Caution> Of(DensityStudy study)
    {
        var cautions = new List<Caution>();
        Sample sample = study.Sample;
        if (sample.LeftOut > 0)
        {
            double percent = 100.0 * sample.LeftOut / (sample.LeftOut + sample.Count);
            string share = percent < 0.1 ? "less than 0.1" : Guard.Text($"{percent:F1}");
            string left = sample.LeftOut == 1 ? Guard.Text($"One missing value ({share} %) was left out: if it is missing because of its size,")
                : Guard.Text($"{StudyNumbers.Count(sample.LeftOut)} missing values ({share} %) were left out: if they are missing because of their size,");
            cautions.Add(new(CautionKind.LeftOut, left + " every number here is off. Find out why."));
        }

        if (sample.EffectiveCount < Few)
        {
            cautions.Add(new(CautionKind.FewValues, Guard.Text($"{(sample.EffectiveCount < 2 ? "Only one value: the curve shows where it lies and nothing of a shape." : Guard.Text($"Only {StudyNumbers.CountWord(Math.Floor(sample.EffectiveCount))} values: the curve shows where they lie and little of their shape."))} About {4 * Few} would show two groups apart.")));
        }

        if (sample.IsWeighted && sample.WeightMeaning == WeightMeaning.Relative && sample.EffectiveCount < 0.8 * sample.Count)
        {
            cautions.Add(new(CautionKind.Weights, Guard.Text($"The weights are uneven: {StudyNumbers.Count(sample.Count)} values say as much as {StudyNumbers.Count(Math.Floor(sample.EffectiveCount))} of equal weight, and intervals are as wide as for those.")));
        }

        Rounding(study, cautions);
        Ends(study, cautions);
        Smoothing(study, cautions);
        FineScale(study, cautions);
        Bias(study, cautions);
        Groups(study, cautions);
        Order(study, cautions);
        Outside(study, cautions);
        return cautions.AsReadOnly();
    }

    private static void Rounding(DensityStudy study, List<Caution> cautions)
    {
        Sample sample = study.CurveSample;
        double h = study.Bandwidth;
        string width = StudyNumbers.WithUnit(StudyNumbers.Significant(h, 2), study.Unit);
        bool atFloor = study.Bandwidth.Status == BandwidthStatus.RoundingFloor;

        // The floor of the rounding is half its step for the Gaussian kernel; a higher one is that of the heaps.
        double gaussian = study.Options.Kernel.Order == 2 ? study.Bandwidth.EquivalentFor(Kernel.Gaussian) : h;
        bool heapsHidden = atFloor && sample.HeapingUnit is not null && gaussian > 0.6 * (sample.RoundingUnit?.Step ?? 0);
        if (sample.HeapingUnit is { } heaps)
        {
            string step = StudyNumbers.WithUnit(StudyNumbers.AsGiven(heaps.Step), study.Unit);
            string kept = heapsHidden ? Guard.Text($"bumps at those places are rounding, and the smoothing was kept at {width} to hide them. Nothing finer can be seen; values recorded as read would show more.")
                : h >= heaps.Step / 2 ? Guard.Text($"bumps at those places are rounding, and the smoothing ({width}) is wide enough to hide them.")
                : Guard.Text($"bumps at those places are rounding; the smoothing ({width}) may not hide all of them. Record the values as read, or read no bump narrower than {step}.");
            cautions.Add(new(CautionKind.Heaping, Guard.Text($"{100 * heaps.Share:F0} % of the values sit on multiples of {step}, where {100 * heaps.ExpectedShare:F0} % would by chance: {kept}")));
        }

        if (sample.RoundingUnit is { } unit && !heapsHidden && (atFloor || unit.Step > h))
        {
            string kept = atFloor ? Guard.Text($", and the smoothing was kept at {width} for it") : "";
            cautions.Add(new(CautionKind.Rounding, Guard.Text($"The values are rounded to {StudyNumbers.WithUnit(StudyNumbers.AsGiven(unit.PrintedStep), study.Unit)}{kept}: nothing finer can be seen. Finer records would show more.")));
        }
    }

    private static void Ends(DensityStudy study, List<Caution> cautions)
    {
        Sample sample = study.Sample;
        foreach ((Atom? pile, string end, string other) in new[] { (sample.PilingAtMinimum, "smallest", "below"), (sample.PilingAtMaximum, "largest", "above") })
        {
            if (pile is not null && !study.Atoms.Any(a => a.Value == pile.Value))
            {
                cautions.Add(new(CautionKind.PiledUp, Guard.Text($"{100 * pile.Share:F1} % of the values equal the {end} one, {StudyNumbers.WithUnit(StudyNumbers.AsGiven(pile.Value), study.Unit)}: {Stops(other)}")));
            }
        }

        foreach (Atom atom in study.Atoms)
        {
            // Zero is more often a true nothing (a dry day) than the end of a scale.
            string? end = atom.Value == sample.Maximum ? "largest" : atom.Value == sample.Minimum && atom.Value != 0 ? "smallest" : null;
            cautions.Add(new(CautionKind.Atom, Guard.Text($"The value {StudyNumbers.WithUnit(StudyNumbers.AsGiven(atom.Value), study.Unit)} alone holds {100 * atom.Share:F0} % of the values. It is no part of the curve, which is drawn for the rest; shares and quantiles count it.{(end is null ? "" : Guard.Text($" It is the {end} value: {Stops(end == "largest" ? "above" : "below")}"))}")));
        }

        if (study.Options.Support is null)
        {
            foreach (LimitFinding finding in LimitEvidence.Suspected(study.CurveSample))
            {
                // A point mass taken out there has been said, and leaves an abrupt end behind.
                if (study.Atoms.Any(a => finding.IsLower ? a.Value <= finding.Limit : a.Value >= finding.Limit))
                {
                    continue;
                }

                string side = finding.IsLower ? "below" : "above";
                string place = StudyNumbers.WithUnit(StudyReport.End(study.CurveSample, finding.Limit), study.Unit);
                cautions.Add(new(CautionKind.UndeclaredLimit, Guard.Text($"The values stop abruptly at {place} instead of thinning out. If the quantity cannot lie {side} it, declare that as Support: the curve now runs past it and is too low before it.")));
            }
        }

        foreach (string note in study.Density.LimitNotes)
        {
            cautions.Add(new(CautionKind.UndeclaredLimit, note));
        }
    }

    private static string Stops(string other) =>
        Guard.Text($"if that is where recording stops (a duration still running, the end of a scale), the true values lie {other} it and neither curve nor quantiles there mean anything. Find out, and use a method for censored values if so.");

    private static void FineScale(DensityStudy study, List<Caution> cautions)
    {
        if (study.Uncertainty is not { Contradicted.Count: > 0 } trust)
        {
            return;
        }

        // Stretches of several scales overlap; only what the picture shows is said.
        var seen = new List<Interval>();
        foreach (Interval c in trust.Contradicted.Where(c => c.Upper > study.Picture.Lower && c.Lower < study.Picture.Upper).OrderBy(c => c.Lower))
        {
            var inside = new Interval(Math.Max(c.Lower, study.Picture.Lower), Math.Min(c.Upper, study.Picture.Upper));
            if (seen.Count > 0 && inside.Lower <= seen[^1].Upper)
            {
                seen[^1] = new Interval(seen[^1].Lower, Math.Max(seen[^1].Upper, inside.Upper));
            }
            else
            {
                seen.Add(inside);
            }
        }

        if (seen.Count > 0)
        {
            string places = StudyNumbers.Listed([.. seen.Take(4).Select(s => StudyPeaks.Stretch(study, s, "from ", " to "))]);
            cautions.Add(new(CautionKind.FineStructure, Guard.Text($"The data contradict the smooth curve at a finer scale {places}: there may be something narrower than the smoothing shows, and the band is widened there.")));
        }
    }

    private static void Bias(DensityStudy study, List<Caution> cautions)
    {
        IReadOnlyList<Interval> stretches = StudyFigure.Biased(study);
        if (stretches.Count > 0)
        {
            string places = StudyNumbers.Listed([.. stretches.Take(3).Select(s => StudyPeaks.Stretch(study, s, "from ", " to ") + (study.Uncertainty!.BiasAt((s.Lower + s.Upper) / 2).Estimate < 0 ? " too low" : " too high"))]);
            cautions.Add(new(CautionKind.SmoothingBias, Guard.Text($"Smoothing draws the curve {places}, by more than the band reaches to either side. The dotted line of the picture is nearer the truth there, and the band is corrected for it: read heights from those.")));
        }
    }

    private static void Groups(DensityStudy study, List<Caution> cautions)
    {
        // Few values, dependence and unsaid limits have cautions of their own.
        foreach ((GroupWarning kind, string text) in study.Groups?.Findings ?? [])
        {
            if (kind == GroupWarning.RoundingStops)
            {
                cautions.Add(new(CautionKind.Groups, Guard.Text($"Whether there are more than {StudyNumbers.CountWord(study.Groups!.AtLeast)} groups cannot be said: the values are rounded too coarsely for it. Finer records would tell.")));
            }
            else if (kind is GroupWarning.Flat or GroupWarning.Weights)
            {
                cautions.Add(new(CautionKind.Groups, text));
            }
        }
    }

    private static void Smoothing(DensityStudy study, List<Caution> cautions)
    {
        BandwidthChoice choice = study.Bandwidth;
        if (choice.Status is BandwidthStatus.Replaced or BandwidthStatus.EndOfSearch)
        {
            string what = choice.Status == BandwidthStatus.EndOfSearch ? "The search for the smoothing ended at its limit without a solution inside"
                : "One of the ways of choosing the smoothing found no solution";
            string width = StudyNumbers.WithUnit(StudyNumbers.Significant(choice.Value, 2), study.Unit);
            cautions.Add(new(CautionKind.Smoothing, Guard.Text($"{what}; h = {width} was taken ({StudyMethod.Rule(choice)}), and the curve may show too much or too little. Compare half and double of it before reading details.")));
        }

        int peaks = StudyPeaks.Named(study).Count;
        if (study.Groups is { Tests.Count: > 0 } evidence && peaks > evidence.AtLeast + Accidents)
        {
            double wide = choice.CandidatesDisagree ? choice.Candidates.Values.Max() : BandwidthRules.NormalReference(study.CurveSample, study.Options.Kernel, new BandwidthOptions { Support = study.Options.Support });
            string why = choice.CandidatesDisagree ? "the other way of choosing it gives" : "for one plain hill it would be";
            cautions.Add(new(CautionKind.Smoothing, Guard.Text($"The curve has {StudyNumbers.CountWord(peaks)} peaks where the tests establish {StudyNumbers.CountWord(evidence.AtLeast)}: it follows rounding or chance, and its details mean nothing. Give a wider bandwidth than {StudyNumbers.WithUnit(StudyNumbers.Significant(choice.Value, 2), study.Unit)}; {why} {StudyNumbers.WithUnit(StudyNumbers.Significant(wide, 2), study.Unit)}.")));
        }
        else if (choice.CandidatesDisagree && choice.Candidates.Count > 1)
        {
            double least = choice.Candidates.Values.Min();
            double most = choice.Candidates.Values.Max();
            cautions.Add(new(CautionKind.Smoothing, Guard.Text($"Two ways of choosing the smoothing disagree ({StudyNumbers.Significant(least, 2)} and {StudyNumbers.WithUnit(StudyNumbers.Significant(most, 2), study.Unit)}): the data have structure on several scales, and one smoothing shows only part of it. The finer one was taken.")));
        }
    }

    private static void Order(DensityStudy study, List<Caution> cautions)
    {
        Sample sample = study.Sample;
        double r = sample.LagOneCorrelation;
        if (sample.Count < 20)
        {
            return;
        }

        if (study.Options.TimeOrdered)
        {
            if (Math.Abs(r) > sample.LagOneLimit)
            {
                cautions.Add(new(CautionKind.Dependence, Guard.Text($"Neighbours in time {(r > 0 ? "resemble each other" : "alternate")} (lag-1 autocorrelation {r:F2}, chance stays within ±{sample.LagOneLimit:F2}): the values {(r > 0 ? "say less than their number" : "are no independent draws")}. Intervals of shares and quantiles and the band allow for it; the tests for groups do not.")));
            }

            return;
        }

        // Beyond three standard errors, and by enough to make intervals a twentieth too narrow: √((1 + r)/(1 − r)) at r = 0.05.
        if (r > Math.Max(1.5 * sample.LagOneLimit, 0.05) && !IsSorted(sample.Values))
        {
            double independent = sample.Count * (1 - r) / (1 + r);
            cautions.Add(new(CautionKind.Dependence, Guard.Text($"Neighbouring rows resemble each other (lag-1 autocorrelation {r:F2}, chance stays within ±{sample.LagOneLimit:F2}). If the rows stand in the order of time, they say about as much as {StudyNumbers.Count(Math.Max(1, Math.Floor(independent)))} independent values and the intervals here are too narrow: declare the order (TimeOrdered).")));
        }
    }

    private static bool IsSorted(ReadOnlySpan<double> values)
    {
        bool up = true;
        bool down = true;
        for (int i = 1; i < values.Length && (up || down); i++)
        {
            up &= values[i] >= values[i - 1];
            down &= values[i] <= values[i - 1];
        }

        return up || down;
    }

    private static void Outside(DensityStudy study, List<Caution> cautions)
    {
        int outside = 0;
        foreach (double value in study.CurveSample.Values)
        {
            outside += study.Picture.Contains(value) ? 0 : 1;
        }

        if (outside > 0)
        {
            Sample sample = study.CurveSample;
            cautions.Add(new(CautionKind.OutsidePicture, Guard.Text($"{(outside == 1 ? "One value lies" : StudyNumbers.Count(outside) + " values lie")} outside the picture, which would be flat otherwise (range {StudyReport.End(sample, sample.Minimum)} to {StudyNumbers.WithUnit(StudyReport.End(sample, sample.Maximum), study.Unit)}). All numbers count them.")));
        }
    }
}
