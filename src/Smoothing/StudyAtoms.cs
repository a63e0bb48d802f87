using Smoothing.Samples;

namespace Smoothing;

/// <summary>Takes the values that hold a share of their own out of the curve.</summary>
internal static class StudyAtoms
{
    /// <summary>The atoms, and the sample without them; the sample itself where there is none or where too little would be left to draw.</summary>
    public static (IReadOnlyList<Atom> Atoms, Sample Others) TakeOut(Sample sample)
    {
        IReadOnlyList<Atom> atoms = sample.Atoms;
        if (atoms.Count == 0)
        {
            return ([], sample);
        }

        var values = new List<double>();
        var weights = new List<double>();
        for (int i = 0; i < sample.Count; i++)
        {
            double value = sample.Values[i];
            if (!atoms.Any(a => a.Value == value))
            {
                values.Add(value);
                if (sample.IsWeighted)
                {
                    weights.Add(sample.Weights[i]);
                }
            }
        }

        // A curve needs values of at least two kinds.
        return values.Distinct().Take(2).Count() < 2
            ? ([], sample)
            : (atoms, Sample.Of(values.ToArray(), new SampleOptions { Weights = weights.ToArray(), WeightMeaning = sample.WeightMeaning, Name = sample.Name, Unit = sample.Unit }));
    }
}
