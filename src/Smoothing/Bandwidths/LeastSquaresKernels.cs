using Smoothing.Estimation;
using Smoothing.Kernels;
using Smoothing.Samples;

namespace Smoothing.Bandwidths;

/// <summary>Least-squares cross-validation with the kernel's own criterion, for kernels other than the Gaussian.</summary>
/// <remarks>
/// Method: Gaussian-based kernels of higher order through the spectrum with their own transform. Kernels on [−1, 1] by sums over all pairs of K and K∗K: in linear time where
/// K∗K is one polynomial, by the double loop up to 2,000 distinct values elsewhere. What remains (many values with other kernels, limits, derivatives) takes the minimum of
/// the Gaussian-based kernel of the same order by canonical bandwidths. The criterion of a kernel with an end has kinks where h crosses distances between values, so
/// minima are found by comparing values, to 1e-9 of h at best. Beyond 20,000 distinct values not rounded, minima are looked for with <see cref="CompactLags"/> where that
/// serves, and settled by the exact sums to 1e-6 of h.
/// </remarks>
internal static class LeastSquaresKernels
{
    private const int DirectLimit = 2000;
    private const int ScanPoints = 81;

    // One exact evaluation takes some ten nanoseconds a value: fewer of them on large samples.
    private const int LargeSample = 20_000;
    private const int FewScanPoints = 33;

    private const int SettlePoints = 5;
    private const double SettleWidth = 1e-6;

    // φ times a polynomial of degree six falls below 1e-12 at 8.9 where φ itself does so at 7.4.
    private const double HigherOrderTails = 1.2;

    public static RuleOutcome? Find(SelectionInput input, Kernel kernel)
    {
        if (kernel.Order == 2 && !kernel.GaussianPolynomial.IsEmpty)
        {
            return null;
        }

        if (!kernel.GaussianPolynomial.IsEmpty)
        {
            return Spectral(input, kernel);
        }

        bool plain = input.Options.Derivative == 0 && !input.HasLimits && double.IsFinite(kernel.SupportRadius);
        if (plain && CompactPairs.HasSelfConvolution(kernel))
        {
            // Weights of this sample are shares; relative weights and their products are all that the sums take.
            var pairs = new CompactPairs(Sample.Of(input.Values, new SampleOptions { Weights = input.Masses }), kernel);
            double Own(double h) => Score(input, kernel, h, pairs.Kernels(h), pairs.SelfConvolutions(h));
            return input.Values.Length > LargeSample && input.RoundingUnit == 0 && Scanned(input, kernel, Own) is { } scanned ? scanned : Exact(input, kernel, Own);
        }

        if (plain && input.Values.Length <= DirectLimit)
        {
            return Exact(input, kernel, h => Direct(input, kernel, h));
        }

        if (kernel.Order == 2)
        {
            return null;
        }

        Kernel other = Kernel.GaussianOfOrder(Math.Min(kernel.Order, 8));
        double ratio = kernel.CanonicalBandwidth / other.CanonicalBandwidth;
        RuleOutcome found = Spectral(input, other);
        return found with { Value = found.Value * ratio, Minima = [.. found.Minima.Select(h => h * ratio)], Objective = null };
    }

    private static RuleOutcome Exact(SelectionInput input, Kernel kernel, Func<double, double> score)
    {
        double factor = kernel.Order == 2 ? KernelFactors.FromGaussian(kernel, 0) : NormalReferenceRule.Bandwidth(kernel, 0, 1, 1000) / NormalReferenceRule.Bandwidth(Kernel.Gaussian, 0, 1, 1000);
        double[] grid = RootScan.Grid(input.Smallest * factor, input.Largest * factor, input.Values.Length > LargeSample ? FewScanPoints : ScanPoints);
        double[] minima = [.. RootScan.Minima(score, grid, out _).Select(m => m.At)];
        return LeastSquaresRule.Pick(BandwidthRule.LeastSquaresCrossValidation, input, score, minima, input.Bracket * LeastSquaresRule.Preferred * factor, grid) with { IsExact = true };
    }

