using Smoothing.Numerics;

namespace Smoothing.Kernels;

/// <content>Transform, self-convolution and incomplete moments.</content>
public abstract partial class Kernel
{
    /// <summary>The Fourier transform κ(t) = ∫ K(u) cos(tu) du: 1 at t = 0, symmetric.</summary>
    /// <remarks>Closed forms; near t = 0, where they cancel, a positive-weight rule. Accuracy: 1e-14 of κ(0) = 1.</remarks>
    /// <param name="t">Frequency per bandwidth; ±∞ gives 0.</param>
    /// <returns>A number in [−1, 1] for kernels that are nowhere negative.</returns>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="t"/> is NaN.</exception>
    public double FourierTransform(double t)
    {
        double frequency = Math.Abs(Guard.Number(t));
        return frequency == 0 ? 1 : double.IsInfinity(frequency) ? 0 : TransformCore(frequency);
    }

    /// <summary>The self-convolution (K∗K)(u) = ∫ K(v) K(u − v) dv; (K∗K)(0) = R(K).</summary>
    /// <remarks>Closed forms, or a rule that is exact for the polynomial pieces. Accuracy: 1e-14 of the value at 0.</remarks>
    /// <param name="u">Distance in bandwidths; ±∞ gives 0.</param>
    /// <returns>The convolution, zero beyond twice the support radius.</returns>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="u"/> is NaN.</exception>
    public double SelfConvolution(double u)
    {
        double distance = Math.Abs(Guard.Number(u));
        return distance >= 2 * SupportRadius || double.IsInfinity(distance) ? 0 : SelfConvolutionCore(distance);
    }

    /// <summary>The incomplete moment ∫ uʲ K(u) du from −∞ to <paramref name="upper"/>; order 0 is <see cref="Cumulative"/>.</summary>
    /// <param name="order">j, 0 or more.</param>
    /// <param name="upper">Upper end in bandwidths; +∞ gives <see cref="Moment"/>, −∞ gives 0.</param>
    /// <returns>The integral.</returns>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="upper"/> is NaN, or <paramref name="order"/> negative.</exception>
    public double IncompleteMoment(int order, double upper)
    {
        Guard.AtLeast(order, 0);
        Guard.Number(upper);
        if (upper >= SupportRadius)
        {
            return Moment(order);
        }

        return upper <= -SupportRadius ? 0 : order == 0 ? CumulativeCore(upper) : IncompleteMomentCore(order, upper);
    }

    /// <summary>κ(t) for t above 0 and finite.</summary>
    internal virtual double TransformCore(double t)
    {
        // Half a turn of the cosine a panel, at most a quarter of the radius wide: 24 nodes leave nothing of a smooth piece.
        double end = FiniteRadius;
        int panels = (int)Math.Ceiling(Math.Max(4, end * t / Math.PI));
        CompensatedSum sum = default;
        for (int i = 0; i < panels; i++)
        {
            sum.Add(GaussLegendre.Integrate(u => ValueCore(u) * Math.Cos(t * u), end * i / panels, end * (i + 1) / panels, 24));
        }

        return 2 * sum.Value;
    }

    /// <summary>(K∗K)(u) for u from 0 to below twice the radius.</summary>
    internal virtual double SelfConvolutionCore(double u)
    {
        // Symmetric about u/2: twice the half from u/2 on, cut at the kinks at u and at the end.
        double end = FiniteRadius;
        double[] cuts = [u / 2, Math.Min(u, end), end];
        CompensatedSum sum = default;
        for (int i = 1; i < cuts.Length; i++)
        {
            double width = cuts[i] - cuts[i - 1];
            int panels = Math.Max(1, (int)Math.Ceiling(width / (end / 8)));
            for (int k = 0; k < panels && width > 0; k++)
            {
                sum.Add(GaussLegendre.Integrate(v => ValueCore(v) * ValueCore(u - v), cuts[i - 1] + (width * k / panels), cuts[i - 1] + (width * (k + 1) / panels), 24));
            }
        }

        return 2 * sum.Value;
    }

    /// <summary>∫ uʲ K up to a point inside the support, j at least 1.</summary>
    internal virtual double IncompleteMomentCore(int order, double upper)
    {
        // By symmetry only the lower half is integrated: for p > 0, even j: μ_j − M_j(−p); odd j: M_j(−p).
        if (upper > 0)
        {
            double mirrored = IncompleteMomentCore(order, -upper);
            return order % 2 == 0 ? EvenMoment(order) - mirrored : mirrored;
        }

        double end = FiniteRadius;
        double width = end + upper;
        if (width <= 0)
        {
            return 0;
        }

        int panels = Math.Max(4, (int)Math.Ceiling(width / (end / 16)));
        CompensatedSum sum = default;
        for (int i = 0; i < panels; i++)
        {
            sum.Add(GaussLegendre.Integrate(u => Math.Pow(u, order) * ValueCore(u), -end + (width * i / panels), -end + (width * (i + 1) / panels), 24));
        }

        return sum.Value;
    }

    /// <summary>The radius, or a distance beyond which K and its low moments leave nothing of a double.</summary>
    private protected virtual double FiniteRadius
    {
        get
        {
            double reach = double.IsFinite(SupportRadius) ? SupportRadius : 8;
            while (double.IsInfinity(SupportRadius) && reach < 1e6 && Math.Abs(CumulativeCore(-reach)) * Math.Pow(reach, 4) > 1e-18)
            {
                reach *= 2;
            }

            return reach;
        }
    }
}
