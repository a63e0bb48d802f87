using System.Numerics;
using MathNet.Numerics.IntegralTransforms;
using Smoothing.Numerics;

namespace Smoothing.Tests.Numerics;

/// <summary>Against MathNet.Numerics' transform, and against single waves whose transform is known.</summary>
public class StockhamTransformTests
{
    [Fact]
    public void Forward_EveryPowerOfTwo_IsTheLibrarysTransform()
    {
        for (int log = 0; log <= 15; log++)
        {
            int n = 1 << log;
            var random = new RandomStream((ulong)log + 1);
            double[] real = new double[n], imaginary = new double[n];
            var expected = new Complex[n];
            for (int i = 0; i < n; i++)
            {
                real[i] = random.NextNormal();
                imaginary[i] = random.NextNormal();
                expected[i] = new Complex(real[i], imaginary[i]);
            }

            (double[] first, double[] second) = ([.. real], [.. imaginary]);
            Fourier.Forward(expected, FourierOptions.AsymmetricScaling);
            FourierPlan.Forward(real, imaginary);
            double size = 1e-15 * Math.Sqrt(n) * (log + 2);
            for (int i = 0; i < n; i++)
            {
                Assert.True(Math.Abs(expected[i].Real - real[i]) <= size && Math.Abs(expected[i].Imaginary - imaginary[i]) <= size, $"N = {n}, {i}: {expected[i]} and {real[i]}, {imaginary[i]}");
            }

            FourierPlan.Inverse(real, imaginary);
            for (int i = 0; i < n; i++)
            {
                Assert.True(Math.Abs(first[i] - real[i]) <= 1e-15 * (log + 4) && Math.Abs(second[i] - imaginary[i]) <= 1e-15 * (log + 4), $"N = {n}, back at {i}");
            }
        }
    }

    [Theory]
    [InlineData(4)]
    [InlineData(8)]
    [InlineData(64)]
    [InlineData(2048)]
    public void Forward_OneWave_HasOneLine(int n)
    {
        int wave = (n / 4) + 1;
        double[] real = new double[n], imaginary = new double[n];
        for (int i = 0; i < n; i++)
        {
            (imaginary[i], real[i]) = Math.SinCos(2 * Math.PI * ((long)wave * i % n) / n);
        }

        FourierPlan.Forward(real, imaginary);
        for (int k = 0; k < n; k++)
        {
            Assert.Equal(k == wave ? n : 0, real[k], 1e-12);
            Assert.Equal(0, imaginary[k], 1e-12);
        }
    }

    [Theory]
    [InlineData(3)]
    [InlineData(12)]
    [InlineData(1000)]
    public void Forward_OtherLengths_GoToTheLibrary(int n)
    {
        double[] real = [.. Enumerable.Range(0, n).Select(i => (double)i)], imaginary = new double[n];
        FourierPlan.Forward(real, imaginary);
        Assert.Equal(n * (n - 1) / 2.0, real[0], 1e-9);
        FourierPlan.Inverse(real, imaginary);
        Assert.Equal(n - 1, real[^1], 1e-9);
    }
}
