using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Estimation;

/// <summary>Sums with a bandwidth of its own for each value.</summary>
/// <remarks>Method: direct sums, compensated; n steps a point. Source: Abramson (1982).</remarks>
internal sealed class AdaptiveSums : KernelSums
{
    private readonly Sample _sample;
    private readonly Kernel _kernel;

    public AdaptiveSums(Sample sample, Kernel kernel, double bandwidth, AdaptiveBandwidth options, KernelSums pilot)
    {
        if (!(options.Exponent >= 0 && options.Exponent <= 1))
        {
            throw new ArgumentException(Guard.Text($"Exponent must lie in [0, 1], but is {options.Exponent}: ½ is the usual choice."));
        }

        _sample = sample;
        _kernel = kernel;
        Widths = new double[sample.Count];
        pilot.Derivatives(sample.Values, 0, Widths);
        CompensatedSum logs = default;
        for (int i = 0; i < Widths.Length; i++)
        {
            double weight = sample.IsWeighted ? sample.Weights[i] : 1;
            logs.Add(weight == 0 ? 0 : weight / sample.TotalWeight * Math.Log(Widths[i]));
        }

        // A value of weight 0 may have no pilot density; it takes no part, so any width will do.
        for (int i = 0; i < Widths.Length; i++)
        {
            Widths[i] = bandwidth * (Widths[i] > 0 ? Math.Exp(-options.Exponent * (Math.Log(Widths[i]) - logs.Value)) : 1);
        }
    }

    public override string Method => "Adaptive";

    /// <summary>The bandwidth of each value, in the order of the sample.</summary>
    public double[] Widths { get; }

    public override void Derivatives(ReadOnlySpan<double> x, int order, Span<double> destination)
    {
        ReadOnlySpan<double> values = _sample.Values;
        ReadOnlySpan<double> weights = _sample.Weights;
        for (int j = 0; j < x.Length; j++)
        {
            CompensatedSum sum = default;
            for (int i = 0; i < values.Length; i++)
            {
                double u = (x[j] - values[i]) / Widths[i];
                double k = order == 0 ? _kernel.ValueCore(u) : _kernel.DerivativeCore(u, order);
                double term = k / Math.Pow(Widths[i], order + 1);
                sum.Add(weights.IsEmpty ? term : weights[i] * term);
            }

            destination[j] = sum.Value / _sample.TotalWeight;
        }
    }

    public override void Cumulatives(ReadOnlySpan<double> x, bool upper, Span<double> destination)
    {
        ReadOnlySpan<double> values = _sample.Values;
        ReadOnlySpan<double> weights = _sample.Weights;
        for (int j = 0; j < x.Length; j++)
        {
            CompensatedSum sum = default;
            for (int i = 0; i < values.Length; i++)
            {
                double u = (x[j] - values[i]) / Widths[i];
                double share = _kernel.CumulativeCore(upper ? -u : u);
                sum.Add(weights.IsEmpty ? share : weights[i] * share);
            }

            destination[j] = sum.Value / _sample.TotalWeight;
        }
    }
}
