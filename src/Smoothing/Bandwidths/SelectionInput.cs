using Smoothing.Estimation;
using Smoothing.Numerics;

namespace Smoothing.Bandwidths;

/// <summary>What every rule reads of a sample: distinct values with masses in units of a robust scale, n, ties and rounding, and the spectrum.</summary>
/// <remarks>
/// All numbers in here are in units of <see cref="Unit"/> and for the Gaussian kernel, so that high powers neither overflow nor
/// underflow and a change of the data's scale changes no bit of the decision. Not shared between threads.
/// </remarks>
internal sealed partial class SelectionInput
{
    /// <summary>1.72 covers Terrell's 1.144 times 1.5: the largest scale that the smaller of sd and 1.5 IQR can mean.</summary>
    public const double BracketFactor = 1.72;

    /// <summary>Span of the search: the largest bandwidth is this many times the smallest (the finest of the fifteen test laws needs 1/33 at n = 10,000).</summary>
    public const double SearchRatio = 500;

    private EmpiricalSpectrum? _spectrum;
    private double[]? _squared;
    private double[]? _pairs;
    private double _widest;

    private SelectionInput(double[] values, double[] masses, double effectiveCount, double deviation, double interquartileRange, BandwidthOptions options)
    {
        Values = values;
        Masses = masses;
        N = Math.Max(2, effectiveCount);
        Deviation = deviation;
        InterquartileRange = interquartileRange;
        Options = options;
    }

    public BandwidthOptions Options { get; }

    /// <summary>Distinct values, increasing, as (x − centre)/<see cref="Unit"/>.</summary>
    public double[] Values { get; }

    /// <summary>Share of each distinct value; sums to 1.</summary>
    public double[] Masses { get; }

    /// <summary>Effective number of observations, at least 2.</summary>
    public double N { get; }

    /// <summary>Standard deviation, in units.</summary>
    public double Deviation { get; }

    /// <summary>Interquartile range, in units; may be 0.</summary>
    public double InterquartileRange { get; }

    /// <summary>The data's unit behind 1.</summary>
    public double Unit { get; private init; }

    public double TiedShare { get; private init; }

    /// <summary>The step of rounding, in units; 0 without one.</summary>
    public double RoundingUnit { get; private init; }

    /// <summary>The coarser of rounding and heaping step, in units; 0 without one.</summary>
    public double LatticeStep { get; private init; }

    /// <summary>What the data could not tell, for the notes.</summary>
    public List<string> Notes { get; } = [];

    /// <summary>Half the coarser step: below it the ripple of the lattice shows (1.4 % at one half, 8.5 % at 0.4: 2 exp(−2π²h²/δ²)).</summary>
    public double Floor => Math.Max(Math.Max(0.5 * RoundingUnit, HeapingFloor), CellFloor);

    /// <summary>The bandwidth at which the ripple of the heaped share, 2 share exp(−2π²h²/δ²), is down to the same 1.4 %; 0 without heaping.</summary>
    public double HeapingFloor { get; private init; }

    /// <summary>Two cell widths of a condensed sample, whose values stand at the means of their cells; 0 for a sample.</summary>
    public double CellFloor { get; private init; }

    /// <summary>Values at cell means lose the spread in the cell, δ²/12: at h = 2δ that is 1 % of h.</summary>
    private const double CellsPerBandwidth = 2;

    /// <summary>1 on the whole line; 2 with limits: ∫ over the support of f′² is twice that of the reflected density.</summary>
    public double Reflection { get; private init; } = 1;

    /// <summary>Circumference of the circle for limits on both sides; 0 otherwise.</summary>
    public double Circle { get; private init; }

    public bool HasLimits => Reflection > 1;

    /// <summary>The smaller of sd and 1.5 IQR; sd where the IQR is 0.</summary>
    public double BracketScale => InterquartileRange > 0 ? Math.Min(Deviation, 1.5 * InterquartileRange) : Deviation;

    /// <summary>Upper end of the bracket of the plug-in rules. With limits 1.3 sd n^(−1/5): a flat law has no finite best h, and wider gains nothing.</summary>
    public double Bracket => Options.LargestBandwidth / Unit ?? (HasLimits ? 1.3 : BracketFactor) * BracketScale * Math.Pow(N, -0.2);

    /// <summary>Largest bandwidth that any rule looks at.</summary>
    public double Largest => 2 * Bracket;

