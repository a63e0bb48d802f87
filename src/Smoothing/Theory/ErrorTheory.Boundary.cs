using Smoothing.Kernels;
using Smoothing.Numerics;

namespace Smoothing.Theory;

/// <content>Errors near a known lower limit of the range.</content>
public sealed partial class ErrorTheory
{
    /// <summary>Exact bias at x = lower + c·h of an estimate that treats the lower end of the target's support in the named way.</summary>
    /// <remarks>
    /// With aₗ = ∫ uˡK(u) du over u ≤ c the weight w of an observation X at u = (x − X)/h ≤ c is K(u), K(u)/a₀, K(u) + K(2c − u), or
    /// (a₂ − a₁u)K(u)/(a₀a₂ − a₁²). These are the estimates before negative parts are cut and before division by their mass.
    /// The bias is ∫ w(u){f(x − hu) − f(x)} du + (∫w − 1) f(x); relative accuracy is kept as h → 0 where f'' is known and finite. Source: Jones (1993).
    /// </remarks>
    /// <param name="correction">None, Renormalised, Reflection or LinearKernel (which needs a kernel of order 2).</param>
    /// <param name="c">Distance from the limit in bandwidths, 0 or more; 1 is the edge of the zone for a kernel of radius 1.</param>
    /// <param name="h">Bandwidth, positive.</param>
    /// <returns>The bias.</returns>
    /// <exception cref="ArgumentException">Another correction, or LinearKernel with a kernel of higher order.</exception>
    /// <exception cref="ArgumentOutOfRangeException">c is negative or not finite, h not positive.</exception>
    /// <exception cref="InvalidOperationException">The target has no finite lower end, or the theory is one of a derivative.</exception>
    public double BoundaryBias(BoundaryCorrection correction, double c, double h)
    {
        BoundaryWeight weight = BoundaryWeight.Of(Kernel, correction, c);
        (double x, double width) = NearLimit(c, h);
        double f = _target.ValueCore(x);
        double direct = BoundaryIntegral(u => weight.At(u) * (_target.ValueCore(x - (width * u)) - f), c, x, width);
        if (Math.Abs(direct) < 1e-3 * f && _target.Knows(2) && double.IsFinite(_target.Derivative(_target.Support.Lower, 2)))
        {
            // The difference cancels: Taylor's formula with its remainder as an integral.
            List<double> unit = PanelRule.Panels(0, 1, [], 0.5);
            double rest = BoundaryIntegral(u => u * u * weight.At(u) * PanelRule.Integrate(t => (1 - t) * _target.DerivativeCore(x - (width * u * t), 2), unit), c, x, width);
            direct = (width * width * rest) - (width * weight.First * _target.Derivative(x));
        }

        return Out(direct + (f * weight.Defect), 1);
    }

    /// <summary>Exact variance at x = lower + c·h of an estimate that treats the lower end of the target's support in the named way.</summary>
    /// <param name="correction">None, Renormalised, Reflection or LinearKernel; the weights are those of <see cref="BoundaryBias"/>.</param>
    /// <param name="c">Distance from the limit in bandwidths, 0 or more.</param>
    /// <param name="h">Bandwidth, positive.</param>
    /// <param name="n">Number of observations, at least 1.</param>
    /// <returns>{∫ w² f(x − hu) du/h − E²}/n.</returns>
    /// <exception cref="ArgumentException">Another correction, or LinearKernel with a kernel of higher order.</exception>
    /// <exception cref="ArgumentOutOfRangeException">A number is out of range.</exception>
    /// <exception cref="InvalidOperationException">The target has no finite lower end, or the theory is one of a derivative.</exception>
    public double BoundaryVariance(BoundaryCorrection correction, double c, double h, long n)
    {
        Guard.AtLeast(n, 1);
        BoundaryWeight weight = BoundaryWeight.Of(Kernel, correction, c);
        (double x, double width) = NearLimit(c, h);
        double mean = BoundaryIntegral(u => weight.At(u) * _target.ValueCore(x - (width * u)), c, x, width);
        double square = BoundaryIntegral(u => weight.At(u) * weight.At(u) * _target.ValueCore(x - (width * u)), c, x, width);
        return Out(Math.Max(0, (square / width) - (mean * mean)) / n, 2);
    }

