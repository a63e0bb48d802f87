namespace Smoothing.Estimation;

/// <summary>The seam between an estimate and the way its sums are computed. Implementations are immutable once built, or guard their lazy parts.</summary>
/// <remarks>All results are normalised: divided by Σw and by the power of h that belongs to them.</remarks>
internal abstract class KernelSums
{
    /// <summary>Short name of the algorithm, for tests that prove it was chosen and for diagnostics.</summary>
    public abstract string Method { get; }

    /// <summary>destination[j] = (1/(Σw h^{r+1})) Σ wᵢ K^(r)((x_j − Xᵢ)/h), r = <paramref name="order"/>; ±∞ gives 0. No NaN in x.</summary>
    public abstract void Derivatives(ReadOnlySpan<double> x, int order, Span<double> destination);

    /// <summary>destination[j] = (1/Σw) Σ wᵢ ∫ K up to (x_j − Xᵢ)/h, or from there on when <paramref name="upper"/>: relative accuracy on the asked side.</summary>
    public abstract void Cumulatives(ReadOnlySpan<double> x, bool upper, Span<double> destination);

    /// <summary>Value, first derivative and lower tail at the same points; algorithms that can do so share the work.</summary>
    public virtual void Evaluate(ReadOnlySpan<double> x, Span<double> values, Span<double> slopes, Span<double> cumulatives)
    {
        Derivatives(x, 0, values);
        Derivatives(x, 1, slopes);
        Cumulatives(x, upper: false, cumulatives);
    }
}
