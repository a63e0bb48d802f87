using Smoothing.Samples;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Samples;

/// <summary>
/// What the sample notices in open data. The expected steps are facts about how the data were taken: sources in Data/README.md;
/// 1 inch = 25.4 mm (1959 definition) and 1 °F = 5/9 °C for the two weather series, which the station reports in inches and °F.
/// </summary>
public class SampleEvidenceTests
{
    [Theory]
    [InlineData("faithful_waiting_272", 1, 1)]
    [InlineData("faithful_eruptions_272", 1 / 60.0, 0.001)]
    [InlineData("flight_delay_20k", 1, 1)]
    [InlineData("us_births_daily_1994_2003", 1, 1)]
    [InlineData("airquality_ozone_116", 1, 1)]
    [InlineData("newcomb_66", 1, 1)]
    [InlineData("cps_wages_534", 0.01, 0.01)]
    [InlineData("chondrite_22", 0.01, 0.01)]
    [InlineData("earthquake_mag_week", 0.01, 0.01)]
    [InlineData("penguin_flipper_342", 1, 1)]
    [InlineData("penguin_bodymass_342", 25, 1)]
    [InlineData("seattle_precip_1461", 0.254, 0.1)]
    [InlineData("seattle_tempmax_1461", 5 / 9.0, 0.1)]
    [InlineData("six_points", 0.1, 0.1)]
    public void RoundingUnit_OpenData_IsTheStepOfTheInstrument(string name, double step, double printed)
    {
        RoundingUnit? unit = Sample.Of(TestData.Load(name)).RoundingUnit;
        Assert.NotNull(unit);
        Near.Relative(step, unit.Step, 1e-12, name);
        Near.Relative(printed, unit.PrintedStep, 1e-12, name);
        Assert.InRange(unit.Share, 0.95, 1);
        Assert.InRange(unit.ExpectedShare, 0, 0.4);
    }

    [Theory]
    [InlineData("penguin_bodymass_342", 50, 0.5)]
    [InlineData("earthquake_mag_week", 0.1, 0.3)]
    [InlineData("cps_wages_534", 0.05, 0.5)]
    public void HeapingUnit_HeapedData_IsFoundWithItsExcess(string name, double step, double leastExcess)
    {
        Sample sample = Sample.Of(TestData.Load(name));
        HeapingUnit? heaping = sample.HeapingUnit;
        Assert.NotNull(heaping);
        Near.Relative(step, heaping.Step, 1e-12, name);
        Assert.InRange(heaping.Excess, leastExcess, 1);
        double onStep = sample.Values.ToArray().Average(x => Math.Abs((x / step) - Math.Round(x / step)) < 1e-6 ? 1 : 0);
        Near.Absolute(onStep, heaping.Share, 1e-12, "share on the step, counted directly");
    }

    [Theory]
    [InlineData("faithful_waiting_272")]
    [InlineData("faithful_eruptions_272")]
    [InlineData("us_births_daily_1994_2003")]
    [InlineData("newcomb_66")]
    [InlineData("six_points")]
    public void HeapingUnit_EvenlyReadData_IsNull(string name) => Assert.Null(Sample.Of(TestData.Load(name)).HeapingUnit);

    [Fact]
    public void Atoms_DailyRain_IsTheDryDays()
    {
        double[] rain = TestData.Load("seattle_precip_1461");
        Sample sample = Sample.Of(rain);
        Atom atom = Assert.Single(sample.Atoms);
        Assert.Equal(0, atom.Value);
        Near.Relative(rain.Count(x => x == 0) / 1461.0, atom.Share, 1e-12);
        Near.Relative(rain.Count(x => x == 0.3) / 1461.0, atom.NeighbourShare, 1e-12, "0.3 mm is the fullest of the three places above");
        Assert.Equal(atom, sample.PilingAtMinimum);
        Assert.Null(sample.PilingAtMaximum);
    }

    [Theory]
    [InlineData("faithful_waiting_272")]
    [InlineData("cps_wages_534")]
    [InlineData("flight_delay_20k")]
    [InlineData("penguin_bodymass_342")]
    [InlineData("seattle_tempmax_1461")]
    [InlineData("us_births_daily_1994_2003")]
    [InlineData("newcomb_66")]
    [InlineData("six_points")]
    public void Atoms_OtherData_AreNone(string name)
    {
        Sample sample = Sample.Of(TestData.Load(name));
        Assert.Empty(sample.Atoms);
        Assert.Null(sample.PilingAtMinimum);
        Assert.Null(sample.PilingAtMaximum);
    }

    [Theory]
    [InlineData("faithful_waiting_272")]
    [InlineData("us_births_daily_1994_2003")]
    [InlineData("six_points")]
    public void TiedShare_OpenData_CountsTheRepeated(string name)
    {
        double[] values = TestData.Load(name);
        double expected = values.GroupBy(x => x).Where(group => group.Count() > 1).Sum(group => group.Count()) / (double)values.Length;
        Near.Absolute(expected, Sample.Of(values).TiedShare, 1e-15);
    }

    [Fact]
    public void PilingAtMaximum_ClippedValues_IsTheClip()
    {
        double[] values = Array.ConvertAll(SeededColumns.Draw("normal", 500, 3), x => Math.Min(x, 1.5));
        Atom? piling = Sample.Of(values).PilingAtMaximum;
        Assert.NotNull(piling);
        Assert.Equal(1.5, piling.Value);
        Near.Absolute(values.Count(x => x == 1.5) / 500.0, piling.Share, 1e-15);
        Assert.Null(Sample.Of(values).PilingAtMinimum);
    }

    [Fact]
    public void LagOneCorrelation_AutoregressiveSeries_IsItsCoefficient()
    {
        // AR(1) with coefficient 0.6: standard error √((1 − 0.36)/n) = 0.0113 at n = 5,000 (Bartlett's formula); tolerance five of them.
        double[] noise = SeededColumns.Draw("normal", 5000, 11);
        var series = new double[noise.Length];
        for (int i = 1; i < series.Length; i++)
        {
            series[i] = (0.6 * series[i - 1]) + noise[i];
        }

        Near.Absolute(0.6, Sample.Of(series).LagOneCorrelation, 0.057);
        Sample shuffled = Sample.Of(noise);
        Assert.True(Math.Abs(shuffled.LagOneCorrelation) < 2 * shuffled.LagOneLimit);
        Assert.Equal(2 / Math.Sqrt(5000), shuffled.LagOneLimit);
    }

    [Fact]
    public void LagOneCorrelation_SmallCases_AreByHand()
    {
        // Mean 2.5, deviations −1.5 −0.5 0.5 1.5: products 0.75 − 0.25 + 0.75 over squares 5.
        Near.Relative(0.25, Sample.Of([1, 2, 3, 4]).LagOneCorrelation, 1e-14);
        Assert.Equal(0, Sample.Of([1, 2]).LagOneCorrelation);
        Assert.Equal(0, Sample.Of([3, 3, 3, 3]).LagOneCorrelation);
        Near.Relative(0.25, Sample.Of([1e308, 1.1e308, 1.2e308, 1.3e308]).LagOneCorrelation, 1e-12);
    }
}
