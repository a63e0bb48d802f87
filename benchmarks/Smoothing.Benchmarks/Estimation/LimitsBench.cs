using System.Globalization;
using Smoothing.Bandwidths;
using Smoothing.Estimation;
using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Benchmarks.Estimation;

/// <summary>"-- limits": errors of the boundary corrections at their best and at the chosen bandwidth, and of the distribution function. Tables in Markdown.</summary>
internal static class LimitsBench
{
    private const int Points = 401;

    private static readonly BoundaryCorrection[] s_corrections =
        [BoundaryCorrection.LinearKernel, BoundaryCorrection.PositiveLinear, BoundaryCorrection.Renormalised, BoundaryCorrection.Reflection, BoundaryCorrection.None];

    public static int Run(string[] args)
    {
        CultureInfo.CurrentCulture = CultureInfo.InvariantCulture;
        int samples = args.Length > 0 ? int.Parse(args[0], CultureInfo.InvariantCulture) : 100;
        Curves(1000, samples);
        Distributions(200, 3 * samples);
        Adaptive(500, samples);
        return 0;
    }

    private static void Curves(int n, int samples)
    {
        double[] factors = [0.15, 0.2, 0.27, 0.35, 0.45, 0.6, 0.8, 1.05, 1.4, 1.8];
        Console.WriteLine($"Gaussian kernel, n = {n}, {samples} seeded samples. MISE relative to the best method at its best bandwidth; bandwidths tried: {factors[0]} … {factors[^1]} standard deviations × n^(−1/5).");
        Console.WriteLine("Automatic: BandwidthRule.Automatic with Support. Bias at the limit: mean of f̂(0) − f(0), in % of f(0) (of the largest f where f(0) = 0), ± one standard error.");
        Console.WriteLine();
        Console.WriteLine("| law | " + string.Join(" | ", s_corrections.Select(c => $"{c}, best h")) + " | LinearKernel, automatic h | mean automatic h / best h | bias at 0, LinearKernel, automatic | smallest f̂ | largest mass error |");
        Console.WriteLine("|---|" + string.Concat(Enumerable.Repeat("---|", s_corrections.Length + 5)));
        foreach (LimitedLaw law in LimitedLaw.WithLimits)
        {
            Row(law, n, samples, factors);
        }

        Console.WriteLine();
    }

    private static void Row(LimitedLaw law, int n, int samples, double[] factors)
    {
        double[] x = Grid(law.Shown);
        double[] truth = [.. x.Select(law.Density)];
        var errors = new double[s_corrections.Length, factors.Length];
        var y = new double[Points];
        double automatic = 0, ratio = 0, bias = 0, biasSquared = 0, smallest = double.PositiveInfinity, mass = 0;
        double[] chosen = new double[samples];
        double unit = 0;
        for (int s = 0; s < samples; s++)
        {
            Sample sample = Sample.Of(law.Sample(n, (ulong)s));
            unit = sample.StandardDeviation * Math.Pow(n, -0.2);
            for (int c = 0; c < s_corrections.Length; c++)
            {
                for (int k = 0; k < factors.Length; k++)
                {
                    Density.Of(sample, Kernel.Gaussian, factors[k] * unit, new DensityOptions { Support = law.Support, Boundary = s_corrections[c] }).Values(x, y);
                    errors[c, k] += SquaredError(x, y, truth) / samples;
                }
            }

            chosen[s] = BandwidthRules.Automatic(sample, Kernel.Gaussian, new BandwidthOptions { Support = law.Support });
            ratio += chosen[s] / unit / samples;
            Density mended = Density.Of(sample, Kernel.Gaussian, chosen[s], new DensityOptions { Support = law.Support });
            mended.Values(x, y);
            automatic += SquaredError(x, y, truth) / samples;
            double off = (y[0] - truth[0]) / (truth[0] > 0 ? truth[0] : truth.Max());
            bias += off / samples;
            biasSquared += off * off / samples;
            smallest = Math.Min(smallest, y.Min());
            mass = Math.Max(mass, Math.Abs(Mass(mended, law.Support, law.Shown) - 1));
        }

        double best = double.PositiveInfinity;
        double[] bestOf = new double[s_corrections.Length];
        double bestFactor = 0;
        for (int c = 0; c < s_corrections.Length; c++)
        {
            bestOf[c] = double.PositiveInfinity;
            for (int k = 0; k < factors.Length; k++)
            {
                bestFactor = c == 0 && errors[c, k] < bestOf[c] ? factors[k] : bestFactor;
                bestOf[c] = Math.Min(bestOf[c], errors[c, k]);
            }

            best = Math.Min(best, bestOf[c]);
        }

        double standardError = Math.Sqrt((biasSquared - (bias * bias)) / samples);
        Console.WriteLine($"| {law.Name} | {string.Join(" | ", bestOf.Select(e => $"{e / best:F2}"))} | {automatic / best:F2} | {ratio / bestFactor:F2} | {100 * bias:F1} ± {100 * standardError:F1} % | {smallest:E1} | {mass:E1} |");
    }

