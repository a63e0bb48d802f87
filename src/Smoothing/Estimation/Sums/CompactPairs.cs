using System.Numerics.Tensors;
using Smoothing.Kernels;
using Smoothing.Samples;

namespace Smoothing.Estimation;

/// <summary>Exact leave-one-out values and sums over pairs for polynomial kernels: what cross-validation is made of.</summary>
/// <remarks>Method: <see cref="CompactBlocks.OthersAtValues"/>. O(n) for each bandwidth once the values are sorted; relative error as <see cref="EdgeMoments"/> says, never a difference that cancels. Keeps its tables from bandwidth to bandwidth; one thread at a time.</remarks>
internal sealed unsafe class CompactPairs(Sample sample, Kernel kernel)
{
    private double[] _room = [];
    private double[]? _convolution;
    private CompactBlocks? _blocks;
    private CompactBlocks? _wideBlocks;

    /// <summary>Whether K∗K is one polynomial on [0, 2], so that <see cref="SelfConvolutions"/> can be used: K even in u without odd powers of |u|, of degree at most 7.</summary>
    public static bool HasSelfConvolution(Kernel kernel)
    {
        ReadOnlySpan<double> polynomial = kernel.EdgePolynomial;
        if (polynomial.IsEmpty || (2 * polynomial.Length) - 1 > EdgeMoments.MaximumDegree)
        {
            return false;
        }

        // Coefficients about s = 1, that is u = 0: odd ones must vanish to rounding.
        Span<double> centred = stackalloc double[EdgeMoments.MaximumDegree + 1];
        polynomial.CopyTo(centred);
        int degree = polynomial.Length - 1;
        double size = 0;
        for (int pass = 0; pass < degree; pass++)
        {
            for (int k = degree - 1; k >= pass; k--)
            {
                centred[k] += centred[k + 1];
            }
        }

        for (int k = 0; k <= degree; k++)
        {
            size += Math.Abs(polynomial[k]);
        }

        for (int k = 1; k <= degree; k += 2)
        {
            if (Math.Abs(centred[k]) > 1e-13 * size)
            {
                return false;
            }
        }

        return true;
    }

    /// <summary>destination[i] = Σ_{j≠i} w_j K((x_i − x_j)/h) / ((Σw − w_i) h) for every value, smallest first.</summary>
    public void LeaveOneOut(double bandwidth, Span<double> destination)
    {
        double* polynomial = stackalloc double[EdgeMoments.MaximumDegree + 1];
        int degree = EdgePolynomials.Derivative(kernel, 0, new Span<double>(polynomial, EdgeMoments.MaximumDegree + 1));
        Blocks(ref _blocks, bandwidth, degree).OthersAtValues(polynomial, degree, lowerOnly: false, destination);
        ReadOnlySpan<double> weights = sample.SortedWeights;
        if (weights.IsEmpty)
        {
            Span<double> own = destination[..sample.Count];
            TensorPrimitives.Divide(own, (sample.TotalWeight - 1) * bandwidth, own);
            return;
        }

        for (int i = 0; i < sample.Count; i++)
        {
            destination[i] /= (sample.TotalWeight - weights[i]) * bandwidth;
        }
    }

    /// <summary>Σ_{j&lt;i} w_i w_j K((x_i − x_j)/h).</summary>
    public double Kernels(double bandwidth)
    {
        double* polynomial = stackalloc double[EdgeMoments.MaximumDegree + 1];
        int degree = EdgePolynomials.Derivative(kernel, 0, new Span<double>(polynomial, EdgeMoments.MaximumDegree + 1));
        return Pairs(Blocks(ref _blocks, bandwidth, degree), polynomial, degree);
    }

    /// <summary>Coefficients of K∗K in powers of t = 2 − |u|; needs <see cref="HasSelfConvolution"/>.</summary>
    /// <remarks>With K = Σ p_k sᵏ: (K∗K)(u) = ∫₀ᵗ P(y)P(t − y) dy = Σ p_j p_k j! k!/(j + k + 1)! t^(j+k+1).</remarks>
    public static double[] SelfConvolution(Kernel kernel)
    {
        ReadOnlySpan<double> p = kernel.EdgePolynomial;
        var polynomial = new double[2 * p.Length];
        for (int j = 0; j < p.Length; j++)
        {
            double beta = 1.0 / (j + 1); // j! k!/(j + k + 1)! at k = 0
            for (int k = 0; k < p.Length; k++)
            {
                polynomial[j + k + 1] += p[j] * p[k] * beta;
                beta *= (k + 1.0) / (j + k + 2);
            }
        }

        return polynomial;
    }

    /// <summary>Σ_{j&lt;i} w_i w_j (K∗K)((x_i − x_j)/h), on a window of 2h in s = t/2; needs <see cref="HasSelfConvolution"/>.</summary>
    public double SelfConvolutions(double bandwidth)
    {
        double* polynomial = stackalloc double[EdgeMoments.MaximumDegree + 1];
        new Span<double>(polynomial, EdgeMoments.MaximumDegree + 1).Clear();
        _convolution ??= SelfConvolution(kernel);
        int degree = _convolution.Length - 1;
        for (int k = 0; k <= degree; k++)
        {
            polynomial[k] = Math.ScaleB(_convolution[k], k);
        }

        return Pairs(Blocks(ref _wideBlocks, 2 * bandwidth, degree), polynomial, degree);
    }

    /// <summary>∫f̂² − 2·(mean of the leave-one-out values), the least-squares criterion, for values of equal weight.</summary>
    /// <remarks>
    /// n⁻²h⁻¹{n R(K) + 2 Σ_{j&lt;i} (K∗K)} − 4{n(n − 1)h}⁻¹ Σ_{j&lt;i} K; needs <see cref="HasSelfConvolution"/> and two values.
    /// Source: Rudemo (1982), Bowman (1984).
    /// </remarks>
    public double LeastSquares(double bandwidth)
    {
        double n = sample.Count;
        double squares = ((n * kernel.RoughnessCore(0)) + (2 * SelfConvolutions(bandwidth))) / (n * n * bandwidth);
        return squares - (4 * Kernels(bandwidth) / (n * (n - 1) * bandwidth));
    }

    private CompactBlocks Blocks(ref CompactBlocks? kept, double width, int degree)
    {
        if (kept is null)
        {
            kept = new CompactBlocks(sample, width, degree);
        }
        else if (kept.Bandwidth != width)
        {
            kept.Fill(width);
        }

        return kept;
    }

    private double Pairs(CompactBlocks blocks, double* polynomial, int degree)
    {
        if (_room.Length == 0)
        {
            _room = new double[sample.Count];
        }

        blocks.OthersAtValues(polynomial, degree, lowerOnly: true, _room);
        return sample.IsWeighted ? TensorPrimitives.Dot<double>(_room, sample.SortedWeights) : TensorPrimitives.Sum<double>(_room);
    }
}
