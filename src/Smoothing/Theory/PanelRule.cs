using MathNet.Numerics.Integration;
using Smoothing.Numerics;

namespace Smoothing.Theory;

/// <summary>Adaptive Gauss–Legendre quadrature that starts from given panels.</summary>
/// <remarks>
/// Method: 20 points a panel, exact for degree 39. The last two Legendre coefficients of the integrand on the panel, got from the same
/// values, tell whether it is resolved; if not, the panel is halved. For a smooth integrand the error is about the square of those
/// coefficients, so 1e-9 of the whole leaves nothing; at a kink between panels it is about 1e-10 of the whole.
/// </remarks>
internal static class PanelRule
{
    private const int Points = 20;
    private const double Resolved = 1e-9;
    private const int MostPanels = 4000; // a bound on time; reached only by an integrand that is not a function of bounded variation
    private static readonly GaussLegendreRule s_rule = new(-1, 1, Points);
    private static readonly double[] s_nodes = s_rule.Abscissas;
    private static readonly double[] s_weights = s_rule.Weights;
    private static readonly double[] s_last = Coefficient(Points - 1);
    private static readonly double[] s_before = Coefficient(Points - 2);

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

    /// <summary>∫ f over the panels; parts below 1e-9 of <paramref name="floor"/> need not be resolved.</summary>
    public static double Integrate(Func<double, double> f, List<double> ends, double floor = 0)
    {
        CompensatedSum sum = default;
        double scale = floor;
        List<(double From, double To, double Value, double Left)>? rough = null;
        for (int i = 1; i < ends.Count; i++)
        {
            (double value, double size, double rest) = Panel(f, ends[i - 1], ends[i]);
            scale += size;
            sum.Add(value);
            if (rest > Resolved * scale)
            {
                (rough ??= []).Add((ends[i - 1], ends[i], value, rest));
            }
        }

        for (int panels = ends.Count; rough is { Count: > 0 } && panels < MostPanels; panels++)
        {
            (double from, double to, double value, double rest) = rough[^1];
            rough.RemoveAt(rough.Count - 1);
            double middle = from + ((to - from) / 2);
            if (rest <= Resolved * scale || !(middle > from && middle < to))
            {
                continue;
            }

            sum.Add(-value);
            (double left, _, double leftRest) = Panel(f, from, middle);
            (double right, _, double rightRest) = Panel(f, middle, to);
            sum.Add(left);
            sum.Add(right);
            rough.Add((from, middle, left, leftRest));
            rough.Add((middle, to, right, rightRest));
        }

        return sum.Value;
    }

    /// <summary>∫ f from <paramref name="from"/> to ∞ (or to −∞ for a negative scale, still counted positive), x = from + scale·t/(1 − t).</summary>
    public static double IntegrateTail(Func<double, double> f, double from, double scale, double floor = 0) =>
        Integrate(
            t => f(from + (scale * t / (1 - t))) * Math.Abs(scale) / ((1 - t) * (1 - t)),
            [0, 0.25, 0.5, 0.75, 1],
            floor);

    /// <summary>∫ f over [end, to] (either side) where f behaves as a power of the distance from <paramref name="end"/>: x = end + (to − end) t⁸.</summary>
    public static double IntegrateFromPower(Func<double, double> f, double end, double to) =>
        Integrate(
            t =>
            {
                double t7 = t * t * t * t * t * t * t;
                return f(end + ((to - end) * t7 * t)) * 8 * t7 * Math.Abs(to - end);
            },
            [0, 0.25, 0.5, 0.75, 1]);

    private static (double Value, double Size, double Left) Panel(Func<double, double> f, double from, double to)
    {
        double half = (to - from) / 2;
        double middle = from + half;
        double value = 0;
        double size = 0;
        double last = 0;
        double before = 0;
        for (int j = 0; j < Points; j++)
        {
            double y = f(middle + (half * s_nodes[j]));
            value += s_weights[j] * y;
            size += s_weights[j] * Math.Abs(y);
            last += s_last[j] * y;
            before += s_before[j] * y;
        }

        return (half * value, half * size, half * (Math.Abs(last) + Math.Abs(before)));
    }

    /// <summary>Weights that give the Legendre coefficient of degree n from the values at the nodes: (2n + 1)/2 w Pₙ.</summary>
    private static double[] Coefficient(int n)
    {
        var a = new double[Points];
        for (int j = 0; j < Points; j++)
        {
            double below = 1;
            double p = s_nodes[j];
            for (int k = 2; k <= n; k++)
            {
                (below, p) = (p, ((((2 * k) - 1) * s_nodes[j] * p) - ((k - 1) * below)) / k);
            }

            a[j] = (n + 0.5) * s_weights[j] * p;
        }

        return a;
    }
}
