using Smoothing.Estimation;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Bandwidths;

/// <summary>The spectrum against plain double sums over all pairs.</summary>
public class EmpiricalSpectrumTests
{
    [Theory]
    [InlineData(0, 0.05)]
    [InlineData(0, 1.0)]
    [InlineData(2, 0.2)]
    [InlineData(3, 0.6)]
    [InlineData(7, 0.4)]
    public void Roughness_AgainstDoubleSum_AgreesToTenDigits(int derivative, double scale)
    {
        double[] x = [.. BadInputTests.Normal(120, 3).Order()];
        double[] m = [.. x.Select((_, i) => 1.0 + (i % 4))];
        double total = m.Sum();
        m = [.. m.Select(v => v / total)];
        double n = 1 / m.Sum(v => v * v);
        EmpiricalSpectrum spectrum = EmpiricalSpectrum.Of(x, m, n, 0.05, 1.0);
        double all = 0, others = 0;
        for (int i = 0; i < x.Length; i++)
        {
            for (int j = 0; j < x.Length; j++)
            {
                double term = m[i] * m[j] * PairTerm(derivative, scale, x[i] - x[j]);
                all += term;
                others += i == j ? 0 : term;
            }
        }

        Near.Relative(all, spectrum.Roughness(derivative, scale), 1e-10);
        Near.Relative(others / (1 - (1 / n)), spectrum.RoughnessWithoutOwn(derivative, scale), 1e-9);
    }

    [Fact]
    public void Roughness_FarClusters_IgnoresTheGap()
    {
        double[] x = [.. BadInputTests.Normal(100, 4).Order()];
        double[] far = [.. x, .. x.Select(v => (v / 2) + 1e6)];
        double[] m = [.. far.Select(_ => 1.0 / far.Length)];
        EmpiricalSpectrum spectrum = EmpiricalSpectrum.Of(far, m, far.Length, 0.05, 0.5);
        Assert.Equal(1, spectrum.Map.Count);
        double sum = 0;
        foreach (double a in far)
        {
            sum += far.Sum(b => PairTerm(2, 0.2, a - b)) / far.Length / far.Length;
        }

        Near.Relative(sum, spectrum.Roughness(2, 0.2), 1e-9);
    }

    [Fact]
    public void OnCircle_ManyValues_AgreesWithItsTwoHalves()
    {
        // More than 200,000 values are rounded to nodes, either half is spread exactly, and φ of the whole is the mean of the halves'.
        double[] x = [.. BadInputTests.Normal(240_000, 6).Order()];
        double[] m = [.. Enumerable.Repeat(1.0 / x.Length, x.Length)];
        double[] half = [.. Enumerable.Repeat(2.0 / x.Length, x.Length / 2)];
        EmpiricalSpectrum whole = EmpiricalSpectrum.OnCircle(x, m, x.Length, -8, 16, 0.002);
        EmpiricalSpectrum left = EmpiricalSpectrum.OnCircle(x[..120_000], half, x.Length, -8, 16, 0.002);
        EmpiricalSpectrum right = EmpiricalSpectrum.OnCircle(x[120_000..], half, x.Length, -8, 16, 0.002);
        // Rounding moves a value by at most half a node, 16/65536/√12 on the root mean square: 5 standard errors at t = 40 are 3e-5.
        for (int k = 0; k < 100; k++)
        {
            Near.Absolute((left.Real[k] + right.Real[k]) / 2, whole.Real[k], 3e-5);
            Near.Absolute((left.Imaginary[k] + right.Imaginary[k]) / 2, whole.Imaginary[k], 3e-5);
        }
    }

    // (−1)^s φ_{g√2}^{(2s)}(d): the overlap of two s-th derivatives of Gaussians of scale g.
    private static double PairTerm(int s, double g, double d)
    {
        double scale = g * Math.Sqrt(2);
        double u = d / scale;
        double below = 0, hermite = 1;
        for (int r = 0; r < 2 * s; r++)
        {
            (below, hermite) = (hermite, (u * hermite) - (r * below));
        }

        return (s % 2 == 0 ? 1 : -1) * hermite * Math.Exp(-0.5 * u * u) / Math.Sqrt(2 * Math.PI) / Math.Pow(scale, (2 * s) + 1);
    }
}
