using Smoothing.Numerics;

namespace Smoothing.Theory;

/// <summary>Σ wᵢ N(mᵢ, sᵢ²): everything about it has a closed form.</summary>
/// <remarks>Derivatives by Hermite polynomials: φ⁽ʳ⁾(u) = (−1)ʳ Heᵣ(u) φ(u). Source: Marron &amp; Wand (1992), sec. 2.</remarks>
public sealed class NormalMixture : TargetDensity
{
    private readonly double[] _weights;
    private readonly double[] _means;
    private readonly double[] _deviations;

    /// <summary>Makes a mixture.</summary>
    /// <param name="weights">Shares, not negative, summing to 1 within 1e-12.</param>
    /// <param name="means">As many finite means.</param>
    /// <param name="standardDeviations">As many positive standard deviations.</param>
    /// <exception cref="ArgumentException">Lengths differ or are 0, a weight is negative, or the sum is not 1.</exception>
    /// <exception cref="ArgumentOutOfRangeException">A mean is not finite or a standard deviation is not positive.</exception>
    public NormalMixture(ReadOnlySpan<double> weights, ReadOnlySpan<double> means, ReadOnlySpan<double> standardDeviations)
        : this("normal mixture", weights, means, standardDeviations)
    {
    }

    internal NormalMixture(string name, ReadOnlySpan<double> weights, ReadOnlySpan<double> means, ReadOnlySpan<double> standardDeviations)
    {
        if (weights.Length == 0 || means.Length != weights.Length || standardDeviations.Length != weights.Length)
        {
            throw new ArgumentException(Guard.Text($"weights, means and standardDeviations must have one length above 0, but have {weights.Length}, {means.Length} and {standardDeviations.Length}: pass one of each for every component."), nameof(weights));
        }

        _weights = TargetSearch.Weights(weights);
        for (int i = 0; i < means.Length; i++)
        {
            Guard.Finite(means[i], name: Guard.Text($"means[{i}]"));
            Guard.Positive(standardDeviations[i], name: Guard.Text($"standardDeviations[{i}]"));
        }

        Name = name;
        _means = means.ToArray();
        _deviations = standardDeviations.ToArray();
        Splits = [.. Present().SelectMany(i => new[] { -9.0, -3, 0, 3, 9 }.Select(c => _means[i] + (c * _deviations[i]))).Distinct().Order()];
    }

    private NormalMixture(string name, NormalMixture from, double shift, double factor)
        : this(name, from._weights, [.. from._means.Select(m => (factor * m) + shift)], [.. from._deviations.Select(s => factor * s)])
    {
    }

    /// <summary>The fifteen mixtures of Marron and Wand, in their order, with their names.</summary>
    /// <remarks>Source: Marron &amp; Wand (1992), Table 1.</remarks>
    public static IReadOnlyList<NormalMixture> MarronWand { get; } = MarronWandTable.Make();

    /// <inheritdoc/>
    public override string Name { get; }

    /// <summary>The whole line.</summary>
    public override Interval Support => Interval.WholeLine;

    /// <summary>Shares of the components.</summary>
    public IReadOnlyList<double> Weights => _weights;

    /// <summary>Means of the components.</summary>
    public IReadOnlyList<double> Means => _means;

    /// <summary>Standard deviations of the components.</summary>
    public IReadOnlyList<double> StandardDeviations => _deviations;

    /// <summary>Mean of the mixture.</summary>
    public double Mean => _weights.Select((w, i) => w * _means[i]).Sum();

    /// <summary>Standard deviation of the mixture.</summary>
    public double StandardDeviation
    {
        get
        {
            // In units of the largest length, so that squares neither overflow nor vanish.
            double mean = Mean;
            double unit = Math.Max(_deviations.Max(), _means.Max(m => Math.Abs(m - mean)));
            double Square(double v) => v / unit * (v / unit);
            return unit * Math.Sqrt(_weights.Select((w, i) => w * (Square(_deviations[i]) + Square(_means[i] - mean))).Sum());
        }
    }

    internal override IReadOnlyList<double> Breaks => [];

    internal override IReadOnlyList<double> Splits { get; }

    internal override double Finest => Present().Min(i => _deviations[i]);

    internal override double Widest => StandardDeviation;