    /// <summary>Leading bias: (b₀ − 1) f − h b₁ f' + h² b₂ f''/2 at x = lower + c·h, with bₗ = ∫ uˡw(u) du.</summary>
    /// <remarks>bₗ in closed form from the incomplete moments aₗ, such as b₂ = (a₂² − a₁a₃)/(a₀a₂ − a₁²) and b₁ = 0 for the linear kernel. Source: Jones (1993).</remarks>
    /// <param name="correction">None, Renormalised, Reflection or LinearKernel.</param>
    /// <param name="c">Distance from the limit in bandwidths, 0 or more.</param>
    /// <param name="h">Bandwidth, positive.</param>
    /// <returns>The asymptotic bias, its terms up to h².</returns>
    /// <exception cref="ArgumentException">Another correction, or LinearKernel with a kernel of higher order.</exception>
    /// <exception cref="ArgumentOutOfRangeException">c is negative or not finite, h not positive.</exception>
    /// <exception cref="InvalidOperationException">No finite lower end, a theory of a derivative, or f' or f'' not known.</exception>
    public double AsymptoticBoundaryBias(BoundaryCorrection correction, double c, double h)
    {
        BoundaryWeight weight = BoundaryWeight.Of(Kernel, correction, c);
        (double x, double width) = NearLimit(c, h);
        double slope = weight.First == 0 ? 0 : width * weight.First * _target.Derivative(x);
        return Out((weight.Defect * _target.Value(x)) - slope + (width * width * weight.Second / 2 * _target.Derivative(x, 2)), 1);
    }

    /// <summary>Leading variance: f(x) ∫ w²/(nh) at x = lower + c·h.</summary>
    /// <param name="correction">None, Renormalised, Reflection or LinearKernel.</param>
    /// <param name="c">Distance from the limit in bandwidths, 0 or more.</param>
    /// <param name="h">Bandwidth, positive.</param>
    /// <param name="n">Number of observations, at least 1.</param>
    /// <returns>The asymptotic variance.</returns>
    /// <exception cref="ArgumentException">Another correction, or LinearKernel with a kernel of higher order.</exception>
    /// <exception cref="ArgumentOutOfRangeException">A number is out of range.</exception>
    /// <exception cref="InvalidOperationException">The target has no finite lower end, or the theory is one of a derivative.</exception>
    public double AsymptoticBoundaryVariance(BoundaryCorrection correction, double c, double h, long n)
    {
        Guard.AtLeast(n, 1);
        BoundaryWeight weight = BoundaryWeight.Of(Kernel, correction, c);
        (double x, double width) = NearLimit(c, h);
        return Out(_target.Value(x) * BoundaryIntegral(u => weight.At(u) * weight.At(u), c, x, width) / (n * width), 2);
    }

    private (double X, double Width) NearLimit(double c, double h)
    {
        double width = H(h);
        double limit = _target.Support.Lower;
        return DerivativeOrder == 0 && double.IsFinite(limit)
            ? (limit + (c * width), width)
            : throw new InvalidOperationException(Guard.Text($"An error near a limit needs a density (derivative 0) with a finite lower end, but {Target.Name} starts at {Target.Support.Lower} and derivative {DerivativeOrder} is asked for."));
    }

    private double BoundaryIntegral(Func<double, double> f, double c, double x, double h)
    {
        double radius = QuadratureError.Radius(Kernel);
        double longest = double.IsFinite(Kernel.SupportRadius) ? radius : 4; // as in the pointwise errors
        double to = Math.Min(c, radius);
        return PanelRule.Integrate(f, PanelRule.Panels(-radius, to, _target.Splits.Select(s => (x - s) / h).Append(0).Append((2 * c) - radius), longest));
    }
}
