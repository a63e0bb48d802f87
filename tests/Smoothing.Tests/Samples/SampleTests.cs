using FsCheck;
using FsCheck.Fluent;
using FsCheck.Xunit;
using MathNet.Numerics.Statistics;
using Smoothing.Samples;
using Smoothing.Tests.Support;
using TestData = Smoothing.Tests.Support.TestData;

namespace Smoothing.Tests.Samples;

/// <summary>Summaries and quantiles, against hand calculation and MathNet.Numerics.</summary>
public class SampleTests
{
    [Theory]
    [InlineData("faithful_eruptions_272")]
    [InlineData("us_births_daily_1994_2003")]
    [InlineData("cps_wages_534")]
    public void Summaries_OpenData_AreThoseOfMathNet(string name)
    {
        double[] values = TestData.Load(name);
        Sample sample = Sample.Of(values);
        Near.Relative(values.Mean(), sample.Mean, 1e-14);
        Near.Relative(values.StandardDeviation(), sample.StandardDeviation, 1e-13);

        // R-7 is the published name of the definition by linear interpolation at (n − 1)p (Hyndman & Fan 1996, definition 7).
        foreach (double p in new[] { 0, 0.01, 0.25, 0.5, 0.9, 0.999, 1 })
        {
            Near.Relative(values.QuantileCustom(p, QuantileDefinition.R7), sample.Quantile(p), 1e-14);
        }
    }

    [Fact]
    public void Of_CallersArray_IsCopiedInItsOrder()
    {
        double[] values = [3, 1, 2];
        Sample sample = Sample.Of(values);
        values[0] = 99;
        Assert.Equal([3, 1, 2], sample.Values.ToArray());
        Assert.Equal([1, 2, 3], sample.SortedValues.ToArray());
        Assert.Equal((1, 3, 2), (sample.Minimum, sample.Maximum, sample.Mean));
    }

    [Fact]
    public void Summaries_OneValue_HaveNoSpread()
    {
        Sample sample = Sample.Of([4.2]);
        Assert.Equal((1, 4.2, 0, 4.2, 4.2, 0), (sample.Count, sample.Mean, sample.StandardDeviation, sample.Minimum, sample.Quantile(0.3), sample.InterquartileRange));
    }

    [Theory]
    [InlineData(0.1, 7)]
    [InlineData(1e-310, 3001)]
    [InlineData(1.7e308, 5)]
    [InlineData(-123456.789, 100000)]
    public void Summaries_EqualValues_AreThatValueAndZeroSpread(double value, int n)
    {
        Sample sample = Sample.Of(Enumerable.Repeat(value, n));
        Assert.Equal(value, sample.Mean);
        Assert.Equal(0, sample.StandardDeviation);
    }

    [Theory]
    [InlineData(1e308)]
    [InlineData(1e200)]
    [InlineData(1e-200)]
    [InlineData(1e-300)]
    public void Summaries_ExtremeScales_AreScaled(double scale)
    {
        double[] unit = [-1, 0.25, 0.5, 1];
        Sample sample = Sample.Of(Array.ConvertAll(unit, x => x * scale));
        Near.Relative(unit.StandardDeviation(), sample.StandardDeviation / scale, 1e-14);
        Near.Relative(0.1875, sample.Mean / scale, 1e-14);
        Near.Relative(Sample.Of(unit).Quantile(0.2), sample.Quantile(0.2) / scale, 1e-14);
    }

    [Fact]
    public void StandardDeviation_BeyondADouble_IsInfinite()
    {
        // The deviation of ±m is √2·m.
        Assert.Equal(double.PositiveInfinity, Sample.Of([-1.7e308, 1.7e308]).StandardDeviation);
        Assert.Equal(0, Sample.Of([-1.7e308, 1.7e308]).Mean);
    }

    [Fact]
    public void Summaries_SubnormalValues_KeepTheirDigits()
    {
        Sample sample = Sample.Of([3 * double.Epsilon, 5 * double.Epsilon, 4 * double.Epsilon]);
        Assert.Equal(4 * double.Epsilon, sample.Mean);
        Assert.Equal(double.Epsilon, sample.StandardDeviation);
        Assert.Equal([3 * double.Epsilon, 4 * double.Epsilon, 5 * double.Epsilon], sample.SortedValues.ToArray());
    }

