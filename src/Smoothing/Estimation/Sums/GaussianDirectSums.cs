using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Estimation;

/// <summary>Kernels φ(u)·q(u²) by the vectorised double loops of <see cref="GaussianDirect"/> and <see cref="GaussianGrid"/>: for few values or few pairs.</summary>
internal sealed unsafe class GaussianDirectSums(Sample sample, Kernel kernel, double bandwidth) : KernelSums
{
    // Derivatives of the highest order asked for anywhere, and the widest q of the Gaussian-based orders.
    private const int LargestDegree = 40;

    private readonly DirectSums _plain = new(sample, kernel, bandwidth);

    public override string Method => "GaussianDirect";

    /// <summary>The plain loop serves where squares or reciprocals of h leave the range of doubles.</summary>
    public static bool Serves(Kernel kernel, double bandwidth) => !kernel.GaussianPolynomial.IsEmpty && bandwidth is > 1e-150 and < 1e150;

    public override void Derivatives(ReadOnlySpan<double> x, int order, Span<double> destination)
    {
        if (x.IsEmpty)
        {
            return;
        }

        int degree = (2 * (kernel.GaussianPolynomial.Length - 1)) + order;
        if (degree >= LargestDegree)
        {
            _plain.Derivatives(x, order, destination);
            return;
        }

        Span<double> q = stackalloc double[LargestDegree];
        q = Polynomial(order, q)[..(degree + 1)];
        double factor = NormalLaw.InverseSqrtTwoPi / sample.TotalWeight / Math.Pow(bandwidth, order + 1);
        fixed (double* values = sample.Values, weights = sample.Weights, points = x, target = destination)
        {
            if (degree == 0 && GaussianGrid.Serves(x, bandwidth))
            {
                GaussianGrid.Sums(values, weights, sample.Count, x, bandwidth, factor * q[0], destination);
            }
            else
            {
                GaussianDirect.Scattered(values, weights, sample.Count, points, x.Length, bandwidth, q, factor, target);
            }
        }
    }

    public override void Cumulatives(ReadOnlySpan<double> x, bool upper, Span<double> destination) => _plain.Cumulatives(x, upper, destination);

    // (q φ)' = (q' − u q) φ, applied r times to q(u²).
    private Span<double> Polynomial(int order, Span<double> q)
    {
        q.Clear();
        ReadOnlySpan<double> even = kernel.GaussianPolynomial;
        for (int k = 0; k < even.Length; k++)
        {
            q[2 * k] = even[k];
        }

        Span<double> next = stackalloc double[LargestDegree];
        for (int r = 0; r < order; r++)
        {
            for (int k = 0; k < LargestDegree; k++)
            {
                next[k] = (k + 1 < LargestDegree ? (k + 1) * q[k + 1] : 0) - (k > 0 ? q[k - 1] : 0);
            }

            next.CopyTo(q);
        }

        return q;
    }
}
