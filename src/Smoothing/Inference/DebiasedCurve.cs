using Smoothing.Estimation;
using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Inference;

/// <summary>The curve with its leading bias removed, and the size of one value's contribution to it at every place.</summary>
/// <remarks>
/// Method: f̃ = f̂ − h²f̂''/2 at the same h, that is the kernel M(u) = φ(u)(3 − u²)/2 (Calonico, Cattaneo &amp; Farrell 2018 with ρ = 1); near a known limit
/// M_p(u) = φ(u)(c₀ + c₁u + c₂u²) with moments (1, 0, 0) on what is left of the line. Both are sums over Gaussian derivatives: uφ = −φ', u²φ = φ'' + φ,
/// so every fast sum serves them. One value's contribution is s(x) = R(M_p)/(n(x) h), n(x) the smaller of the global and the local effective size.
/// </remarks>
internal sealed class DebiasedCurve
{
    // Beyond 1.5 h from a limit the lower end needs no help; within, a curve that is 0 at the limit would never be covered.
    private const double MinimumRuleReach = 1.5;

    private readonly Sample _sample;
    private readonly Density _line;
    private readonly Density? _squares;
    private readonly Density? _narrow;
    private readonly double _squaredWeights;
    private readonly Interval _support;
    private readonly double _shrink;

    public DebiasedCurve(Sample sample, double bandwidth, Interval support, double inflation)
    {
        _sample = sample;
        Bandwidth = bandwidth;
        _support = support;
        _shrink = inflation;
        _line = Density.Of(sample, Kernel.Gaussian, bandwidth);
        if (sample.IsWeighted && sample.WeightMeaning == WeightMeaning.Relative)
        {
            double total = sample.TotalWeight;
            double[] squares = [.. sample.Weights.ToArray().Select(w => w / total * (w / total))];
            _squaredWeights = squares.Sum();
            _squares = Density.Of(Sample.Of(sample.Values, new SampleOptions { Weights = squares }), Kernel.Gaussian, bandwidth);
        }

        if (double.IsFinite(support.Lower) || double.IsFinite(support.Upper))
        {
            _narrow = Density.Of(sample, Kernel.Gaussian, bandwidth / Math.Sqrt(2));
        }
    }

    public double Bandwidth { get; }

    /// <summary>f̃, s and the empirical standard error (only near a limit; NaN elsewhere) at each place.</summary>
    public void Evaluate(ReadOnlySpan<double> x, Span<double> estimate, Span<double> size, Span<double> nearLimit)
    {
        int m = x.Length;
        double h = Bandwidth;
        var f = new double[m];
        var slope = new double[m];
        var curvature = new double[m];
        _line.Values(x, f);
        _line.Derivatives(x, 2, curvature);
        double[] local = Sizes(x, f);
        bool limits = _narrow is not null;
        if (limits)
        {
            _line.Derivatives(x, 1, slope);
        }

        for (int j = 0; j < m; j++)
        {
            double p = (x[j] - _support.Lower) / h;
            double q = (_support.Upper - x[j]) / h;
            BoundaryWeights weights = BoundaryWeights.Of(p, q);
            estimate[j] = ((weights.C0 + weights.C2) * f[j]) - (weights.C1 * h * slope[j]) + (weights.C2 * h * h * curvature[j]);
            size[j] = weights.Roughness / (local[j] * h);
            nearLimit[j] = Math.Min(p, q) <= MinimumRuleReach ? Empirical(x[j], weights, estimate[j], local[j]) : double.NaN;
        }
    }

    // √{(1/n)[(1/n)ΣM_h² − f̃²]}: φ² = φ_{1/√2}/(2√π), and with v = √2u the powers of u turn into derivatives of the narrower Gaussian curve.
    private double Empirical(double x, BoundaryWeights w, double estimate, double n)
    {
        double narrow = Bandwidth / Math.Sqrt(2);
        double g0 = _narrow!.Value(x);
        double g1 = narrow * _narrow.Derivative(x);
        double g2 = Power(narrow, 2) * _narrow.Derivative(x, 2);
        double g3 = Power(narrow, 3) * _narrow.Derivative(x, 3);
        double g4 = Power(narrow, 4) * _narrow.Derivative(x, 4);
        double v1 = -g1;
        double v2 = g2 + g0;
        double v3 = -g3 - (3 * g1);
        double v4 = g4 + (6 * g2) + (3 * g0);
        double root = Math.Sqrt(2);
        double square = (w.C0 * w.C0 * g0)
            + (2 * w.C0 * w.C1 * v1 / root)
            + (((w.C1 * w.C1) + (2 * w.C0 * w.C2)) * v2 / 2)
            + (2 * w.C1 * w.C2 * v3 / (2 * root))
            + (w.C2 * w.C2 * v4 / 4);
        double mean = square / (2 * NormalLaw.SqrtPi * Bandwidth);
        return Math.Sqrt(Math.Max(mean - (estimate * estimate), 0) / n);
    }

    private double[] Sizes(ReadOnlySpan<double> x, double[] f)
    {
        double global = _sample.EffectiveCount / _shrink;
        var sizes = new double[x.Length];
        Array.Fill(sizes, global);
        if (_squares is null)
        {
            return sizes;
        }

        var g = new double[x.Length];
        _squares.Values(x, g);
        double scale = Bandwidth / NormalLaw.InverseSqrtTwoPi;
        double prior = 1.0 / _sample.Count;
        for (int j = 0; j < sizes.Length; j++)
        {
            double near = ((f[j] * scale) + prior) / ((g[j] * scale * _squaredWeights) + (prior / _sample.EffectiveCount));
            sizes[j] = Math.Min(global, near / _shrink);
        }

        return sizes;
    }

    private static double Power(double x, int n)
    {
        double product = 1;
        for (int i = 0; i < n; i++)
        {
            product *= x;
        }

        return product;
    }
}
