using Smoothing.Samples;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Samples;

/// <summary>Seeded columns, rounded and not: what is found and how rarely something is found that is not there.</summary>
public class SampleRoundingTests
{
    [Theory]
    [InlineData(50)]
    [InlineData(300)]
    [InlineData(3000)]
    public void Evidence_UnroundedColumns_IsNone(int n)
    {
        // 6 shapes × 50 seeds: 300 samples a size, none may speak up.
        foreach (string shape in SeededColumns.Shapes)
        {
            for (int seed = 0; seed < 50; seed++)
            {
                Sample sample = Sample.Of(SeededColumns.Draw(shape, n, seed));
                Assert.Null(sample.RoundingUnit);
                Assert.Null(sample.HeapingUnit);
                Assert.Empty(sample.Atoms);
                Assert.Null(sample.PilingAtMinimum);
                Assert.Null(sample.PilingAtMaximum);
                Assert.Equal(0, sample.TiedShare);
            }
        }
    }

    [Theory]
    [InlineData("0.05")]
    [InlineData("0.1")]
    [InlineData("0.15")]
    [InlineData("0.25")]
    [InlineData("0.5")]
    [InlineData("1")]
    public void Evidence_RoundedColumns_IsTheStepAndNothingElse(string text)
    {
        decimal step = decimal.Parse(text, System.Globalization.CultureInfo.InvariantCulture);
        foreach (string shape in SeededColumns.Shapes)
        {
            for (int seed = 0; seed < 35; seed++)
            {
                Sample sample = Sample.Of(SeededColumns.Round(SeededColumns.Draw(shape, 400, 1000 + seed), step));
                Near.Relative((double)step, sample.RoundingUnit?.Step ?? double.NaN, 1e-12, $"{shape} {seed}");
                Assert.True(sample.HeapingUnit is null, $"{shape} {seed} {sample.HeapingUnit}");
                Assert.Empty(sample.Atoms);
            }
        }
    }

    [Theory]
    [InlineData(1 / 3.0)]
    [InlineData(0.0123456789)]
    [InlineData(271.8281828)]
    [InlineData(1e-12)]
    public void RoundingUnit_ScaledGrid_IsTheScaledStep(double scale)
    {
        double[] values = Array.ConvertAll(SeededColumns.Round(SeededColumns.Draw("normal", 200, 5), 0.1m), x => Math.Round(x * 10) * scale);
        Near.Relative(scale, Sample.Of(values).RoundingUnit?.Step ?? double.NaN, 1e-9);
    }

    [Fact]
    public void RoundingUnit_SinglePrecisionDecimals_IsTheDecimalStep()
    {
        double[] values = Array.ConvertAll(SeededColumns.Round(SeededColumns.Draw("normal", 200, 6), 0.1m), x => (double)(float)x);
        Near.Relative(0.1, Sample.Of(values).RoundingUnit?.Step ?? double.NaN, 1e-12);
    }

    [Theory]
    [InlineData(0.96, true)]
    [InlineData(0.90, false)]
    public void RoundingUnit_PartOffTheGrid_NeedsNinetyFivePercent(double share, bool found)
    {
        double[] values = SeededColumns.Draw("normal", 1000, 8);
        double[] rounded = SeededColumns.Round(values, 0.25m);
        double[] mixed = values.Select((x, i) => i < share * 1000 ? rounded[i] : x).ToArray();
        Sample sample = Sample.Of(mixed);
        if (found)
        {
            Assert.Equal(0.25, sample.RoundingUnit!.Step);
            Near.Absolute(share, sample.RoundingUnit.Share, 1e-9);
        }
        else
        {
            Assert.Null(sample.RoundingUnit);
        }
    }

    [Theory]
    [InlineData(200, 0.3, 0.25)]
    [InlineData(2000, 0.1, 0.5)]
    [InlineData(1000, 0.6, 0.5)]
    public void HeapingUnit_PartOnAGridTheRestUnrounded_IsTheGridAndItsShare(int n, double share, double step)
    {
        double[] values = SeededColumns.Draw("normal", n, 21);
        double[] rounded = SeededColumns.Round(values, (decimal)step);
        Sample sample = Sample.Of(values.Select((x, i) => i < share * n ? rounded[i] : x).ToArray());
        Assert.Null(sample.RoundingUnit);
        Assert.Equal(step, sample.HeapingUnit!.Step);

        // Zeros are not evidence of a step and are left aside: at most a share step · φ(0) of the rounded ones.
        Assert.InRange(sample.HeapingUnit.Share, share * (1 - (0.45 * step)) - 0.05, share + 1e-9);
        Assert.Empty(sample.Atoms);
    }

    [Fact]
    public void HeapingUnit_MinutesHeapedOnFive_IsFiveWithTheMovedShare()
    {
        double[] values = Array.ConvertAll(SeededColumns.Draw("normal", 1200, 4), x => Math.Round(60 + (15 * x)));
        double[] heaped = values.Select((x, i) => i % 4 == 0 ? 5 * Math.Round(x / 5) : x).ToArray();
        Sample sample = Sample.Of(heaped);
        Assert.Equal(1, sample.RoundingUnit!.Step);
        Assert.Equal(5, sample.HeapingUnit!.Step);

        // A quarter was rounded to 5: 0.25 + 0.75/5 = 0.4 lies there, 0.15 a place beside. The excess is the share on it times 5/4, less 1/4:
        // standard error 1.25·√(0.4·0.6/1200) = 0.018, four of them.
        Near.Absolute(0.25, sample.HeapingUnit.Excess, 0.072);
        Assert.Null(Sample.Of(values).HeapingUnit);
    }

    [Fact]
    public void Atoms_TwoValuesInAnUnroundedRest_AreBothFound()
    {
        double[] values = SeededColumns.Draw("normal", 1000, 9);
        Array.Fill(values, 0, 0, 100);
        Array.Fill(values, 1.7, 200, 60);
        Assert.Equal([(0, 0.1), (1.7, 0.06)], Sample.Of(values).Atoms.Select(atom => (atom.Value, atom.Share)));
    }

    [Fact]
    public void Evidence_DegenerateSamples_IsNone()
    {
        foreach (Sample sample in new[] { Sample.Of([5]), Sample.Of([5, 5, 5, 5, 5, 5, 5, 5, 5, 5]), Sample.Of([0, 0, 0]), Sample.Of([-1e308, 1e308, 3e300]) })
        {
            Assert.Empty(sample.Atoms);
            Assert.Null(sample.HeapingUnit);
            Assert.Null(sample.PilingAtMinimum);
        }

        Assert.Null(Sample.Of([0, 0, 0]).RoundingUnit);
        Assert.Equal(1, Sample.Of([5, 5]).TiedShare);
    }

    // In the tolerance of single precision about 1e9 every value of the first group would pass for 0.
    [Fact]
    public void RoundingUnit_TwoGroupsFarApart_IsNoGiantStep()
    {
        double[] near = SeededColumns.Draw("normal", 300, 3);
        Sample sample = Sample.Of([.. near, .. near.Select(x => 1e9 + (3 * x))]);
        Assert.True(sample.RoundingUnit is not { Step: > 1e-3 }, $"step {sample.RoundingUnit?.Step}");
    }
}
