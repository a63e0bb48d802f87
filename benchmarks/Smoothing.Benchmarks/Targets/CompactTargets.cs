using Smoothing.Estimation;
using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Benchmarks.Targets;

/// <summary>Targets of polynomial kernels and of few values: T7, T8, T9, T12, T17.</summary>
internal static class CompactTargets
{
    private const int Million = 1_000_000;

    // The Epanechnikov reference bandwidth for standard normal values: (8·3·√π·0.6/(3·0.04))^(1/5) n^(−1/5) = 2.34 n^(−1/5).
    private const double ReferenceFactor = 2.34;

    public static IReadOnlyList<Func<Target>> All { get; } = [Grid(Kernel.Epanechnikov, "T7", 0.09), Grid(Kernel.Triweight, "T8", 0.18), LeaveOneOut, SmallGaussian, ManyPoints];

    private static Func<Target> Grid(Kernel kernel, string id, double limit) => () =>
    {
        double[] values = GaussianTargets.Normal(Million, 1);
        double[] work = new double[Million];
        double[] x = GaussianTargets.Equal(-5, 5, 1024);
        double[] y = new double[x.Length];
        double width = ReferenceFactor * Math.Pow(Million, -0.2);
        return new Target(
            id,
            kernel.Name + ", n = 10^6 unsorted, m = 1,024, sample included / Span.Sort",
            limit,
            () => values.CopyTo(work, 0),
            () => work.AsSpan().Sort(),
            () => Density.Of(Sample.Of(values), kernel, width).Values(x, y));
    };

    private static Target LeaveOneOut()
    {
        double[] values = GaussianTargets.Normal(Million, 1);
        double[] work = new double[Million];
        double[] y = new double[Million];
        Sample sample = Sample.Of(values);
        _ = sample.SortedValues.Length; // sorts before the clock starts, as the target says
        var pairs = new CompactPairs(sample, Kernel.Epanechnikov);
        double width = ReferenceFactor * Math.Pow(Million, -0.2);
        return new Target(
            "T9",
            "Epanechnikov leave-one-out at all n = 10^6 sorted values / Span.Sort of unsorted ones",
            0.35,
            () => values.CopyTo(work, 0),
            () => work.AsSpan().Sort(),
            () => pairs.LeaveOneOut(width *= 1 + 1e-12, y)); // another bandwidth each time: tables are laid out anew
    }

    private static Target ManyPoints()
    {
        const int points = 100_000;
        double[] values = GaussianTargets.Normal(Million, 1);
        double[] work = new double[Million];
        var random = new RandomStream(3);
        var x = new double[points];
        for (int j = 0; j < points; j++)
        {
            x[j] = -5 + (10 * random.NextUniform());
        }

        double[] y = new double[points];
        double width = ReferenceFactor * Math.Pow(Million, -0.2);
        return new Target(
            "T17",
            "Epanechnikov at 10^5 unsorted points, n = 10^6 unsorted, sample included / Span.Sort",
            0.6,
            () => values.CopyTo(work, 0),
            () => work.AsSpan().Sort(),
            () => Density.Of(Sample.Of(values), Kernel.Epanechnikov, width).Values(x, y));
    }

    private static Target SmallGaussian()
    {
        const int repeats = 20; // one run is a tenth of a millisecond
        double[] values = GaussianTargets.Normal(1000, 2);
        double[] x = GaussianTargets.Equal(-4, 4, 512);
        double[] y = new double[x.Length];
        double width = 1.06 * Math.Pow(1000, -0.2);
        return new Target(
            "T12",
            "Gaussian, n = 1,000, m = 512 equal steps, sample included / the Math.Exp double loop",
            0.07,
            () => { },
            () => ExpLoop(values, x, width, y),
            () =>
            {
                for (int r = 0; r < repeats; r++)
                {
                    Density.Of(Sample.Of(values), Kernel.Gaussian, width).Values(x, y);
                }
            },
            repeats);
    }

    private static void ExpLoop(double[] values, double[] x, double width, double[] y)
    {
        double inverse = 1 / width;
        for (int j = 0; j < x.Length; j++)
        {
            double sum = 0;
            foreach (double value in values)
            {
                double u = (x[j] - value) * inverse;
                sum += Math.Exp(-0.5 * u * u);
            }

            y[j] = sum;
        }
    }
}
