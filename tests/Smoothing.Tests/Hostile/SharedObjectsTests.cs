using System.Globalization;
using Smoothing.Bandwidths;
using Smoothing.Estimation;
using Smoothing.Inference;
using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;
using Smoothing.Theory;

namespace Smoothing.Tests.Hostile;

/// <summary>Immutable objects shared by 32 threads whose first calls race: every thread reads the bits that one thread alone reads.</summary>
public class SharedObjectsTests
{
    private const int ThreadCount = 32;

    private static readonly double[] s_values = NormalMixture.MarronWand[7].Draw(4_000, 11);

    public static TheoryDataRow<string>[] Kernels() => [.. Kernel.Standard.Append(Kernel.GaussianOfOrder(4)).Append(Kernel.PolynomialOfOrder(4)).Select(k => new TheoryDataRow<string>(k.Name))];

    [Fact]
    public void Sample_SharedByThreads_GivesTheBitsOfOneThread() =>
        SameBits(() => Sample.Of(s_values), sample =>
        [
            sample.Mean, sample.StandardDeviation, sample.InterquartileRange, sample.Quantile(0.37), sample.SortedValues[17], sample.SortedValues[^3],
            sample.TiedShare, sample.LagOneCorrelation,
        ]);

    [Theory]
    [MemberData(nameof(Kernels))]
    public void Density_SharedByThreads_GivesTheBitsOfOneThread(string name)
    {
        Kernel kernel = Kernel.Standard.Append(Kernel.GaussianOfOrder(4)).Append(Kernel.PolynomialOfOrder(4)).Single(k => k.Name == name);
        SameBits(() => Density.Of(Sample.Of(s_values), kernel, 0.3), density =>
        {
            var y = new double[101];
            density.Values([.. Enumerable.Range(0, 101).Select(i => -4 + (0.08 * i))], y);
            return [.. y, density.Value(0.3), density.Cumulative(-1), density.Survival(2), density.Quantile(0.95), .. density.Tabulate(-4, 4, 64).Y, .. kernel.Order == 2 ? density.Draw(20, 5) : []];
        });
    }

    [Fact]
    public void LimitedDensity_SharedByThreads_GivesTheBitsOfOneThread() =>
        SameBits(
            () => Density.Of(Sample.Of([.. s_values.Select(Math.Abs)]), Kernel.Epanechnikov, 0.3, new DensityOptions { Support = new Interval(0, double.PositiveInfinity) }),
            density => [density.Value(0), density.Derivative(0.1), density.Cumulative(0.7), density.Quantile(0.5), .. density.Tabulate(0, 3, 64).Y]);

    [Fact]
    public void Uncertainty_SharedByThreads_GivesTheBitsOfOneThread() =>
        SameBits(() => Uncertainty.Of(Density.Of(Sample.Of(s_values), Kernel.Gaussian, 0.3)), uncertainty =>
        {
            Band band = uncertainty.Band(-3, 3, 101);
            return [uncertainty.BiasAt(0).Estimate, uncertainty.StandardErrorAt(1), uncertainty.IntervalAt(0.2).Lower, band.CriticalValue, .. band.Lower, .. band.Upper];
        });

    [Fact]
    public void Rules_OfASharedSample_GiveTheBitsOfOneThread() =>
        SameBits(() => Sample.Of(s_values[..600]), sample => [.. Enum.GetValues<BandwidthRule>().Select(rule => DensityStudy.Of(sample, new StudyOptions { Rule = rule, Points = 51 }).Bandwidth.Value)], threads: 8);

    [Fact]
    public void Study_SharedByThreadsOfManyCultures_WritesTheBytesOfOneThread()
    {
        string[] cultures = ["", "de-DE", "ar-SA", "tr-TR", "fa-IR", "hi-IN", "fr-CH", "th-TH"];
        DensityStudy Make() => DensityStudy.Of(s_values, new StudyOptions { Name = "level", Unit = "mm", Limits = [1.5], ReferenceValues = s_values.AsMemory(0, 1_000), ReferenceName = "before" });
        static string All(DensityStudy study) => study.ToText() + study.ToMarkdown() + study.ToHtml() + study.ToJson() + study.ToSvg() + study.ToComparisonSvg() + FormattableString.Invariant($"{study.Sharp!.Value(0.5):R}");
        string expected = All(Make());
        DensityStudy shared = Make();
        string[] got = OnThreads(ThreadCount, i =>
        {
            CultureInfo.CurrentCulture = CultureInfo.GetCultureInfo(cultures[i % cultures.Length]);
            return All(shared);
        });
        Assert.All(got, text => Assert.Equal(expected, text));
    }

    // The reference object and the shared one are separate: nothing cached by the first can help the second.
    private static void SameBits<T>(Func<T> make, Func<T, double[]> read, int threads = ThreadCount)
    {
        double[] expected = read(make());
        T shared = make();
        double[][] got = OnThreads(threads, _ => read(shared));
        foreach (double[] numbers in got)
        {
            Assert.Equal(expected.Select(BitConverter.DoubleToInt64Bits), numbers.Select(BitConverter.DoubleToInt64Bits));
        }
    }

    private static T[] OnThreads<T>(int count, Func<int, T> work)
    {
        var results = new T[count];
        var errors = new Exception?[count];
        using var start = new Barrier(count);
        Thread[] threads =
        [
            .. Enumerable.Range(0, count).Select(i => new Thread(() =>
            {
                start.SignalAndWait();
                try
                {
                    results[i] = work(i);
                }
                catch (Exception error)
                {
                    errors[i] = error;
                }
            })),
        ];
        foreach (Thread thread in threads)
        {
            thread.Start();
        }

        foreach (Thread thread in threads)
        {
            thread.Join();
        }

        Assert.All(errors, Assert.Null);
        return results;
    }
}
