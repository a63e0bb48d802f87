using Smoothing.Numerics;

namespace Smoothing.Estimation;

/// <summary>φ_n(t) = Σ mⱼ exp(i t xⱼ), Σ mⱼ = 1, at the frequencies t_k = k · <see cref="Step"/>, k = 0 … <see cref="Count"/> − 1.</summary>
/// <remarks>
/// Method: every pair sum Σᵢⱼ mᵢmⱼ w(xᵢ − xⱼ) with a band-limited w is (1/2π)∫ ŵ(t)|φ_n(t)|² dt, so one transform serves
/// every bandwidth. The frequencies are those of a circle of circumference <see cref="Length"/> that holds the values and
/// enough empty space; on it the trapezoidal rule is exact but for pairs that meet across the empty space. Gaps too
/// wide to matter are closed first (<see cref="GapMap"/>), so an outlier costs nothing. Values are spread on a grid twice as
/// fine as needed with a Gaussian and the spread divided out again (Greengard &amp; Lee 2004; 12 nodes either side, 1e-12),
/// beyond 200,000 distinct values by rounding to the nearest node (error (step/h)²/24 relative in h, below 1e-6 there).
/// Immutable once built; safe to share between threads.
/// </remarks>
internal sealed partial class EmpiricalSpectrum
{
    /// <summary>exp(−u²/2) is below 1e-16 beyond this u: 8.6²/2 = 36.98, e^−36.98 = 9e-17.</summary>
    public const double GaussianReach = 8.6;

    /// <summary>Longest grid used: 2^19 nodes, 8 MB of work space; beyond it <see cref="SmallestScale"/> rises instead.</summary>
    public const int MaximumGrid = 1 << 19;

    private readonly double[] _real;
    private readonly double[] _imaginary;
    private readonly double[] _squared;

    private EmpiricalSpectrum(double[] real, double[] imaginary, double length, double origin, double effectiveCount, GapMap map)
    {
        _real = real;
        _imaginary = imaginary;
        _squared = new double[real.Length];
        for (int k = 0; k < real.Length; k++)
        {
            _squared[k] = (real[k] * real[k]) + (imaginary[k] * imaginary[k]);
        }

        Length = length;
        Origin = origin;
        EffectiveCount = effectiveCount;
        Map = map;
    }

    /// <summary>Number of frequencies.</summary>
    public int Count => _squared.Length;

    /// <summary>Distance of neighbouring frequencies, 2π/<see cref="Length"/>.</summary>
    public double Step => 2 * Math.PI / Length;

    /// <summary>Circumference of the circle, in the unit of the values.</summary>
    public double Length { get; }

    /// <summary>Where the circle starts, in closed places (<see cref="GapMap"/>); phases of <see cref="Real"/> and <see cref="Imaginary"/> are counted from here.</summary>
    public double Origin { get; }

    /// <summary>1/Σmⱼ² over the observations: the white-noise level of |φ_n|² is its reciprocal.</summary>
    public double EffectiveCount { get; }

    /// <summary>How the values were moved together across wide gaps.</summary>
    public GapMap Map { get; }

    /// <summary>Smallest h for which exp(−h²t²/2) has died away (1e-16) at the last frequency.</summary>
    public double SmallestScale => GaussianReach / (Count * Step);

    /// <summary>|φ_n(t_k)|².</summary>
    public ReadOnlySpan<double> SquaredModulus => _squared;

    /// <summary>Re Σ mⱼ exp(i t_k (closed place of xⱼ − Origin)).</summary>
    public ReadOnlySpan<double> Real => _real;

    /// <summary>Im Σ mⱼ exp(i t_k (closed place of xⱼ − Origin)).</summary>
    public ReadOnlySpan<double> Imaginary => _imaginary;

    /// <summary>The spectrum of values given in increasing order.</summary>
    /// <param name="values">Increasing, distinct.</param>
    /// <param name="masses">Positive, summing to 1, one per value.</param>
    /// <param name="effectiveCount">1/Σm² over observations.</param>
    /// <param name="smallest">Smallest bandwidth that will be asked for, in the unit of the values.</param>
    /// <param name="largest">Largest bandwidth that will be asked for.</param>
    public static EmpiricalSpectrum Of(ReadOnlySpan<double> values, ReadOnlySpan<double> masses, double effectiveCount, double smallest, double largest)
    {
        // Two Gaussians of scale h overlap by exp(−d²/(4h²)): below 1e-15 at d = 12h.
        double empty = 12 * largest;
        GapMap map = GapMap.Of(values, empty);
        double length = map.Length + empty;
        double reach = Math.Min(GaussianReach / smallest, MaximumGrid * Math.PI / 2 / length);
        int grid = SizeFor(reach, length);
        return Spread(values, masses, effectiveCount, map, -0.5 * empty, length, grid);
    }

    /// <summary>The spectrum on a circle of given circumference, values outside it wrapped round: for known limits on both sides and for samples that share a grid.</summary>
    public static EmpiricalSpectrum OnCircle(
        ReadOnlySpan<double> values, ReadOnlySpan<double> masses, double effectiveCount, double origin, double length, double smallest)
    {
        double reach = Math.Min(GaussianReach / smallest, MaximumGrid * Math.PI / 2 / length);
        return Spread(values, masses, effectiveCount, GapMap.None, origin, length, SizeFor(reach, length));
    }

    /// <summary>Power-of-two grid with four nodes for every frequency below <paramref name="reach"/>; never under 256.</summary>
    private static int SizeFor(double reach, double length)
    {
        double frequencies = reach * length / (2 * Math.PI);
        int grid = 256;
        while (grid < MaximumGrid && grid < 4 * frequencies)
        {
            grid *= 2;
        }

        return grid;
    }
}
