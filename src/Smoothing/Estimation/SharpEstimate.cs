using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Estimation;

/// <summary>An estimate of the density that errs less than any single bandwidth can: the mean of three kinds of smoothing, projected on densities.</summary>
/// <remarks>
/// Method: the average, in equal parts, of the Gaussian estimate at h, of the fourth-order Gaussian-based estimate at its own h₄, and of the Wiener
/// filter p/(p + (1 − p)/n) with p = |φ_n(t)|² exp(−h²t²) (Watson &amp; Leadbetter 1963); then max(g − ξ, 0), ξ such that the mass is 1 (Glad,
/// Hjort &amp; Ushakov 2003). One transform and one back. The curve is linear between nodes h/16 apart, the distribution function its
/// exact integral. Price: ripples in the tails, exact zeros where the data thin out, no simple formula for its bias. Never count peaks on it, and
/// never build intervals on it. Errors against the best ordinary estimate: docs/bandwidths.md. Immutable and safe to share between threads.
/// </remarks>
public sealed class SharpEstimate
{
    private readonly double[] _density;
    private readonly double[] _cumulative;
    private readonly GapMap _map;
    private readonly double _origin;
    private readonly double _spacing;

    private SharpEstimate(Sample sample, double bandwidth, double sharpBandwidth)
    {
        Sample = sample;
        Bandwidth = bandwidth;
        SharpBandwidth = sharpBandwidth;
        double finest = Math.Min(bandwidth, sharpBandwidth);
        EmpiricalSpectrum spectrum = EmpiricalSpectrum.Of(sample, finest, Math.Max(bandwidth, sharpBandwidth));
        double[] multiplier = SharpFilter.Multiplier(spectrum, bandwidth, sharpBandwidth, LatticeStep(sample));
        int size = spectrum.SizeFor(finest / 16, multiplier.Length);
        _density = spectrum.Curve(multiplier, size);
        _spacing = spectrum.Length / size;
        _origin = spectrum.Origin;
        _map = spectrum.Map;
        SharpFilter.Project(_density, _spacing);
        _cumulative = new double[size];
        for (int i = 1; i < size; i++)
        {
            _cumulative[i] = _cumulative[i - 1] + (0.5 * (_density[i - 1] + _density[i]) * _spacing);
        }

        double total = _cumulative[^1];
        for (int i = 0; i < size; i++)
        {
            _density[i] /= total;
            _cumulative[i] /= total;
        }
    }

    /// <summary>The sample behind the estimate.</summary>
    public Sample Sample { get; }

    /// <summary>h of the ordinary part, for the Gaussian kernel, in the unit of the data.</summary>
    public double Bandwidth { get; }

    /// <summary>h₄ of the fourth-order part, for the Gaussian-based kernel of order 4, in the unit of the data.</summary>
    public double SharpBandwidth { get; }

    /// <summary>Smooths a sample.</summary>
    /// <param name="sample">The values, with weights if any.</param>
    /// <param name="bandwidth">h, positive, in the unit of the data: the automatic rule's for the Gaussian kernel.</param>
    /// <param name="sharpBandwidth">h₄, positive, in the unit of the data: the block-spectrum rule's for the fourth-order Gaussian-based kernel.</param>
    /// <returns>The estimate.</returns>
    /// <exception cref="ArgumentOutOfRangeException">A bandwidth is not positive and finite.</exception>
    public static SharpEstimate Of(Sample sample, double bandwidth, double sharpBandwidth)
    {
        Guard.Given(sample);
        Guard.Positive(bandwidth, "take the automatic rule's for the Gaussian kernel");
        Guard.Positive(sharpBandwidth, "take the block-spectrum rule's for the fourth-order Gaussian kernel");
        return new SharpEstimate(sample, bandwidth, sharpBandwidth);
    }

    /// <summary>The density at one point; 0 at ±∞ and, often, in thin tails.</summary>
    /// <param name="x">Where, in the unit of the data.</param>
    /// <returns>The density, in 1/unit, never negative.</returns>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="x"/> is NaN.</exception>
    public double Value(double x)
    {
        if (!TryPlace(Guard.Number(x), out int node, out double fraction))
        {
            return 0;
        }

        return _density[node] + (fraction * (_density[node + 1] - _density[node]));
    }

