using Smoothing.Bandwidths;
using Smoothing.Estimation;
using Smoothing.Kernels;
using Smoothing.Numerics;

namespace Smoothing.Inference;

/// <summary>Intervals for the place and height of each peak of a curve.</summary>
/// <remarks>
/// Method: a place is possible while the bias-corrected slope f̃′ is within z standard errors √(f̂ R(M′)/(nh³)) of zero, walking out from the peak of f̃ between the
/// curve's valleys. f at the true peak is at least f at the place found, and at most the largest upper limit over the possible places.
/// </remarks>
internal static class PeakIntervals
{
    private const int StepsPerBandwidth = 20;
    private const int MostSteps = 4000;

    public static IReadOnlyList<GroupPeak> Of(Density density, double level, Interval range)
    {
        Uncertainty uncertainty = Uncertainty.Of(density, new UncertaintyOptions { Level = level, FineScale = FineScaleCheck.Off });
        double h = density.Bandwidth;
        Kernel debiased = Kernel.GaussianOfOrder(4);
        Density sharp = Density.Of(density.Sample!, debiased, h);
        double z = -NormalLaw.Quantile((1 - level) / 2);
        double unit = debiased.Roughness(1) / (uncertainty.EffectiveCount * h * h * h);
        var result = new List<GroupPeak>();
        foreach (Peak peak in density.Peaks().Peaks)
        {
            if (!range.Contains(peak.Location))
            {
                continue;
            }

            // Outermost ranges run far into the empty tails: the central range and three bandwidths say enough.
            double from = Math.Max(peak.Range.Lower, Math.Min(range.Lower, peak.Location) - (3 * h));
            double to = Math.Min(peak.Range.Upper, Math.Max(range.Upper, peak.Location) + (3 * h));
            int steps = (int)Math.Clamp(Math.Ceiling((to - from) / h * StepsPerBandwidth), 8, MostSteps);
            double[] x = [.. Enumerable.Range(0, steps + 1).Select(i => from + ((to - from) * i / steps))];
            var slope = new double[x.Length];
            var height = new double[x.Length];
            var sharpHeight = new double[x.Length];
            sharp.Derivatives(x, 1, slope);
            sharp.Values(x, sharpHeight);
            density.Values(x, height);
            int top = Array.IndexOf(sharpHeight, sharpHeight.Max());
            double Bar(int i) => z * Math.Sqrt(Math.Max(height[i], 0) * unit);
            int left = top;
            while (left > 0 && slope[left] <= Bar(left))
            {
                left--;
            }

            int right = top;
            while (right < x.Length - 1 && slope[right] >= -Bar(right))
            {
                right++;
            }

            bool apart = slope[left] > Bar(left) && slope[right] < -Bar(right);
            double upper = 0;
            int stride = Math.Max(1, (right - left) / 40);
            for (int i = left; i <= right; i += stride)
            {
                upper = Math.Max(upper, uncertainty.IntervalAt(x[i]).Upper);
            }

            Interval here = uncertainty.IntervalAt(x[top]);
            result.Add(new GroupPeak(peak.Location, new Interval(x[left], x[right]), peak.Height, new Interval(here.Lower, Math.Max(upper, here.Upper)), apart));
        }

        return result.AsReadOnly();
    }
}
