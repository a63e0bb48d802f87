using Smoothing.Estimation;
using Smoothing.Numerics;

namespace Smoothing.Bandwidths;

/// <summary>Likelihood cross-validation.</summary>
/// <remarks>
/// Method: maximises Σ wᵢ log f̂₋ᵢ(xᵢ) for the Gaussian kernel, each left-out estimate summed without its own term, outwards from the value until terms no
/// longer count. Beyond 2,000 distinct values f̂ comes from the spectrum where it is more than five own terms high, so taking
/// one away costs no digits, and from the sum elsewhere. Source: Habbema, Hermans &amp; van den Broek (1974), Duin (1976). Dominant error: one far value
/// forces a wide h, ties a narrow one.
/// </remarks>
internal static class LikelihoodRule
{
    private const int DirectLimit = 2000;

    /// <summary>Few distinct values mean ties, and ties make narrow maxima: these are scanned twice as finely.</summary>
    private const int FewValues = 600;

    /// <summary>exp(−38) is 3e-17: terms that much smaller than the largest change nothing.</summary>
    private const double Negligible = 38;

    public static RuleOutcome Find(SelectionInput input)
    {
        double Score(double h) => -Likelihood(input, h);
        double[] grid = RootScan.Grid(input.Smallest, input.Largest, input.Values.Length <= FewValues ? 120 : 60);
        double[] minima = [.. RootScan.Minima(Score, grid, out double[] values).Select(m => m.At)];
        RuleOutcome outcome = LeastSquaresRule.Pick(BandwidthRule.LikelihoodCrossValidation, input, Score, minima, input.Largest, grid);
        if (minima.Length == 0 && values[^1] < values[0])
        {
            outcome = outcome with { Value = grid[^1] };
        }

        return outcome;
    }

    private static double Likelihood(SelectionInput input, double h)
    {
        double[] x = input.Values, m = input.Masses, own = input.OwnMasses;
        double[]? curve = x.Length > DirectLimit ? CurveAt(input, h) : null;
        double spacing = curve is null ? 0 : input.Spectrum.Length / curve.Length;
        double sum = 0;
        int run = 0;
        for (int i = 0; i < x.Length; i++)
        {
            double log = double.NaN;
            if (curve is not null)
            {
                double place = (input.Spectrum.Map.Close(x[i], ref run) - input.Spectrum.Origin) / spacing;
                double value = Cubic(curve, place);
                double self = own[i] * NormalLaw.InverseSqrtTwoPi / h;
                log = value > 6 * self ? Math.Log((value - self) / (1 - own[i])) : double.NaN;
            }

            if (double.IsNaN(log))
            {
                log = LeftOut(x, m, own, i, h, input.HasLimits);
            }

            sum += m[i] * log;
        }

        return sum;
    }

    /// <summary>log f̂₋ᵢ(xᵢ), scaled by the nearest other value so that nothing underflows.</summary>
    private static double LeftOut(double[] x, double[] m, double[] own, int i, double h, bool mirrored)
    {
        double tied = m[i] - own[i];
        int mirror = mirrored ? x.Length - 1 - i : -1;
        double nearest = tied > 1e-12 * m[i] ? 0 : double.PositiveInfinity;
        for (int side = -1; side <= 1; side += 2)
        {
            int j = i + side == mirror ? i + (2 * side) : i + side;
            if (j >= 0 && j < x.Length)
            {
                nearest = Math.Min(nearest, Math.Abs(x[j] - x[i]));
            }
        }

        double scale = 1 / (2 * h * h);
        double sum = nearest == 0 ? tied : 0;
        for (int side = -1; side <= 1; side += 2)
        {
            for (int j = i + side; j >= 0 && j < x.Length; j += side)
            {
                double d = Math.Abs(x[j] - x[i]);
                double exponent = (d - nearest) * (d + nearest) * scale;
                if (exponent > Negligible)
                {
                    break;
                }

                sum += j == mirror ? 0 : m[j] * Math.Exp(-exponent);
            }
        }

        return Math.Log(sum * NormalLaw.InverseSqrtTwoPi / (h * (1 - own[i]))) - (nearest * nearest * scale);
    }

    private static double[] CurveAt(SelectionInput input, double h)
    {
        EmpiricalSpectrum spectrum = input.Spectrum;
        int end = spectrum.IndexOf(EmpiricalSpectrum.GaussianReach / h);
        var multiplier = new double[end];
        for (int k = 0; k < end; k++)
        {
            double u = h * k * spectrum.Step;
            multiplier[k] = Math.Exp(-0.5 * u * u);
        }

        // Cubic interpolation with central slopes at h/20 errs by 0.016·0.05³·max|φ‴| = 3e-6 over h.
        return spectrum.Curve(multiplier, spectrum.SizeFor(h / 20, end));
    }

    private static double Cubic(double[] y, double place)
    {
        int i = (int)Math.Floor(place);
        double f = place - i;
        int mask = y.Length - 1;
        double a = y[(i - 1) & mask], b = y[i & mask], c = y[(i + 1) & mask], d = y[(i + 2) & mask];
        return b + (0.5 * f * (c - a + (f * ((2 * a) - (5 * b) + (4 * c) - d + (f * ((3 * (b - c)) + d - a))))));
    }
}
