using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Theory;

namespace Smoothing.Tests.Theory;

/// <summary>A random kernel, a random mixture of one to four normals, a bandwidth over five decades, a point and a number of observations.</summary>
internal sealed class RandomCase
{
    private static readonly Kernel[] s_kernels =
    [
        .. Kernel.Standard, Kernel.GaussianOfOrder(4), Kernel.GaussianOfOrder(6), Kernel.GaussianOfOrder(8), Kernel.PolynomialOfOrder(4), Kernel.PolynomialOfOrder(6),
    ];

    public RandomCase(int seed)
    {
        var random = new RandomStream((ulong)(uint)seed, 404);
        Kernel = s_kernels[random.NextIndex(s_kernels.Length)];
        int parts = 1 + random.NextIndex(4);
        double[] raw = new double[parts];
        Means = new double[parts];
        Deviations = new double[parts];
        for (int i = 0; i < parts; i++)
        {
            raw[i] = 0.05 + random.NextUniform();
            Means[i] = 6 * (random.NextUniform() - 0.5);
            Deviations[i] = Math.Pow(10, (1.5 * random.NextUniform()) - 1.2);
        }

        double sum = raw.Sum();
        Weights = [.. raw.Select(w => w / sum)];
        Weights[0] += 1 - Weights.Sum();
        Target = new NormalMixture(Weights, Means, Deviations);
        H = Math.Pow(10, (5 * random.NextUniform()) - 4);
        N = 1 + random.NextIndex(100_000);
        X = Means[0] + (Deviations[0] * 6 * (random.NextUniform() - 0.5));
    }

    public Kernel Kernel { get; }

    public double[] Weights { get; }

    public double[] Means { get; }

    public double[] Deviations { get; }

    public NormalMixture Target { get; }

    public double H { get; }

    public long N { get; }

    public double X { get; }

    /// <summary>Beyond this the kernel is nothing to a double.</summary>
    public double Radius => double.IsFinite(Kernel.SupportRadius) ? Kernel.SupportRadius : 48;

    /// <summary>f from the textbook, not from the library.</summary>
    public double F(double x)
    {
        double sum = 0;
        for (int i = 0; i < Weights.Length; i++)
        {
            double u = (x - Means[i]) / Deviations[i];
            sum += Weights[i] * Math.Exp(-u * u / 2) / (Deviations[i] * Math.Sqrt(2 * Math.PI));
        }

        return sum;
    }

    /// <summary>∫ w(u) f(x − hu) du by the tests' integrator.</summary>
    public double Convolve(Func<double, double> w, double x)
    {
        // Cut where the kernel has its kink and where the components have their middles and shoulders, seen from x in bandwidths.
        IEnumerable<double> cuts = Means.SelectMany((m, i) => new[] { -9.0, -4, -1.5, 0, 1.5, 4, 9 }.Select(c => (x - m - (c * Deviations[i])) / H));
        return OwnIntegral.Of(u => w(u) * F(x - (H * u)), -Radius, Radius, cuts.Concat([0, -1, 1, -3, 3, -8, 8]));
    }

    /// <summary>(1/2π) ∫ |φ_f(t)|² w(κ(ht)) dt by the trapezoidal rule, which converges exponentially here.</summary>
    public double Spectral(Func<double, double> w)
    {
        // Nothing is left beyond 8.8 of the smallest deviation; the step keeps the periods of the autocorrelation and of the kernel apart.
        double end = 8.8 / Deviations.Min();
        double length = 14 + (18 * Deviations.Max()) + (4 * H * Radius);
        int count = (int)Math.Ceiling(end * length / (2 * Math.PI));
        double step = end / count;
        double sum = 0.5 * w(1);
        for (int i = 1; i <= count; i++)
        {
            double t = i * step;
            double re = 0;
            double im = 0;
            for (int k = 0; k < Weights.Length; k++)
            {
                double size = Weights[k] * Math.Exp(-t * t * Deviations[k] * Deviations[k] / 2);
                re += size * Math.Cos(t * Means[k]);
                im += size * Math.Sin(t * Means[k]);
            }

            sum += ((re * re) + (im * im)) * w(Kernel.FourierTransform(H * t));
        }

        return sum * step / Math.PI;
    }

    public override string ToString() => FormattableString.Invariant($"{Kernel.Name}, h = {H}, n = {N}, x = {X}, w = [{string.Join(" ", Weights)}], m = [{string.Join(" ", Means)}], s = [{string.Join(" ", Deviations)}]");
}
