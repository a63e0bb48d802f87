using Smoothing.Bandwidths;
using Smoothing.Estimation;
using Smoothing.Inference;
using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing;

/// <summary>The single steps of a study, each a call on a module.</summary>
internal static class StudySteps
{
    public static void Check(StudyOptions options)
    {
        Guard.Given(options.Kernel, nameof(options.Kernel));
        Guard.Given(options.Name, nameof(options.Name));
        Guard.Given(options.Unit, nameof(options.Unit));
        Guard.Given(options.ReferenceName, nameof(options.ReferenceName));
        Guard.Given(options.Limits, nameof(options.Limits));
        Guard.Given(options.Probabilities, nameof(options.Probabilities));
        if (options.Reference is not null && !options.ReferenceValues.IsEmpty)
        {
            throw new ArgumentException("Reference and ReferenceValues are both given: the values can be compared with one of them only, so leave one out.", nameof(options));
        }

        Guard.Level(options.Level, nameof(options.Level));
        Guard.InRange(options.Points, 51, 10_001, nameof(options.Points));
        if (options.Bandwidth is double h)
        {
            Guard.Positive(h, "pass a width in the unit of the data, or leave it null and let a rule choose", nameof(options.Bandwidth));
        }

        for (int i = 0; i < options.Limits.Count; i++)
        {
            Guard.Finite(options.Limits[i], "a limit is a number in the unit of the data", Guard.Text($"Limits[{i}]"));
        }

        for (int i = 0; i < options.Probabilities.Count; i++)
        {
            Guard.Level(options.Probabilities[i], Guard.Text($"Probabilities[{i}]"));
        }
    }

    /// <summary>How a column is read.</summary>
    public static SampleOptions Columns(StudyOptions options) =>
        new() { Weights = options.Weights, WeightMeaning = options.WeightMeaning, Missing = options.Missing, Name = options.Name, Unit = options.Unit };

    /// <summary>How many observations there are: the sum of the weights where these are counts.</summary>
    public static double Observations(Sample sample) => sample.IsWeighted && sample.WeightMeaning == WeightMeaning.Counts ? sample.TotalWeight : sample.Count;

    /// <summary>Whether powers of the bandwidth up to the fifth stay inside the range of a double.</summary>
    public static bool IsModerate(double bandwidth) => bandwidth is > 1e-60 and < 1e60;

    public static BandwidthChoice Choose(Sample sample, StudyOptions options)
    {
        BandwidthChoice choice = options.Bandwidth is double given
            ? BandwidthChoice.Given(given, options.Kernel, sample.EffectiveCount)
            : BandwidthRules.Choose(options.Rule, sample, options.Kernel, new BandwidthOptions { Support = options.Support });

        // A curve's height is about 1/h: outside this range it is no number that a report could hold.
        return choice.Value is > 1e-290 and < 1e290
            ? choice
            : throw new ArgumentException(Guard.Text($"The bandwidth is {choice.Value}, too far from 1 for a report: multiply the values by a power of ten."), nameof(options));
    }

    /// <summary>Statements about the error; null where too few values carry the curve.</summary>
    public static Uncertainty? Trust(Density density, BandwidthChoice choice, StudyOptions options) =>
        IsModerate(density.Bandwidth) && density is { Kernel.Order: 2, Sample: { Count: >= 3 } sample } && sample.Minimum < sample.Maximum
            ? Uncertainty.Of(density, new UncertaintyOptions { Level = options.Level, Choice = choice, Dependence = Serial(options) })
            : null;

    public static SerialDependence Serial(StudyOptions options) => options.TimeOrdered ? SerialDependence.AllowFor : SerialDependence.Ignore;

    /// <summary>The stretch that is drawn: all values and the foot of the curve, or the middle 99.6 % where a few far values would flatten the rest.</summary>
    public static Interval PictureRange(Sample sample, double bandwidth, StudyOptions options)
    {
        // Beyond three standard deviations of the kernel the curve of one value is below 1.2 % of its height.
        double reach = 3 * bandwidth * Spread(options.Kernel);
        double low = sample.Minimum;
        double high = sample.Maximum;
        ReadOnlySpan<double> sorted = sample.SortedValues;
        int far = (int)Math.Ceiling(0.002 * (sorted.Length - 1));
        double innerLow = sorted[far];
        double innerHigh = sorted[sorted.Length - 1 - far];
        double core = Math.Max(sample.Quantile(0.9) - sample.Quantile(0.1), reach);

        // A side that reaches more than two cores past the outermost 0.2 % of the values is cut there.
        if (innerLow - low > 2 * core)
        {
            low = innerLow;
        }

        if (high - innerHigh > 2 * core)
        {
            high = innerHigh;
        }

        // Beyond a quarter of the largest double the width of the picture itself would overflow.
        low = Math.Max(low - reach, -double.MaxValue / 4);
        high = Math.Min(high + reach, double.MaxValue / 4);
        if (options.Support is { } support)
        {
            low = Math.Max(low, support.Lower);
            high = Math.Min(high, support.Upper);
        }

        // One value, or values so large that the reach drowns: a stretch of some width all the same.
        return low < high ? new Interval(low, high) : new Interval(Math.BitDecrement(low), Math.BitIncrement(high));
    }

    /// <summary>The picture made wide enough for the point masses, each with a little room beside it, as long as that does not more than double it.</summary>
    public static Interval WithAtoms(Interval picture, IReadOnlyList<Atom> atoms, StudyOptions options)
    {
        double low = picture.Lower;
        double high = picture.Upper;
        double room = 0.02 * picture.Length;
        foreach (Atom atom in atoms.Where(a => a.Value > picture.Lower - picture.Length && a.Value < picture.Upper + picture.Length))
        {
            low = Math.Min(low, atom.Value - room);
            high = Math.Max(high, atom.Value + room);
        }

        return options.Support is { } support ? new Interval(Math.Max(low, support.Lower), Math.Min(high, support.Upper)) : new Interval(low, high);
    }

    public static double[] Grid(Interval range, int points)
    {
        var x = new double[points];
        for (int i = 0; i < points; i++)
        {
            double t = (double)i / (points - 1);
            x[i] = i == points - 1 ? range.Upper : ((1 - t) * range.Lower) + (t * range.Upper);
        }

        return x;
    }

    private static double Spread(Kernel kernel) => kernel.Order == 2 ? Math.Sqrt(kernel.Moment(2)) : 1;
}
