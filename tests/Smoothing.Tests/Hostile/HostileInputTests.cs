using FsCheck;
using FsCheck.Fluent;
using FsCheck.Xunit;
using Smoothing.Bandwidths;
using Smoothing.Estimation;
using Smoothing.Inference;
using Smoothing.Kernels;
using Smoothing.Samples;

namespace Smoothing.Tests.Hostile;

/// <summary>Every public entry point on columns that love trouble: a finite and sensible result, or a documented exception; never NaN out of finite input. The seed is fixed; ten times the columns from fresh seeds found nothing more.</summary>
public class HostileInputTests
{
    [Property(MaxTest = 150, Replay = "1973,2029")]
    public Property Sample_AnyColumn_HasFiniteSummariesInOrder() => Prop.ForAll(HostileColumns.Any(), x =>
    {
        Sample sample = Sample.Of(x);
        Assert.True(double.IsFinite(sample.Mean) && sample.Mean >= sample.Minimum && sample.Mean <= sample.Maximum, $"mean {sample.Mean}");
        Assert.True(sample.StandardDeviation >= 0 && !double.IsNaN(sample.StandardDeviation));
        double before = sample.Minimum;
        for (int i = 0; i <= 20; i++)
        {
            double q = sample.Quantile(i / 20.0);
            Assert.True(q >= before && q <= sample.Maximum, $"quantile {i / 20.0}: {q} after {before}");
            before = q;
        }

        Assert.InRange(sample.TiedShare, 0, 1);
        Assert.All(sample.Atoms, a => Assert.InRange(a.Share, 0.05, 1));
        Assert.True(sample.RoundingUnit is null || (sample.RoundingUnit.Step > 0 && double.IsFinite(sample.RoundingUnit.Step)));
        Assert.InRange(sample.LagOneCorrelation, -1, 1);
    });

    [Property(MaxTest = 150, Replay = "1973,2029")]
    public Property Density_AnyColumnAndKernel_IsFiniteAndMonotone() => Prop.ForAll(
        HostileColumns.Any(),
        Gen.Elements<Kernel>([.. Kernel.Standard, Kernel.GaussianOfOrder(4), Kernel.PolynomialOfOrder(4)]).ToArbitrary(),
        Gen.Elements(1e-300, 1e-9, 0.3, 1, 1e5, 1e300).ToArbitrary(),
        (x, kernel, h) =>
        {
            Sample sample = Sample.Of(x);
            Density density = Density.Of(sample, kernel, h);
            double[] places = [double.NegativeInfinity, -1e308, -1, -0.0, 0.2, 1, 1e6, 1e308, double.PositiveInfinity, sample.Minimum, sample.Maximum];
            Array.Sort(places);
            var f = new double[places.Length];
            var lower = new double[places.Length];
            var upper = new double[places.Length];
            density.Values(places, f);
            density.Cumulatives(places, lower);
            density.Survivals(places, upper);
            for (int i = 0; i < places.Length; i++)
            {
                Assert.False(double.IsNaN(f[i]) || double.IsNaN(lower[i]) || double.IsNaN(upper[i]), $"NaN at {places[i]}");
                if (kernel.Order == 2)
                {
                    Assert.True(f[i] >= 0);
                    Assert.InRange(lower[i], 0, 1 + 1e-12);
                    Assert.InRange(lower[i] + upper[i], 1 - 1e-9, 1 + 1e-9);
                    Assert.True(i == 0 || lower[i] >= lower[i - 1] - 1e-12);
                }
            }

            Assert.Equal(0, f[0]);
            Assert.Equal(0, lower[0]);
            Assert.Equal(1, lower[^1], 9);
        });

    [Property(MaxTest = 60, Replay = "1973,2029")]
    public Property Rules_AnyColumn_GiveAFiniteBandwidthOrAClearError() => Prop.ForAll(
        HostileColumns.Any(),
        Gen.Elements(Enum.GetValues<BandwidthRule>()).ToArbitrary(),
        (x, rule) =>
        {
            try
            {
                BandwidthChoice choice = BandwidthRules.Choose(rule, Sample.Of(x), Kernel.Gaussian);
                Assert.True(choice.Value > 0 && double.IsFinite(choice.Value), $"{rule}: {choice.Value}");
            }
            catch (ArgumentException error)
            {
                Assert.True(error.Message.Length > 20);
            }
        });

