using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Estimation;

/// <summary>The two-sided exponential (Laplace) kernel by running sums over the sorted values: O(n) once, then O(log n) a point.</summary>
/// <remarks>
/// <para>Method: L_i = w_i + L_{i−1}·exp(−(x_i − x_{i−1})/h) gathers all values up to x_i, R_i those from x_i on. A point between two values
/// needs one exponential from either side. All terms are positive: nothing cancels in either tail.</para>
/// <para>Dominant error: one rounding a step over the values within a few bandwidths, relative 1e-12 at most for ten million. Source: common practice.</para>
/// </remarks>
internal sealed class ExponentialSums(Sample sample, Kernel kernel, double bandwidth) : KernelSums
{
    private readonly double _rate = kernel.ExponentialRate / bandwidth;
    private readonly Lazy<(double[] UpTo, double[] From)> _running = new(() => Run(sample, kernel.ExponentialRate / bandwidth));
    private readonly Lazy<PrefixWeights> _weights = new(() => new PrefixWeights(sample));

    public override string Method => "ExponentialRecursion";

    public static bool Serves(Kernel kernel, double bandwidth) =>
        kernel.ExponentialRate > 0 && double.IsFinite(kernel.ExponentialRate / bandwidth) && double.IsNormal(kernel.ExponentialRate / bandwidth);

    public override void Derivatives(ReadOnlySpan<double> x, int order, Span<double> destination)
    {
        ReadOnlySpan<double> values = sample.SortedValues;
        double factor = _rate / 2 * Math.Pow(_rate, order) / sample.TotalWeight;
        int place = 0;
        for (int j = 0; j < x.Length; j++)
        {
            (double left, double right, double tied) = Sides(values, x[j], ref place);

            // K^(r)(u) = λʳ K(u), with sign (−1)ʳ where u > 0; at u = 0 what the kernel says.
            double sum = order % 2 == 0 ? left + right : right - left;
            destination[j] = sum * factor;
            if (tied > 0)
            {
                destination[j] += tied * (order == 0 ? kernel.ValueCore(0) : kernel.DerivativeCore(0, order)) / sample.TotalWeight / Math.Pow(bandwidth, order + 1);
            }
        }
    }

    public override void Cumulatives(ReadOnlySpan<double> x, bool upper, Span<double> destination)
    {
        ReadOnlySpan<double> values = sample.SortedValues;
        PrefixWeights prefix = _weights.Value;
        int place = 0;
        for (int j = 0; j < x.Length; j++)
        {
            (double left, double right, double tied) = Sides(values, x[j], ref place);
            int after = SortedSearch.UpTo(values, x[j], place);
            double sum = upper
                ? prefix.From(after) + (tied / 2) - (right / 2) + (left / 2)
                : prefix.Below(place) + (tied / 2) - (left / 2) + (right / 2);
            destination[j] = sum / sample.TotalWeight;
        }
    }

    // Σ w exp(−λ|x − X|/h) over values below x and above x, and the weight of values at x itself.
    private (double Left, double Right, double Tied) Sides(ReadOnlySpan<double> values, double x, ref int place)
    {
        (double[] upTo, double[] from) = _running.Value;
        place = SortedSearch.Below(values, x, place);
        int after = SortedSearch.UpTo(values, x, place);
        double left = place > 0 ? upTo[place - 1] * Math.Exp((values[place - 1] - x) * _rate) : 0;
        double right = after < values.Length ? from[after] * Math.Exp((x - values[after]) * _rate) : 0;
        return (left, right, PrefixWeights.Between(sample.SortedWeights, place, after));
    }

    private static (double[] UpTo, double[] From) Run(Sample sample, double rate)
    {
        ReadOnlySpan<double> values = sample.SortedValues;
        ReadOnlySpan<double> weights = sample.SortedWeights;
        var upTo = new double[values.Length];
        var from = new double[values.Length];
        double sum = 0;
        for (int i = 0; i < values.Length; i++)
        {
            sum = i == 0 ? 0 : sum * Math.Exp((values[i - 1] - values[i]) * rate);
            sum += weights.IsEmpty ? 1 : weights[i];
            upTo[i] = sum;
        }

        sum = 0;
        for (int i = values.Length - 1; i >= 0; i--)
        {
            sum = i == values.Length - 1 ? 0 : sum * Math.Exp((values[i] - values[i + 1]) * rate);
            sum += weights.IsEmpty ? 1 : weights[i];
            from[i] = sum;
        }

        return (upTo, from);
    }
}
