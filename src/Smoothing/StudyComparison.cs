using Smoothing.Inference;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing;

/// <summary>The reference of a study: how it is read, whether it can be compared, and what came out in words.</summary>
internal static class StudyComparison
{
    private const int FewestValues = 3;

    /// <summary>The reference as a sample, checked against the study; null without one.</summary>
    public static Sample? Reference(StudyOptions options, DensityStudy study)
    {
        Sample? reference = options.Reference;
        if (!options.ReferenceValues.IsEmpty)
        {
            reference = Sample.Of(options.ReferenceValues.Span, new SampleOptions { Missing = options.Missing, Name = options.ReferenceName });
        }

        if (reference is null)
        {
            return null;
        }

        string unit = options.Unit.Length > 0 ? options.Unit : study.Sample.Unit;
        foreach (string other in new[] { unit, study.Sample.Unit })
        {
            if (reference.Unit.Length > 0 && other.Length > 0 && reference.Unit != other)
            {
                throw new ArgumentException(Guard.Text($"Reference must be in the unit of the studied values, but is in {TextCleaner.Name(reference.Unit)} and they are in {TextCleaner.Name(other)}: convert one of them."), nameof(options));
            }
        }

        if (options.Support is { } support && !(support.Contains(reference.Minimum) && support.Contains(reference.Maximum)))
        {
            throw new ArgumentException(Guard.Text($"Reference must lie inside Support {support}, but runs from {reference.Minimum} to {reference.Maximum}: mend the values or the limits."), nameof(options));
        }

        return reference;
    }

    public static IReadOnlyList<LimitChange> Changes(DensityStudy study) => study.Reference is not { } reference
        ? []
        : [.. study.Limits.Select(limit => new LimitChange(limit.Limit, Shares.Beyond(reference, limit.Limit, study.Options.Level, dependence: StudySteps.Serial(study.Options)), limit.Beyond))];

    /// <summary>What the reference is called.</summary>
    public static string Name(DensityStudy study)
    {
        string given = TextCleaner.Name(study.Options.ReferenceName.Length > 0 ? study.Options.ReferenceName : study.Reference?.Name ?? "");
        return given.Length > 0 && given != study.Name ? given : "the reference";
    }

    /// <summary>Why no comparison can be made, as a sentence; null where one can.</summary>
    public static string? Obstacle(DensityStudy study)
    {
        Sample reference = study.Reference!;
        Sample own = study.CurveSample;
        if (Math.Min(own.Count, reference.Count) < FewestValues)
        {
            return Guard.Text($"Whether the values differ from {Name(study)} cannot be said: {StudyNumbers.CountWord(own.Count)} and {StudyNumbers.CountWord(reference.Count)} of them are too few, it takes at least three on either side.");
        }

        if (Math.Min(own.Minimum, reference.Minimum) == Math.Max(own.Maximum, reference.Maximum))
        {
            return Guard.Text($"Values and {Name(study)} are all equal: there is no distribution to compare.");
        }

        return StudySteps.IsModerate(study.Bandwidth) ? null : "The values are too large or too small to be compared: multiply both sides by a power of ten.";
    }

    /// <summary>The finding in one sentence.</summary>
    public static string Verdict(DensityStudy study)
    {
        if (study.Comparison is not { } result)
        {
            return Obstacle(study)!;
        }

        string name = Name(study);
        string p = P(result.PValue);
        if (result.PValue > 1 - result.Band.Level)
        {
            return Guard.Text($"A difference from {name} is not shown (p {p}); that is no proof that there is none.");
        }

        string[] places = [.. new[] { Places(study, result.Band.Higher, "more"), Places(study, result.Band.Lesser, "fewer") }.Where(part => part.Length > 0)];
        string where = places.Length > 0 ? Guard.Text($": {string.Join("; ", places)}.") : "; where they differ is not told at this level.";
        return Guard.Text($"The values differ from {name} (p {p}){where}");
    }

    /// <summary>What a reader must know besides: how large a hidden difference could be, what was left out, what the method cannot see.</summary>
    public static IEnumerable<string> Notes(DensityStudy study)
    {
        if (study.Comparison is not { } result)
        {
            yield break;
        }

        QuantileShift? median = result.Shifts.MinBy(s => Math.Abs(s.Probability - 0.5));
        if (result.PValue > 1 - result.Band.Level && median is not null)
        {
            string which = median.Probability == 0.5 ? "The median" : Guard.Text($"The {StudyNumbers.AsGiven(Math.Round(100 * median.Probability, 10))} % quantile");
            yield return Guard.Text($"{which} may still have moved by {Shift(study, median)}; with four times as many values on both sides a difference half as large would show.");
        }

        if (study.Atoms.Count > 0 || StudyAtoms.TakeOut(study.Reference!).Atoms.Count > 0)
        {
            yield return "Values with a share of their own are left out of this comparison on both sides; shares beyond limits count them.";
        }

        foreach (string note in result.Notes)
        {
            yield return note;
        }
    }

    /// <summary>The interval of a shift, signed, rounded to what its width supports.</summary>
    public static string Shift(DensityStudy study, QuantileShift shift) => StudyNumbers.SignedRange(shift.Interval, ShiftError(study, shift), study.Unit);

    /// <summary>What a shift is rounded to: half its interval, never finer than the values were recorded.</summary>
    public static double ShiftError(DensityStudy study, QuantileShift shift) =>
        Math.Max(double.IsFinite(shift.Interval.Length) ? shift.Interval.Length / 2 : 0, StudyReport.Resolution(study.Sample));

    public static string P(double p) => p <= 0.001 ? "at most 0.001" : p >= 1 ? "above 0.5" : "= " + StudyNumbers.PValue(p);

    // "fewer from 37 to 39, 41 to 43 and 44 to 49 µm"; stretches that look alike after rounding are said once.
    private static string Places(DensityStudy study, IReadOnlyList<Interval> stretches, string what)
    {
        string[] places = [.. stretches.Select(s => (StudyPeaks.Around(study, s.Lower), StudyPeaks.Around(study, s.Upper))).Select(s => s.Item1 == s.Item2 ? "near " + s.Item1 : s.Item1 + " to " + s.Item2).Distinct().Take(4)];
        return places.Length == 0 ? "" : Guard.Text($"{what} {(places[0].StartsWith("near", StringComparison.Ordinal) ? "" : "from ")}{StudyNumbers.WithUnit(StudyNumbers.Listed(places), study.Unit)}");
    }
}
