using Smoothing.Kernels;

namespace Smoothing.Bandwidths;

/// <summary>Minimiser of the exact integrated error over a block-thresholded spectrum.</summary>
/// <remarks>
/// Method: the exact mean integrated squared error is (1/2π)∫ {(1 − κ(ht))² p + κ(ht)² (1 − p)/n} dt with p = |φ|². Blocks of width
/// (1 + k/10)/σ in t keep p = max(|φ_n|² − 1/n, 0) where n times their mean exceeds 1 + c(log(k+3/2)/L + √(2 log(k+3/2)/L)), L = max(width·σ/π, ½),
/// c = 0.6; elsewhere p = 0. Exact for the kernel, of any order. Sources: blocks of Efromovich (1985), cut spectrum of Chiu (1991); thresholds and c fixed by
/// simulation over fifteen laws. Derivative r: the same integrals with t^(2r). Dominant error: noise of p at small n.
/// </remarks>
internal static class BlockSpectrumRule
{
    private const int ScanPoints = 90;

    /// <summary>Weight of the threshold above the noise level.</summary>
    private const double Threshold = 0.6;

    /// <summary>Growth of the block width from one block to the next.</summary>
    private const double Growth = 0.1;

    public static RuleOutcome Find(SelectionInput input, Kernel kernel)
    {
        int r = input.Options.Derivative;
        if (kernel.Order == 2 && kernel.GaussianPolynomial.IsEmpty)
        {
            // Transforms of kernels with an end decay too slowly to be cut; the canonical equivalent loses nothing that matters.
            return Find(input, 2, Kernel.Gaussian.Roughness(r), 1);
        }

        double factor = NormalReferenceRule.Bandwidth(kernel, r, 1, 1000) / NormalReferenceRule.Bandwidth(Kernel.Gaussian, 0, 1, 1000);
        return Find(input, kernel.Order, kernel.Roughness(r), factor) with { IsExact = true };
    }

    /// <summary>For the Gaussian-based kernel of an order, whose transform is exp(−z) Σ zⁱ/i! with z = u²/2, i below half the order.</summary>
    public static RuleOutcome Find(SelectionInput input, int order, double roughness, double factor)
    {
        double[] p = Spectrum(input);
        double step = input.Spectrum.Step;
        int r = input.Options.Derivative;
        double noise = roughness / input.N;
        double Score(double h)
        {
            double sum = 0;
            for (int k = 0; k < p.Length; k++)
            {
                if (p[k] > 0)
                {
                    double t = k * step;
                    double w = Transform(order, h * t);
                    double weight = r == 0 ? 1 : Math.Pow(t, 2 * r);
                    sum += (k == 0 ? 0.5 : 1) * weight * p[k] * (((1 - w) * (1 - w)) - (w * w / input.N));
                }
            }

            // On a reflected sample the noise is twice as high near the limit and the range half: n stays n.
            return (input.Reflection * sum * step / Math.PI) + (noise / Math.Pow(h, (2 * r) + 1));
        }

        double[] grid = RootScan.Grid(input.Smallest * factor, input.Largest * factor, ScanPoints);
        List<(double At, double Value)> minima = RootScan.Minima(Score, grid, out double[] values);
        double best = minima.Count > 0 ? minima.MinBy(m => m.Value).At : double.NaN;
        int least = Array.IndexOf(values, values.Min());
        bool atEnd = least == 0 || least == values.Length - 1;
        return new RuleOutcome(
            BandwidthRule.BlockSpectrum,
            atEnd ? grid[least] : best,
            atEnd ? BandwidthStatus.EndOfSearch : minima.Count > 1 ? BandwidthStatus.SeveralFound : BandwidthStatus.Found)
        {
            Minima = [.. minima.Select(m => m.At)],
            Objective = input.Options.KeepObjective ? (grid, values) : null,
        };
    }

    /// <summary>The transform of the Gaussian-based kernel of an order at u.</summary>
    public static double Transform(int order, double u)
    {
        double z = 0.5 * u * u, term = 1, sum = 1;
        for (int i = 1; i < order / 2; i++)
        {
            term *= z / i;
            sum += term;
        }

        return sum * Math.Exp(-z);
    }

    /// <summary>p at the frequencies, up to the last block kept.</summary>
    public static double[] Spectrum(SelectionInput input)
    {
        ReadOnlySpan<double> squared = input.Squared, pairs = input.Pairs;
        double n = input.N, sigma = input.BracketScale, step = input.Spectrum.Step, last = step * (squared.Length - 1);
        var p = new double[squared.Length];
        int end = 0;
        double edge = 0;
        int first = 0;
        for (int block = 0; edge < last; block++)
        {
            double width = (1 + (Growth * block)) / sigma;
            edge += width;
            int next = Math.Min(squared.Length, (int)Math.Ceiling(edge / step));
            if (next <= first)
            {
                continue;
            }

            double excess = 0;
            for (int k = first; k < next; k++)
            {
                excess += pairs[k];
            }

            excess *= n / (next - first);
            double length = Math.Max(width * sigma / Math.PI, 0.5);
            double noise = Math.Log(block + 1.5) / length;
            if (block == 0 || excess > Threshold * (noise + Math.Sqrt(2 * noise)))
            {
                for (int k = first; k < next; k++)
                {
                    p[k] = Math.Max(pairs[k] * (1 - (1 / n)), 0);
                }

                end = next;
            }

            first = next;
        }

        return p[..end];
    }
}