    /// <summary>Smallest bandwidth that any rule looks at.</summary>
    public double Smallest => Math.Max(Math.Max(Options.SmallestBandwidth / Unit ?? Largest / SearchRatio, Floor), Spectrum.SmallestScale);

    public EmpiricalSpectrum Spectrum => _spectrum ??= BuildSpectrum();

    /// <summary>|φ_n|² as the rules see it: cut at π/step and freed of the rounding cell's damping.</summary>
    public ReadOnlySpan<double> Squared => _squared ??= BuildSquared();

    /// <summary>The part of |φ_n|² that pairs of two different observations make, as their mean: (|φ_n|² − 1/n)/(1 − 1/n).</summary>
    public ReadOnlySpan<double> Pairs => _pairs ??= BuildPairs();

    /// <summary>Mass of one observation of each distinct value.</summary>
    public double[] OwnMasses { get; private init; } = [];

    /// <summary>The measure of spread that the options ask for.</summary>
    public double ScaleFor(BandwidthScale scale) => scale switch
    {
        BandwidthScale.StandardDeviation => Deviation,
        BandwidthScale.InterquartileRange when InterquartileRange > 0 => InterquartileRange / NormalInterquartileRange,
        _ when InterquartileRange > 0 => Math.Min(Deviation, InterquartileRange / NormalInterquartileRange),
        _ => Deviation,
    };

    /// <summary>2 Φ⁻¹(¾) = 1.34898, the interquartile range of the standard normal law, in the rounding that the literature uses.</summary>
    public const double NormalInterquartileRange = 1.349;

    /// <summary>∫ (f̂_g^(s))² over the support, own terms included.</summary>
    public double Roughness(int derivative, double g) => Reflection * Spectrum.GaussianIntegral(Squared, 0, derivative, g);

    /// <summary>The same as the mean over pairs of two different observations.</summary>
    public double RoughnessWithoutOwn(int derivative, double g) => Reflection * Spectrum.GaussianIntegral(Pairs, 0, derivative, g);

    /// <summary>Makes room between the ends of the data and their repetition for bandwidths up to <paramref name="largest"/>: kernels of higher order take wider ones.</summary>
    public void ReachUpTo(double largest)
    {
        if (Circle == 0 && largest > _widest)
        {
            (_widest, _spectrum, _squared, _pairs) = (largest, null, null, null);
        }
    }

    private EmpiricalSpectrum BuildSpectrum()
    {
        double smallest = Math.Max(Options.SmallestBandwidth / Unit ?? Largest / SearchRatio, Floor);
        return Circle > 0
            ? EmpiricalSpectrum.OnCircle(Values, Masses, N, -0.5 * Circle, Circle, smallest)
            : EmpiricalSpectrum.Of(Values, Masses, N, smallest, Math.Max(Largest, _widest));
    }

    private double[] BuildPairs()
    {
        ReadOnlySpan<double> raw = Spectrum.SquaredModulus, real = Spectrum.Real;
        var pairs = new double[Squared.Length];
        for (int k = 0; k < pairs.Length; k++)
        {
            // On a reflected sample an observation meets itself twice, directly and in its mirror image: the mean of cos²(t x)/n.
            // The limit lies half a circle from the origin, so φ of the reflected sample at t_2k is (−1)^2k times the real part there.
            double own = !HasLimits ? 1 / N : (1 + (2 * k < real.Length ? real[2 * k] : 0)) / (2 * N);
            pairs[k] = (raw[k] - own) / (1 - (1 / N));
        }

        return pairs;
    }

    private double[] BuildSquared()
    {
        ReadOnlySpan<double> raw = Spectrum.SquaredModulus;
        if (LatticeStep == 0)
        {
            return raw.ToArray();
        }

        // Above π/δ the spectrum of rounded values repeats itself and says nothing about the law.
        int kept = Math.Clamp((int)(Math.PI / LatticeStep / Spectrum.Step) + 1, 2, raw.Length);
        double[] cut = raw[..kept].ToArray();
        for (int k = 1; k < kept && RoundingUnit > 0; k++)
        {
            // Rounding multiplies φ by about sin(δt/2)/(δt/2), at t = π/δ by 0.64.
            double half = 0.5 * RoundingUnit * k * Spectrum.Step;
            double damping = Math.Sin(half) / half;
            cut[k] /= damping * damping;
        }

        return cut;
    }
}
