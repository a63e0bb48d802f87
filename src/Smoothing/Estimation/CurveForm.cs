using Smoothing.Numerics;

namespace Smoothing.Estimation;

/// <summary>What an estimate is made of once limits, negative parts and the like are taken care of: value, derivatives and both tails of one curve of mass 1.</summary>
/// <remarks>Arguments are checked by <see cref="Density"/>; x holds no NaN. Forms are immutable once built, or guard their lazy parts.</remarks>
internal abstract class CurveForm
{
    private double[]? _signChanges;

    /// <summary>The closed range outside which the curve is 0; ends may be infinite.</summary>
    public abstract Interval Ends { get; }

    /// <summary>A finite range that holds the bulk of the curve: where searches start.</summary>
    public abstract Interval Core { get; }

    /// <summary>The length on which the curve can change: the bandwidth, in the unit of the data.</summary>
    public abstract double Scale { get; }

    /// <summary>Whether the curve may fall below 0, so that its distribution function can dip.</summary>
    public abstract bool MayBeNegative { get; }

    /// <summary>destination[j] = f⁽ʳ⁾(x_j).</summary>
    public abstract void Derivatives(ReadOnlySpan<double> x, int order, Span<double> destination);

    /// <summary>destination[j] = ∫ f up to x_j, or from there on when <paramref name="upper"/>.</summary>
    public abstract void Cumulatives(ReadOnlySpan<double> x, bool upper, Span<double> destination);

    /// <summary>Value, first derivative and lower tail at the same points.</summary>
    public virtual void Evaluate(ReadOnlySpan<double> x, Span<double> values, Span<double> slopes, Span<double> cumulatives)
    {
        Derivatives(x, 0, values);
        Derivatives(x, 1, slopes);
        Cumulatives(x, upper: false, cumulatives);
    }

    /// <summary>Fills the destination with independent draws; false when the form has no recipe of its own and must be inverted.</summary>
    public virtual bool TryDraw(ref RandomStream random, Span<double> destination) => false;

    /// <summary>The values behind the curve, smallest first, where they are known: they tell the occupied range from gaps, and where kinks are.</summary>
    protected virtual ReadOnlySpan<double> SortedValues => default;

    /// <summary>Kinks of the kernel's derivatives, as distances from its centre in the unit of the data.</summary>
    protected virtual IReadOnlyList<double> Kinks => [];

    /// <summary>Points, increasing, between which the curve changes little: where searches for turning points look.</summary>
    /// <param name="smoothness">How far the chain of derivatives goes; kernels with a short one get their kinks as well.</param>
    public virtual double[] Grid(int smoothness) => CurveGrid.Of(Ends, Core, Scale, SortedValues, smoothness <= 2 ? Kinks : []);

    /// <summary>Where the curve crosses zero; none for curves that are nowhere negative. Found once, on first need.</summary>
    public IReadOnlyList<double> ZeroCrossings => MayBeNegative ? (_signChanges ??= SignChanges.Of(this)) : [];

    /// <summary>inf{x : F(x) ≥ p} for a lower tail p, or for the upper tail 1 − p; 0 &lt; tail ≤ ½.</summary>
    public virtual double Quantile(double tail, bool upper) => QuantileSearch.Find(this, tail, upper, ZeroCrossings);

    public double Derivative(double x, int order)
    {
        double result = 0;
        Derivatives(new ReadOnlySpan<double>(in x), order, new Span<double>(ref result));
        return result;
    }

    public double Value(double x) => Derivative(x, 0);

    public double Tail(double x, bool upper)
    {
        double result = 0;
        Cumulatives(new ReadOnlySpan<double>(in x), upper, new Span<double>(ref result));
        return result;
    }

    /// <summary>Whether the curve is smooth to all orders on the length <see cref="Scale"/>, so that a Gauss rule sums short stretches of it to rounding.</summary>
    protected virtual bool IsAnalytic => false;

    /// <summary>∫ f over [from, to], taken on the side where less cancels; short stretches of smooth curves by quadrature, where nothing does.</summary>
    public double Mass(double from, double to)
    {
        if (IsAnalytic && to - from <= Scale * GaussRule.ShortStretch)
        {
            return GaussRule.Integrate(this, from, to);
        }

        double below = Tail(from, upper: false);
        return below > 0.5 ? Tail(from, upper: true) - Tail(to, upper: true) : Tail(to, upper: false) - below;
    }
}
