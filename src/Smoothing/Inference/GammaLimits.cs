using MathNet.Numerics;
using Smoothing.Numerics;

namespace Smoothing.Inference;

/// <summary>Limits for a weighted count through the gamma law.</summary>
/// <remarks>
/// Method: Garwood (1936) for counts; Fay and Feuer (1997) use gamma limits for weighted counts. Here the "count" is m = f̃/s, s the size of one value's
/// contribution: lower s·Γ⁻¹(p; m), upper s·Γ⁻¹(1 − p; m + ½). The inverse starts from Wilson and Hilferty (1931) and is finished by bracketed
/// Newton steps on the regularised incomplete gamma function; above 10⁶ the start alone is within 1e-9 and is kept.
/// </remarks>
internal static class GammaLimits
{
    private const double LargeShape = 1e6;

    public static Interval Of(double estimate, double size, double tail)
    {
        double m = Math.Max(estimate, 0) / size;
        return new Interval(m == 0 ? 0 : size * Quantile(m, tail, upper: false), size * Quantile(m + 0.5, tail, upper: true));
    }

    /// <summary>x with P(a, x) = tail, or Q(a, x) = tail when <paramref name="upper"/>.</summary>
    public static double Quantile(double shape, double tail, bool upper)
    {
        double z = -NormalLaw.Quantile(tail);
        double cube = 1 - (1 / (9 * shape)) + ((upper ? z : -z) / (3 * Math.Sqrt(shape)));
        double start = shape * cube * cube * cube;
        if (shape > LargeShape)
        {
            return start;
        }

        // log x keeps the far lower tail of small shapes in reach: there P(a, x) ≈ x^a/Γ(a + 1).
        double x = cube > 0.05 ? start : Math.Exp((Math.Log(tail) + SpecialFunctions.GammaLn(shape + 1)) / shape);
        double low = 0;
        double high = double.PositiveInfinity;
        for (int i = 0; i < 200; i++)
        {
            double gap = (upper ? SpecialFunctions.GammaUpperRegularized(shape, x) : SpecialFunctions.GammaLowerRegularized(shape, x)) - tail;
            bool tooLow = upper ? gap > 0 : gap < 0;
            (low, high) = tooLow ? (Math.Max(low, x), high) : (low, Math.Min(high, x));
            double density = Math.Exp(((shape - 1) * Math.Log(x)) - x - SpecialFunctions.GammaLn(shape));
            double next = x - ((upper ? -gap : gap) / density);
            if (!(next > low && next < high))
            {
                next = double.IsInfinity(high) ? 2 * x : low > 0 ? Math.Sqrt(low * high) : high / 4;
            }

            if (Math.Abs(next - x) <= 1e-13 * x || high < double.Epsilon * 4)
            {
                return next;
            }

            x = next;
        }

        return x;
    }
}