    private static void Distributions(int n, int samples)
    {
        Console.WriteLine($"Distribution function, Gaussian kernel on the whole line, n = {n}, {samples} seeded samples, bandwidth by ForDistribution; MISE against the step function's.");
        Console.WriteLine();
        Console.WriteLine("| law | smoothed / step ± standard error |");
        Console.WriteLine("|---|---|");
        foreach (LimitedLaw law in LimitedLaw.ForDistribution)
        {
            // Sample means of both errors; the ratio's standard error by the delta method.
            double[] x = Grid(law.Shown);
            double[] truth = [.. x.Select(v => law.Name.StartsWith("gamma", StringComparison.Ordinal) && v < 0 ? 0 : law.Cumulative(v))];
            var smooth = new double[samples];
            var step = new double[samples];
            var y = new double[Points];
            for (int s = 0; s < samples; s++)
            {
                Sample sample = Sample.Of(law.Sample(n, (ulong)s));
                double h = BandwidthRules.ForDistribution(sample, Kernel.Gaussian);
                Density.Of(sample, Kernel.Gaussian, h).Cumulatives(x, y);
                smooth[s] = SquaredError(x, y, truth);
                double[] sorted = sample.SortedValues.ToArray();
                for (int i = 0; i < Points; i++)
                {
                    int found = Array.BinarySearch(sorted, x[i]);
                    y[i] = (double)(found < 0 ? ~found : found + 1) / n;
                }

                step[s] = SquaredError(x, y, truth);
            }

            double ratio = smooth.Average() / step.Average();
            double variance = smooth.Zip(step, (a, b) => (a - (ratio * b)) * (a - (ratio * b))).Average();
            Console.WriteLine($"| {law.Name} | {ratio:F3} ± {Math.Sqrt(variance / samples) / step.Average():F3} |");
        }
    }

    private static void Adaptive(int n, int samples)
    {
        double[] factors = [0.1, 0.14, 0.2, 0.28, 0.4, 0.55, 0.75, 1.05, 1.4];
        Console.WriteLine();
        Console.WriteLine($"Adaptive bandwidth (exponent ½), Gaussian kernel, n = {n}, {samples} seeded samples: MISE relative to one bandwidth for all.");
        Console.WriteLine();
        Console.WriteLine("| law | each at its best h | both at the automatic h, pilot at it too |");
        Console.WriteLine("|---|---|---|");
        var y = new double[Points];
        foreach (LimitedLaw law in LimitedLaw.ForAdaptive)
        {
            double[] x = Grid(law.Shown);
            double[] truth = [.. x.Select(law.Density)];
            var errors = new double[2, factors.Length + 1];
            for (int s = 0; s < samples; s++)
            {
                Sample sample = Sample.Of(law.Sample(n, (ulong)s));
                double automatic = BandwidthRules.Automatic(sample, Kernel.Gaussian);
                for (int k = 0; k <= factors.Length; k++)
                {
                    double h = k == factors.Length ? automatic : factors[k] * sample.StandardDeviation * Math.Pow(n, -0.2);
                    for (int a = 0; a < 2; a++)
                    {
                        Density.Of(sample, Kernel.Gaussian, h, new DensityOptions { Adaptive = a == 0 ? null : new AdaptiveBandwidth { PilotBandwidth = automatic } }).Values(x, y);
                        errors[a, k] += SquaredError(x, y, truth);
                    }
                }
            }

            double Best(int a) => Enumerable.Range(0, factors.Length).Min(k => errors[a, k]);
            Console.WriteLine($"| {law.Name} | {Best(1) / Best(0):F2} | {errors[1, factors.Length] / errors[0, factors.Length]:F2} |");
        }
    }

    // ∫ f̂ by the three-point Gauss rule apart from the library's own quadrature: some 1000 panels over the shown range and ten bandwidths, with
    // further ends where the curve leaves or reaches 0 (found by bisection); beyond, the survival.
    private static double Mass(Density density, Interval support, Interval shown)
    {
        const int Panels = 1000;
        double to = Math.Min(support.Upper, shown.Upper + (10 * density.Bandwidth));
        var ends = new List<double>();
        for (int i = 0; i <= Panels; i++)
        {
            ends.Add(shown.Lower + ((to - shown.Lower) * i / Panels));
        }

        var y = new double[Panels + 1];
        density.Values(ends.ToArray(), y);
        for (int i = 1; i <= Panels; i++)
        {
            if (y[i] > 0 != y[i - 1] > 0)
            {
                (double low, double high) = (ends[i - 1], ends[i]);
                for (int k = 0; k < 60; k++)
                {
                    double middle = (low + high) / 2;
                    (low, high) = density.Value(middle) > 0 == y[i - 1] > 0 ? (middle, high) : (low, middle);
                }

                ends.Add(high);
            }
        }

        ends.Sort();
        var x = new double[3 * (ends.Count - 1)];
        for (int i = 1; i < ends.Count; i++)
        {
            double middle = (ends[i] + ends[i - 1]) / 2;
            double reach = (ends[i] - ends[i - 1]) / 2 * Math.Sqrt(0.6);
            (x[3 * (i - 1)], x[(3 * (i - 1)) + 1], x[(3 * (i - 1)) + 2]) = (middle - reach, middle, middle + reach);
        }

        y = new double[x.Length];
        density.Values(x, y);
        double sum = density.Survival(to);
        for (int i = 1; i < ends.Count; i++)
        {
            int k = 3 * (i - 1);
            sum += (ends[i] - ends[i - 1]) / 18 * ((5 * y[k]) + (8 * y[k + 1]) + (5 * y[k + 2]));
        }

        return sum;
    }

    private static double[] Grid(Interval shown) => [.. Enumerable.Range(0, Points).Select(i => shown.Lower + (shown.Length * i / (Points - 1)))];

    // ∫ (f̂ − f)² by the trapezoidal rule.
    private static double SquaredError(double[] x, double[] y, double[] truth)
    {
        double sum = 0;
        for (int i = 0; i < x.Length; i++)
        {
            double d = y[i] - truth[i];
            sum += d * d * (i == 0 || i == x.Length - 1 ? 0.5 : 1);
        }

        return sum * (x[1] - x[0]);
    }
}
