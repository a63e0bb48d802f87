using Smoothing.Kernels;
using Smoothing.Numerics;

namespace Smoothing.Estimation;

/// <summary>The curve near a limit before it is divided by its mass: value and derivatives.</summary>
/// <remarks>
/// Method: linear boundary kernel f_L = (a₂S₀ − a₁S₁)/(a₀a₂ − a₁²), made non-negative by max(·, 0); its positive form f̄ exp(f_L/f̄ − 1) with
/// f̄ = S₀/a₀; or f̄ itself. Sources: Jones (1993); Jones &amp; Foster (1996). Changes: both limits may be in reach at once (moments over [−q, p]);
/// derivatives come from truncated Taylor series. Away from limits the moments are those of the whole kernel and the curve is the plain sum.
/// </remarks>
internal sealed class BoundaryCurve
{
    private readonly BoundarySums _sums;
    private readonly BoundaryMoments _moments;
    private readonly BoundaryCorrection _correction;
    private readonly Interval _support;

    public BoundaryCurve(BoundarySums sums, BoundaryMoments moments, BoundaryCorrection correction, double bandwidth, Interval support)
    {
        _sums = sums;
        _moments = moments;
        _correction = correction;
        _support = support;
        double reach = moments.Reach * bandwidth;
        LowerZoneEnd = double.IsFinite(support.Lower) ? Math.Min(support.Lower + reach, support.Upper) : double.NegativeInfinity;
        UpperZoneStart = double.IsFinite(support.Upper) ? Math.Max(support.Upper - reach, support.Lower) : double.PositiveInfinity;
    }

    /// <summary>Where the lower limit is no longer felt; −∞ without one.</summary>
    public double LowerZoneEnd { get; }

    /// <summary>Where the upper limit begins to be felt; +∞ without one.</summary>
    public double UpperZoneStart { get; }

    /// <summary>Whether the raw curve can fall below 0 and is cut there.</summary>
    public bool IsCut => _correction == BoundaryCorrection.LinearKernel;

    public bool InZone(double x) => x < LowerZoneEnd || x > UpperZoneStart;

    /// <summary>Value or derivative, cut at 0 where the correction says so; 0 outside the support.</summary>
    public void Derivatives(ReadOnlySpan<double> x, int order, Span<double> destination)
    {
        Raw(x, order, destination, cut: IsCut);
    }

    /// <summary>The values before they are cut, for finding where they change sign.</summary>
    public void RawValues(ReadOnlySpan<double> x, Span<double> destination) => Raw(x, 0, destination, cut: false);

    public double RawValue(double x)
    {
        double result = 0;
        Raw(new ReadOnlySpan<double>(in x), 0, new Span<double>(ref result), cut: false);
        return result;
    }

    private void Raw(ReadOnlySpan<double> x, int order, Span<double> destination, bool cut)
    {
        var inside = new List<int>();
        for (int i = 0; i < x.Length; i++)
        {
            destination[i] = 0;
            if (_support.Contains(x[i]) && InZone(x[i]))
            {
                inside.Add(i);
            }
        }

        var zone = new double[inside.Count];
        for (int i = 0; i < zone.Length; i++)
        {
            zone[i] = x[inside[i]];
        }

        _sums.Zeroth(x, order, destination);
        for (int i = 0; i < x.Length; i++)
        {
            destination[i] = _support.Contains(x[i]) ? destination[i] : 0;
        }

        if (zone.Length == 0)
        {
            return;
        }

        bool linear = _correction != BoundaryCorrection.Renormalised;
        double[][] s0 = Series(zone, order, _sums.Zeroth);
        double[][] s1 = linear ? Series(zone, order, _sums.First) : [];
        double factorial = Jet.Factorial(order);
        for (int i = 0; i < zone.Length; i++)
        {
            double[] value = Mend(zone[i], order, s0[i], linear ? s1[i] : []);
            destination[inside[i]] = cut && value[0] <= 0 ? 0 : factorial * value[order];
        }
    }

    private delegate void SumOf(ReadOnlySpan<double> x, int derivative, Span<double> destination);

    // result[i][j]: j-th Taylor coefficient at x[i].
    private static double[][] Series(double[] x, int order, SumOf sum)
    {
        var result = new double[x.Length][];
        for (int i = 0; i < x.Length; i++)
        {
            result[i] = new double[order + 1];
        }

        var column = new double[x.Length];
        for (int j = 0; j <= order; j++)
        {
            sum(x, j, column);
            for (int i = 0; i < x.Length; i++)
            {
                result[i][j] = column[i] / Jet.Factorial(j);
            }
        }

        return result;
    }

    private double[] Mend(double x, int order, double[] s0, double[] s1)
    {
        double[] a0 = _moments.Series(x, 0, order);
        if (_correction == BoundaryCorrection.Renormalised)
        {
            return Jet.Divide(s0, a0);
        }

        double[] a1 = _moments.Series(x, 1, order);
        double[] a2 = _moments.Series(x, 2, order);
        double[] determinant = Jet.Combine(1, Jet.Multiply(a0, a2), -1, Jet.Multiply(a1, a1));
        double[] linear = Jet.Divide(Jet.Combine(1, Jet.Multiply(a2, s0), -1, Jet.Multiply(a1, s1)), determinant);
        if (_correction == BoundaryCorrection.LinearKernel)
        {
            return linear;
        }

        double[] ordinary = Jet.Divide(s0, a0);
        if (!(ordinary[0] > 0))
        {
            return new double[order + 1];
        }

        double[] exponent = Jet.Divide(linear, ordinary);
        exponent[0] -= 1;
        return Jet.Multiply(ordinary, Jet.Exp(exponent));
    }
}
