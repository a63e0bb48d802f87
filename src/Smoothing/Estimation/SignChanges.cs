using Smoothing.Numerics;

namespace Smoothing.Estimation;

/// <summary>Where a curve that may be negative changes sign.</summary>
/// <remarks>
/// Method: the curve is read on the grid of turning points, sixteen steps a bandwidth; changes of sign are then closed in by Brent's method. A dip
/// narrower than a step would be missed; in a sum of kernels that are smooth on the scale h its mass is of the order of the third power of the
/// step times the curve nearby. Mass beyond six bandwidths from every value is below 1e-8 of a kernel's and keeps the sign of its last point.
/// </remarks>
internal static class SignChanges
{
    public static double[] Of(CurveForm form)
    {
        // The longest chain: without the kinks, which do not make a smooth curve change sign.
        double[] x = form.Grid(4);
        int points = x.Length;
        var y = new double[points];
        form.Derivatives(x, 0, y);
        var changes = new List<double>();
        int last = -1;
        for (int i = 0; i < points; i++)
        {
            if (y[i] == 0)
            {
                continue;
            }

            if (last >= 0 && y[i] > 0 != y[last] > 0)
            {
                changes.Add(Roots.Between(form.Value, x[last], x[i]));
            }

            last = i;
        }

        return [.. changes];
    }
}
