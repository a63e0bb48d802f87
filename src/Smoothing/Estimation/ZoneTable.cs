using Smoothing.Numerics;

namespace Smoothing.Estimation;

/// <summary>Mass of a mended curve over the stretch where a limit is felt, from either side.</summary>
/// <remarks>
/// Method: the stretch is cut into panels at every kink of the curve and at most an eighth of a bandwidth wide; each is summed by a
/// Gauss–Legendre rule, exact for polynomials of degree 23 (7 where kinks leave a sixty-fourth of a bandwidth or less), once, and part of a panel
/// is summed on that part alone. Panels where the raw curve changes sign are cut there. All weights are positive, so the distribution function
/// never falls. Dominant error: rounding; where a stretch holds more kinks than are placed, those inside a panel.
/// </remarks>
internal sealed class ZoneTable
{
    private const int Nodes = GaussRule.Nodes;

    // Where the support is short against the bandwidth the moments change on the length of the support, not of the bandwidth.
    private const int FewestPanels = 16;

    private readonly BoundaryCurve _curve;
    private readonly double[] _edges;
    private readonly double[] _below;
    private readonly double[] _above;

    public ZoneTable(BoundaryCurve curve, double from, double to, double scale, IEnumerable<double> kinks)
    {
        _curve = curve;
        _edges = Edges(curve, from, to, scale, kinks);
        double[] masses = Masses(curve, _edges, Math.Min(scale, to - from) * GaussRule.NarrowStretch);
        _below = new double[_edges.Length];
        _above = new double[_edges.Length];
        CompensatedSum sum = default;
        for (int k = 1; k < _edges.Length; k++)
        {
            sum.Add(masses[k - 1]);
            _below[k] = sum.Value;
        }

        sum = default;
        for (int k = _edges.Length - 2; k >= 0; k--)
        {
            sum.Add(masses[k]);
            _above[k] = sum.Value;
        }
    }

    public double From => _edges[0];

    public double To => _edges[^1];

    public double Mass => _below[^1];

    /// <summary>∫ of the mended curve from the start of the stretch to each x, or from x to its end; x inside the stretch.</summary>
    public void Tails(ReadOnlySpan<double> x, bool upper, Span<double> destination)
    {
        var nodes = new double[x.Length * Nodes];
        var panel = new int[x.Length];
        for (int i = 0; i < x.Length; i++)
        {
            int found = Array.BinarySearch(_edges, x[i]);
            panel[i] = Math.Clamp(found >= 0 ? found : ~found - 1, 0, _edges.Length - 2);
            (double a, double b) = upper ? (x[i], _edges[panel[i] + 1]) : (_edges[panel[i]], x[i]);
            GaussRule.Place(a, b, nodes.AsSpan(i * Nodes, Nodes));
        }

        var y = new double[nodes.Length];
        _curve.Derivatives(nodes, 0, y);
        for (int i = 0; i < x.Length; i++)
        {
            double width = upper ? _edges[panel[i] + 1] - x[i] : x[i] - _edges[panel[i]];
            double part = GaussRule.Sum(y.AsSpan(i * Nodes, Nodes), width);
            destination[i] = part + (upper ? _above[panel[i] + 1] : _below[panel[i]]);
        }
    }

    private static double[] Edges(BoundaryCurve curve, double from, double to, double scale, IEnumerable<double> kinks)
    {
        int panels = Math.Max(FewestPanels, (int)Math.Ceiling((to - from) / (scale * GaussRule.ShortStretch)));
        var edges = new List<double>();
        for (int i = 0; i <= panels; i++)
        {
            edges.Add(i == panels ? to : from + ((to - from) * i / panels));
        }

        edges.AddRange(kinks.Where(k => k > from && k < to));
        double[] ordered = [.. edges.Distinct().Order()];
        return curve.IsCut ? CutAtZeros(curve, ordered) : ordered;
    }

    // Looks at the raw curve in four places of each panel; where the sign differs the zero becomes an edge.
    private static double[] CutAtZeros(BoundaryCurve curve, double[] edges)
    {
        const int Looks = 4;
        var x = new double[((edges.Length - 1) * Looks) + 1];
        for (int i = 0; i < x.Length; i++)
        {
            (int k, int part) = (i / Looks, i % Looks);
            x[i] = part == 0 ? edges[k] : edges[k] + ((edges[k + 1] - edges[k]) * part / Looks);
        }

        var y = new double[x.Length];
        curve.RawValues(x, y);
        var result = new List<double>(edges);
        for (int i = 1; i < x.Length; i++)
        {
            if ((y[i - 1] < 0 && y[i] > 0) || (y[i - 1] > 0 && y[i] < 0))
            {
                result.Add(Roots.Between(curve.RawValue, x[i - 1], x[i]));
            }
        }

        return [.. result.Distinct().Order()];
    }

    // Of every panel; a few thousand panels at a time, so that a million of them take little memory.
    private static double[] Masses(BoundaryCurve curve, double[] edges, double narrow)
    {
        const int Together = 4096;
        var masses = new double[edges.Length - 1];
        var x = new double[Together * Nodes];
        var y = new double[Together * Nodes];
        for (int start = 0; start < masses.Length; start += Together)
        {
            int end = Math.Min(start + Together, masses.Length);
            int used = 0;
            for (int k = start; k < end; k++)
            {
                int nodes = Points(edges, k, narrow);
                GaussRule.Place(edges[k], edges[k + 1], x.AsSpan(used, nodes));
                used += nodes;
            }

            curve.Derivatives(x.AsSpan(0, used), 0, y.AsSpan(0, used));
            used = 0;
            for (int k = start; k < end; k++)
            {
                int nodes = Points(edges, k, narrow);
                masses[k] = GaussRule.Sum(y.AsSpan(used, nodes), edges[k + 1] - edges[k]);
                used += nodes;
            }
        }

        return masses;
    }

    private static int Points(double[] edges, int k, double narrow) => edges[k + 1] - edges[k] <= narrow ? GaussRule.FewNodes : Nodes;
}
