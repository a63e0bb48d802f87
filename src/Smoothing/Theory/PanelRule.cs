using MathNet.Numerics.Integration;
using Smoothing.Numerics;

namespace Smoothing.Theory;

/// <summary>Composite Gauss–Legendre quadrature on given panels.</summary>
/// <remarks>Method: 20 points a panel; exact for degree 39. The caller cuts at kinks, so what is left is smooth on a panel.</remarks>
internal static class PanelRule
{
    private static readonly GaussLegendreRule s_rule = new(-1, 1, 20);
    private static readonly double[] s_nodes = s_rule.Abscissas;
    private static readonly double[] s_weights = s_rule.Weights;

    /// <summary>The cuts inside [from, to] with both ends, no panel longer than <paramref name="longest"/>.</summary>
    public static List<double> Panels(double from, double to, IEnumerable<double> cuts, double longest)
    {
        var ends = new List<double> { from };
        foreach (double cut in cuts.Where(c => c > from && c < to).Append(to).Order())
        {
            double last = ends[^1];
            if (!(cut - last > 1e-14 * Math.Max(Math.Abs(cut), Math.Abs(last))))
            {
                continue;
            }

            int parts = (int)Math.Min(1000, Math.Ceiling((cut - last) / longest));
            for (int i = 1; i <= parts; i++)
            {
                ends.Add(i == parts ? cut : last + ((cut - last) * i / parts));
            }
        }

        return ends;
    }

    public static double Integrate(Func<double, double> f, List<double> ends)
    {
        CompensatedSum sum = default;
        for (int i = 1; i < ends.Count; i++)
        {
            double half = (ends[i] - ends[i - 1]) / 2;
            double middle = ends[i - 1] + half;
            for (int j = 0; j < s_nodes.Length; j++)
            {
                sum.Add(half * s_weights[j] * f(middle + (half * s_nodes[j])));
            }
        }

        return sum.Value;
    }
}
