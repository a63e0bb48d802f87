using Smoothing.Numerics;

namespace Smoothing.Estimation;

public sealed partial class Density
{
    /// <summary>The curve at equally spaced points, by linear binning and one Fourier transform pair.</summary>
    /// <param name="from">First abscissa, in the unit of the data.</param>
    /// <param name="to">Last abscissa, above <paramref name="from"/>.</param>
    /// <param name="points">How many points, 2 or more; both ends included.</param>
    /// <returns>Abscissae and densities (1/unit).</returns>
    /// <remarks>
    /// <para>The values are spread linearly over the nodes of an internal grid of width δ. The grid refines the asked one by a
    /// whole factor, so no interpolation follows, and δ is chosen from h alone, however few points are asked for.</para>
    /// <para>Error against <see cref="Values"/>: at most (δ²/8)·max|K″|/h³ at every point, with δ so small that this is at
    /// most 10⁻⁵ K(0)/h, for kernels with a continuous slope (Gaussian and its higher orders, logistic, biweight, triweight,
    /// tricube). For kernels with a kink (triangular, Epanechnikov, cosine, Laplace) at most (δ/2)·max|K′|/h², δ ≤ h/128. For the
    /// uniform, which jumps, the error is stated in the integral: ∫|error| ≤ δ/(2h), δ ≤ h/128. Rounding adds about 10⁻¹⁵ of
    /// the largest density. Source of the first bound: linear binning is linear interpolation of K between nodes, Jones &amp; Lotwick (1984).</para>
    /// <para>With a known limit, with negative parts cut, or where the internal grid would be too long (values far apart
    /// compared with h), the points are computed exactly by <see cref="Values"/> instead. Cost: O(n + N log N), N the internal grid.</para>
    /// </remarks>
    /// <exception cref="ArgumentOutOfRangeException"><paramref name="points"/> is below 2, or an end is not finite.</exception>
    /// <exception cref="ArgumentException"><paramref name="from"/> is not below <paramref name="to"/>.</exception>
    public Curve Tabulate(double from, double to, int points = 401)
    {
        Guard.Range(from, to);
        Guard.AtLeast(points, 2);
        double[] x = Abscissae(from, to, points);
        var y = new double[points];
        if (Sample is null || !IsPlain || !BinnedTable.TryFill(Sample, Kernel, Bandwidth, from, to, y))
        {
            Values(x, y);
        }

        return new Curve(x, y);
    }

    // Each from its own product: no drift, and the last one is the asked end to the bit.
    private static double[] Abscissae(double from, double to, int points)
    {
        var x = new double[points];
        for (int j = 0; j < points; j++)
        {
            double share = (double)j / (points - 1);
            x[j] = ((1 - share) * from) + (share * to);
        }

        return x;
    }
}
