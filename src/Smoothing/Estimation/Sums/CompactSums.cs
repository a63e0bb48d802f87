using System.Runtime.CompilerServices;
using Smoothing.Kernels;
using Smoothing.Samples;

namespace Smoothing.Estimation;

/// <summary>Exact sums of polynomial kernels on a bounded support, in O(log n) a point once the values are sorted and O(n) in all.</summary>
/// <remarks>
/// Method: <see cref="CompactBlocks"/>. Which values lie in a window is decided on x ± h without rounding; windows are closed, as
/// supports are. Relative error about 1e-15 times the condition given at <see cref="EdgeMoments"/>; exact zeros stay 0.
/// </remarks>
internal sealed unsafe partial class CompactSums(Sample sample, Kernel kernel, double bandwidth) : KernelSums
{
    private const double Largest = 1e290; // x ± h and its rounding error stay finite

    private readonly Lazy<CompactBlocks> _blocks = new(() => new CompactBlocks(sample, bandwidth, kernel.EdgePolynomial.Length - 1));
    private readonly Lazy<CompactBlocks> _integrals = new(() => new CompactBlocks(sample, bandwidth, kernel.EdgePolynomial.Length));
    private readonly Lazy<PrefixWeights> _weights = new(() => new PrefixWeights(sample));

    public override string Method => "CompactBlocks";

    /// <summary>Whether exact window ends and powers of h stay inside the range of doubles; otherwise the plain double loop serves.</summary>
    public static bool Serves(Sample sample, Kernel kernel, double bandwidth)
    {
        const double smallest = 1e-200; // 1/h and distances divided by it stay finite and normal
        return kernel.SupportRadius == 1 && kernel.EdgePolynomial.Length is > 0 and <= EdgeMoments.MaximumDegree
            && bandwidth > smallest && bandwidth < Largest
            && sample.Minimum > -Largest && sample.Maximum < Largest;
    }

    public override void Derivatives(ReadOnlySpan<double> x, int order, Span<double> destination)
    {
        double* right = stackalloc double[EdgeMoments.MaximumDegree + 1];
        double* left = stackalloc double[EdgeMoments.MaximumDegree + 1];
        int degree = EdgePolynomials.Derivative(kernel, order, new Span<double>(right, EdgeMoments.MaximumDegree + 1));
        for (int k = 0; k <= degree; k++)
        {
            left[k] = order % 2 == 0 ? right[k] : -right[k];
        }

        double factor = 1 / sample.TotalWeight / Math.Pow(bandwidth, order + 1);
        if (order == 0 && UsesCells(x))
        {
            CellValues(x, right, degree, factor, destination);
        }
        else if (order == 0 && x.Length >= FewestToSort && !IsAscending(x))
        {
            SortedValues(x, right, degree, factor, destination);
        }
        else if (order == 0)
        {
            Values(x, right, degree, factor, destination);
        }
        else
        {
            Slopes(x, order, left, right, degree, factor, destination);
        }
    }

    public override void Cumulatives(ReadOnlySpan<double> x, bool upper, Span<double> destination)
    {
        double* integral = stackalloc double[EdgeMoments.MaximumDegree + 1];
        int degree = EdgePolynomials.Integral(kernel, new Span<double>(integral, EdgeMoments.MaximumDegree + 1));
        CompactBlocks blocks = _integrals.Value;
        PrefixWeights prefix = _weights.Value;
        ReadOnlySpan<double> sorted = sample.SortedValues;
        double total = sample.TotalWeight;
        int first = 0, middle = 0, stop = 0;
        fixed (double* values = sorted, weights = sample.SortedWeights)
        {
            for (int j = 0; j < x.Length; j++)
            {
                WindowEnd lower = WindowEnd.Of(x[j], -bandwidth);
                WindowEnd higher = WindowEnd.Of(x[j], bandwidth);
                first = SortedSearch.Below(sorted, lower.Ceiling, first);
                middle = SortedSearch.UpTo(sorted, x[j], middle);
                stop = SortedSearch.UpTo(sorted, higher.Floor, stop);
                double left = blocks.Left(values, weights, lower, first, middle, integral, degree);
                double right = blocks.Right(values, weights, higher, middle, stop, integral, degree);
                double sum = upper ? prefix.From(middle) - right + left : prefix.Below(middle) - left + right;
                destination[j] = sum / total;
            }
        }
    }

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private void Values(ReadOnlySpan<double> x, double* polynomial, int degree, double factor, Span<double> destination)
    {
        CompactBlocks blocks = _blocks.Value;
        ReadOnlySpan<double> sorted = sample.SortedValues;
        int first = 0, middle = 0, stop = 0;
        fixed (double* values = sorted, weights = sample.SortedWeights)
        {
            for (int j = 0; j < x.Length; j++)
            {
                WindowEnd lower = WindowEnd.Of(x[j], -bandwidth);
                WindowEnd higher = WindowEnd.Of(x[j], bandwidth);
                first = SortedSearch.Below(sorted, lower.Ceiling, first);
                middle = SortedSearch.Below(sorted, x[j], middle);
                stop = SortedSearch.UpTo(sorted, higher.Floor, stop);
                double sum = blocks.Left(values, weights, lower, first, middle, polynomial, degree)
                    + blocks.Right(values, weights, higher, middle, stop, polynomial, degree);
                destination[j] = sum * factor;
            }
        }
    }

    // Open half windows by moments; values exactly at x and at its ends one by one, where the kernel itself says what holds there.
    private void Slopes(ReadOnlySpan<double> x, int order, double* left, double* right, int degree, double factor, Span<double> destination)
    {
        CompactBlocks blocks = _blocks.Value;
        ReadOnlySpan<double> sorted = sample.SortedValues;
        int first = 0, inside = 0, middle = 0, after = 0, end = 0, stop = 0;
        fixed (double* values = sorted, weights = sample.SortedWeights)
        {
            for (int j = 0; j < x.Length; j++)
            {
                WindowEnd lower = WindowEnd.Of(x[j], -bandwidth);
                WindowEnd higher = WindowEnd.Of(x[j], bandwidth);
                first = SortedSearch.Below(sorted, lower.Ceiling, first);
                inside = SortedSearch.UpTo(sorted, lower.Floor, inside);
                middle = SortedSearch.Below(sorted, x[j], middle);
                after = SortedSearch.UpTo(sorted, x[j], after);
                end = SortedSearch.Below(sorted, higher.Ceiling, end);
                stop = SortedSearch.UpTo(sorted, higher.Floor, stop);
                double sum = degree < 0
                    ? 0
                    : blocks.Left(values, weights, lower, inside, middle, left, degree) + blocks.Right(values, weights, higher, after, end, right, degree);
                sum += Ties(first, inside, 1, order) + Ties(middle, after, 0, order) + Ties(end, stop, -1, order);
                destination[j] = sum * factor;
            }
        }
    }

    private double Ties(int from, int to, double u, int order) =>
        from >= to ? 0 : PrefixWeights.Between(sample.SortedWeights, from, to) * kernel.DerivativeCore(u, order);
}
