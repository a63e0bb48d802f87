using Smoothing.Samples;

namespace Smoothing.Estimation;

/// <content>From a sample.</content>
internal sealed partial class EmpiricalSpectrum
{
    /// <summary>The spectrum of a sample; see <see cref="Of(ReadOnlySpan{double}, ReadOnlySpan{double}, double, double, double)"/>.</summary>
    public static EmpiricalSpectrum Of(Sample sample, double smallest, double largest)
    {
        (double[] values, double[] masses) = Distinct(sample);
        return Of(values, masses, Math.Max(1, sample.EffectiveCount), smallest, largest);
    }

    /// <summary>The distinct values with weight above zero, increasing, and their shares.</summary>
    public static (double[] Values, double[] Masses) Distinct(Sample sample)
    {
        ReadOnlySpan<double> x = sample.SortedValues, w = sample.SortedWeights;
        var values = new double[x.Length];
        var masses = new double[x.Length];
        int count = 0;
        for (int i = 0; i < x.Length; i++)
        {
            double mass = (w.IsEmpty ? 1 : w[i]) / sample.TotalWeight;
            if (mass > 0)
            {
                count += count > 0 && values[count - 1] == x[i] ? 0 : 1;
                values[count - 1] = x[i];
                masses[count - 1] += mass;
            }
        }

        return (values[..count], masses[..count]);
    }
}
