using FsCheck.Xunit;
using Smoothing.Kernels;
using Smoothing.Tests.Support;
using Smoothing.Theory;

namespace Smoothing.Tests.Theory;

/// <summary>Exact errors of random kernels on random mixtures against integrals by the tests' own code.</summary>
public class ErrorTheoryPropertyTests
{
    [Property(MaxTest = 80, Replay = "1992,711")]
    public void BiasAndVariance_RandomCase_AreTheDirectIntegrals(int seed)
    {
        var c = new RandomCase(seed);
        var theory = new ErrorTheory(c.Kernel, c.Target);
        double f = c.F(c.X);
        double mean = c.Convolve(c.Kernel.Value, c.X);
        double square = c.Convolve(u => c.Kernel.Value(u) * c.Kernel.Value(u), c.X) / c.H;
        double top = Enumerable.Range(0, c.Means.Length).Max(i => c.F(c.Means[i]));
        Near.Absolute(mean - f, theory.Bias(c.X, c.H), 2e-13 * top, "bias " + c);
        double variance = (square - (mean * mean)) / c.N;
        Near.Absolute(variance, theory.Variance(c.X, c.H, c.N), 1e-11 * (square + (mean * mean)) / c.N, "variance " + c);
        double error = ((mean - f) * (mean - f)) + variance;
        Near.Absolute(error, theory.MeanSquaredError(c.X, c.H, c.N), 1e-11 * error + (4e-13 * top * Math.Abs(mean - f)) + (1e-11 * mean * mean / c.N), "MSE " + c);
    }

    [Property(MaxTest = 100, Replay = "1992,711")]
    public void Mise_RandomCase_IsTheSpectralIntegral(int seed)
    {
        var c = new RandomCase(seed);
        var theory = new ErrorTheory(c.Kernel, c.Target);
        double bias2 = c.Spectral(k => (1 - k) * (1 - k));
        double mean2 = c.Spectral(k => k * k);
        double whole = c.Spectral(_ => 1);
        Near.Absolute(bias2, theory.IntegratedSquaredBias(c.H), 1e-10 * bias2 + (1e-13 * Math.Sqrt(bias2 * whole)), "ISB " + c);
        double variance = ((c.Kernel.Roughness() / c.H) - mean2) / c.N;
        Near.Absolute(variance, theory.IntegratedVariance(c.H, c.N), 1e-10 * ((c.Kernel.Roughness() / c.H) + mean2) / c.N, "IV " + c);
        Near.Relative(bias2 + variance, theory.Mise(c.H, c.N), 1e-9, "MISE " + c);
    }
}
