using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Estimation;

/// <summary>A curve mended near one or two limits by a boundary kernel and divided by its mass.</summary>
/// <remarks>
/// Method: near a limit the distribution function is summed by panels (<see cref="ZoneTable"/>), away from it the plain closed form is used; both are
/// joined where the limit is no longer felt and divided by the total, so that F ends at exactly 1 and F′ = f.
/// </remarks>
internal sealed class BoundaryForm : CurveForm
{
    // Kinks of the curve become panel edges up to this many: about half a second once. Beyond, kinks are so many and so small that panels a
    // sixty-fourth of h wide average them: the error of F then falls like the inverse square root of their number.
    private const int MostKinks = 1_000_000;
    private const double PanelRefinement = 8;

    private readonly KernelSums _sums;
    private readonly Kernel _kernel;
    private readonly double _bandwidth;
    private readonly Interval _support;
    private readonly Interval _range;
    private readonly Sample? _sample;
    private readonly BoundaryCurve _curve;
    private readonly Lazy<Parts> _parts;

    public BoundaryForm(KernelSums sums, Kernel kernel, double bandwidth, DensityOptions options, Interval range, Sample? sample, Func<Sample, double, KernelSums> sumsOf)
    {
        _sums = sums;
        _kernel = kernel;
        _bandwidth = bandwidth;
        _support = options.Support!.Value;
        _range = range;
        _sample = sample;
        var local = new BoundarySums(sums, kernel, bandwidth, _support, sample, sumsOf);
        if (options.Boundary != BoundaryCorrection.Renormalised)
        {
            Refuse(kernel, options.Boundary, local.HasFirst);
        }

        _curve = new BoundaryCurve(local, new BoundaryMoments(kernel, bandwidth, _support), options.Boundary, bandwidth, _support);
        _parts = new Lazy<Parts>(Build);
    }

    public override Interval Ends
    {
        get
        {
            double reach = _bandwidth * _kernel.SupportRadius;
            return new Interval(Math.Max(_support.Lower, _range.Lower - reach), Math.Min(_support.Upper, _range.Upper + reach));
        }
    }

    public override Interval Core => _range;

    public override double Scale => _bandwidth;

    public override bool MayBeNegative => _kernel.Order > 2;

    /// <summary>The integral of the mended curve before it was divided by it: how far the correction was from keeping mass by itself.</summary>
    public double RawMass => _parts.Value.Total;

    protected override ReadOnlySpan<double> SortedValues => _sample is null ? default : _sample.SortedValues;

    protected override IReadOnlyList<double> Kinks =>
        double.IsInfinity(_kernel.SupportRadius) ? [0] : [-_bandwidth * _kernel.SupportRadius, 0, _bandwidth * _kernel.SupportRadius];

    public override void Derivatives(ReadOnlySpan<double> x, int order, Span<double> destination)
    {
        _curve.Derivatives(x, order, destination);
        double total = _parts.Value.Total;
        for (int i = 0; i < x.Length; i++)
        {
            destination[i] /= total;
        }
    }

    public override void Cumulatives(ReadOnlySpan<double> x, bool upper, Span<double> destination)
    {
        Parts parts = _parts.Value;
        for (int i = 0; i < x.Length; i++)
        {
            destination[i] = Math.Clamp(Unnormalised(parts, x[i], upper) / parts.Total, 0, MayBeNegative ? double.PositiveInfinity : 1);
        }
    }

    private static void Refuse(Kernel kernel, BoundaryCorrection correction, bool hasFirst)
    {
        if (kernel.Order > 2)
        {
            throw new ArgumentException(
                Guard.Text($"Boundary = {correction} fits a line, and away from limits needs ∫ u²K above 0, which is 0 for the {kernel.Name} kernel of order {kernel.Order}: use BoundaryCorrection.Renormalised or Reflection, or a kernel of order 2."));
        }

        if (!hasFirst)
        {
            throw new ArgumentException(
                Guard.Text($"Boundary = {correction} with the {kernel.Name} kernel needs the values themselves, but only their cell moments are given: use the Gaussian kernel, or BoundaryCorrection.Renormalised or Reflection."));
        }
    }

    // Mass between two places that the limits do not reach, on the side where less cancels.
    private double Plain(double from, double to)
    {
        double below = One(from, upper: false);
        return below > 0.5 ? One(from, upper: true) - One(to, upper: true) : One(to, upper: false) - below;
    }

    private double One(double x, bool upper)
    {
        double result = 0;
        _sums.Cumulatives(new ReadOnlySpan<double>(in x), upper, new Span<double>(ref result));
        return result;
    }

    private Parts Build()
    {
        double low = _curve.LowerZoneEnd;
        double high = _curve.UpperZoneStart;
        if (low >= high)
        {
            ZoneTable whole = Table(_support.Lower, _support.Upper);
            return new Parts(whole, null, 0, whole.Mass);
        }

        ZoneTable? lower = double.IsFinite(low) ? Table(_support.Lower, low) : null;
        ZoneTable? upper = double.IsFinite(high) ? Table(high, _support.Upper) : null;
        double middle = Plain(low, high);
        return new Parts(lower, upper, middle, (lower?.Mass ?? 0) + middle + (upper?.Mass ?? 0));
    }

    private ZoneTable Table(double from, double to)
    {
        var kinks = new List<double>();
        bool smooth = PeakSearch.Smoothness(_kernel) == 4;
        double scale = _bandwidth;
        if (!smooth && _sample is not null)
        {
            foreach (double kink in Kinks)
            {
                ReadOnlySpan<double> sorted = SortedValues;
                for (int i = SortedSearch.Below(sorted, from - kink, 0); i < sorted.Length && sorted[i] + kink < to && kinks.Count <= MostKinks; i++)
                {
                    kinks.Add(sorted[i] + kink);
                }
            }
        }

        if (!smooth && (_sample is null || kinks.Count > MostKinks))
        {
            kinks.Clear();
            scale /= PanelRefinement;
        }

        // The moments change form where a limit comes within reach.
        kinks.Add(_curve.LowerZoneEnd);
        kinks.Add(_curve.UpperZoneStart);
        return new ZoneTable(_curve, from, to, scale, kinks);
    }

    private double Unnormalised(Parts parts, double x, bool upper)
    {
        if (x <= _support.Lower)
        {
            return upper ? parts.Total : 0;
        }

        if (x >= _support.Upper)
        {
            return upper ? 0 : parts.Total;
        }

        ZoneTable? lower = parts.Lower;
        ZoneTable? high = parts.Upper;
        double highMass = high?.Mass ?? 0;
        if (lower is not null && x < lower.To)
        {
            return Inside(lower, x, upper) + (upper ? parts.Middle + highMass : 0);
        }

        if (high is not null && x > high.From)
        {
            return Inside(high, x, upper) + (upper ? 0 : (lower?.Mass ?? 0) + parts.Middle);
        }

        return upper
            ? (high is null ? One(x, upper: true) : Plain(x, high.From) + highMass)
            : (lower is null ? One(x, upper: false) : Plain(lower.To, x) + lower.Mass);
    }

    private static double Inside(ZoneTable table, double x, bool upper)
    {
        double result = 0;
        table.Tails(new ReadOnlySpan<double>(in x), upper, new Span<double>(ref result));
        return result;
    }

    private sealed record Parts(ZoneTable? Lower, ZoneTable? Upper, double Middle, double Total);
}
