using Smoothing.Numerics;

namespace Smoothing.Inference;

/// <summary>A simultaneous band: with the stated confidence it covers the whole true curve over its range at once.</summary>
public sealed class Band
{
    internal Band(double[] x, double[] lower, double[] upper, double[] centre, double criticalValue, double level, IReadOnlyList<Interval> widened)
    {
        X = Array.AsReadOnly(x);
        Lower = Array.AsReadOnly(lower);
        Upper = Array.AsReadOnly(upper);
        Centre = Array.AsReadOnly(centre);
        CriticalValue = criticalValue;
        Level = level;
        Widened = widened;
    }

    /// <summary>Places, in the unit of the data, increasing.</summary>
    public IReadOnlyList<double> X { get; }

    /// <summary>Lower edge, 0 or more, in 1/unit.</summary>
    public IReadOnlyList<double> Lower { get; }

    /// <summary>Upper edge, in 1/unit; above 0 even where no value is near.</summary>
    public IReadOnlyList<double> Upper { get; }

    /// <summary>The debiased estimate in the middle, negative parts cut, in 1/unit: not the drawn curve, which is flatter.</summary>
    public IReadOnlyList<double> Centre { get; }

    /// <summary>The critical value c in place of the normal quantile.</summary>
    public double CriticalValue { get; }

    /// <summary>The confidence level.</summary>
    public double Level { get; }

    /// <summary>Stretches where the data contradict the curve at a finer scale and the band was widened; usually none.</summary>
    public IReadOnlyList<Interval> Widened { get; }
}
