using Smoothing.Kernels;

namespace Smoothing.Bandwidths;

/// <summary>Least-squares cross-validation.</summary>
/// <remarks>
/// Method: minimises LSCV(h) = ∫(f̂^(r))² − 2 mean over pairs of two observations of the r-th estimate, an unbiased estimate of the integrated
/// error less a constant. For the Gaussian through the spectrum, minima as zeros of the exact derivative; for other kernels see
/// <see cref="LeastSquaresKernels"/>. Source: Rudemo (1982), Bowman
/// (1984); the largest local minimum: Hall &amp; Marron (1991). Dominant error: noise, relative spread of h falling only like n^(−1/10); ties draw it to 0.
/// </remarks>
internal static class LeastSquaresRule
{
    /// <summary>Bandwidths scanned: 1.08 apart over the search ratio of 500.</summary>
    private const int ScanPoints = 81;

    /// <summary>Minima above 1.3 times the oversmoothed bandwidth are listed but not preferred: 1.3 · 1.1439/1.72 of the bracket.</summary>
    public const double Preferred = 1.3 * 1.1439 / SelectionInput.BracketFactor;

    public static RuleOutcome Find(SelectionInput input, Kernel kernel)
    {
        int r = input.Options.Derivative;
        double root2 = Math.Sqrt(2);
        if (LeastSquaresKernels.Find(input, kernel) is { } exact)
        {
            return exact;
        }

        // d/dh of R(r, h) − 2 Q(r, h/√2) is 2h (Q(r + 1, h/√2) − R(r + 1, h)).
        double Slope(double h) => input.RoughnessWithoutOwn(r + 1, h / root2) - input.Roughness(r + 1, h);
        double Score(double h) => input.Roughness(r, h) - (2 * input.RoughnessWithoutOwn(r, h / root2));
        double[] grid = RootScan.Grid(input.Smallest, input.Largest, ScanPoints);
        double[] minima = [.. RootScan.Crossings(Slope, grid, out _).Where(c => c.Rising).Select(c => c.Root)];
        return Pick(BandwidthRule.LeastSquaresCrossValidation, input, Score, minima, input.Bracket * Preferred, grid);
    }

    /// <summary>The outcome of a rule that has local minima: which of them, which status, what to say.</summary>
    public static RuleOutcome Pick(BandwidthRule rule, SelectionInput input, Func<double, double> score, double[] minima, double preferredBelow, double[] grid)
    {
        double value = double.NaN;
        if (input.Options.GlobalMinimum && minima.Length > 0)
        {
            value = minima.MinBy(score);
        }
        else if (minima.Length > 0)
        {
            double[] preferred = [.. minima.Where(h => h <= preferredBelow)];
            value = preferred.Length > 0 ? preferred[^1] : minima[0];
        }

        return new RuleOutcome(
            rule, value, minima.Length switch { 0 => BandwidthStatus.EndOfSearch, 1 => BandwidthStatus.Found, _ => BandwidthStatus.SeveralFound })
        {
            Minima = minima,
            Objective = input.Options.KeepObjective ? (grid, Array.ConvertAll(grid, h => score(h))) : null,
            Notes = input.TiedShare > TieWarning
                ? ["More than 5 % of the observations share their value: ties pull cross-validation towards 0; prefer the automatic rule."]
                : [],
        };
    }

    /// <summary>Share of tied observations from which cross-validation is warned of: rounding to 0.05 sd already makes its criterion fall to −∞ at 0.</summary>
    public const double TieWarning = 0.05;
}
