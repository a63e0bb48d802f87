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
                sample.StandardDeviation,
                sample.TiedShare,
                sample.RoundingUnit?.Step,
                sample.HeapingUnit?.Step,
                study.Options.Support is { } support ? DocumentInterval.Of(support) : null),
            [.. study.Atoms.Select(a => Atom(study, a.Value))],
            new DocumentSmoothing(study.Options.Kernel.Name, study.Bandwidth, study.Bandwidth.Rule.ToString(), study.Bandwidth.Status.ToString(), study.Options.Boundary.ToString()),
            new DocumentCurve(study.Curve.X, study.Curve.Y, study.CurveShare, study.Band?.Lower, study.Band?.Upper, Bias(study)),
            [.. StudyPeaks.Named(study).Select(p => new DocumentPeak(p.Location, p.Height, p.Prominence, p.Mass))],
            [.. study.Limits.Select(l => new DocumentLimit(l.Limit, l.Beyond.Estimate, DocumentInterval.Of(l.Beyond.Interval)))],
            [.. study.Quantiles.Select(q => new DocumentQuantile(q.Probability, q.Estimate, DocumentInterval.Of(q.Interval)))],
            [.. study.Cautions.Select(c => new DocumentCaution(c.Kind.ToString(), c.Text))],
            study.MethodSentence);
    }

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
