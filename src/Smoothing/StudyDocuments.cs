using Smoothing.Inference;

namespace Smoothing;

/// <summary>Writes the numbers of a study into a document.</summary>
internal static class StudyDocuments
{
    public static StudyDocument Of(DensityStudy study)
    {
        var sample = study.Sample;
        return new StudyDocument(
            StudyDocument.CurrentSchema,
            StudyMethod.Version,
            study.Name,
            study.Unit,
            study.Options.Level,
            new DocumentData(
                sample.Count,
                sample.EffectiveCount,
                sample.LeftOut,
                sample.Minimum,
                sample.Maximum,
                sample.Mean,
                Math.Min(sample.StandardDeviation, double.MaxValue),
                sample.TiedShare,
                sample.RoundingUnit?.Step,
                sample.HeapingUnit?.Step,
                study.Options.Support is { } support ? DocumentInterval.Of(support) : null,
                sample.LagOneCorrelation),
            [.. study.Atoms.Select(a => Atom(study, a.Value))],
            new DocumentSmoothing(study.Options.Kernel.Name, study.Bandwidth, study.Bandwidth.Rule.ToString(), study.Bandwidth.Status.ToString(), study.Options.Boundary.ToString()),
            new DocumentCurve(study.Curve.X, study.Curve.Y, study.CurveShare, study.Band?.Lower, study.Band?.Upper, Bias(study)),
            [.. StudyPeaks.Named(study).Select(p => new DocumentPeak(p.Location, p.Height, p.Prominence, p.Mass))],
            [.. study.Limits.Select(l => new DocumentLimit(l.Limit, l.Beyond.Estimate, DocumentInterval.Of(l.Beyond.Interval)))],
            [.. study.Quantiles.Select(q => new DocumentQuantile(q.Probability, q.Estimate, DocumentInterval.Of(q.Interval)))],
            [.. study.Cautions.Select(c => new DocumentCaution(c.Kind.ToString(), c.Text))],
            study.MethodSentence,
            Groups(study),
            Comparison(study),
            Variant(study.AtHalf),
            Variant(study.AtDouble),
            new DocumentPlan(study.Plan.Count, study.Plan.ForShares, study.Plan.ForCurve));
    }

    private static DocumentGroups? Groups(DensityStudy study) => study.Groups is not { } evidence
        ? null
        : new DocumentGroups(
            evidence.AtLeast,
            evidence.Significance,
            study.Options.Seed,
            [.. evidence.Tests.Select(t => new DocumentGroupTest(t.Peaks, t.CriticalBandwidth, t.PValue, t.IsRejected, t.Method))],
            Known(evidence.Dip),
            Known(evidence.DipPValue),
            [.. evidence.Peaks.Select(p => new DocumentGroupPeak(p.Location, DocumentInterval.Of(p.LocationInterval), p.Height, DocumentInterval.Of(p.HeightInterval), p.StandsApart))],
            StudyGroups.Verdict(study));

    private static DocumentComparison? Comparison(DensityStudy study)
    {
        if (study.Reference is not { } reference)
        {
            return null;
        }

        ComparisonResult? result = study.Comparison;
        return new DocumentComparison(
            StudyComparison.Name(study),
            reference.Count,
            result?.PValue,
            result?.Permutations,
            study.Options.Seed,
            [.. result?.Shifts.Select(s => new DocumentShift(s.Probability, s.First, s.Second, s.Shift, DocumentInterval.Of(s.Interval))) ?? []],
            [.. study.LimitChanges.Select(c => new DocumentLimitChange(c.Limit, c.Before.Estimate, c.Now.Estimate, c.Change, DocumentInterval.Of(c.Interval)))],
            result?.Band.X,
            result?.Band.Difference,
            result?.Band.Lower,
            result?.Band.Upper,
            StudyComparison.Verdict(study));
    }

    private static DocumentVariant? Variant(SmoothingVariant? variant) =>
        variant is null ? null : new DocumentVariant(variant.Bandwidth, variant.Peaks, variant.HighestLocation, variant.HighestHeight);

    private static double? Known(double value) => double.IsFinite(value) ? value : null;

    private static double[]? Bias(DensityStudy study)
    {
        if (study.Uncertainty is not { } trust)
        {
            return null;
        }

        double[] x = [.. study.Curve.X];
        var bias = new double[x.Length];
        trust.Biases(x, bias);
        return bias;
    }

    private static DocumentAtom Atom(DensityStudy study, double value)
    {
        ShareEstimate share = Shares.Between(study.Sample, value, value, study.Options.Level);
        return new DocumentAtom(value, share.Estimate, DocumentInterval.Of(share.Interval));
    }
}
