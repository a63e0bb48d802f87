using FsCheck;
using FsCheck.Fluent;
using FsCheck.Xunit;
using Smoothing.Samples;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Samples;

/// <summary>Counts are repetitions; relative weights only have ratios.</summary>
public class SampleWeightTests
{
    [Property(MaxTest = 100)]
    public Property Counts_AnyColumn_EqualTheValuesRepeated() => Prop.ForAll(Weighted(), Gen.Choose(0, 1000).ToArbitrary(), (rows, permille) =>
    {
        double[] repeated = [.. rows.SelectMany(row => Enumerable.Repeat(row.Value, row.Count))];
        Sample counts = Sample.Of(rows.Select(row => row.Value), new SampleOptions { Weights = rows.Select(row => (double)row.Count).ToArray(), WeightMeaning = WeightMeaning.Counts });
        Sample plain = Sample.Of(repeated);
        Assert.Equal(plain.Quantile(permille / 1000.0), counts.Quantile(permille / 1000.0));
        Assert.Equal((plain.EffectiveCount, plain.Minimum, plain.Maximum), (counts.EffectiveCount, counts.Minimum, counts.Maximum));
        Near.Absolute(plain.Mean, counts.Mean, 1e-13);
        Near.Absolute(plain.StandardDeviation, counts.StandardDeviation, 1e-12);
        Near.Absolute(plain.TiedShare, counts.TiedShare, 1e-14);
        Assert.Equal(plain.RoundingUnit?.Step, counts.RoundingUnit?.Step);
        Assert.Equal(plain.HeapingUnit?.Step, counts.HeapingUnit?.Step);
        Assert.Equal(plain.Atoms.Select(atom => atom.Value), counts.Atoms.Select(atom => atom.Value));
        Assert.Equal(plain.PilingAtMinimum?.Value, counts.PilingAtMinimum?.Value);
    });

    [Property(MaxTest = 100)]
    public Property Relative_AllScaled_ChangesNothing() => Prop.ForAll(Weighted(), Gen.Elements(1e-300, 0.037, 3, 1e290).ToArbitrary(), (rows, scale) =>
    {
        Sample Of(double factor) => Sample.Of(rows.Select(row => row.Value), new SampleOptions { Weights = rows.Select(row => row.Count * factor).ToArray() });
        Sample a = Of(1), b = Of(scale);
        Near.Relative(a.EffectiveCount, b.EffectiveCount, 1e-12);
        Near.Absolute(a.Mean, b.Mean, 1e-12);
        Near.Absolute(a.StandardDeviation, b.StandardDeviation, 1e-11);
        Near.Absolute(a.Quantile(0.3), b.Quantile(0.3), 1e-9);
        Near.Absolute(a.TiedShare, b.TiedShare, 1e-12);
        Assert.Equal(a.RoundingUnit?.Step, b.RoundingUnit?.Step);
        Assert.Equal(a.Atoms.Count, b.Atoms.Count);
    });

    [Fact]
    public void Relative_EqualWeights_AreAsIfThereWereNone()
    {
        double[] values = SeededColumns.Draw("two groups", 41, 7);
        Sample weighted = Sample.Of(values, new SampleOptions { Weights = Enumerable.Repeat(0.3, 41).ToArray() });
        Sample plain = Sample.Of(values);
        Near.Relative(41, weighted.EffectiveCount, 1e-14);
        Near.Relative(plain.StandardDeviation, weighted.StandardDeviation, 1e-13);
        for (int i = 0; i <= 40; i++)
        {
            Near.Absolute(plain.Quantile(i / 40.0), weighted.Quantile(i / 40.0), 1e-12);
        }
    }

    [Fact]
    public void Relative_SmallCase_IsByHand()
    {
        // w = 1, 1, 2: m = 16/6 = 8/3; mean 2.25; Σw(x − mean)²/Σw = 0.6875; · m/(m − 1) = 1.6.
        Sample sample = Sample.Of([1, 2, 3], new SampleOptions { Weights = new double[] { 1, 1, 2 } });
        Near.Relative(8 / 3.0, sample.EffectiveCount, 1e-15);
        Near.Relative(2.25, sample.Mean, 1e-15);
        Near.Relative(Math.Sqrt(0.6875 * 1.6), sample.StandardDeviation, 1e-15);

        // Scaled weights 2/3, 2/3, 4/3: pieces of 2/3 and (2/3 + 1)/2 = 5/6, then a plateau of 1/3; the half is at 11/12, 0.3 of the second piece.
        Near.Relative(2.3, sample.Quantile(0.5), 1e-14);
    }

