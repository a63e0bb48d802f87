using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Estimation;

/// <summary>Kernels of any shape on a bounded support: the plain compensated sum over the values in the window, found by searching the sorted values.</summary>
/// <remarks>Cost: O(log n + values in the window) a point. Accuracy: that of the kernel itself, as the full double loop has it.</remarks>
internal sealed class WindowedSums(Sample sample, Kernel kernel, double bandwidth) : KernelSums
{
    // A hair wider than the support: the kernel itself decides at its ends.
    private readonly double _reach = kernel.SupportRadius * bandwidth * (1 + 1e-14);
    private readonly Lazy<PrefixWeights> _weights = new(() => new PrefixWeights(sample));

    public override string Method => "Windowed";

    public static bool Serves(Kernel kernel, double bandwidth) => double.IsFinite(kernel.SupportRadius * bandwidth * 2);

    public override void Derivatives(ReadOnlySpan<double> x, int order, Span<double> destination)
    {
        double factor = 1 / sample.TotalWeight / Math.Pow(bandwidth, order + 1);
        ReadOnlySpan<double> values = sample.SortedValues;
        ReadOnlySpan<double> weights = sample.SortedWeights;
        int from = 0, to = 0;
        for (int j = 0; j < x.Length; j++)
        {
            (from, to) = Window(values, x[j], from, to);
            CompensatedSum sum = default;
            for (int i = from; i < to; i++)
            {
                double u = (x[j] - values[i]) / bandwidth;
                double k = order == 0 ? kernel.ValueCore(u) : kernel.DerivativeCore(u, order);
                sum.Add(weights.IsEmpty ? k : weights[i] * k);
            }

            destination[j] = sum.Value * factor;
        }
    }

    public override void Cumulatives(ReadOnlySpan<double> x, bool upper, Span<double> destination)
    {
        ReadOnlySpan<double> values = sample.SortedValues;
        ReadOnlySpan<double> weights = sample.SortedWeights;
        PrefixWeights prefix = _weights.Value;
        int from = 0, to = 0;
        for (int j = 0; j < x.Length; j++)
        {
            (from, to) = Window(values, x[j], from, to);
            CompensatedSum sum = default;
            for (int i = from; i < to; i++)
            {
                double u = (x[j] - values[i]) / bandwidth;
                double k = kernel.CumulativeCore(upper ? -u : u);
                sum.Add(weights.IsEmpty ? k : weights[i] * k);
            }

            sum.Add(upper ? prefix.From(to) : prefix.Below(from));
            destination[j] = sum.Value / sample.TotalWeight;
        }
    }

    private (int From, int To) Window(ReadOnlySpan<double> values, double x, int from, int to) =>
        (SortedSearch.Below(values, x - _reach, from), SortedSearch.UpTo(values, x + _reach, to));
}
