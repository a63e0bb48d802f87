using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Inference;

/// <summary>The number of independent, equally weighted values that a statement about a set of values may count on.</summary>
/// <remarks>
/// Method: relative weights: the smaller of (Σw)²/Σw² and the same inside the set and inside its complement, written as a
/// size for the whole: n_A = (P + w₀)/(Σ_A w² + w₀/n_eff), weights summing to 1, with one average value w₀ = 1/n as a
/// prior so that an empty set falls back to the global size. One global size is not enough once weights depend on the value.
/// Dependent values: divided by the inflation of the set's indicator, see <see cref="BatchMeans"/>.
/// </remarks>
internal static class EffectiveSize
{
    // Below five independent values every limit is close to "anything is possible": said, not hidden.
    private const double FewValues = 5;

    /// <summary>How the note about dependent values begins.</summary>
    public const string DependenceNote = "The values depend on each other in time";

    /// <summary>The effective size for the share of the values in a set, beside that share.</summary>
    public static (double Size, double Share, double Weight) Of(Sample sample, Func<double, bool> inside, SerialDependence dependence, List<string> notes)
    {
        ReadOnlySpan<double> x = sample.Values;
        ReadOnlySpan<double> w = sample.Weights;
        double total = sample.TotalWeight;
        double weight = 0, squares = 0, squaresOutside = 0;
        for (int i = 0; i < x.Length; i++)
        {
            double wi = w.IsEmpty ? 1 : w[i];
            double relative = wi / total;
            if (inside(x[i]))
            {
                weight += wi;
                squares += relative * relative;
            }
            else
            {
                squaresOutside += relative * relative;
            }
        }

        double share = Math.Min(weight / total, 1);
        double n = sample.EffectiveCount;
        if (sample.IsWeighted && sample.WeightMeaning == WeightMeaning.Relative)
        {
            double prior = 1.0 / x.Length;
            double here = (share + prior) / (squares + (prior / sample.EffectiveCount));
            double there = (1 - share + prior) / (squaresOutside + (prior / sample.EffectiveCount));
            n = Math.Min(n, Math.Min(here, there));
        }

        n = Depend(sample, inside, dependence, share, n, notes);
        if (n < FewValues && sample.IsWeighted)
        {
            notes.Add(Guard.Text($"The weights are so uneven that the {x.Length} values count as {n:G3}: limits are wide and rest on very few values."));
        }

        return (n, share, weight);
    }

    private static double Depend(Sample sample, Func<double, bool> inside, SerialDependence dependence, double share, double n, List<string> notes)
    {
        if (dependence == SerialDependence.Ignore)
        {
            return n;
        }

        BatchMeans batches = BatchMeans.Of(sample.Values);
        double count = sample.Count;
        if (dependence == SerialDependence.Check)
        {
            Caution(batches.LagOne, sample.Count, notes);
            return n;
        }

        // An empty or full set has no indicator to follow: the largest fiftieth (at least five values) stands in for it.
        ReadOnlySpan<double> sorted = sample.SortedValues;
        double stand = sorted[Math.Max(0, sorted.Length - Math.Max(5, sorted.Length / 50))];
        var indicator = new double[sample.Count];
        for (int i = 0; i < indicator.Length; i++)
        {
            bool hit = share is > 0 and < 1 ? inside(sample.Values[i]) : sample.Values[i] > stand;
            indicator[i] = hit ? 1 : 0;
        }

        double inflation = batches.Inflation(indicator);
        notes.Add(Guard.Text($"{DependenceNote} (lag-1 autocorrelation {batches.LagOne:F2}): {count:G6} of them count as {n / inflation:G4} here (batch means of {Math.Ceiling(batches.BlockLength):F0} values)."));
        return n / inflation;
    }

    /// <summary>The caution for a series whose neighbours are correlated beyond chance.</summary>
    public static void Caution(double lagOne, int count, List<string> notes)
    {
        // 2/√n: two standard errors of an autocorrelation of independent values.
        if (Math.Abs(lagOne) > 2 / Math.Sqrt(count))
        {
            notes.Add(Guard.Text($"Neighbouring values are correlated (lag-1 autocorrelation {lagOne:F2}, chance alone stays within ±{2 / Math.Sqrt(count):F2}): limits for independent values may be too narrow; ask for SerialDependence.AllowFor."));
        }
    }
}
