using Smoothing.Numerics;

namespace Smoothing.Estimation;

/// <content>Draws.</content>
public sealed partial class Density
{
    /// <summary>Draws from the curve: smoothed resampling.</summary>
    /// <param name="count">How many, 0 or more.</param>
    /// <param name="seed">The same seed gives the same bits on every machine.</param>
    /// <param name="options">Stream and variance correction; null for stream 0 without correction.</param>
    /// <returns>Independent draws, in the unit of the data, inside the declared limits.</returns>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="count"/> is negative.</exception>
    /// <exception cref="InvalidOperationException">The kernel is negative in places and its curve is not cut, so it is no distribution; or a variance correction is asked for where it has no form.</exception>
    /// <remarks>
    /// A value is picked by weight and moved by h times a draw from K; where the curve has no such form (mended limits, cut negative parts, values not
    /// kept) a uniform number is put through <see cref="Quantile"/>, which costs some ten evaluations of F̂ each.
    /// </remarks>
    public double[] Draw(int count, ulong seed, DrawOptions? options = null)
    {
        Guard.AtLeast(count, 0);
        if (_form.MayBeNegative)
        {
            throw new InvalidOperationException(
                Guard.Text($"The {Kernel.Name} kernel is negative in places, so nothing can be drawn from its curve: use a kernel of order 2, or NegativeParts.CutAndRenormalise."));
        }

        options ??= new DrawOptions();
        double shrink = options.VarianceCorrected ? Shrinkage() : 1;
        var random = new RandomStream(seed, options.Stream);
        var draws = new double[count];
        if (!_form.TryDraw(ref random, draws))
        {
            for (int i = 0; i < count; i++)
            {
                draws[i] = Quantile(random.NextUniform());
            }
        }

        for (int i = 0; shrink < 1 && i < count; i++)
        {
            draws[i] = Sample!.Mean + ((draws[i] - Sample.Mean) * shrink);
        }

        return draws;
    }

    // √(s²/(s² + h²μ₂)): the plain curve has variance s² + h²μ₂.
    private double Shrinkage()
    {
        if (!IsPlain || Sample is null)
        {
            throw new InvalidOperationException(
                "VarianceCorrected needs the values and a plain curve on the whole line with one bandwidth: leave it out where limits, cut parts or adaptive bandwidths are in force.");
        }

        CompensatedSum squares = default;
        for (int i = 0; i < Sample.Count; i++)
        {
            double d = Sample.Values[i] - Sample.Mean;
            squares.Add((Sample.IsWeighted ? Sample.Weights[i] : 1) / Sample.TotalWeight * d * d);
        }

        return Math.Sqrt(squares.Value / (squares.Value + (Bandwidth * Bandwidth * Kernel.Moment(2))));
    }
}
