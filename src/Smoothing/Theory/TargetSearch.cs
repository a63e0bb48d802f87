using Smoothing.Numerics;

namespace Smoothing.Theory;

/// <summary>Quadrature and quantiles shared by the targets.</summary>
internal static class TargetSearch
{
    public static double Integrate(Func<double, double> f, double from, double to, IEnumerable<double> cuts, double relativeError) =>
        Quadrature.Integrate(f, from, to, cuts, relativeError);

    /// <summary>Root of F(x) = p; infinite ends are replaced by doubling steps from the middle split.</summary>
    public static double Quantile(TargetDensity target, double p)
    {
        double lower = target.Support.Lower;
        double upper = target.Support.Upper;
        double start = double.IsFinite(lower) ? lower : double.IsFinite(upper) ? upper : 0;
        if (!double.IsFinite(lower))
        {
            double step = 1;
            for (lower = start - step; target.CumulativeCore(lower) > p; step *= 2)
            {
                lower = start - step;
            }
        }

        if (!double.IsFinite(upper))
        {
            double step = 1;
            for (upper = start + step; target.CumulativeCore(upper) < p; step *= 2)
            {
                upper = start + step;
            }
        }

        return Roots.Between(x => target.CumulativeCore(x) - p, lower, upper);
    }

    /// <summary>Weights that are not negative and sum to 1 within 1e-12.</summary>
    public static double[] Weights(ReadOnlySpan<double> weights)
    {
        CompensatedSum sum = default;
        for (int i = 0; i < weights.Length; i++)
        {
            if (!(weights[i] >= 0 && double.IsFinite(weights[i])))
            {
                throw new ArgumentException(Guard.Text($"weights[{i}] must be at least 0, but is {weights[i]}: pass shares of the mixture."), nameof(weights));
            }

            sum.Add(weights[i]);
        }

        if (!(Math.Abs(sum.Value - 1) <= 1e-12))
        {
            throw new ArgumentException(Guard.Text($"weights must sum to 1 within 1e-12, but sum to {sum.Value}: divide them by their sum."), nameof(weights));
        }

        return weights.ToArray();
    }
}
