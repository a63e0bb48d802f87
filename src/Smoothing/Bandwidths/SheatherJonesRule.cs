using Smoothing.Numerics;

namespace Smoothing.Bandwidths;

/// <summary>Sheather and Jones' solve-the-equation plug-in rule.</summary>
/// <remarks>
/// Method: the root h of h = {R(K)/(n S(α(h)))}^(1/5), α(h) = c {S(a)/T(b)}^(1/7) h^(5/7), a = A λ n^(−1/7), b = B λ n^(−1/9), with
/// S(g) = n/(n−1) ∫(f̂″ at scale g/√2)² and T likewise of the third derivative, own terms included. Source: Sheather &amp; Jones (1991).
/// Published form: λ = IQR, c, A, B = 1.357, 0.920, 0.912. Default form: λ = the smaller of sd and IQR/1.349, and the constants
/// that these figures round. The largest root is taken, all are listed. Dominant error: the pilots a and b are anchored on a normal law, so
/// structure on several scales is smoothed away (up to 3.7 times the best error at n = 10,000).
/// </remarks>
internal static class SheatherJonesRule
{
    /// <summary>(6√2)^(1/7), (32/(5√2))^(1/7), (64/(7√2))^(1/9): R(K) = 1/(2√π), φ⁗(0) = 3/√(2π) and φ⁽⁶⁾(0) = −15/√(2π) for a normal law.</summary>
    public static readonly (double C, double A, double B) Exact =
        (Math.Pow(6 * Math.Sqrt(2), 1.0 / 7), Math.Pow(32 / (5 * Math.Sqrt(2)), 1.0 / 7), Math.Pow(64 / (7 * Math.Sqrt(2)), 1.0 / 9));

    /// <summary>The figures of the paper; A and B belong to the interquartile range.</summary>
    public static readonly (double C, double A, double B) Published = (1.357, 0.920, 0.912);

    /// <summary>Bandwidths scanned for roots: 1.13 apart over the search ratio of 500.</summary>
    private const int ScanPoints = 52;

    public static RuleOutcome Find(SelectionInput input)
    {
        double n = input.N;
        bool published = input.Options.Scale == BandwidthScale.InterquartileRange && input.InterquartileRange > 0;
        (double c, double a, double b) = published ? Published : Exact;
        double scale = published ? input.InterquartileRange : input.ScaleFor(input.Options.Scale);
        double root2 = Math.Sqrt(2);
        double more = n / (n - 1);
        double second = more * input.Roughness(2, a * scale * Math.Pow(n, -1.0 / 7) / root2);
        double third = more * input.Roughness(3, b * scale * Math.Pow(n, -1.0 / 9) / root2);
        double factor = c * Math.Pow(second / third, 1.0 / 7);
        double Criterion(double h)
        {
            double s = more * input.Roughness(2, factor * Math.Pow(h, 5.0 / 7) / root2);
            double plugged = Math.Pow(2 * NormalLaw.SqrtPi * n * s, -0.2);
            // The difference of logarithms, kept finite where S underflows.
            return Math.Clamp(Math.Log(h / plugged), -1000, 1000);
        }

        if (!double.IsFinite(factor) || !(factor > 0))
        {
            return new RuleOutcome(BandwidthRule.SheatherJones, double.NaN, BandwidthStatus.EndOfSearch) { Scale = scale };
        }

        double[] grid = RootScan.Grid(input.Smallest, input.Largest, ScanPoints);
        List<(double Root, bool Rising)> crossings = RootScan.Crossings(Criterion, grid, out double[] values);
        double[] roots = [.. crossings.Select(r => r.Root)];
        return new RuleOutcome(
            BandwidthRule.SheatherJones,
            roots.Length > 0 ? roots[^1] : values[0] >= 0 ? grid[0] : double.NaN,
            roots.Length == 0 ? BandwidthStatus.EndOfSearch : roots.Length == 1 ? BandwidthStatus.Found : BandwidthStatus.SeveralFound)
        {
            Roots = roots,
            Scale = scale,
            Objective = input.Options.KeepObjective ? (grid, values) : null,
        };
    }
}
