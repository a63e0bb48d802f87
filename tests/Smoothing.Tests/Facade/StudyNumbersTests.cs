using Smoothing.Numerics;

namespace Smoothing.Tests.Facade;

/// <summary>Numbers as a reader sees them; every expectation worked out by hand from the rule "two digits of the error, the value to the same place".</summary>
public class StudyNumbersTests
{
    [Theory]
    [InlineData(22.3356, 2.03, "22.3")]
    [InlineData(22.3356, 0.234, "22.34")]
    [InlineData(22.3356, 23.4, "22")]
    [InlineData(1234.5, 230, "1230")]
    [InlineData(123456.7, 230, "123,460")]
    [InlineData(123456.7, 0.23, "123,456.70")]
    [InlineData(0.5, 0.0996, "0.50")]
    [InlineData(0.5, 0.0994, "0.500")]
    [InlineData(-0.0004, 0.05, "0.000")]
    [InlineData(-3.14159, 0.05, "−3.142")]
    [InlineData(5, 0, "5")]
    [InlineData(0.1, 0, "0.1")]
    [InlineData(1.886e-9, 5e-11, "1.886 × 10⁻⁹")]
    [InlineData(2.5e18, 1e16, "2.5 × 10¹⁸")]
    [InlineData(1e-9, 1e-10, "10⁻⁹")]
    public void Rounded_ValueAndError_ShowsTwoDigitsOfTheError(double value, double error, string expected) => Assert.Equal(expected, StudyNumbers.Rounded(value, error));

    [Theory]
    [InlineData(1.0 / 9, "about one in nine")]
    [InlineData(0.115, "about one in nine")]
    [InlineData(0.119, "about one in eight")]
    [InlineData(0.178, "")]
    [InlineData(0.41, "about two in five")]
    [InlineData(0.5, "about one in two")]
    [InlineData(0.66, "about two in three")]
    [InlineData(0.97, "")]
    [InlineData(0.0029, "about one in 350")]
    [InlineData(0.0, "none")]
    [InlineData(1.0, "all")]
    public void OneIn_Share_IsSaidOnlyWhereItIsTrue(double share, string expected) => Assert.Equal(expected, StudyNumbers.OneIn(share));

    // The words must never be narrower than the interval.
    [Theory]
    [InlineData(0.104, 0.159, "between one in ten and one in six")]
    [InlineData(0.09, 0.2, "between one in twelve and one in five")]
    [InlineData(0.05, 0.37, "")]
    [InlineData(0.0, 0.1, "")]
    [InlineData(0.001, 0.1, "")]
    public void OneInRange_Interval_IsRoundedOutwards(double lower, double upper, string expected)
    {
        Assert.Equal(expected, StudyNumbers.OneInRange(new Interval(lower, upper)));
    }

    [Theory]
    [InlineData(-0.7, 2.9, 1.8, "−0.7 to +2.9 mm")]
    [InlineData(0.0, 4.0, 2.0, "0.0 to +4.0 mm")]
    [InlineData(double.NegativeInfinity, 3.0, 1.0, "at most +3.0 mm")]
    [InlineData(-3.0, double.PositiveInfinity, 1.0, "at least −3.0 mm")]
    [InlineData(double.NegativeInfinity, double.PositiveInfinity, 1.0, "any amount")]
    public void SignedRange_Interval_ShowsSigns(double lower, double upper, double error, string expected) => Assert.Equal(expected, StudyNumbers.SignedRange(new Interval(lower, upper), error, "mm"));

    [Theory]
    [InlineData(10.0, 20.0, 1.5, "10.0 to 20.0 min")]
    [InlineData(52.0, double.PositiveInfinity, 1.0, "at least 52.0 min")]
    [InlineData(double.NegativeInfinity, 3.0, 1.0, "at most 3.0 min")]
    [InlineData(double.NegativeInfinity, double.PositiveInfinity, 1.0, "cannot be said")]
    [InlineData(5.0, 5.0, 0.0, "5 to 5 min")]
    public void Range_Interval_SaysMissingEnds(double lower, double upper, double error, string expected) => Assert.Equal(expected, StudyNumbers.Range(new Interval(lower, upper), error, "min"));

    [Theory]
    [InlineData(0.13, 0.0275, "13.0 %")]
    [InlineData(0.17, 0.16, "17 %")]
    [InlineData(0.0, 0.01, "0 %")]
    [InlineData(1.0, 0.01, "100 %")]
    [InlineData(0.033571, 0.00035, "3.357 %")]
    public void Percent_ShareAndError_ShowsTwoDigitsOfTheError(double share, double error, string expected) => Assert.Equal(expected, StudyNumbers.Percent(share, error));

    [Fact]
    public void Listed_Parts_ReadAsAList()
    {
        Assert.Equal("", StudyNumbers.Listed([]));
        Assert.Equal("a", StudyNumbers.Listed(["a"]));
        Assert.Equal("a and b", StudyNumbers.Listed(["a", "b"]));
        Assert.Equal("a, b and c", StudyNumbers.Listed(["a", "b", "c"]));
    }

    [Theory]
    [InlineData(0, 100, 8)]
    [InlineData(-3.7, 12.1, 8)]
    [InlineData(1e9, 1.0000001e9, 8)]
    [InlineData(1e-12, 5e-12, 6)]
    [InlineData(0, 1e18, 6)]
    public void Ticks_AnyRange_AreRoundInsideAndApart(double from, double to, int wanted)
    {
        (double[] ticks, int decimals) = AxisTicks.Between(from, to, wanted);
        Assert.InRange(ticks.Length, 2, 2 * wanted);
        Assert.All(ticks, t => Assert.InRange(t, from - (1e-9 * (to - from)), to + (1e-9 * (to - from))));
        Assert.Equal(ticks.Length, ticks.Select(t => AxisTicks.Label(t, decimals)).Distinct().Count());
    }
}
