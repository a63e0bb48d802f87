using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Estimation;

/// <summary>The sums S₀ = (1/(Σw h)) Σ w K(u) and S₁ = (1/(Σw h)) Σ w u K(u), u = (x − X)/h, and their derivatives in x, near a limit.</summary>
/// <remarks>
/// Method: both come through the seam. S₀ is the plain estimate. For the Gaussian uφ = −φ′, so S₁ = −h S₀′. For other kernels
/// h S₁ = d S₀ − D T₀ with d the distance of x from the limit, T₀ the plain estimate with each weight times the distance of its value from the
/// limit, and D the mean distance: only values within twice the reach of the kernel take part, so no term is larger than about S₀ and the
/// difference loses no more than a digit.
/// </remarks>
internal sealed class BoundarySums
{
    private readonly KernelSums _sums;
    private readonly double _bandwidth;
    private readonly Interval _support;
    private readonly bool _gaussian;
    private readonly Side? _lower;
    private readonly Side? _upper;

    public BoundarySums(KernelSums sums, Kernel kernel, double bandwidth, Interval support, Sample? sample, Func<Sample, double, KernelSums> sumsOf)
    {
        _sums = sums;
        _bandwidth = bandwidth;
        _support = support;
        _gaussian = ReferenceEquals(kernel, Kernel.Gaussian);
        HasFirst = _gaussian || sample is not null;
        if (!_gaussian && sample is not null)
        {
            double reach = 2 * BoundaryMoments.ReachOf(kernel) * bandwidth;
            _lower = Side.Of(sample, support.Lower, 1, reach, bandwidth, sumsOf);
            _upper = Side.Of(sample, support.Upper, -1, reach, bandwidth, sumsOf);
        }
    }

    /// <summary>Whether <see cref="First"/> can be had: values kept, or a kernel whose first-moment sum is one of its derivatives.</summary>
    public bool HasFirst { get; }

    public void Zeroth(ReadOnlySpan<double> x, int derivative, Span<double> destination) => _sums.Derivatives(x, derivative, destination);

    /// <summary>S₁⁽ʲ⁾ at places within the kernel's reach of a limit.</summary>
    public void First(ReadOnlySpan<double> x, int derivative, Span<double> destination)
    {
        if (_gaussian)
        {
            _sums.Derivatives(x, derivative + 1, destination);
            for (int i = 0; i < x.Length; i++)
            {
                destination[i] *= -_bandwidth;
            }

            return;
        }

        var zeroth = new double[x.Length];
        var below = new double[x.Length];
        _sums.Derivatives(x, derivative, zeroth);
        if (derivative > 0)
        {
            _sums.Derivatives(x, derivative - 1, below);
        }

        for (int i = 0; i < x.Length; i++)
        {
            bool fromLower = x[i] - _support.Lower <= _support.Upper - x[i];
            double distance = x[i] - (fromLower ? _support.Lower : _support.Upper);
            destination[i] = ((distance * zeroth[i]) + (derivative * below[i])) / _bandwidth;
        }

        _lower?.Subtract(x, derivative, (x, support) => x - support.Lower <= support.Upper - x, _support, destination);
        _upper?.Subtract(x, derivative, (x, support) => !(x - support.Lower <= support.Upper - x), _support, destination);
    }

    /// <summary>The values near one limit, weighted with their distance from it.</summary>
    private sealed class Side(KernelSums sums, double factor)
    {
        public static Side? Of(Sample sample, double limit, int direction, double reach, double bandwidth, Func<Sample, double, KernelSums> sumsOf)
        {
            if (!double.IsFinite(limit))
            {
                return null;
            }

            var values = new List<double>();
            var weights = new List<double>();
            CompensatedSum total = default;
            for (int i = 0; i < sample.Count; i++)
            {
                double distance = direction * (sample.Values[i] - limit);
                double weight = sample.IsWeighted ? sample.Weights[i] : 1;
                if (distance > 0 && distance <= reach && weight > 0)
                {
                    values.Add(sample.Values[i]);
                    weights.Add(weight * distance);
                    total.Add(weight * distance);
                }
            }

            if (values.Count == 0)
            {
                return null;
            }

            Sample near = Sample.Of([.. values], new SampleOptions { Weights = weights.ToArray() });
            return new Side(sumsOf(near, bandwidth), direction * total.Value / (sample.TotalWeight * bandwidth));
        }

        public void Subtract(ReadOnlySpan<double> x, int derivative, Func<double, Interval, bool> mine, Interval support, Span<double> destination)
        {
            var part = new double[x.Length];
            sums.Derivatives(x, derivative, part);
            for (int i = 0; i < x.Length; i++)
            {
                destination[i] -= mine(x[i], support) ? factor * part[i] : 0;
            }
        }
    }
}
