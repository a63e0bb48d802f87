using Smoothing.Kernels;
using Smoothing.Samples;

namespace Smoothing.Estimation;

/// <summary>Chooses the algorithm behind an estimate from kernel, sample and bandwidth.</summary>
internal static class SumsChoice
{
    public static KernelSums For(Sample sample, Kernel kernel, double bandwidth)
    {
        if (CompactSums.Serves(sample, kernel, bandwidth))
        {
            return new CompactSums(sample, kernel, bandwidth);
        }

        if (MomentSums.Serves(sample, kernel, bandwidth))
        {
            return new MomentSums(sample, kernel, bandwidth);
        }

        if (GaussianDirectSums.Serves(kernel, bandwidth))
        {
            return new GaussianDirectSums(sample, kernel, bandwidth);
        }

        if (WindowedSums.Serves(kernel, bandwidth))
        {
            return new WindowedSums(sample, kernel, bandwidth);
        }

        if (ExponentialSums.Serves(kernel, bandwidth))
        {
            return new ExponentialSums(sample, kernel, bandwidth);
        }

        if (PanelSums.Serves(kernel, bandwidth))
        {
            return new PanelSums(sample, kernel, bandwidth);
        }

        return new DirectSums(sample, kernel, bandwidth);
    }
}