    [Property(MaxTest = 60, Replay = "1973,2029")]
    public Property Study_AnyColumn_ReportsWithoutNaNOrSaysWhy() => Prop.ForAll(HostileColumns.Any(), x =>
    {
        try
        {
            DensityStudy study = DensityStudy.Of(x, new StudyOptions { Limits = [0.5], Points = 51 });
            string text = study.ToText();
            Assert.DoesNotContain("NaN", text, StringComparison.Ordinal);
            Assert.DoesNotContain("NaN", study.ToHtml(), StringComparison.Ordinal);
            Assert.Equal(study.ToJson(), StudyDocument.FromJson(study.ToJson()).ToJson());
        }
        catch (ArgumentException error)
        {
            Assert.Contains("bandwidth", error.Message, StringComparison.OrdinalIgnoreCase);
        }
    });

    [Property(MaxTest = 100, Replay = "1973,2029")]
    public Property SharesAndQuantiles_AnyColumn_HoldTheirEstimate() => Prop.ForAll(HostileColumns.Any(), Gen.Elements(-1e308, 0, 0.5, 1, 1e308).ToArbitrary(), (x, limit) =>
    {
        Sample sample = Sample.Of(x);
        ShareEstimate share = Shares.Beyond(sample, limit);
        Assert.True(share.Interval.Contains(share.Estimate));
        QuantileEstimate median = Quantiles.Of(sample, 0.5);
        Assert.True(median.Interval.Contains(median.Estimate));
    });

    [Property(MaxTest = 100, Replay = "1973,2029")]
    public Property Condensed_AnyColumn_KeepsCountAndEndsThroughBytes() => Prop.ForAll(HostileColumns.Any(), x =>
    {
        CondensedSample condensed = CondensedSample.Of(x);
        Assert.Equal(x.Length, condensed.Count);
        CondensedSample back = CondensedSample.FromBytes(condensed.ToBytes());
        Assert.Equal(condensed.ToBytes(), back.ToBytes());
        CondensedSample twice = CondensedSample.Merge(condensed, back);
        Assert.Equal(2 * x.Length, twice.Count);
    });

    // NaN and infinities, wherever they stand: an error that names the place.
    [Theory]
    [InlineData(double.NaN)]
    [InlineData(double.PositiveInfinity)]
    [InlineData(double.NegativeInfinity)]
    public void EntryPoints_NonFiniteValue_NameItsIndex(double bad)
    {
        double[] x = [1, 2, bad, 4];
        Assert.Contains("values[2]", Assert.ThrowsAny<ArgumentException>(() => Sample.Of(x)).Message, StringComparison.Ordinal);
        Assert.Contains("values[2]", Assert.ThrowsAny<ArgumentException>(() => DensityStudy.Of(x)).Message, StringComparison.Ordinal);
        Assert.Contains("[2]", Assert.ThrowsAny<ArgumentException>(() => CondensedSample.Of(x)).Message, StringComparison.Ordinal);
    }

    // Payload bits and the sign of a NaN must not carry it past a check.
    [Fact]
    public void Guards_NaNOfEverySignAndPayload_Fail()
    {
        foreach (long bits in new[] { unchecked((long)0xFFF8000000000000), 0x7FF8000000000001, 0x7FF0000000000001, unchecked((long)0xFFF0DEADBEEF0001) })
        {
            double nan = BitConverter.Int64BitsToDouble(bits);
            Density density = Density.Of(Sample.Of([1.0, 2, 3]), Kernel.Gaussian, 1);
            Assert.ThrowsAny<ArgumentException>(() => Sample.Of([1.0, nan]));
            Assert.ThrowsAny<ArgumentException>(() => density.Value(nan));
            Assert.ThrowsAny<ArgumentException>(() => density.Quantile(nan));
            Assert.ThrowsAny<ArgumentException>(() => Density.Of(Sample.Of([1.0]), Kernel.Gaussian, nan));
            Assert.ThrowsAny<ArgumentException>(() => Kernel.Gaussian.Value(nan));
        }
    }

    [Fact]
    public void Study_AMillionEqualValuesAndOneOther_Answers()
    {
        double[] x = [.. Enumerable.Repeat(5.0, 1_000_000), 6];
        Assert.Equal(1e-6 / (1 + 1e-6), Shares.Beyond(Sample.Of(x), 5.5).Estimate, 12);
        Assert.DoesNotContain("NaN", DensityStudy.Of(x, new StudyOptions { Bandwidth = 0.5 }).ToText(), StringComparison.Ordinal);
    }
}