    [Fact]
    public void Summaries_LargeOffset_KeepTheSpread()
    {
        // 1e9 + {0, 1, 2}: the textbook one-pass formula loses all digits here.
        Near.Relative(1, Sample.Of([1e9, 1e9 + 1, 1e9 + 2]).StandardDeviation, 1e-15);
    }

    [Fact]
    public void Of_NegativeZero_IsStoredAsZero() =>
        Assert.All(Sample.Of([-0.0, 0.0, -0.0]).Values.ToArray(), x => Assert.Equal(0L, BitConverter.DoubleToInt64Bits(x)));

    [Property(MaxTest = 50)]
    public Property Summaries_AnyOrder_HaveTheSameQuantiles() => Prop.ForAll(Columns(), Gen.Choose(0, 100).ToArbitrary(), (values, percent) =>
    {
        double[] reversed = [.. values.Reverse()];
        Sample a = Sample.Of(values), b = Sample.Of(reversed);
        Assert.Equal(BitConverter.DoubleToInt64Bits(a.Quantile(percent / 100.0)), BitConverter.DoubleToInt64Bits(b.Quantile(percent / 100.0)));
        Assert.Equal(a.TiedShare, b.TiedShare);
        Assert.Equal(a.RoundingUnit, b.RoundingUnit);
    });

    [Fact]
    public void Quantile_SteppedProbability_NeverFalls()
    {
        Sample sample = Sample.Of(SeededColumns.Draw("skewed", 57, 1), new SampleOptions { Weights = SeededColumns.Draw("exponential", 57, 2) });
        double previous = sample.Minimum;
        Assert.Equal(previous, sample.Quantile(0));
        for (int i = 1; i <= 1000; i++)
        {
            double q = sample.Quantile(i / 1000.0);
            Assert.True(q >= previous);
            previous = q;
        }

        Assert.Equal(sample.Maximum, previous);
    }

    [Fact]
    public void Of_Durations_AreReadInTheUnit()
    {
        Sample sample = Sample.Of(new[] { TimeSpan.FromSeconds(90), TimeSpan.FromHours(1) }, TimeUnit.Minutes);
        Assert.Equal([1.5, 60], sample.Values.ToArray());
        Assert.Equal("min", sample.Unit);
        Assert.Equal("Min.", Sample.Of([TimeSpan.FromDays(2)], TimeUnit.Days, new SampleOptions { Unit = "Min." }).Unit);
        Assert.Equal([1500.0], Sample.Of(new[] { TimeSpan.FromSeconds(1.5) }, TimeUnit.Milliseconds).Values.ToArray());
        Sample gap = Sample.Of(new TimeSpan?[] { TimeSpan.FromHours(36), null }, TimeUnit.Days, new SampleOptions { Missing = MissingValues.LeaveOut });
        Assert.Equal((1.5, 1, "d"), (gap.Mean, gap.LeftOut, gap.Unit));
        Assert.Throws<ArgumentOutOfRangeException>(() => Sample.Of([TimeSpan.Zero], (TimeUnit)9));
    }

    [Fact]
    public void Of_NullableColumn_TreatsNullAsMissing()
    {
        var column = new double?[] { 1, null, 3, double.NaN };
        Sample sample = Sample.Of(column, new SampleOptions { Missing = MissingValues.LeaveOut });
        Assert.Equal((2, 2, 2.0), (sample.Count, sample.LeftOut, sample.Mean));
        Assert.StartsWith("values[1] is NaN, 2 of 4 values in all: leave", Assert.Throws<ArgumentException>(() => Sample.Of(column)).Message, StringComparison.Ordinal);
    }

    private static Arbitrary<double[]> Columns() =>
        Gen.Choose(-500, 500).Select(i => i / 10.0).ArrayOf().Where(values => values.Length > 0).ToArbitrary();
}
