using Smoothing.Numerics;

namespace Smoothing.Estimation;

/// <content>Derivatives, the distribution function and what follows from both.</content>
public sealed partial class Density
{
    // Below this share the hazard is a ratio of numbers that have lost their digits to underflow: 2⁻¹⁰²² is the smallest normal double.
    private const double SmallestShare = 2.2250738585072014e-308;

    /// <summary>The r-th derivative of f̂ at one point; 0 at ±∞ and outside the support.</summary>
    /// <param name="x">Where, in the unit of the data.</param>
    /// <param name="order">r, 0 or more; default 1.</param>
    /// <returns>f̂⁽ʳ⁾(x), in 1/unit^(r+1).</returns>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="x"/> is NaN or <paramref name="order"/> negative.</exception>
    /// <exception cref="InvalidOperationException">The curve has no such derivative there, because the kernel has none.</exception>
    /// <remarks>At a declared limit this is the one-sided derivative from inside. Cost and accuracy: as <see cref="Value"/>.</remarks>
    public double Derivative(double x, int order = 1)
    {
        Guard.Number(x);
        Guard.AtLeast(order, 0);
        return _form.Derivative(x, order);
    }

    /// <summary>The r-th derivative of f̂ at many points, in any order.</summary>
    /// <param name="x">Where, in the unit of the data; ±∞ allowed.</param>
    /// <param name="order">r, 0 or more.</param>
    /// <param name="destination">Receives one value per point; at least as long as <paramref name="x"/>.</param>
    /// <exception cref="ArgumentException">A point is NaN, <paramref name="order"/> is negative, or <paramref name="destination"/> is too short.</exception>
    /// <exception cref="InvalidOperationException">The curve has no such derivative somewhere, because the kernel has none.</exception>
    public void Derivatives(ReadOnlySpan<double> x, int order, Span<double> destination)
    {
        Guard.Numbers(x, nameof(x));
        Guard.AtLeast(order, 0);
        Guard.Destination(x.Length, destination.Length);
        _form.Derivatives(x, order, destination);
    }

    /// <summary>f̂, f̂′ and F̂ at many points in one pass, in any order of the points.</summary>
    /// <param name="x">Where, in the unit of the data; ±∞ allowed.</param>
    /// <param name="values">Receives f̂; at least as long as <paramref name="x"/>.</param>
    /// <param name="slopes">Receives f̂′, as <see cref="Derivatives"/> with order 1.</param>
    /// <param name="cumulatives">Receives F̂, as <see cref="Cumulatives"/>.</param>
    /// <exception cref="ArgumentException">A point is NaN, or a destination is too short.</exception>
    /// <exception cref="InvalidOperationException">The curve has no derivative somewhere, because the kernel has none.</exception>
    /// <remarks>Cost: with many values and a Gaussian-based kernel about twice <see cref="Values"/>, instead of three times; otherwise that of the three calls. Accuracy: theirs.</remarks>
    public void Evaluate(ReadOnlySpan<double> x, Span<double> values, Span<double> slopes, Span<double> cumulatives)
    {
        Guard.Numbers(x, nameof(x));
        Guard.Destination(x.Length, values.Length);
        Guard.Destination(x.Length, slopes.Length);
        Guard.Destination(x.Length, cumulatives.Length);
        _form.Evaluate(x, values, slopes, cumulatives);
    }

    /// <summary>The smoothed distribution function F̂(x) = ∫ f̂ up to x; 0 at −∞, 1 at +∞.</summary>
    /// <param name="x">Where, in the unit of the data.</param>
    /// <returns>The share at or below <paramref name="x"/>; in [0, 1] and never falling unless the kernel is negative in places.</returns>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="x"/> is NaN.</exception>
    /// <remarks>Accuracy: relative in the lower tail, 1e-12 or better. For a share beyond a point use <see cref="Survival"/>, which keeps the other tail.</remarks>
    public double Cumulative(double x) => _form.Tail(Guard.Number(x), upper: false);

    /// <summary>F̂ at many points, in any order.</summary>
    /// <param name="x">Where, in the unit of the data; ±∞ allowed.</param>
    /// <param name="destination">Receives one share per point; at least as long as <paramref name="x"/>.</param>
    /// <exception cref="ArgumentException">A point is NaN, or <paramref name="destination"/> is too short.</exception>
    public void Cumulatives(ReadOnlySpan<double> x, Span<double> destination) => Tails(x, upper: false, destination);

    /// <summary>1 − F̂(x), summed directly so that the upper tail keeps relative accuracy.</summary>
    /// <param name="x">Where, in the unit of the data.</param>
    /// <returns>The share above <paramref name="x"/>.</returns>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="x"/> is NaN.</exception>
    public double Survival(double x) => _form.Tail(Guard.Number(x), upper: true);

    /// <summary>1 − F̂ at many points, in any order.</summary>
    /// <param name="x">Where, in the unit of the data; ±∞ allowed.</param>
    /// <param name="destination">Receives one share per point; at least as long as <paramref name="x"/>.</param>
    /// <exception cref="ArgumentException">A point is NaN, or <paramref name="destination"/> is too short.</exception>
    public void Survivals(ReadOnlySpan<double> x, Span<double> destination) => Tails(x, upper: true, destination);

    /// <summary>The smoothed share between two points, taken on the side where less cancels.</summary>
    /// <param name="from">Left end, in the unit of the data; −∞ allowed.</param>
    /// <param name="to">Right end, at least <paramref name="from"/>; +∞ allowed.</param>
    /// <returns>∫ f̂ over [from, to]; 0 when both are the same.</returns>
    /// <exception cref="ArgumentException">An end is NaN, or <paramref name="from"/> exceeds <paramref name="to"/>.</exception>
    public double Probability(double from, double to)
    {
        Guard.Number(from);
        Guard.Number(to);
        if (from > to)
        {
            throw new ArgumentException(Guard.Text($"from must not exceed to, but from is {from} and to is {to}: exchange them."), nameof(from));
        }

        return from == to ? 0 : _form.Mass(from, to);
    }

    /// <summary>The hazard f̂(x)/(1 − F̂(x)): the rate at which what has lasted until x ends there.</summary>
    /// <param name="x">Where, in the unit of the data; 0 is returned at −∞.</param>
    /// <returns>A rate, in 1/unit.</returns>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="x"/> is NaN.</exception>
    /// <exception cref="InvalidOperationException">Nothing measurable is left above <paramref name="x"/>, so the ratio has no meaning.</exception>
    /// <remarks>
    /// Relative accuracy holds far into the upper tail, but there the number describes the kernel, not the data: beyond the largest values a Gaussian
    /// kernel makes every hazard climb. An estimate informs a decision; it replaces no standard, code or licensed judgement.
    /// </remarks>
    public double Hazard(double x)
    {
        double left = Survival(x);
        if (!(left >= SmallestShare))
        {
            throw new InvalidOperationException(Guard.Text($"The hazard at {x} is not defined: the share above is {left}. Ask below {Quantile(1)}, or for Survival itself."));
        }

        return _form.Value(x) / left;
    }

    private void Tails(ReadOnlySpan<double> x, bool upper, Span<double> destination)
    {
        Guard.Numbers(x, nameof(x));
        Guard.Destination(x.Length, destination.Length);
        _form.Cumulatives(x, upper, destination);
    }
}
