using System.Runtime.Intrinsics;
using Smoothing.Numerics;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Numerics;

[Trait("Category", "Widths")]
public class VectorExpTests
{
    // Against the Taylor series in 31-digit arithmetic.
    [Fact]
    public void Of_WholeRange_IsWithinTwoUnitsInTheLastPlace()
    {
        var random = new RandomStream(11);
        for (int i = 0; i < 20_000; i++)
        {
            double x = i % 4 == 0 ? (1400 * random.NextUniform()) - 700 : -700 * Math.Pow(random.NextUniform(), 4);
            double actual = VectorExp.Of(Vector256.Create(x))[i % 4];
            DoubleDouble expected = DoubleDouble.Exp(x);
            double error = Math.Abs((double)((expected - actual) / expected));
            Assert.True(error <= 2 * 2.3e-16, $"e^{x:R}: relative error {error:E2}");
        }
    }

    [Fact]
    public void Of_SpecialArguments_GivesOneAndZero()
    {
        Assert.Equal(1, VectorExp.Of(Vector256.Create(0.0))[0]);
        Assert.Equal(0, VectorExp.Of(Vector256.Create(-709.0))[1]);
        Assert.Equal(0, VectorExp.Of(Vector256.Create(-1e300))[2]);
        Assert.Equal(0, VectorExp.Of(Vector256.Create(double.NegativeInfinity))[3]);
    }
}