    /// <summary>One normal law.</summary>
    /// <param name="mean">Its mean, finite.</param>
    /// <param name="standardDeviation">Its standard deviation, positive.</param>
    /// <returns>A mixture of one component.</returns>
    public static NormalMixture Normal(double mean = 0, double standardDeviation = 1) => new("normal", [1], [mean], [standardDeviation]);

    /// <summary>Σ wᵢ fᵢ of normal mixtures, again one.</summary>
    internal static NormalMixture Joined(string name, ReadOnlySpan<double> weights, IReadOnlyList<NormalMixture> parts)
    {
        var w = new List<double>();
        for (int i = 0; i < parts.Count; i++)
        {
            foreach (double v in parts[i]._weights)
            {
                w.Add(weights[i] * v);
            }
        }

        double sum = w.Sum(); // 1 but for the roundings that the parts were allowed
        return new(name, [.. w.Select(v => v / sum)], [.. parts.SelectMany(p => p._means)], [.. parts.SelectMany(p => p._deviations)]);
    }

    internal static double Phi(double d, double variance, int order) => PhiOf(d, Math.Sqrt(variance), order);

    internal static double PhiOf(double d, double s, int order)
    {
        double u = d / s;
        double below = 0;
        double hermite = 1;
        double scale = 1 / s;
        for (int r = 0; r < order; r++)
        {
            (below, hermite) = (hermite, (u * hermite) - (r * below));
            scale /= -s;
        }

        double density = NormalLaw.Density(u);
        return density == 0 ? 0 : scale * hermite * density;
    }

    internal override TargetDensity Moved(double shift, double factor) => new NormalMixture(AffineTarget.NameOf(this, shift, factor), this, shift, factor);

    internal override double ValueCore(double x) => DerivativeCore(x, 0);

    internal override double DerivativeCore(double x, int order)
    {
        if (double.IsInfinity(x))
        {
            return 0;
        }

        double sum = 0;
        for (int i = 0; i < _weights.Length; i++)
        {
            sum += _weights[i] == 0 ? 0 : _weights[i] * PhiOf(x - _means[i], _deviations[i], order);
        }

        return sum;
    }

    internal override double CumulativeCore(double x)
    {
        double sum = 0;
        for (int i = 0; i < _weights.Length; i++)
        {
            sum += _weights[i] * NormalLaw.Cumulative((x - _means[i]) / _deviations[i]);
        }

        return Math.Min(1, sum);
    }

    internal override double QuantileCore(double probability)
    {
        double z = NormalLaw.Quantile(probability);
        double lower = double.PositiveInfinity;
        double upper = double.NegativeInfinity;
        foreach (int i in Present())
        {
            double q = _means[i] + (z * _deviations[i]);
            lower = Math.Min(lower, q);
            upper = Math.Max(upper, q);
        }

        if (lower == upper)
        {
            return lower;
        }

        // Above the middle the upper tail is matched, whose digits are not lost against 1.
        return probability <= 0.5
            ? Roots.Between(x => CumulativeCore(x) - probability, lower, upper)
            : Roots.Between(x => (1 - probability) - Survival(x), lower, upper);
    }

    internal override double DrawCore(ref RandomStream random)
    {
        double u = random.NextUniform();
        int i = 0;
        while (i < _weights.Length - 1 && u >= _weights[i])
        {
            u -= _weights[i++];
        }

        return _means[i] + (_deviations[i] * random.NextNormal());
    }

    internal override double RoughnessCore(int order)
    {
        // R(f^(r)) = (−1)^r ΣΣ w w' φ^(2r) at the difference of means with the sum of variances.
        CompensatedSum sum = default;
        for (int i = 0; i < _weights.Length; i++)
        {
            for (int j = 0; j < _weights.Length; j++)
            {
                double w = _weights[i] * _weights[j];
                sum.Add(w == 0 ? 0 : w * PhiOf(_means[i] - _means[j], double.Hypot(_deviations[i], _deviations[j]), 2 * order));
            }
        }

        return order % 2 == 0 ? sum.Value : -sum.Value;
    }

    /// <summary>The components that are there at all.</summary>
    private IEnumerable<int> Present() => Enumerable.Range(0, _weights.Length).Where(i => _weights[i] > 0);

    private double Survival(double x)
    {
        double sum = 0;
        for (int i = 0; i < _weights.Length; i++)
        {
            sum += _weights[i] * NormalLaw.Survival((x - _means[i]) / _deviations[i]);
        }

        return sum;
    }
}
