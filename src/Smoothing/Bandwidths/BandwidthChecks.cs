using Smoothing.Kernels;
using Smoothing.Numerics;

namespace Smoothing.Bandwidths;

/// <summary>The checks in front of every rule.</summary>
internal static class BandwidthChecks
{
    private const double LargestHalfSpan = 5e299;

    public static void Check(BandwidthOptions options)
    {
        Guard.InRange(options.Derivative, 0, 4, nameof(options.Derivative));
        Guard.InRange(options.HighestDerivative, 4, 10, nameof(options.HighestDerivative));
        Guard.InRange(options.PlugInStages, 1, 3, nameof(options.PlugInStages));
        if (options.SmallestBandwidth is double smallest)
        {
            Guard.Positive(smallest, "pass a bandwidth in the unit of the data", nameof(options.SmallestBandwidth));
        }

        if (options.LargestBandwidth is double largest)
        {
            Guard.Positive(largest, "pass a bandwidth in the unit of the data", nameof(options.LargestBandwidth));
            if (options.SmallestBandwidth >= largest)
            {
                throw new ArgumentException(
                    Guard.Text($"SmallestBandwidth must lie below LargestBandwidth, but they are {options.SmallestBandwidth} and {largest}: exchange them."), nameof(options));
            }
        }

        if (options.RoundingUnit is double step && !(step >= 0 && double.IsFinite(step)))
        {
            throw new ArgumentOutOfRangeException(
                nameof(options), Guard.Text($"RoundingUnit must be finite and not negative, but is {step}: pass the step, or 0 for values that were not rounded."));
        }
    }

    /// <summary>At least two different values with weight, and more than one observation.</summary>
    public static void Spread(List<double> values, double effectiveCount)
    {
        if (values.Count < 2)
        {
            throw new ArgumentException(
                Guard.Text($"A rule needs at least two different values with weight above zero, but there is only {values[0]}: no rule can choose a bandwidth; pass one as a number."),
                nameof(values));
        }

        // Sums of squares of distances must stay inside the range of a double, with room for the powers that the rules take of them.
        double half = (values.Max() / 2) - (values.Min() / 2);
        if (!(half < LargestHalfSpan))
        {
            throw new ArgumentException(
                Guard.Text($"The values span more than {2 * LargestHalfSpan}: divide them by a power of ten, or pass a bandwidth as a number."), nameof(values));
        }

        if (!(effectiveCount > 1))
        {
            throw new ArgumentException(
                Guard.Text($"A rule needs an effective count above 1, but it is {effectiveCount}: one value holds all the weight; pass a bandwidth as a number."), nameof(values));
        }
    }

    public static void Inside(double[] values, Interval support)
    {
        if (!(values[0] >= support.Lower && values[^1] <= support.Upper))
        {
            double outside = values[0] >= support.Lower ? values[^1] : values[0];
            throw new ArgumentException(
                Guard.Text($"Every value must lie in Support {support}, but there is {outside}: widen the limits or mend the value."), nameof(support));
        }
    }

    /// <summary>Rules that rest on the second derivative serve kernels of order 2 only.</summary>
    public static void SecondOrder(Kernel kernel, BandwidthRule rule)
    {
        if (kernel.Order != 2)
        {
            throw new ArgumentException(
                Guard.Text($"{rule} needs a kernel of order 2, but {kernel.Name} has order {kernel.Order}: use BlockSpectrum, LeastSquaresCrossValidation, DirectPlugIn or NormalReference."),
                nameof(kernel));
        }
    }
}
