using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Estimation;

/// <summary>Equally spaced densities by linear binning and a Fourier convolution.</summary>
/// <remarks>
/// <para>Method: each value shares its weight between its two neighbouring nodes in proportion to nearness, which is the same as
/// replacing K by its linear interpolant between nodes (Jones &amp; Lotwick 1984). Node counts and kernel ordinates travel as
/// the real and imaginary part of one transform; their product comes back through one inverse.</para>
/// <para>Validity: the period is at least data, asked range and one kernel reach long, so nothing wraps around. Values further
/// than a reach from the asked range are left out beforehand. Dominant error: the interpolant's; see <see cref="KernelSmoothness"/>.</para>
/// </remarks>
internal static class BinnedTable
{
    /// <summary>Error aimed at for kernels with a continuous slope, as a share of K(0)/h: beyond what a plot shows.</summary>
    public const double Aim = 1e-5;

    // Steps per bandwidth: at least 4 for any kernel; 128 where a kink or jump leaves only first order.
    private const double FewestSteps = 4;
    private const double StepsAtKink = 128;

    // A longer internal grid takes longer than exact sums at the asked points.
    private const long LongestGrid = 1 << 20;

    /// <summary>Steps per bandwidth that keep the stated error.</summary>
    public static double StepsPerBandwidth(Kernel kernel)
    {
        KernelSmoothness smoothness = KernelSmoothness.Of(kernel);
        return smoothness.ContinuousDerivatives < 1
            ? StepsAtKink
            : Math.Max(FewestSteps, Math.Sqrt(smoothness.Largest / (8 * Aim * kernel.ValueCore(0))));
    }

    /// <summary>Fills the densities at equal steps from <paramref name="from"/> to <paramref name="to"/>; false when the grid would be too long.</summary>
    public static bool TryFill(Sample sample, Kernel kernel, double bandwidth, double from, double to, Span<double> destination)
    {
        double asked = (to - from) / (destination.Length - 1);
        double refinement = Math.Max(1, Math.Ceiling(asked * StepsPerBandwidth(kernel) / bandwidth));
        return refinement * destination.Length <= int.MaxValue && TryFill(sample, kernel, bandwidth, from, to, (int)refinement, destination);
    }

    /// <summary>The same on an internal grid that splits each asked step into <paramref name="refinement"/> parts.</summary>
    public static bool TryFill(Sample sample, Kernel kernel, double bandwidth, double from, double to, int refinement, Span<double> destination)
    {
        long last = (long)refinement * (destination.Length - 1);
        double step = (to - from) / last;
        double reach = Math.Ceiling(KernelSmoothness.Reach(kernel) * bandwidth / step);
        destination.Clear();
        (double least, double greatest) = NodesInReach(sample.Values, from, 1 / step, reach, last);
        if (!(least <= greatest))
        {
            return true; // no value is near the asked range
        }

        double lower = Math.Min(least, Math.Max(0, least - reach));
        double upper = Math.Max(greatest + 1, Math.Min(last, greatest + 1 + reach));
        double length = upper - lower + 1 + reach;
        if (!(length <= LongestGrid))
        {
            return false;
        }

        int size = 1;
        while (size < length)
        {
            size *= 2;
        }

        var counts = new double[size];
        var ordinates = new double[size];
        Spread(sample, from, 1 / step, (long)lower, least, greatest, counts);
        for (int k = 0; k <= (int)reach; k++)
        {
            double share = kernel.ValueCore(k * step / bandwidth) * (step / bandwidth);
            ordinates[k] = share;
            ordinates[(size - k) % size] = share;
        }

        Convolve(counts, ordinates);
        bool signed = kernel.Order > 2;
        for (int j = 0; j < destination.Length; j++)
        {
            long node = (long)j * refinement;
            if (node >= least - reach && node <= greatest + 1 + reach)
            {
                double value = counts[node - (long)lower] / step;
                destination[j] = signed ? value : Math.Max(0, value); // rounding may leave −1e-17 where nothing is
            }
        }

        return true;
    }

    private static (double Least, double Greatest) NodesInReach(ReadOnlySpan<double> values, double from, double inverse, double reach, double last)
    {
        double least = double.PositiveInfinity;
        double greatest = double.NegativeInfinity;
        foreach (double value in values)
        {
            double node = Math.Floor((value - from) * inverse);
            if (node >= -reach - 1 && node <= last + reach)
            {
                least = Math.Min(least, node);
                greatest = Math.Max(greatest, node);
            }
        }

        return (least, greatest);
    }

    private static void Spread(Sample sample, double from, double inverse, long origin, double least, double greatest, double[] counts)
    {
        ReadOnlySpan<double> values = sample.Values;
        ReadOnlySpan<double> weights = sample.Weights;
        for (int i = 0; i < values.Length; i++)
        {
            double place = (values[i] - from) * inverse;
            double node = Math.Floor(place);
            if (node >= least && node <= greatest)
            {
                double weight = weights.IsEmpty ? 1 : weights[i];
                double right = (place - node) * weight;
                int k = (int)((long)node - origin);
                counts[k] += weight - right;
                counts[k + 1] += right;
            }
        }

        double total = sample.TotalWeight;
        for (int k = 0; k < counts.Length; k++)
        {
            counts[k] /= total;
        }
    }

    // a ← the circular convolution of a and b, b even. With Z the transform of a + ib: A·B = (Z_k + Z̄_{N−k})(Z_k − Z̄_{N−k})/(4i).
    private static void Convolve(double[] a, double[] b)
    {
        int size = a.Length;
        FourierPlan.Forward(a, b);
        for (int k = 0; k <= size / 2; k++)
        {
            int mirror = (size - k) % size;
            double even = (a[k] + a[mirror]) / 2;      // Re A_k
            double odd = (b[k] - b[mirror]) / 2;       // Im A_k
            double kernel = (b[k] + b[mirror]) / 2;    // B_k, real because b is even
            (a[k], b[k]) = (even * kernel, odd * kernel);
            (a[mirror], b[mirror]) = (even * kernel, -odd * kernel);
        }

        FourierPlan.Inverse(a, b);
    }
}
