using Smoothing.Numerics;

namespace Smoothing.Inference;

/// <summary>A simultaneous band for the difference of two densities, second less first.</summary>
public sealed class DifferenceBand
{
    internal DifferenceBand(double[] x, double[] lower, double[] upper, double[] difference, double criticalValue, double level, double firstBandwidth, double secondBandwidth)
    {
        X = Array.AsReadOnly(x);
        Lower = Array.AsReadOnly(lower);
        Upper = Array.AsReadOnly(upper);
        Difference = Array.AsReadOnly(difference);
        CriticalValue = criticalValue;
        Level = level;
        FirstBandwidth = firstBandwidth;
        SecondBandwidth = secondBandwidth;
        Higher = Stretches(x, lower, sign: 1);
        Lesser = Stretches(x, upper, sign: -1);
    }

    /// <summary>The places, equally spaced, in the unit of the data.</summary>
    public IReadOnlyList<double> X { get; }

    /// <summary>Lower limits of the difference, in 1/unit.</summary>
    public IReadOnlyList<double> Lower { get; }

    /// <summary>Upper limits of the difference, in 1/unit.</summary>
    public IReadOnlyList<double> Upper { get; }

    /// <summary>Bias-corrected second density less the first, in 1/unit.</summary>
    public IReadOnlyList<double> Difference { get; }

    /// <summary>The critical value.</summary>
    public double CriticalValue { get; }

    /// <summary>Confidence level, for all places together.</summary>
    public double Level { get; }

    /// <summary>Bandwidth of the first sample, for the Gaussian kernel.</summary>
    public double FirstBandwidth { get; }

    /// <summary>Bandwidth of the second sample.</summary>
    public double SecondBandwidth { get; }

    /// <summary>Whether both samples were smoothed alike: then the band also answers whether the densities differ at all.</summary>
    public bool IsCommon => FirstBandwidth == SecondBandwidth;

    /// <summary>Stretches where the second density is higher, beyond chance.</summary>
    public IReadOnlyList<Interval> Higher { get; }

    /// <summary>Stretches where the second density is lower, beyond chance.</summary>
    public IReadOnlyList<Interval> Lesser { get; }

    /// <summary>Whether the band leaves out a difference of 0 somewhere.</summary>
    public bool ExcludesZero => Higher.Count + Lesser.Count > 0;

    private static System.Collections.ObjectModel.ReadOnlyCollection<Interval> Stretches(double[] x, double[] limit, int sign)
    {
        var found = new List<Interval>();
        int start = -1;
        for (int j = 0; j <= x.Length; j++)
        {
            bool outside = j < x.Length && sign * limit[j] > 0;
            if (outside && start < 0)
            {
                start = j;
            }
            else if (!outside && start >= 0)
            {
                found.Add(new Interval(x[start], x[j - 1]));
                start = -1;
            }
        }

        return found.AsReadOnly();
    }
}