    // Minima from the lag table's scan, each settled by the exact criterion within ±1 % of h: the table's error of 1e-7 of the criterion moves a minimum by far less.
    private static RuleOutcome? Scanned(SelectionInput input, Kernel kernel, Func<double, double> exact)
    {
        double factor = KernelFactors.FromGaussian(kernel, 0), smallest = input.Smallest * factor;
        if (!CompactLags.Serves(kernel) || CompactLags.Of(Sample.Of(input.Values, new SampleOptions { Weights = input.Masses }), kernel, smallest) is not { } lags)
        {
            return null;
        }

        double Quick(double h) => Score(input, kernel, h, lags.Kernels(h), lags.SelfConvolutions(h));
        double[] grid = RootScan.Grid(smallest, input.Largest * factor, ScanPoints);
        double preferred = input.Bracket * LeastSquaresRule.Preferred * factor;
        double[] rough = [.. RootScan.Minima(Quick, grid, out _).Select(m => m.At)];
        double[] minima = [.. rough.Select(h => Settle(exact, h))];
        return LeastSquaresRule.Pick(BandwidthRule.LeastSquaresCrossValidation, input, Quick, minima, preferred, grid) with { IsExact = true };
    }

    private static double Settle(Func<double, double> exact, double h)
    {
        double[] near = RootScan.Grid(0.99 * h, 1.01 * h, SettlePoints);
        List<(double At, double Value)> found = RootScan.Minima(exact, near, out _, SettleWidth);
        return found.Count > 0 ? found.MinBy(m => m.Value).At : h;
    }

    private static RuleOutcome Spectral(SelectionInput input, Kernel kernel)
    {
        int r = input.Options.Derivative;
        double factor = NormalReferenceRule.Bandwidth(kernel, r, 1, 1000) / NormalReferenceRule.Bandwidth(Kernel.Gaussian, 0, 1, 1000);
        input.ReachUpTo(input.Largest * factor * HigherOrderTails);
        double step = input.Spectrum.Step;
        double Criterion(double h)
        {
            ReadOnlySpan<double> squared = input.Squared, others = input.Pairs;
            double sum = 0;
            for (int k = 0; k < squared.Length; k++)
            {
                double t = k * step, transform = BlockSpectrumRule.Transform(kernel.Order, h * t), weight = (k == 0 ? 0.5 : 1) * (r == 0 ? 1 : Math.Pow(t, 2 * r));
                sum += weight * transform * ((transform * squared[k]) - (2 * others[k]));
            }

            return input.Reflection * sum * step / Math.PI;
        }

        double[] grid = RootScan.Grid(input.Smallest * factor, input.Largest * factor, ScanPoints);
        double[] minima = [.. RootScan.Minima(Criterion, grid, out _).Select(m => m.At)];
        return LeastSquaresRule.Pick(BandwidthRule.LeastSquaresCrossValidation, input, Criterion, minima, input.Bracket * LeastSquaresRule.Preferred * factor, grid) with { IsExact = true };
    }

    // ∫f̂² − 2·mean over pairs of two observations; tied observations are pairs at distance 0, an observation with itself is none.
    private static double Score(SelectionInput input, Kernel kernel, double h, double kernels, double convolutions)
    {
        double same = 0, tied = 0, own = 0;
        for (int i = 0; i < input.Masses.Length; i++)
        {
            double m = input.Masses[i];
            same += m * m;
            tied += m * (m - input.OwnMasses[i]);
            own += m * input.OwnMasses[i];
        }

        double squares = (same * kernel.SelfConvolution(0)) + (2 * convolutions);
        return (squares - (2 * ((tied * kernel.Value(0)) + (2 * kernels)) / (1 - own))) / h;
    }

    private static double Direct(SelectionInput input, Kernel kernel, double h)
    {
        double[] x = input.Values, m = input.Masses;
        double reach = 2 * h * kernel.SupportRadius, kernels = 0, convolutions = 0;
        for (int i = 1; i < x.Length; i++)
        {
            for (int j = i - 1; j >= 0 && x[i] - x[j] <= reach; j--)
            {
                double u = (x[i] - x[j]) / h, mass = m[i] * m[j];
                kernels += mass * kernel.Value(u);
                convolutions += mass * kernel.SelfConvolution(u);
            }
        }

        return Score(input, kernel, h, kernels, convolutions);
    }
}
