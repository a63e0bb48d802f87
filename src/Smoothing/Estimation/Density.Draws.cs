using Smoothing.Numerics;

namespace Smoothing.Estimation;

/// <content>Draws.</content>
public sealed partial class Density
{
    /// <summary>Draws from the curve: smoothed resampling.</summary>
    /// <param name="count">How many, 0 or more.</param>
    /// <param name="seed">The same seed gives the same bits on every machine.</param>
    /// <returns>Independent draws, in the unit of the data, inside the declared limits.</returns>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="count"/> is negative.</exception>
    /// <exception cref="InvalidOperationException">The kernel is negative in places and its curve is not cut, so it is no distribution.</exception>
    /// <remarks>
    /// A value is picked by weight and moved by h times a draw from K; where the curve has no such form (mended limits, cut negative parts, values not
    /// kept) a uniform number is put through <see cref="Quantile"/>, which costs some ten evaluations of F̂ each.
    /// </remarks>
    public double[] Draw(int count, ulong seed)
    {
        Guard.AtLeast(count, 0);
        if (_form.MayBeNegative)
        {
            throw new InvalidOperationException(
                Guard.Text($"The {Kernel.Name} kernel is negative in places, so nothing can be drawn from its curve: use a kernel of order 2, or NegativeParts.CutAndRenormalise."));
        }

        var random = new RandomStream(seed);
        var draws = new double[count];
        if (!_form.TryDraw(ref random, draws))
        {
            for (int i = 0; i < count; i++)
            {
                draws[i] = Quantile(random.NextUniform());
            }
        }

        return draws;
    }
}