    /// <summary>The share of the distribution up to <paramref name="x"/>.</summary>
    /// <param name="x">Upper end, in the unit of the data; ±∞ allowed.</param>
    /// <returns>A number in [0, 1], never falling as <paramref name="x"/> grows.</returns>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="x"/> is NaN.</exception>
    public double Cumulative(double x)
    {
        Guard.Number(x);
        if (double.IsInfinity(x))
        {
            return x > 0 ? 1 : 0;
        }

        if (!TryPlace(x, out int node, out double fraction))
        {
            return CumulativeOutside(x);
        }

        double here = _density[node] + (0.5 * fraction * (_density[node + 1] - _density[node]));
        return Math.Min(1, _cumulative[node] + (fraction * _spacing * here));
    }

    /// <summary>The smallest x with <see cref="Cumulative"/> ≥ p.</summary>
    /// <param name="probability">p in [0, 1]; 0 and 1 give the ends of the range where the density is above zero.</param>
    /// <returns>A value in the unit of the data.</returns>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="probability"/> is outside [0, 1] or NaN.</exception>
    public double Quantile(double probability)
    {
        Guard.Probability(probability);
        int node = Array.BinarySearch(_cumulative, probability);
        if (node >= 0)
        {
            // Flat stretches hold the same number many times: the left end, at p = 0 the right end, where the mass begins.
            bool start = probability == 0;
            while (start ? node + 1 < _cumulative.Length && _cumulative[node + 1] == probability : node > 0 && _cumulative[node - 1] == probability)
            {
                node += start ? 1 : -1;
            }

            return _map.Open(_origin + (node * _spacing));
        }

        node = Math.Clamp(~node - 1, 0, _density.Length - 2);
        // d₀s + (d₁ − d₀)s²/2 = (p − F)/spacing, the stable root.
        double d0 = _density[node], slope = _density[node + 1] - d0;
        double rest = (probability - _cumulative[node]) / _spacing;
        double root = Math.Sqrt(Math.Max(0, (d0 * d0) + (2 * slope * rest)));
        double fraction = d0 + root > 0 ? Math.Clamp(2 * rest / (d0 + root), 0, 1) : 0;
        return _map.Open(_origin + ((node + fraction) * _spacing));
    }

    /// <summary>The share between two points.</summary>
    /// <param name="from">Lower end, in the unit of the data; −∞ allowed.</param>
    /// <param name="to">Upper end, not below <paramref name="from"/>; +∞ allowed.</param>
    /// <returns>A number in [0, 1].</returns>
    /// <exception cref="ArgumentException">The ends are in the wrong order or NaN.</exception>
    public double Probability(double from, double to)
    {
        var range = new Interval(from, to);
        return Math.Max(0, Cumulative(range.Upper) - Cumulative(range.Lower));
    }

    /// <summary>The density as a table.</summary>
    /// <param name="from">First abscissa, in the unit of the data.</param>
    /// <param name="to">Last abscissa, above <paramref name="from"/>.</param>
    /// <param name="points">Number of points, at least 2; 401 by default, enough for a figure.</param>
    /// <returns>The curve.</returns>
    /// <exception cref="ArgumentException">The range is empty or not finite.</exception>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="points"/> is below 2.</exception>
    public Curve Tabulate(double from, double to, int points = 401)
    {
        Guard.Range(from, to);
        Guard.AtLeast(points, 2);
        var x = new double[points];
        var y = new double[points];
        for (int i = 0; i < points; i++)
        {
            x[i] = i == points - 1 ? to : from + ((to - from) * i / (points - 1));
            y[i] = Value(x[i]);
        }

        return new Curve(x, y);
    }

    // Below 5 % ties a lattice is either too fine to matter or an accident of few clusters.
    private static double LatticeStep(Sample sample) =>
        sample.TiedShare > 0.05 ? Math.Max(sample.RoundingUnit?.Step ?? 0, sample.HeapingUnit?.Step ?? 0) : 0;

    private bool TryPlace(double x, out int node, out double fraction)
    {
        node = 0;
        fraction = 0;
        if (double.IsInfinity(x) || !_map.TryClose(x, out double place))
        {
            return false;
        }

        double position = (place - _origin) / _spacing;
        if (!(position >= 0 && position < _density.Length - 1))
        {
            return false;
        }

        node = (int)position;
        fraction = position - node;
        return true;
    }

    // Left or right of everything, or deep inside a gap: all mass of the runs to the left.
    private double CumulativeOutside(double x)
    {
        ReadOnlySpan<double> values = Sample.SortedValues;
        int below = values.BinarySearch(x);
        below = below < 0 ? ~below : below;
        if (below == 0 || below == values.Length)
        {
            return below == 0 ? 0 : 1;
        }

        _ = _map.TryClose(values[below], out double next);
        double middle = (next - _origin - (0.5 * _map.Gap)) / _spacing;
        return _cumulative[Math.Clamp((int)middle, 0, _cumulative.Length - 1)];
    }
}
