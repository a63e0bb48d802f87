using System.Numerics.Tensors;
using Smoothing.Estimation;
using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Benchmarks.Targets;

/// <summary>Targets of the exact Gaussian curve: T3, T4, T5, T6, T11, T13, T14, T15, T16.</summary>
internal static class GaussianTargets
{
    private const int Million = 1_000_000;

    // 1.06 n^(−1/5): the normal-reference bandwidth for standard normal values.
    private const double ReferenceFactor = 1.06;

    public static IReadOnlyList<Func<Target>> All { get; } =
    [
        () => Exact("T3", 10 * Million, 12, "TensorPrimitives.Sum", sort: false), () => Exact("T3", 10 * Million, 0.042, "Span.Sort", sort: true), () => Exact("T4", Million, 0.055, "Span.Sort", sort: true),
        DoubleLoop, AllPoints, Heavy, Growth, Bytes, FirstCall.Make, Together,
    ];

    public static double[] Normal(int count, ulong seed)
    {
        var random = new RandomStream(seed);
        var values = new double[count];
        for (int i = 0; i < count; i++)
        {
            values[i] = random.NextNormal();
        }

        return values;
    }

    public static double[] Equal(double from, double to, int points) => [.. Enumerable.Range(0, points).Select(j => from + ((to - from) * j / (points - 1)))];

    private static double Width(int count) => ReferenceFactor * Math.Pow(count, -0.2);

    private static Target Exact(string id, int count, double limit, string against, bool sort)
    {
        double[] values = Normal(count, 1), work = sort ? new double[count] : [], x = Equal(-5, 5, 1024), y = new double[x.Length];
        double total = 0;
        return new Target(
            id,
            FormattableString.Invariant($"exact Gaussian, n = 10^{Math.Log10(count):F0} unsorted, m = 1,024, sample included / {against}"),
            limit,
            () => values.AsSpan(0, work.Length).CopyTo(work),
            sort ? () => work.AsSpan().Sort() : () => total += TensorPrimitives.Sum<double>(values),
            () => Density.Of(Sample.Of(values), Kernel.Gaussian, Width(count)).Values(x, y));
    }

    // One point of the double loop, scaled to 1,024: the ratio is below 1/1,800 when the job is more than 1,800 times as fast.
    private static Target DoubleLoop()
    {
        double[] values = Normal(Million, 1), x = Equal(-5, 5, 1024), y = new double[x.Length];
        double width = Width(Million), sink = 0;
        return new Target(
            "T5",
            "T4 / the Math.Exp double loop (one point timed, times 1,024)",
            1 / 1800.0,
            () => { },
            () =>
            {
                double inverse = 1 / width;
                foreach (double value in values)
                {
                    double u = (0.3 - value) * inverse;
                    sink += Math.Exp(-0.5 * u * u);
                }
            },
            () => Density.Of(Sample.Of(values), Kernel.Gaussian, width).Values(x, y),
            1024);
    }

    private static Target AllPoints()
    {
        double[] values = Normal(Million, 1), work = new double[Million], y = new double[Million];
        return new Target(
            "T6",
            "exact Gaussian at all n = 10^6 values, unsorted, sample included / Span.Sort",
            0.25,
            () => values.CopyTo(work, 0),
            () => work.AsSpan().Sort(),
            () => Density.Of(Sample.Of(values), Kernel.Gaussian, Width(Million)).Values(values, y));
    }

    private static Target Heavy()
    {
        var random = new RandomStream(4);
        var values = new double[Million];
        for (int i = 0; i < values.Length; i++)
        {
            values[i] = random.NextNormal() / random.NextNormal();
        }

        double[] work = new double[Million], x = Equal(-20, 20, 1024), y = new double[x.Length];
        return new Target(
            "T11",
            "exact Gaussian on full Cauchy data, n = 10^6 unsorted, m = 1,024, sample included / Span.Sort",
            0.45,
            () => values.CopyTo(work, 0),
            () => work.AsSpan().Sort(),
            () => Density.Of(Sample.Of(values), Kernel.Gaussian, Width(Million)).Values(x, y));
    }

    private static Target Growth()
    {
        double[] values = Normal(10 * Million, 1), fewer = values[..Million], x = Equal(-5, 5, 1024), y = new double[x.Length];
        return new Target(
            "T13",
            "growth: exact Gaussian at n = 10^7 / at n = 10^6, m = 1,024",
            12,
            () => { },
            () => Density.Of(Sample.Of(fewer), Kernel.Gaussian, Width(Million)).Values(x, y),
            () => Density.Of(Sample.Of(values), Kernel.Gaussian, Width(10 * Million)).Values(x, y));
    }

    // The yardstick counts as one byte, so the ratio is the number of bytes.
    private static Target Bytes()
    {
        double[] values = Normal(Million, 1), x = Equal(-5, 5, 1024), y = new double[x.Length];
        Density density = Density.Of(Sample.Of(values), Kernel.Gaussian, Width(Million));
        density.Values(x, y);
        return new Target(
            "T14",
            "managed bytes of a repeated Values call",
            0,
            () => { },
            () => { },
            () => density.Values(x, y),
            Measure: () =>
            {
                long before = GC.GetAllocatedBytesForCurrentThread();
                density.Values(x, y);
                return GC.GetAllocatedBytesForCurrentThread() - before;
            });
    }

    private static Target Together()
    {
        double[] values = Normal(Million, 1), x = Equal(-5, 5, 10_000), f = new double[x.Length], slope = new double[x.Length], share = new double[x.Length];
        Density density = Density.Of(Sample.Of(values), Kernel.Gaussian, Width(Million));
        return new Target(
            "T16",
            "density, first derivative and F together / density alone, n = 10^6, m = 10,000",
            2.2,
            () => { },
            () => density.Values(x, f),
            () => density.Evaluate(x, f, slope, share));
    }
}
