using Smoothing.Numerics;

namespace Smoothing.Theory;

/// <summary>Quantiles and weights shared by the targets.</summary>
internal static class TargetSearch
{
    /// <summary>inf{x : F(x) ≥ p}: brackets that double outward from the middle, or halve towards a finite lower end, then a root.</summary>
    public static double Quantile(TargetDensity target, double p)
    {
        (double lower, double upper) = target.Support;
        bool openBelow = double.IsInfinity(lower);
        (double start, double step) = target.Splits is { Count: > 2 } s ? (s[s.Count / 2], s[(s.Count / 2) + 1] - s[(s.Count / 2) - 1]) : (openBelow ? double.IsInfinity(upper) ? 0 : upper - 1 : lower + 1, 1);
        if (openBelow && !(target.CumulativeCore(start) < p))
        {
            (lower, upper) = (start - step, start);
            for (; target.CumulativeCore(lower) > p; step *= 2)
            {
                (lower, upper) = (start - (2 * step), lower);
            }
        }
        else if (double.IsInfinity(upper) && target.CumulativeCore(start) < p)
        {
            (lower, upper) = (start, start + step);
            for (; target.CumulativeCore(upper) < p; step *= 2)
            {
                (lower, upper) = (upper, start + (2 * step));
            }

            openBelow = true; // no end of the support below any more
        }
        else if (openBelow)
        {
            lower = start;
        }
        else if (double.IsInfinity(upper))
        {
            upper = start;
        }

        // Towards a finite lower end the digits that count are those of the distance from it.
        double end = lower;
        for (double middle = Half(end, upper); !openBelow && middle > end && middle < upper && target.CumulativeCore(middle) >= p; middle = Half(end, upper))
        {
            upper = middle;
        }

        lower = openBelow ? lower : Half(end, upper);
        double x = Roots.Between(v => target.CumulativeCore(v) - p, lower, upper);

        // On a level stretch of F the root may be any point of it; the quantile is its left end.
        double before = x - (1e-9 * (upper - lower));
        if (before > lower && target.CumulativeCore(before) >= p)
        {
            for (int i = 0; i < 200 && before > lower && before - lower > 1e-15 * Math.Abs(before); i++)
            {
                double middle = Half(lower, before);
                (lower, before) = target.CumulativeCore(middle) >= p ? (lower, middle) : (middle, before);
            }

            return before;
        }

        return x;
    }

    /// <summary>Weights that are not negative and sum to 1 within 1e-12.</summary>
    public static double[] Weights(ReadOnlySpan<double> weights)
    {
        CompensatedSum sum = default;
        for (int i = 0; i < weights.Length; i++)
        {
            if (!(weights[i] >= 0 && double.IsFinite(weights[i])))
            {
                throw new ArgumentException(Guard.Text($"weights[{i}] must be at least 0 and finite, but is {weights[i]}: pass shares of the mixture."), nameof(weights));
            }

            sum.Add(weights[i]);
        }

        if (!(Math.Abs(sum.Value - 1) <= 1e-12))
        {
            throw new ArgumentException(Guard.Text($"weights must sum to 1 within 1e-12, but sum to {sum.Value}: divide them by their sum."), nameof(weights));
        }

        return weights.ToArray();
    }

    private static double Half(double from, double to) => from + ((to - from) / 2);
}
