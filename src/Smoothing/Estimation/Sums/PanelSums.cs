using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Estimation;

/// <summary>Kernels that are analytic about the whole line (the logistic): crowded stretches of values are replaced by a few nodes that no sum can tell from them.</summary>
/// <remarks>
/// <para>Method: on a panel half a bandwidth wide, K((x − X)/h) as a function of X is its Chebyshev interpolant at 14 nodes to better than
/// 1e-17 of its size there. The weights Σ w_i ℓ_k(X_i) at the nodes therefore give every value, derivative and distribution
/// function of the estimate. Panels with no more values than nodes keep their values. Lagrange's ℓ_k come from the sums of
/// Chebyshev polynomials by their discrete orthogonality at the nodes.</para>
/// <para>Validity: K analytic within 2 of the real axis. With the panel's half width ¼ and that strip, the ellipse has ρ ≥ 16, and 14 nodes miss
/// 4ρ⁻¹⁴ ≈ 6e-17. Dominant error: rounding, a few 1e-15 relative. Cost: O(n log n) once, then a sum over at most 28 nodes for each
/// bandwidth of the range, whatever n. Source: Trefethen (2013), Approximation Theory and Approximation Practice, ch. 8.</para>
/// </remarks>
internal sealed class PanelSums(Sample sample, Kernel kernel, double bandwidth) : KernelSums
{
    private const int Nodes = 14;
    private const double Narrowest = 2; // least half width of the strip of analyticity

    private readonly Lazy<(double[] Centres, double[] Offsets, double[] Masses)> _nodes = new(() => Condense(sample, bandwidth));

    public override string Method => "Panels";

    /// <summary>How many nodes and values a sum runs over.</summary>
    public int Terms => _nodes.Value.Masses.Length;

    public static bool Serves(Kernel kernel, double bandwidth) => kernel.AnalyticHalfWidth >= Narrowest && bandwidth is > 1e-290 and < 1e290;

    public override void Derivatives(ReadOnlySpan<double> x, int order, Span<double> destination)
    {
        double factor = 1 / sample.TotalWeight / Math.Pow(bandwidth, order + 1);
        (double[] centres, double[] offsets, double[] masses) = _nodes.Value;
        for (int j = 0; j < x.Length; j++)
        {
            CompensatedSum sum = default;
            for (int i = 0; i < masses.Length; i++)
            {
                double u = (x[j] - centres[i] - offsets[i]) / bandwidth;
                sum.Add(masses[i] * (order == 0 ? kernel.ValueCore(u) : kernel.DerivativeCore(u, order)));
            }

            destination[j] = sum.Value * factor;
        }
    }

    public override void Cumulatives(ReadOnlySpan<double> x, bool upper, Span<double> destination)
    {
        (double[] centres, double[] offsets, double[] masses) = _nodes.Value;
        for (int j = 0; j < x.Length; j++)
        {
            CompensatedSum sum = default;
            for (int i = 0; i < masses.Length; i++)
            {
                double u = (x[j] - centres[i] - offsets[i]) / bandwidth;
                sum.Add(masses[i] * kernel.CumulativeCore(upper ? -u : u));
            }

            destination[j] = sum.Value / sample.TotalWeight;
        }
    }

    private static (double[] Centres, double[] Offsets, double[] Masses) Condense(Sample sample, double bandwidth)
    {
        ReadOnlySpan<double> values = sample.SortedValues;
        ReadOnlySpan<double> weights = sample.SortedWeights;
        var centres = new List<double>();
        var offsets = new List<double>(); // apart from the centres: rounded into one number they would move
        var masses = new List<double>();
        Span<double> sums = stackalloc double[Nodes];
        double half = bandwidth / 4;
        for (int i = 0; i < values.Length;)
        {
            // A panel begins at the next value left; its centre is a double, and all distances are taken from that.
            double centre = values[i] + half;
            int stop = i + 1;
            while (stop < values.Length && values[stop] - centre <= half)
            {
                stop++;
            }

            if (stop - i <= Nodes)
            {
                for (int k = i; k < stop; k++)
                {
                    centres.Add(values[k]);
                    offsets.Add(0);
                    masses.Add(weights.IsEmpty ? 1 : weights[k]);
                }
            }
            else
            {
                Chebyshev(values[i..stop], weights.IsEmpty ? weights : weights[i..stop], centre, half, sums);
                Spread(sums, centre, half, centres, offsets, masses);
            }

            i = stop;
        }

        return (centres.ToArray(), offsets.ToArray(), masses.ToArray());
    }

    // sums[j] = Σ w T_j(t), t = (X − centre)/half.
    private static void Chebyshev(ReadOnlySpan<double> values, ReadOnlySpan<double> weights, double centre, double half, Span<double> sums)
    {
        Span<double> errors = stackalloc double[Nodes];
        sums.Clear();
        errors.Clear();
        for (int i = 0; i < values.Length; i++)
        {
            double t = (values[i] - centre) / half;
            double below = weights.IsEmpty ? 1 : weights[i];
            double current = below * t;
            for (int j = 0; j < Nodes; j++)
            {
                double sum = sums[j] + below;
                double part = sum - sums[j];
                errors[j] += (sums[j] - (sum - part)) + (below - part);
                sums[j] = sum;
                (below, current) = (current, (2 * t * current) - below);
            }
        }

        for (int j = 0; j < Nodes; j++)
        {
            sums[j] += errors[j];
        }
    }

    // Mass at node k: (1/N) Σ_j c_j T_j(t_k) sums[j], c_0 = 1 and 2 else, t_k = cos((k + ½)π/N).
    private static void Spread(ReadOnlySpan<double> sums, double centre, double half, List<double> centres, List<double> offsets, List<double> masses)
    {
        for (int k = Nodes - 1; k >= 0; k--)
        {
            double angle = (k + 0.5) * Math.PI / Nodes;
            double mass = sums[0];
            for (int j = 1; j < Nodes; j++)
            {
                mass += 2 * Math.Cos(j * angle) * sums[j];
            }

            centres.Add(centre);
            offsets.Add(half * Math.Cos(angle));
            masses.Add(mass / Nodes);
        }
    }
}
