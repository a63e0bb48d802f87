using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Inference;

/// <summary>The band for the difference of two densities.</summary>
/// <remarks>
/// Method: gamma limits [l, u] of each bias-corrected curve at the tube value of the difference, then a ± hybrid of the two: (b − a) − √((b − l_b)² + (u_a − a)²) and
/// (b − a) + √((u_b − b)² + (a − l_a)²) (Zou and Donner 2008, "MOVER"). The tube value is that of the smaller bandwidth. Near a known limit the lower limits also
/// allow for the error that the terms show.
/// </remarks>
internal static class DifferenceLimits
{
    public static DifferenceBand Of(Sample a, double ha, Sample b, double hb, double[] x, Interval support, double level)
    {
        double c = TubeValue.Of(x[^1] - x[0], Math.Min(ha, hb), TubeValue.Debiased, 1 - level);
        double tail = NormalLaw.Survival(c);
        (double[] fa, Interval[] la) = One(a, ha, x, support, c, tail);
        (double[] fb, Interval[] lb) = One(b, hb, x, support, c, tail);
        var lower = new double[x.Length];
        var upper = new double[x.Length];
        var difference = new double[x.Length];
        for (int j = 0; j < x.Length; j++)
        {
            difference[j] = fb[j] - fa[j];
            lower[j] = difference[j] - double.Hypot(fb[j] - lb[j].Lower, la[j].Upper - fa[j]);
            upper[j] = difference[j] + double.Hypot(lb[j].Upper - fb[j], fa[j] - la[j].Lower);
        }

        return new DifferenceBand(x, lower, upper, difference, c, level, ha, hb);
    }

    private static (double[] Values, Interval[] Limits) One(Sample sample, double h, double[] x, Interval support, double c, double tail)
    {
        var curve = new DebiasedCurve(sample, h, support, 1);
        var f = new double[x.Length];
        var size = new double[x.Length];
        var near = new double[x.Length];
        curve.Evaluate(x, f, size, near);
        var limits = new Interval[x.Length];
        for (int j = 0; j < x.Length; j++)
        {
            Interval here = GammaLimits.Of(f[j], size[j], tail);
            double low = double.IsNaN(near[j]) ? here.Lower : Math.Min(here.Lower, Math.Max(0, f[j] - (c * near[j])));
            f[j] = Math.Max(f[j], 0);
            limits[j] = new Interval(Math.Min(low, f[j]), Math.Max(here.Upper, f[j]));
        }

        return (f, limits);
    }
}
