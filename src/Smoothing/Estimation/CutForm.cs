using Smoothing.Numerics;

namespace Smoothing.Estimation;

/// <summary>A curve with negative parts, cut at zero and divided by the mass that is left.</summary>
/// <remarks>
/// Method: between its changes of sign the mass of the curve comes from the closed form of its distribution function, so the cut curve needs no
/// quadrature. Dominant error: changes of sign closer than the search grid, see <see cref="SignChanges"/>.
/// </remarks>
internal sealed class CutForm : CurveForm
{
    private readonly CurveForm _raw;
    private readonly Lazy<Pieces> _pieces;

    public CutForm(CurveForm raw)
    {
        _raw = raw;
        _pieces = new Lazy<Pieces>(Build);
    }

    public override Interval Ends => _raw.Ends;

    public override Interval Core => _raw.Core;

    public override double Scale => _raw.Scale;

    public override bool MayBeNegative => false;

    public override double[] Grid(int smoothness) => [.. _raw.Grid(smoothness).Concat(_raw.ZeroCrossings).Distinct().Order()];

    public override void Derivatives(ReadOnlySpan<double> x, int order, Span<double> destination)
    {
        double total = _pieces.Value.Total;
        var values = new double[x.Length];
        _raw.Derivatives(x, 0, values);
        _raw.Derivatives(x, order, destination);
        for (int i = 0; i < x.Length; i++)
        {
            destination[i] = values[i] > 0 ? destination[i] / total : 0;
        }
    }

    public override void Cumulatives(ReadOnlySpan<double> x, bool upper, Span<double> destination)
    {
        Pieces pieces = _pieces.Value;
        for (int i = 0; i < x.Length; i++)
        {
            CompensatedSum sum = default;
            foreach ((double from, double to, double mass) in pieces.Positive)
            {
                sum.Add(upper
                    ? (x[i] <= from ? mass : x[i] < to ? Math.Max(_raw.Mass(x[i], to), 0) : 0)
                    : (x[i] >= to ? mass : x[i] > from ? Math.Max(_raw.Mass(from, x[i]), 0) : 0));
            }

            destination[i] = Math.Min(sum.Value / pieces.Total, 1);
        }
    }

    private Pieces Build()
    {
        IReadOnlyList<double> changes = _raw.ZeroCrossings;
        var positive = new List<(double From, double To, double Mass)>();
        double from = _raw.Ends.Lower;
        for (int i = 0; i <= changes.Count; i++)
        {
            double to = i == changes.Count ? _raw.Ends.Upper : changes[i];
            double mass = from < to ? _raw.Mass(from, to) : 0;
            if (mass > 0)
            {
                positive.Add((from, to, mass));
            }

            from = to;
        }

        CompensatedSum total = default;
        foreach ((_, _, double mass) in positive)
        {
            total.Add(mass);
        }

        return new Pieces([.. positive], total.Value);
    }

    private sealed record Pieces((double From, double To, double Mass)[] Positive, double Total);
}
