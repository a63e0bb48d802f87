using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Estimation;

/// <summary>Sums of the Gaussian kernel from cell moments, cell by cell: for the few cases whose cells can't be numbered in one table of <see cref="MomentCells"/>.</summary>
/// <remarks>
/// Method: Hermite's expansion about the centre of each cell, with a = (x − centre)/h and D = δ/h: φ^(r)(a − Db) = (−1)^r φ(a) Σ_q He_{r+q}(a)(Db)^q/q!, and
/// Φ(a − Db) = Φ(a) − φ(a) Σ_{q ≥ 1} He_{q−1}(a)(Db)^q/q!. The remainder
/// of p moments is at most 1.09 (D/2)^p/√p! of the peak. Cells further than 39 h away are below the smallest double.
/// </remarks>
internal sealed class GaussianCellSums : KernelSums
{
    /// <summary>exp(−39²/2) is below 1e-330.</summary>
    private const double Reach = 39;

    private readonly CondensedSample _cells;
    private readonly double _bandwidth;
    private readonly double _step;
    private readonly double[] _centres;
    private readonly double[] _below;
    private readonly double[] _singlesBelow;

    public GaussianCellSums(CondensedSample sample, double bandwidth)
    {
        _cells = sample;
        _bandwidth = bandwidth;
        _step = _cells.CellWidth / bandwidth;
        _centres = new double[_cells.Cells.Length];
        _below = new double[_centres.Length + 1];
        _singlesBelow = new double[_cells.Singles.Length + 1];
        CompensatedSum weight = default;
        for (int i = 0; i < _centres.Length; i++)
        {
            _centres[i] = (_cells.Cells[i] + 0.5) * _cells.CellWidth;
            weight.Add(_cells.Sums[i * _cells.Moments]);
            _below[i + 1] = weight.Value;
        }

        CompensatedSum single = default;
        for (int i = 0; i < _cells.Singles.Length; i++)
        {
            single.Add(_cells.SingleWeights[i]);
            _singlesBelow[i + 1] = single.Value;
        }
    }

    public override string Method => "Gaussian cell moments";

    public override void Derivatives(ReadOnlySpan<double> x, int order, Span<double> destination)
    {
        double scale = NormalLaw.InverseSqrtTwoPi / _cells.TotalWeight / Math.Pow(_bandwidth, order + 1) * ((order & 1) == 0 ? 1 : -1);
        Span<double> hermite = stackalloc double[order + _cells.Moments];
        for (int j = 0; j < x.Length; j++)
        {
            double sum = 0;
            (int from, int to) = Window(_centres, x[j]);
            for (int i = from; i < to; i++)
            {
                double a = (x[j] - _centres[i]) / _bandwidth;
                Hermite(a, hermite);
                sum += Math.Exp(-0.5 * a * a) * Series(i, 0, hermite[order..]);
            }

            (from, to) = Window(_cells.Singles, x[j]);
            for (int i = from; i < to; i++)
            {
                double u = (x[j] - _cells.Singles[i]) / _bandwidth;
                Hermite(u, hermite);
                sum += Math.Exp(-0.5 * u * u) * _cells.SingleWeights[i] * hermite[order];
            }

            destination[j] = sum * scale;
        }
    }

    public override void Cumulatives(ReadOnlySpan<double> x, bool upper, Span<double> destination)
    {
        Span<double> hermite = stackalloc double[_cells.Moments];
        double sign = upper ? 1 : -1;
        for (int j = 0; j < x.Length; j++)
        {
            (int from, int to) = Window(_centres, x[j]);
            double sum = upper ? _below[^1] - _below[to] : _below[from];
            for (int i = from; i < to; i++)
            {
                double a = (x[j] - _centres[i]) / _bandwidth;
                Hermite(a, hermite);
                double whole = (upper ? NormalLaw.Survival(a) : NormalLaw.Cumulative(a)) * _cells.Sums[i * _cells.Moments];
                sum += whole + (sign * NormalLaw.Density(a) * Series(i, 1, hermite));
            }

            (from, to) = Window(_cells.Singles, x[j]);
            sum += upper ? _singlesBelow[^1] - _singlesBelow[to] : _singlesBelow[from];
            for (int i = from; i < to; i++)
            {
                double u = (x[j] - _cells.Singles[i]) / _bandwidth;
                sum += _cells.SingleWeights[i] * (upper ? NormalLaw.Survival(u) : NormalLaw.Cumulative(u));
            }

            destination[j] = sum / _cells.TotalWeight;
        }
    }

    /// <summary>He_0(a), He_1(a), …: the probabilists' polynomials, He_{q+1} = a He_q − q He_{q−1}.</summary>
    private static void Hermite(double a, Span<double> values)
    {
        double before = 0, here = 1;
        for (int q = 0; q < values.Length; q++)
        {
            values[q] = here;
            (before, here) = (here, (a * here) - (q * before));
        }
    }

    /// <summary>Σ He_{q − first}(a) D^q/q! m_q from q = first on.</summary>
    private double Series(int cell, int first, ReadOnlySpan<double> hermite)
    {
        ReadOnlySpan<double> moments = _cells.Sums.Slice(cell * _cells.Moments, _cells.Moments);
        double sum = 0, factor = first == 0 ? 1 : _step;
        for (int q = first; q < moments.Length; q++)
        {
            sum += hermite[q - first] * factor * moments[q];
            factor *= _step / (q + 1);
        }

        return sum;
    }

    private (int From, int To) Window(ReadOnlySpan<double> centres, double x)
    {
        double reach = Reach * _bandwidth;
        return (First(centres, x - reach), First(centres, x + reach));
    }

    /// <summary>The first index whose centre is at or above a place.</summary>
    private static int First(ReadOnlySpan<double> centres, double place)
    {
        int at = centres.BinarySearch(place);
        return at >= 0 ? at : ~at;
    }
}
