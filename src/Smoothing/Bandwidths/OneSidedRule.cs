namespace Smoothing.Bandwidths;

/// <summary>One-sided cross-validation.</summary>
/// <remarks>
/// Method: least-squares cross-validation for the one-sided local-linear version L of the Gaussian kernel (<see cref="OneSidedKernel"/>), whose score is
/// far less noisy; its minimiser b times C = {R(φ) μ₂(L)²/R(L)}^(1/5) is the bandwidth of the two-sided kernel. Never above the oversmoothed bandwidth.
/// Source: Hart &amp; Yi (1998), Martínez-Miranda, Nielsen &amp; Sperlich (2009). The own terms are summed in closed form, R(L)/(nb).
/// </remarks>
internal static class OneSidedRule
{
    private const int ScanPoints = 60;

    /// <summary>Beyond this bt the transform is below 1/300 and the sample's spectrum pure noise.</summary>
    private const double Reach = 300;

    public static RuleOutcome Find(SelectionInput input)
    {
        double n = input.N;
        double[] pairs = input.Pairs.ToArray();
        double step = input.Spectrum.Step;
        double share = 1 - (1 / n);
        double Score(double b)
        {
            int end = (int)Math.Min(pairs.Length, (Reach / (b * step)) + 1);
            double sum = 0;
            for (int k = 0; k < end; k++)
            {
                (double re, double im) = OneSidedKernel.Transform(b * k * step);
                sum += (k == 0 ? 0.5 : 1) * pairs[k] * ((share * ((re * re) + (im * im))) - (2 * re));
            }

            return (input.Reflection * sum * step / Math.PI) + (OneSidedKernel.Roughness / (n * b));
        }

        double c = OneSidedKernel.Factor;
        // From 1/70 of the largest bandwidth: narrower one-sided windows hold too few values for the score to mean anything.
        double[] grid = RootScan.Grid(Math.Max(input.Smallest, input.Largest / 70) / c, input.Largest / c, ScanPoints);
        List<(double At, double Value)> minima = RootScan.Minima(Score, grid, out double[] values);
        double best = minima.Count > 0 ? minima.MinBy(m => m.Value).At : double.NaN;
        int least = Array.IndexOf(values, values.Min());
        bool atEnd = least == 0 || least == grid.Length - 1;
        best = atEnd && minima.Count == 0 ? grid[least] : best;
        double most = 1.1439 * (input.HasLimits ? 1 : 1 / SelectionInput.BracketFactor) * input.Bracket;
        return new RuleOutcome(
            BandwidthRule.OneSidedCrossValidation,
            Math.Min(c * best, most),
            minima.Count == 0 || c * best > most ? BandwidthStatus.EndOfSearch : minima.Count > 1 ? BandwidthStatus.SeveralFound : BandwidthStatus.Found)
        {
            Minima = [.. minima.Select(m => c * m.At)],
            Objective = input.Options.KeepObjective ? (Array.ConvertAll(grid, b => c * b), values) : null,
        };
    }
}