    [Fact]
    public void Quantile_WeightAlmostAllOnOneValue_StaysThere()
    {
        Sample sample = Sample.Of([1, 2, 3], new SampleOptions { Weights = new double[] { 1000, 1, 1 }, WeightMeaning = WeightMeaning.Counts });
        Assert.Equal(1, sample.Quantile(0.5));
        Assert.Equal(1, sample.Quantile(0.99));
    }

    [Fact]
    public void Of_WeightZero_IsAsIfTheRowWereNotThere()
    {
        Sample sample = Sample.Of([-100, 1, 2, 900], new SampleOptions { Weights = new double[] { 0, 1, 1, 0 } });
        Assert.Equal((2, 2, 1.0, 2.0), (sample.Count, sample.Weightless, sample.Minimum, sample.Maximum));
        Assert.Equal([1.0, 1.0], sample.Weights.ToArray());
    }

    [Fact]
    public void Of_MissingWithWeights_LosesItsWeight()
    {
        Sample sample = Sample.Of([1, double.NaN, 3], new SampleOptions { Weights = new double[] { 1, 50, 3 }, Missing = MissingValues.LeaveOut });
        Assert.Equal((1, 4.0, 2.5), (sample.LeftOut, sample.TotalWeight, sample.Mean));
    }

    [Theory]
    [InlineData(new double[0], new double[0], "values must hold at least one number, but is empty: pass")]
    [InlineData(new[] { 1.0, double.PositiveInfinity }, new double[0], "values[1] is Infinity: values must be finite; mend")]
    [InlineData(new[] { 1.0, double.NegativeInfinity, double.NaN }, new double[0], "values[1] is -Infinity: values must be finite; mend")]
    [InlineData(new[] { 1.0, double.NaN, 2, double.NaN }, new double[0], "values[1] is NaN, 2 of 4 values in all: leave missing values out with Missing = MissingValues.LeaveOut.")]
    [InlineData(new[] { 1.0, 2 }, new[] { 1.0 }, "Weights must have one entry per value: there are 2 values and 1 weights: pass")]
    [InlineData(new[] { 1.0, 2 }, new[] { 1.0, -1 }, "Weights[1] is -1: weights must be finite and not negative; use 0")]
    [InlineData(new[] { 1.0, 2 }, new[] { double.NaN, 1 }, "Weights[0] is NaN: weights must be finite and not negative; use 0")]
    [InlineData(new[] { 1.0, 2 }, new[] { 0.0, 0 }, "Weights of the values kept sum to 0: at least one")]
    [InlineData(new[] { 1.0, 2 }, new[] { 1e308, 1e308 }, "Weights of the values kept sum to Infinity: at least one must be above zero and the sum finite")]
    public void Of_BadInput_SaysWhatWhereAndHow(double[] values, double[] weights, string message)
    {
        ArgumentException error = Assert.Throws<ArgumentException>(() => Sample.Of(values, new SampleOptions { Weights = weights }));
        Assert.StartsWith(message, error.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Of_OtherBadInput_IsRefused()
    {
        Assert.StartsWith("Weights[1] is 1.5: counts must be whole", Assert.Throws<ArgumentException>(() => Sample.Of([1, 2], new SampleOptions { Weights = new[] { 1, 1.5 }, WeightMeaning = WeightMeaning.Counts })).Message, StringComparison.Ordinal);
        Assert.StartsWith("all 2 values are missing", Assert.Throws<ArgumentException>(() => Sample.Of([double.NaN, double.NaN], new SampleOptions { Missing = MissingValues.LeaveOut })).Message, StringComparison.Ordinal);
        Assert.Throws<ArgumentException>(() => Sample.Of([1], new SampleOptions { Missing = (MissingValues)7 }));
        Assert.Throws<ArgumentNullException>(() => Sample.Of((double[])null!));
        Assert.Throws<ArgumentNullException>(() => Sample.Of((IEnumerable<double?>)null!));
        foreach (double p in new[] { -0.1, 1.1, double.NaN })
        {
            Assert.Throws<ArgumentOutOfRangeException>(() => Sample.Of([1, 2]).Quantile(p));
        }
    }

    private static Arbitrary<(double Value, int Count)[]> Weighted() =>
        Gen.Choose(-40, 40).Zip(Gen.Choose(1, 9)).Select(pair => (Value: pair.Item1 / 4.0, Count: pair.Item2)).NonEmptyListOf().Select(list => list.ToArray()).ToArbitrary();
}
