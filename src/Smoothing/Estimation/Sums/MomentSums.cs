using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Estimation;

/// <summary>Kernels φ(u)·q(u²) in linear time: one unsorted pass to cell moments, then a few dozen cells a point, whatever the number of values.</summary>
/// <remarks>
/// <para>Method: Hermite's expansion about the centres of cells of a power-of-two lattice, h/32 &lt; δ ≤ h/16, sixteen moments. With a* the distance at which
/// a value of the whole weight would count as much as the nearest occupied cell, widths up to h/2 serve as long as a*D ≤ 1.9, since
/// (a*D/2)¹⁶/16! ≤ 2e-14; cells beyond √(a*² + 2 ln 1e15) can't change the result. Long ranges use a list of occupied cells.</para>
/// <para>Dominant error: rounding of the exponent, a²·1e-16, so relative 1e-13 at densities of 1e-200 of the peak and below 1e-15 of the peak near it.</para>
/// </remarks>
internal sealed unsafe class MomentSums : KernelSums
{
    /// <summary>From here on the cells cost less than the double loop at some hundred points.</summary>
    private const int FewestValues = 3000;

    private const int HighestOrder = 8;

    private readonly double _bandwidth;
    private readonly double _totalWeight;
    private readonly Lazy<MomentField> _field;
    private readonly KernelSums? _direct; // null when the values are gone
    private readonly double[] _parts;

    public MomentSums(Sample sample, Kernel kernel, double bandwidth)
    {
        (_bandwidth, _totalWeight) = (bandwidth, sample.TotalWeight);
        _direct = new GaussianDirectSums(sample, kernel, bandwidth);
        _parts = GaussianParts.Of(kernel);
        _field = new Lazy<MomentField>(() => MomentField.Of(MomentCells.Of(sample, bandwidth), bandwidth, sample.TotalWeight));
    }

    /// <summary>Of cells whose width serves the bandwidth, as <see cref="CondensedWidth"/> sees to.</summary>
    public MomentSums(CondensedSample sample, Kernel kernel, double bandwidth)
    {
        (_bandwidth, _totalWeight) = (bandwidth, sample.TotalWeight);
        _parts = GaussianParts.Of(kernel);
        _field = new Lazy<MomentField>(() => MomentField.Of(MomentCells.Of(sample, bandwidth), bandwidth, sample.TotalWeight));
    }

    public override string Method => "GaussianMoments";

    /// <summary>Cells and tables, made on first need.</summary>
    public MomentField Field => _field.Value;

    public static bool Serves(Sample sample, Kernel kernel, double bandwidth) =>
        sample.Count >= FewestValues && GaussianDirectSums.Serves(kernel, bandwidth) && MomentCells.CanIndex(bandwidth, Math.Max(-sample.Minimum, sample.Maximum));

    public override void Derivatives(ReadOnlySpan<double> x, int order, Span<double> destination)
    {
        if (order > HighestOrder)
        {
            if (_direct is null)
            {
                throw new InvalidOperationException(Guard.Text($"order must be at most {HighestOrder} for a condensed sample, but is {order}: pass the values for higher derivatives."));
            }

            _direct.Derivatives(x, order, destination);
            return;
        }

        if (x.Length > 0)
        {
            double factor = NormalLaw.InverseSqrtTwoPi / _totalWeight / Math.Pow(_bandwidth, order + 1);
            _field.Value.Derivatives(x, order, _parts, factor, destination);
            GC.KeepAlive(this); // the tables are read through pointers, which keep nothing alive
        }
    }

    public override void Cumulatives(ReadOnlySpan<double> x, bool upper, Span<double> destination)
    {
        if (x.Length > 0)
        {
            _field.Value.Cumulatives(x, upper, _parts, 1 / _totalWeight, destination);
            GC.KeepAlive(this);
        }
    }

    public override void Evaluate(ReadOnlySpan<double> x, Span<double> values, Span<double> slopes, Span<double> cumulatives)
    {
        if (x.Length > 0 && !_field.Value.TryEvaluate(x, _parts, _totalWeight, values, slopes, cumulatives))
        {
            base.Evaluate(x, values, slopes, cumulatives);
        }

        GC.KeepAlive(this);
    }
}
