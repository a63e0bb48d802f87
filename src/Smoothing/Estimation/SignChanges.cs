using Smoothing.Numerics;

namespace Smoothing.Estimation;

/// <summary>Where a curve that may be negative changes sign.</summary>
/// <remarks>
/// Method: the curve is read on a grid of Scale/16 over its core and twelve bandwidths beyond (less where it ends), changes of sign are then closed in by Brent's method. A dip
/// narrower than a sixteenth of the bandwidth would be missed; a sum of kernels that are smooth on the scale h makes none of a size that
/// matters (its mass is below the third power of that step).
/// </remarks>
internal static class SignChanges
{
    private const int StepsPerScale = 16;

    // Beyond 12 bandwidths a Gaussian-based kernel is below 1e-30 of its peak.
    private const double Reach = 12;

    // A range of more steps than this is read in wider ones: 2²⁰ points are the most one scan may cost.
    private const int MaximumPoints = 1 << 20;

    public static double[] Of(CurveForm form)
    {
        double from = Math.Max(form.Ends.Lower, form.Core.Lower - (Reach * form.Scale));
        double to = Math.Min(form.Ends.Upper, form.Core.Upper + (Reach * form.Scale));
        int points = (int)Math.Min(MaximumPoints, Math.Ceiling((to - from) / form.Scale * StepsPerScale) + 1);
        points = Math.Max(points, 2);
        var x = new double[points];
        var y = new double[points];
        for (int i = 0; i < points; i++)
        {
            x[i] = i == points - 1 ? to : from + ((to - from) * i / (points - 1));
        }

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
