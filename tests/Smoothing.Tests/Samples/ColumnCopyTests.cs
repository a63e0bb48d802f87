using Smoothing.Samples;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Samples;

[Trait("Category", "Widths")]
public class ColumnCopyTests
{
    [Fact]
    public void TryCopy_EveryLength_CopiesAndFindsTheRange()
    {
        double[] values = HardSamples.Make("heavy", 256);
        for (int count = 1; count <= values.Length; count++)
        {
            var copy = new double[count];
            Assert.True(ColumnCopy.TryCopy(values.AsSpan(0, count), copy, out double least, out double greatest));
            Assert.Equal(values[..count], copy);
            Assert.Equal((values[..count].Min(), values[..count].Max()), (least, greatest));
        }
    }

    [Theory]
    [InlineData(double.NaN)]
    [InlineData(double.PositiveInfinity)]
    [InlineData(double.NegativeInfinity)]
    public void TryCopy_OneUnusableValueAnywhere_IsSeen(double odd)
    {
        for (int count = 1; count <= 40; count++)
        {
            for (int at = 0; at < count; at++)
            {
                double[] values = HardSamples.Make("normal", count);
                values[at] = odd;
                Assert.False(ColumnCopy.TryCopy(values, new double[count], out _, out _), $"{odd} at {at} of {count}");
            }
        }
    }

    [Fact]
    public void TryCopy_LargestNumbersAndNegativeZero_AreTaken()
    {
        double[] values = [double.MaxValue, double.MinValue, -0.0, double.Epsilon, double.MaxValue, double.MaxValue, 1, 2, -0.0];
        var copy = new double[values.Length];
        Assert.True(ColumnCopy.TryCopy(values, copy, out double least, out double greatest));
        Assert.Equal((double.MinValue, double.MaxValue), (least, greatest));
        Assert.False(double.IsNegative(copy[2]) || double.IsNegative(copy[8]));
    }
}
