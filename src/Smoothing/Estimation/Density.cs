using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Estimation;

/// <summary>A kernel density estimate f̂(x) = (1/(Σw h)) Σ wᵢ K((x − Xᵢ)/h) and what is read off it.</summary>
/// <remarks>Immutable and safe to share between threads.</remarks>
public sealed partial class Density
{
    private readonly KernelSums _sums;
    private readonly CurveForm _form;

    private Density(Sample? sample, Kernel kernel, double bandwidth, DensityOptions options, KernelSums sums, CurveForm form)
    {
        Sample = sample;
        Kernel = kernel;
        Bandwidth = bandwidth;
        Options = options;
        _sums = sums;
        _form = form;
    }

    /// <summary>The sample that was smoothed; null when only its condensed form was given.</summary>
    public Sample? Sample { get; }

    /// <summary>The condensed sample that was smoothed; null when the values were given.</summary>
    public CondensedSample? Condensed { get; private init; }

    /// <summary>The kernel.</summary>
    public Kernel Kernel { get; }

    /// <summary>The bandwidth h: the scale of the kernel as written, in the unit of the data.</summary>
    public double Bandwidth { get; }

    /// <summary>The options in force.</summary>
    public DensityOptions Options { get; }

    /// <summary>Smooths a sample.</summary>
    /// <param name="sample">The values, with weights if any.</param>
    /// <param name="kernel">The kernel K.</param>
    /// <param name="bandwidth">h, positive and finite, in the unit of the data.</param>
    /// <param name="options">Known limits and the like; null for the defaults.</param>
    /// <returns>The estimate.</returns>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="bandwidth"/> is not positive and finite.</exception>
    /// <exception cref="ArgumentException">Values lie outside the support, or the options do not go together.</exception>
    public static Density Of(Sample sample, Kernel kernel, double bandwidth, DensityOptions? options = null)
    {
        Guard.Given(sample);
        Guard.Given(kernel);
        Guard.Positive(bandwidth, "choose one with BandwidthRules, or pass a width in the unit of the data");
        options ??= new DensityOptions();
        KernelSums sums = SumsChoice.For(sample, kernel, bandwidth);
        var range = new Interval(sample.Minimum, sample.Maximum);
        CurveForm form = FormChoice.Of(sums, kernel, bandwidth, options, range, sample, (other, h) => SumsChoice.For(other, kernel, h));
        return new Density(sample, kernel, bandwidth, options, sums, form);
    }

    /// <summary>Smooths a condensed sample with the Gaussian kernel or one of its higher orders, from its cell moments alone.</summary>
    /// <param name="sample">Cell moments, of cells at most 1/16 of the bandwidth wide; narrower with fewer than eight moments.</param>
    /// <param name="kernel">The Gaussian kernel, or <see cref="Kernel.GaussianOfOrder"/>.</param>
    /// <param name="bandwidth">h, positive and finite, in the unit of the data.</param>
    /// <param name="options">Known limits and the like; null for the defaults.</param>
    /// <returns>The estimate; <see cref="Sample"/> is null, and what needs the values says so.</returns>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="bandwidth"/> is not positive and finite.</exception>
    /// <exception cref="ArgumentException">The kernel is another one, cells are too wide for the bandwidth (the message says which width it takes), values lie outside the support, or the options do not go together.</exception>
    /// <remarks>
    /// Accuracy: with sixteen moments that of the values, relative 1e-12 down to 1e-200 of the peak; 1e-13 of the peak from eight moments on, a millionth of it with fewer. Cost: some dozen cells a point, whatever the number of values.
    /// </remarks>
    public static Density Of(CondensedSample sample, Kernel kernel, double bandwidth, DensityOptions? options = null)
    {
        Guard.Given(sample);
        Guard.Given(kernel);
        Guard.Positive(bandwidth, "choose one with BandwidthRules, or pass a width in the unit of the data");
        options ??= new DensityOptions();
        KernelSums sums = CondensedWidth.SumsOf(sample, kernel, bandwidth);
        var range = new Interval(sample.Minimum, sample.Maximum);
        CurveForm form = FormChoice.Of(sums, kernel, bandwidth, options, range, null, (other, h) => SumsChoice.For(other, kernel, h));
        return new Density(null, kernel, bandwidth, options, sums, form) { Condensed = sample };
    }

    /// <summary>f̂ at one point; 0 at ±∞.</summary>
    /// <param name="x">Where, in the unit of the data.</param>
    /// <returns>The density, in 1/unit.</returns>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="x"/> is NaN.</exception>
    public double Value(double x)
    {
        Guard.Number(x);
        double result = 0;
        Values(new ReadOnlySpan<double>(in x), new Span<double>(ref result));
        return result;
    }

    /// <summary>f̂ at many points, in any order.</summary>
    /// <param name="x">Where, in the unit of the data; ±∞ allowed.</param>
    /// <param name="destination">Receives one density per point; at least as long as <paramref name="x"/>.</param>
    /// <exception cref="ArgumentException">A point is NaN, or <paramref name="destination"/> is too short.</exception>
    public void Values(ReadOnlySpan<double> x, Span<double> destination)
    {
        Guard.Numbers(x, nameof(x));
        Guard.Destination(x.Length, destination.Length);
        _form.Derivatives(x, 0, destination);
    }

    /// <summary>The sums behind the estimate, without any mending at limits: for what is derived from them elsewhere.</summary>
    internal KernelSums Sums => _sums;

    /// <summary>Whether the curve is the plain kernel sum on the whole line, so that the sums alone describe it.</summary>
    internal bool IsPlain => _form is LineForm && Options.Adaptive is null;

    /// <summary>The closed range outside which the curve is 0; ends may be infinite.</summary>
    internal Interval Ends => _form.Ends;
}
