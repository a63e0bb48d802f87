using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Estimation;

/// <summary>Puts the curve together that kernel, bandwidth and options ask for.</summary>
internal static class FormChoice
{
    /// <param name="sums">Plain sums of the sample or its condensed form.</param>
    /// <param name="kernel">K.</param>
    /// <param name="bandwidth">h.</param>
    /// <param name="options">Limits, negative parts, adaptive bandwidth.</param>
    /// <param name="range">Smallest and largest value.</param>
    /// <param name="sample">The values; null when only moments are kept.</param>
    /// <param name="sumsOf">How sums of another sample or at another bandwidth are made.</param>
    public static CurveForm Of(
        KernelSums sums, Kernel kernel, double bandwidth, DensityOptions options, Interval range, Sample? sample, Func<Sample, double, KernelSums> sumsOf)
    {
        Interval? support = LimitChecks.Support(options, range, sample);
        CurveForm form = support is { } limits
            ? Limited(sums, kernel, bandwidth, options, range, sample, sumsOf, limits)
            : Line(sums, kernel, bandwidth, options, range, sample, sumsOf).Form;
        return options.NegativeParts == NegativeParts.CutAndRenormalise && form.MayBeNegative ? new CutForm(form) : form;
    }

    private static CurveForm Limited(
        KernelSums sums, Kernel kernel, double bandwidth, DensityOptions options, Interval range, Sample? sample, Func<Sample, double, KernelSums> sumsOf, Interval limits)
    {
        switch (options.Boundary)
        {
            case BoundaryCorrection.None:
                return Line(sums, kernel, bandwidth, options, range, sample, sumsOf).Form;
            case BoundaryCorrection.Reflection:
                (LineForm line, double widest) = Line(sums, kernel, bandwidth, options, range, sample, sumsOf);
                return new ReflectionForm(line, kernel, widest, limits);
            case BoundaryCorrection.LogScale:
                if (sample is null)
                {
                    throw new ArgumentException("Boundary = LogScale needs the values themselves, but only their cell moments are given: condense their logarithms, or use Reflection.");
                }

                Sample logs = LogScaleForm.Transform(sample, limits);
                var logRange = new Interval(logs.Minimum, logs.Maximum);
                LineForm inner = Line(sumsOf(logs, bandwidth), kernel, bandwidth, options, logRange, logs, sumsOf).Form;
                return new LogScaleForm(inner, kernel, bandwidth, limits, range);
            case BoundaryCorrection.LinearKernel:
            case BoundaryCorrection.PositiveLinear:
            case BoundaryCorrection.Renormalised:
                if (options.Adaptive is not null)
                {
                    throw new ArgumentException(Guard.Text(
                        $"Boundary = {options.Boundary} mends one bandwidth, but Adaptive gives each value its own: use BoundaryCorrection.Reflection or LogScale with it."));
                }

                return new BoundaryForm(sums, kernel, bandwidth, options, range, sample, sumsOf);
            default:
                throw new ArgumentException(Guard.Text($"Boundary must be a named BoundaryCorrection, but is {(int)options.Boundary}."));
        }
    }

    private static (LineForm Form, double Widest) Line(
        KernelSums sums, Kernel kernel, double bandwidth, DensityOptions options, Interval range, Sample? sample, Func<Sample, double, KernelSums> sumsOf)
    {
        if (options.Adaptive is not { } adaptive)
        {
            return (new LineForm(sums, kernel, bandwidth, range, sample is null ? null : new SmoothedDraws(sample, kernel, bandwidth)), bandwidth);
        }

        if (sample is null)
        {
            throw new ArgumentException("Adaptive needs the values themselves, but only their cell moments are given: leave Adaptive out.");
        }

        if (kernel.Order > 2)
        {
            throw new ArgumentException(Guard.Text($"Adaptive needs a kernel of order 2, but the {kernel.Name} kernel is of order {kernel.Order}: its pilot may be negative."));
        }

        double pilot = adaptive.PilotBandwidth is { } given ? Guard.Positive(given, "pass a width in the unit of the data", nameof(adaptive.PilotBandwidth)) : bandwidth;
        var own = new AdaptiveSums(sample, kernel, bandwidth, adaptive, sumsOf(sample, pilot));
        double lower = double.PositiveInfinity;
        double upper = double.NegativeInfinity;
        for (int i = 0; i < own.Widths.Length; i++)
        {
            lower = Math.Min(lower, sample.Values[i] - (own.Widths[i] * kernel.SupportRadius));
            upper = Math.Max(upper, sample.Values[i] + (own.Widths[i] * kernel.SupportRadius));
        }

        // The narrowest width sets the grids: nothing changes faster.
        var form = new LineForm(own, kernel, own.Widths.Min(), range, new SmoothedDraws(sample, kernel, own.Widths), new Interval(lower, upper));
        return (form, own.Widths.Max());
    }
}
