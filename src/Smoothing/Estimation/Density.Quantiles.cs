using Smoothing.Numerics;

namespace Smoothing.Estimation;

/// <content>Quantiles.</content>
public sealed partial class Density
{
    /// <summary>The p-quantile of the curve, inf{x : F̂(x) ≥ p}.</summary>
    /// <remarks>
    /// p = 0 and p = 1 give the ends of the curve: the declared limits, the outermost value moved out by h times the support radius, or ±∞. Exact
    /// inverse of <see cref="Cumulative"/> up to the rounding of F̂ divided by f̂; where F̂ is flat at p, the left end of the flat stretch. Where a
    /// kernel of order above 2 makes F̂ dip, the first place where p is reached. A quantile beyond the bulk of the data describes the kernel's tail,
    /// not the quantity's: for far quantiles read the order statistics too.
    /// </remarks>
    /// <param name="probability">p in [0, 1].</param>
    /// <returns>A place, in the unit of the data.</returns>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="probability"/> is outside [0, 1] or NaN.</exception>
    public double Quantile(double probability)
    {
        Guard.Probability(probability);
        return probability == 0 ? _form.Ends.Lower
            : probability == 1 ? _form.Ends.Upper
            : probability <= 0.5 ? _form.Quantile(probability, upper: false)
            : _form.Quantile(1 - probability, upper: true);
    }

    /// <summary>The place above which the share <paramref name="tail"/> lies, inf{x : 1 − F̂(x) ≤ tail}: accurate in the far upper tail, where 1 − p would lose digits.</summary>
    /// <param name="tail">1 − p in [0, 1]; 0 gives the upper end of the curve, 1 the lower end.</param>
    /// <returns>A place, in the unit of the data.</returns>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="tail"/> is outside [0, 1] or NaN.</exception>
    public double UpperQuantile(double tail)
    {
        Guard.Probability(tail);
        return tail == 0 ? _form.Ends.Upper
            : tail == 1 ? _form.Ends.Lower
            : tail <= 0.5 ? _form.Quantile(tail, upper: true)
            : _form.Quantile(1 - tail, upper: false);
    }

    /// <summary>Quantiles for many probabilities, in any order.</summary>
    /// <param name="probabilities">Each in [0, 1].</param>
    /// <param name="destination">Receives one place per probability; at least as long as <paramref name="probabilities"/>.</param>
    /// <exception cref="ArgumentException">A probability is outside [0, 1] or NaN, or <paramref name="destination"/> is too short.</exception>
    public void Quantiles(ReadOnlySpan<double> probabilities, Span<double> destination)
    {
        Guard.Destination(probabilities.Length, destination.Length);
        for (int i = 0; i < probabilities.Length; i++)
        {
            if (!(probabilities[i] >= 0 && probabilities[i] <= 1))
            {
                throw new ArgumentException(
                    Guard.Text($"probabilities[{i}] must lie in [0, 1], but is {probabilities[i]}: pass a share such as 0.95, not a percentage."), nameof(probabilities));
            }
        }

        for (int i = 0; i < probabilities.Length; i++)
        {
            destination[i] = Quantile(probabilities[i]);
        }
    }
}
