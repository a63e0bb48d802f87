using Smoothing.Kernels;
using Smoothing.Numerics;

namespace Smoothing.Theory;

/// <summary>The weight w(u), u ≤ c, of an observation near a lower limit c bandwidths away, with its moments ∫w − 1, ∫uw, ∫u²w.</summary>
/// <remarks>Method: closed forms in the incomplete moments aₗ = ∫ uˡK over u ≤ c. Source: Jones (1993); reflection by substitution of 2c − u.</remarks>
internal sealed class BoundaryWeight
{
    private BoundaryWeight(Func<double, double> at, double defect, double first, double second)
    {
        At = at;
        Defect = defect;
        First = first;
        Second = second;
    }

    public Func<double, double> At { get; }

    public double Defect { get; }

    public double First { get; }

    public double Second { get; }

    public static BoundaryWeight Of(Kernel k, BoundaryCorrection correction, double c)
    {
        if (!(c >= 0 && double.IsFinite(c)))
        {
            throw new ArgumentOutOfRangeException(nameof(c), Guard.Text($"c must be at least 0 and finite, but is {c}: it is the distance from the limit in bandwidths."));
        }

        double a0 = k.IncompleteMoment(0, c);
        double a1 = k.IncompleteMoment(1, c);
        double a2 = k.IncompleteMoment(2, c);
        double beyond = k.Cumulative(-c); // 1 − a₀ without cancellation
        switch (correction)
        {
            case BoundaryCorrection.None:
                return new(k.ValueCore, -beyond, a1, a2);
            case BoundaryCorrection.Renormalised:
                return new(u => k.ValueCore(u) / a0, 0, a1 / a0, a2 / a0);
            case BoundaryCorrection.Reflection:
                double step = 2 * c;
                return new(u => k.ValueCore(u) + k.ValueCore(step - u), 0, (2 * a1) + (step * beyond), k.Moment(2) + (step * step * beyond) + (2 * step * a1));
            case BoundaryCorrection.LinearKernel when k.Order == 2:
                double scale = (a0 * a2) - (a1 * a1);
                return new(u => (a2 - (a1 * u)) / scale * k.ValueCore(u), 0, 0, ((a2 * a2) - (a1 * k.IncompleteMoment(3, c))) / scale);
            case BoundaryCorrection.LinearKernel:
                throw new ArgumentException(Guard.Text($"correction LinearKernel needs a kernel of order 2, but {k.Name} has order {k.Order}: its weight may have no finite scale. Use Renormalised."), nameof(correction));
            default:
                throw new ArgumentException(Guard.Text($"correction must be None, Renormalised, Reflection or LinearKernel, but is {correction}: the others are not linear in the observations."), nameof(correction));
        }
    }
}
