using Smoothing.Kernels;
using Smoothing.Numerics;

namespace Smoothing.Theory;

/// <content>Errors near a known lower limit of the range.</content>
public sealed partial class ErrorTheory
{
    /// <summary>Exact bias at x = lower + c·h of an estimate that treats the lower end of the target's support in the named way.</summary>
    /// <remarks>
    /// With aₗ = ∫ uˡK(u) du over u ≤ c the weight of an observation at u = (x − X)/h ≤ c is K(u), K(u)/a₀, K(u) + K(2c − u), or
    /// (a₂ − a₁u)K(u)/(a₀a₂ − a₁²). Source: Jones (1993).
    /// </remarks>
    /// <param name="correction">None, Renormalised, Reflection or LinearKernel.</param>
    /// <param name="c">Distance from the limit in bandwidths, 0 or more.</param>
    /// <param name="h">Bandwidth, positive.</param>
    /// <returns>The bias.</returns>
    /// <exception cref="ArgumentException">Another correction, or a target without a finite lower end.</exception>
    public double BoundaryBias(BoundaryCorrection correction, double c, double h)
    {
        Func<double, double> weight = BoundaryWeight(correction, c);
        double x = Limit(h) + (c * h);
        double f = Target.ValueCore(x);

        // ∫ w (f(x − hu) − f) + f (∫ w − 1): the second part is exactly 0 for weights of mass 1.
        double defect = correction == BoundaryCorrection.None ? -(1 - Kernel.Cumulative(c)) : 0;
        return BoundaryIntegral(u => weight(u) * (Target.ValueCore(x - (h * u)) - f), c, x, h) + (f * defect);
    }

    /// <summary>Exact variance at x = lower + c·h of an estimate that treats the lower end of the target's support in the named way.</summary>
    /// <param name="correction">None, Renormalised, Reflection or LinearKernel.</param>
    /// <param name="c">Distance from the limit in bandwidths, 0 or more.</param>
    /// <param name="h">Bandwidth, positive.</param>
    /// <param name="n">Number of observations, at least 1.</param>
    /// <returns>{∫ w² f(x − hu) du/h − E²}/n.</returns>
    /// <exception cref="ArgumentException">Another correction, or a target without a finite lower end.</exception>
    public double BoundaryVariance(BoundaryCorrection correction, double c, double h, long n)
    {
        Guard.AtLeast(n, 1);
        Func<double, double> weight = BoundaryWeight(correction, c);
        double x = Limit(h) + (c * h);
        double mean = BoundaryIntegral(u => weight(u) * Target.ValueCore(x - (h * u)), c, x, h);
        double square = BoundaryIntegral(u => weight(u) * weight(u) * Target.ValueCore(x - (h * u)), c, x, h);
        return ((square / h) - (mean * mean)) / n;
    }

    /// <summary>Leading bias: (b₀ − 1) f − h b₁ f' + h² b₂ f''/2 at x = lower + c·h, with bₗ = ∫ uˡw(u) du.</summary>
    /// <param name="correction">None, Renormalised, Reflection or LinearKernel.</param>
    /// <param name="c">Distance from the limit in bandwidths, 0 or more.</param>
    /// <param name="h">Bandwidth, positive.</param>
    /// <returns>The asymptotic bias, its terms up to h².</returns>
    public double AsymptoticBoundaryBias(BoundaryCorrection correction, double c, double h)
    {
        Func<double, double> weight = BoundaryWeight(correction, c);
        double x = Limit(h) + (c * h);
        double defect = correction == BoundaryCorrection.None ? -(1 - Kernel.Cumulative(c)) : 0;
        double b1 = correction == BoundaryCorrection.LinearKernel ? 0 : BoundaryIntegral(u => u * weight(u), c, x, h);
        double b2 = BoundaryIntegral(u => u * u * weight(u), c, x, h);
        return (defect * Target.Value(x)) - (h * b1 * Target.Derivative(x)) + (h * h * b2 / 2 * Target.Derivative(x, 2));
    }

    /// <summary>Leading variance: f(x) ∫ w²/(nh) at x = lower + c·h.</summary>
    /// <param name="correction">None, Renormalised, Reflection or LinearKernel.</param>
    /// <param name="c">Distance from the limit in bandwidths, 0 or more.</param>
    /// <param name="h">Bandwidth, positive.</param>
    /// <param name="n">Number of observations, at least 1.</param>
    /// <returns>The asymptotic variance.</returns>
    public double AsymptoticBoundaryVariance(BoundaryCorrection correction, double c, double h, long n)
    {
        Guard.AtLeast(n, 1);
        Func<double, double> weight = BoundaryWeight(correction, c);
        double x = Limit(h) + (c * h);
        return Target.Value(x) * BoundaryIntegral(u => weight(u) * weight(u), c, x, h) / (n * h);
    }

    private double Limit(double h)
    {
        Guard.Positive(h);
        double limit = Target.Support.Lower;
        return DerivativeOrder == 0 && double.IsFinite(limit)
            ? limit
            : throw new InvalidOperationException(Guard.Text($"An error near a limit needs a density (derivative 0) with a finite lower end, but {Target.Name} starts at {limit} and derivative {DerivativeOrder} is asked for."));
    }

    private double BoundaryIntegral(Func<double, double> f, double c, double x, double h)
    {
        double radius = QuadratureError.Radius(Kernel);
        double longest = double.IsFinite(Kernel.SupportRadius) ? radius : 2; // as in the pointwise errors
        double to = Math.Min(c, radius);
        return PanelRule.Integrate(f, PanelRule.Panels(-radius, to, Target.Splits.Select(s => (x - s) / h).Append(0).Append((2 * c) - radius), longest));
    }

    private Func<double, double> BoundaryWeight(BoundaryCorrection correction, double c)
    {
        if (!(c >= 0 && double.IsFinite(c)))
        {
            throw new ArgumentOutOfRangeException(nameof(c), Guard.Text($"c must be at least 0 and finite, but is {c}: it is the distance from the limit in bandwidths."));
        }

        Kernel k = Kernel;
        double radius = QuadratureError.Radius(k);
        List<double> panels = PanelRule.Panels(-radius, Math.Min(c, radius), [0], double.IsFinite(k.SupportRadius) ? radius : 2);
        double a0 = PanelRule.Integrate(k.ValueCore, panels);
        double a1 = PanelRule.Integrate(u => u * k.ValueCore(u), panels);
        double a2 = PanelRule.Integrate(u => u * u * k.ValueCore(u), panels);
        double scale = (a0 * a2) - (a1 * a1);
        return correction switch
        {
            BoundaryCorrection.None => k.ValueCore,
            BoundaryCorrection.Renormalised => u => k.ValueCore(u) / a0,
            BoundaryCorrection.Reflection => u => k.ValueCore(u) + k.ValueCore((2 * c) - u),
            BoundaryCorrection.LinearKernel => u => (a2 - (a1 * u)) / scale * k.ValueCore(u),
            _ => throw new ArgumentException(Guard.Text($"correction must be None, Renormalised, Reflection or LinearKernel, but is {correction}: the others are not linear in the observations."), nameof(correction)),
        };
    }
}
