using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Estimation;

/// <summary>The sums S₀ = (1/(Σw h)) Σ w K(u) and S₁ = (1/(Σw h)) Σ w u K(u), u = (x − X)/h, and their derivatives in x.</summary>
/// <remarks>
/// S₀ is the plain estimate and comes through the seam. For the Gaussian uφ = −φ′, so S₁ = −h S₀′ comes through it too. For other kernels S₁ is a
/// direct sum over the values in reach; it is only asked for near a limit.
/// </remarks>
internal sealed class BoundarySums(KernelSums sums, Kernel kernel, double bandwidth, Sample? sample)
{
    private readonly bool _gaussian = ReferenceEquals(kernel, Kernel.Gaussian);
    private readonly double _reach = BoundaryMoments.ReachOf(kernel) * bandwidth;

    /// <summary>Whether <see cref="First"/> can be had: values kept, or a kernel whose first-moment sum is one of its derivatives.</summary>
    public bool HasFirst => _gaussian || sample is not null;

    public void Zeroth(ReadOnlySpan<double> x, int derivative, Span<double> destination) => sums.Derivatives(x, derivative, destination);

    public void First(ReadOnlySpan<double> x, int derivative, Span<double> destination)
    {
        if (_gaussian)
        {
            sums.Derivatives(x, derivative + 1, destination);
            for (int i = 0; i < x.Length; i++)
            {
                destination[i] *= -bandwidth;
            }

            return;
        }

        ReadOnlySpan<double> values = sample!.SortedValues;
        ReadOnlySpan<double> weights = sample.SortedWeights;
        double factor = 1 / (sample.TotalWeight * Math.Pow(bandwidth, derivative + 1));
        for (int j = 0; j < x.Length; j++)
        {
            CompensatedSum sum = default;
            for (int i = FirstAtLeast(values, x[j] - _reach); i < values.Length && values[i] <= x[j] + _reach; i++)
            {
                double term = BoundaryMoments.WeightedDerivative(kernel, (x[j] - values[i]) / bandwidth, 1, derivative);
                sum.Add(weights.IsEmpty ? term : weights[i] * term);
            }

            destination[j] = sum.Value * factor;
        }
    }

    public static int FirstAtLeast(ReadOnlySpan<double> sorted, double x)
    {
        int low = 0;
        int high = sorted.Length;
        while (low < high)
        {
            int middle = (low + high) / 2;
            (low, high) = sorted[middle] < x ? (middle + 1, high) : (low, middle);
        }

        return low;
    }
}
