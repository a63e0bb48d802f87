using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Estimation;

/// <summary>The plain double loop over values and points, compensated: the reference that faster paths are tested against.</summary>
internal sealed class DirectSums(Sample sample, Kernel kernel, double bandwidth) : KernelSums
{
    public override string Method => "Direct";

    public override void Derivatives(ReadOnlySpan<double> x, int order, Span<double> destination)
    {
        double factor = 1 / (sample.TotalWeight * Math.Pow(bandwidth, order + 1));
        Sum(x, order == 0 ? kernel.ValueCore : u => kernel.DerivativeCore(u, order), factor, destination);
    }

    public override void Cumulatives(ReadOnlySpan<double> x, bool upper, Span<double> destination) =>
        Sum(x, upper ? u => kernel.CumulativeCore(-u) : kernel.CumulativeCore, 1 / sample.TotalWeight, destination);

    private void Sum(ReadOnlySpan<double> x, Func<double, double> term, double factor, Span<double> destination)
    {
        ReadOnlySpan<double> values = sample.Values;
        ReadOnlySpan<double> weights = sample.Weights;
        for (int j = 0; j < x.Length; j++)
        {
            CompensatedSum sum = default;
            for (int i = 0; i < values.Length; i++)
            {
                double k = term((x[j] - values[i]) / bandwidth);
                sum.Add(weights.IsEmpty ? k : weights[i] * k);
            }

            destination[j] = sum.Value * factor;
        }
    }
}
