using Smoothing.Bandwidths;
using Smoothing.Estimation;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing;

/// <summary>Decides which warnings apply, each with its number, its consequence and its remedy.</summary>
internal static class StudyCautions
{
    // Common practice, without a source: below fifty values a curve shows the broad place of the data and little more.
    private const int Few = 50;

    public static IReadOnlyList<Caution> Of(DensityStudy study)
    {
        var cautions = new List<Caution>();
        Sample sample = study.Sample;
        if (sample.LeftOut > 0)
        {
            double share = (double)sample.LeftOut / (sample.LeftOut + sample.Count);
            cautions.Add(new(CautionKind.LeftOut, Guard.Text($"{StudyNumbers.Count(sample.LeftOut)} missing values ({100 * share:F1} %) were left out: if they are missing because of their size, every number here is off. Find out why they are missing.")));
        }

        if (sample.EffectiveCount < Few)
        {
            cautions.Add(new(CautionKind.FewValues, Guard.Text($"Only {StudyNumbers.Count(Math.Floor(sample.EffectiveCount))} values: the curve shows where they lie and little of their shape. About {4 * Few} would show two groups apart.")));
        }

        if (sample.IsWeighted && sample.WeightMeaning == WeightMeaning.Relative && sample.EffectiveCount < 0.8 * sample.Count)
        {
            cautions.Add(new(CautionKind.Weights, Guard.Text($"The weights are uneven: {StudyNumbers.Count(sample.Count)} values say as much as {StudyNumbers.Count(Math.Floor(sample.EffectiveCount))} of equal weight, and intervals are as wide as for those.")));
        }

        Rounding(study, cautions);
        Ends(study, cautions);
        Smoothing(study, cautions);
        if (study.Uncertainty is { Contradicted.Count: > 0 } trust)
        {
            string places = string.Join(", ", trust.Contradicted.Take(4).Select(c => Guard.Text($"{StudyPeaks.Place(study, c.Lower)} to {StudyPeaks.Place(study, c.Upper)}")));
            cautions.Add(new(CautionKind.FineStructure, Guard.Text($"The data contradict the smooth curve at a finer scale from {places}: there may be something narrower than the smoothing shows, and the band is widened there.")));
        }

        Order(study, cautions);
        Outside(study, cautions);
        return cautions.AsReadOnly();
    }

    private static void Rounding(DensityStudy study, List<Caution> cautions)
    {
        Sample sample = study.CurveSample;
        double h = study.Bandwidth;
        if (sample.HeapingUnit is { } heaps)
        {
            string step = StudyNumbers.WithUnit(StudyNumbers.AsGiven(heaps.Step), study.Unit);
            string kept = h >= heaps.Step / 2
                ? Guard.Text($"bumps at those places are rounding, and the smoothing ({StudyNumbers.WithUnit(StudyNumbers.Significant(h, 2), study.Unit)}) is wide enough to hide them.")
                : Guard.Text($"bumps at those places are rounding; the smoothing ({StudyNumbers.WithUnit(StudyNumbers.Significant(h, 2), study.Unit)}) may not hide all of them. Record the values as read, or read no bump narrower than {step}.");
            cautions.Add(new(CautionKind.Heaping, Guard.Text($"{100 * heaps.Share:F0} % of the values sit on multiples of {step}, where {100 * heaps.ExpectedShare:F0} % would by chance: {kept}")));
        }

        if (sample.RoundingUnit is { } unit && (study.Bandwidth.Status == BandwidthStatus.RoundingFloor || unit.Step > h))
        {
            cautions.Add(new(CautionKind.Rounding, Guard.Text($"The values are rounded to {StudyNumbers.WithUnit(StudyNumbers.Significant(unit.Step, 3), study.Unit)}, and that limits the resolution: nothing finer can be seen. Finer records would show more.")));
        }
    }

    private static void Ends(DensityStudy study, List<Caution> cautions)
    {
        Sample sample = study.Sample;
        foreach ((Atom? pile, string end, string other) in new[] { (sample.PilingAtMinimum, "smallest", "below"), (sample.PilingAtMaximum, "largest", "above") })
        {
            if (pile is not null && !study.Atoms.Any(a => a.Value == pile.Value))
            {
                cautions.Add(new(CautionKind.PiledUp, Guard.Text($"{100 * pile.Share:F1} % of the values equal the {end} one, {StudyNumbers.WithUnit(StudyNumbers.AsGiven(pile.Value), study.Unit)}: if that is where recording stops, the true values lie {other} it and neither curve nor quantiles there mean anything. Use a method for censored values.")));
            }
        }

        foreach (Atom atom in study.Atoms)
        {
            cautions.Add(new(CautionKind.Atom, Guard.Text($"The value {StudyNumbers.WithUnit(StudyNumbers.AsGiven(atom.Value), study.Unit)} alone holds {100 * atom.Share:F0} % of the values. It is no part of the curve, which is drawn for the rest; shares and quantiles count it.")));
        }

        if (study.Options.Support is null)
        {
            foreach (LimitFinding finding in LimitEvidence.Suspected(study.CurveSample))
            {
                cautions.Add(new(CautionKind.UndeclaredLimit, finding.Statement));
            }
        }

        foreach (string note in study.Density.LimitNotes)
        {
            cautions.Add(new(CautionKind.UndeclaredLimit, note));
        }
    }

    private static void Smoothing(DensityStudy study, List<Caution> cautions)
    {
        BandwidthChoice choice = study.Bandwidth;
        if (choice.Status is BandwidthStatus.Replaced or BandwidthStatus.EndOfSearch)
        {
            cautions.Add(new(CautionKind.Smoothing, Guard.Text($"Smoothing: {StudyMethod.Rule(choice)}. Compare half and double before reading details.")));
        }

        if (choice.CandidatesDisagree && choice.Candidates.Count > 1)
        {
            double least = choice.Candidates.Values.Min();
            double most = choice.Candidates.Values.Max();
            cautions.Add(new(CautionKind.Smoothing, Guard.Text($"Two ways of choosing the smoothing disagree ({StudyNumbers.Significant(least, 2)} and {StudyNumbers.WithUnit(StudyNumbers.Significant(most, 2), study.Unit)}): the data have structure on several scales, and one smoothing shows only part of it. The finer one was taken.")));
        }
    }

    private static void Order(DensityStudy study, List<Caution> cautions)
    {
        Sample sample = study.Sample;
        if (study.Options.TimeOrdered && sample.Count >= 20 && Math.Abs(sample.LagOneCorrelation) > sample.LagOneLimit)
        {
            cautions.Add(new(CautionKind.Dependence, Guard.Text($"Neighbours in time are correlated (lag one: {sample.LagOneCorrelation:F2}, chance stays within ±{sample.LagOneLimit:F2}): the values say less than their number. Intervals of shares and quantiles allow for it.")));
        }
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
            cautions.Add(new(CautionKind.OutsidePicture, Guard.Text($"{(outside == 1 ? "One value lies" : StudyNumbers.Count(outside) + " values lie")} outside the picture, which would be flat otherwise (range {StudyNumbers.AsGiven(sample.Minimum)} to {StudyNumbers.WithUnit(StudyNumbers.AsGiven(sample.Maximum), study.Unit)}). All numbers count them.")));
        }
    }
}
