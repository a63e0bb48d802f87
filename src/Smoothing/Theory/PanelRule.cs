using System.Runtime.Intrinsics;
using MathNet.Numerics.Integration;
using Smoothing.Numerics;

namespace Smoothing.Theory;

/// <summary>Adaptive Gauss–Legendre quadrature that starts from given panels.</summary>
/// <remarks>
/// Method: 20 points a panel, exact for degree 39. The last two Legendre coefficients of the integrand on the panel, got from the same
/// values, tell whether it is resolved; if not, the panel is halved. For a smooth integrand the error is about the square of those
/// coefficients, so 1e-9 of the whole leaves nothing; at a kink between panels it is about 1e-10 of the whole. Two integrands that share
/// their work travel as the two lanes of a vector.
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
        double[] inside = [.. cuts.Where(c => c > from && c < to)];
        Array.Sort(inside);
        var ends = new List<double>(inside.Length + 8) { from };
        foreach (double cut in inside)
        {
            Extend(ends, cut, longest);
        }

        Extend(ends, to, longest);
        return ends;
    }

    /// <summary>Panels from the last end up to <paramref name="cut"/>; none where it is the last end but for rounding.</summary>
    public static void Extend(List<double> ends, double cut, double longest)
    {
        double last = ends[^1];
        if (!(cut - last > 1e-14 * Math.Max(Math.Abs(cut), Math.Abs(last))))
        {
            return;
        }

        int parts = (int)Math.Min(1000, Math.Ceiling((cut - last) / longest));
        for (int i = 1; i <= parts; i++)
        {
            ends.Add(i == parts ? cut : last + ((cut - last) * i / parts));
        }
    }

    /// <summary>∫ f over the panels; parts below 1e-9 of <paramref name="floor"/> need not be resolved.</summary>
    public static double Integrate(Func<double, double> f, List<double> ends, double floor = 0) =>
        Integrate(x => Vector128.CreateScalar(f(x)), ends, Vector128.CreateScalar(floor))[0];

    /// <summary>∫ f of two lanes over the panels, each resolved to 1e-9 of its size or floor.</summary>
    public static Vector128<double> Integrate(Func<double, Vector128<double>> f, List<double> ends, Vector128<double> floor)
    {
        CompensatedSum first = default;
        CompensatedSum second = default;
        Vector128<double> scale = floor;
        List<(double From, double To, Vector128<double> Value, Vector128<double> Left)>? rough = null;
        void Add(Vector128<double> value)
        {
            first.Add(value[0]);
            second.Add(value[1]);
        }

        for (int i = 1; i < ends.Count; i++)
        {
            (Vector128<double> value, Vector128<double> size, Vector128<double> rest) = Panel(f, ends[i - 1], ends[i]);
            scale += size;
            Add(value);
            if (Vector128.GreaterThanAny(rest, Resolved * scale))
            {
                (rough ??= []).Add((ends[i - 1], ends[i], value, rest));
            }
        }

        for (int panels = ends.Count; rough is { Count: > 0 } && panels < MostPanels; panels++)
        {
            (double from, double to, Vector128<double> value, Vector128<double> rest) = rough[^1];
            rough.RemoveAt(rough.Count - 1);
            double middle = from + ((to - from) / 2);
            if (!Vector128.GreaterThanAny(rest, Resolved * scale) || !(middle > from && middle < to))
            {
                continue;
            }

            Add(-value);
            (Vector128<double> left, _, Vector128<double> leftRest) = Panel(f, from, middle);
            (Vector128<double> right, _, Vector128<double> rightRest) = Panel(f, middle, to);
            Add(left);
            Add(right);
            rough.Add((from, middle, left, leftRest));
            rough.Add((middle, to, right, rightRest));
        }

        return Vector128.Create(first.Value, second.Value);
    }

    /// <summary>∫ f from <paramref name="from"/> to ∞ (or to −∞ for a negative scale, still counted positive), x = from + scale·t/(1 − t).</summary>
    public static double IntegrateTail(Func<double, double> f, double from, double scale, double floor = 0) =>
        IntegrateTail(x => Vector128.CreateScalar(f(x)), from, scale, Vector128.CreateScalar(floor))[0];

    /// <summary>The same for two lanes.</summary>
    public static Vector128<double> IntegrateTail(Func<double, Vector128<double>> f, double from, double scale, Vector128<double> floor) =>
        Integrate(
            t => f(from + (scale * t / (1 - t))) * (Math.Abs(scale) / ((1 - t) * (1 - t))),
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

    private static (Vector128<double> Value, Vector128<double> Size, Vector128<double> Left) Panel(Func<double, Vector128<double>> f, double from, double to)
    {
        double half = (to - from) / 2;
        double middle = from + half;
        Vector128<double> value = Vector128<double>.Zero;
        Vector128<double> size = Vector128<double>.Zero;
        Vector128<double> last = Vector128<double>.Zero;
        Vector128<double> before = Vector128<double>.Zero;
        for (int j = 0; j < Points; j++)
        {
            Vector128<double> y = f(middle + (half * s_nodes[j]));
            value += s_weights[j] * y;
            size += s_weights[j] * Vector128.Abs(y);
            last += s_last[j] * y;
            before += s_before[j] * y;
        }

        return (half * value, half * size, half * (Vector128.Abs(last) + Vector128.Abs(before)));
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
