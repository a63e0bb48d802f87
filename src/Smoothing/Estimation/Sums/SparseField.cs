using Smoothing.Numerics;

namespace Smoothing.Estimation;

/// <summary>Occupied cells only, found by binary search: for ranges far longer than the bandwidth.</summary>
internal sealed unsafe class SparseField : MomentField
{
    private const int Inside = 40, RestBelow = 41, RestAbove = 42; // table numbers; below them the order of the derivative

    private readonly MomentCells _cells;
    private readonly AlignedRoom _numbers = new();
    private readonly double[] _logWeight;
    private readonly double[] _below; // weight of the cells before each, one entry more
    private readonly double[] _above; // weight of the cells from each on
    private readonly double _step;

    public SparseField(MomentCells cells, double bandwidth, double totalWeight)
        : base(bandwidth, totalWeight)
    {
        _cells = cells;
        _step = cells.Width / bandwidth;
        double[] numbers = cells.Numbers!;
        double* padded = _numbers.Of(numbers.Length + 3);
        (_logWeight, _below, _above) = (new double[numbers.Length], new double[numbers.Length + 1], new double[numbers.Length + 1]);
        CompensatedSum sum = default;
        for (int i = 0; i < numbers.Length + 3; i++)
        {
            padded[i] = numbers[Math.Min(i, numbers.Length - 1)];
        }

        for (int i = 0; i < numbers.Length; i++)
        {
            double m0 = cells.Records[i * MomentCells.Moments];
            _logWeight[i] = 2 * Math.Log(totalWeight / m0);
            sum.Add(m0);
            _below[i + 1] = sum.Value;
        }

        sum = default;
        for (int i = numbers.Length - 1; i >= 0; i--)
        {
            sum.Add(cells.Records[i * MomentCells.Moments]);
            _above[i] = sum.Value;
        }
    }

    public override void Derivatives(ReadOnlySpan<double> x, int order, double[] parts, double factor, Span<double> destination)
    {
        MomentTable table = Table(order, parts);
        for (int j = 0; j < x.Length; j++)
        {
            double u = x[j] * _cells.Inverse;
            destination[j] = Window(u, DensityMargin, out int from, out int to)
                ? factor * MomentEvaluator.Sparse(table.Coefficients, table.Terms, _numbers.Pointer, u, _step, from / 4, (to + 3) / 4)
                : 0;
        }
    }

    public override void Cumulatives(ReadOnlySpan<double> x, bool upper, double[] parts, double factor, Span<double> destination)
    {
        MomentTable table = Table(Inside, parts);
        MomentTable? others = parts.Length == 1 ? null : Table(upper ? RestAbove : RestBelow, parts);
        double[] numbers = _cells.Numbers!;
        for (int j = 0; j < x.Length; j++)
        {
            double u = x[j] * _cells.Inverse;
            (int from, int to) = Run(numbers, u, Farthest / _step);
            double sum = upper ? _above[to] : _below[from];
            for (int i = from; i < to; i++)
            {
                double a = (u - numbers[i] - 0.5) * _step;
                double within = NormalLaw.Density(a) * Polynomial(table, i, a * _step);
                double whole = _cells.Records[i * MomentCells.Moments];
                sum += upper ? (whole * NormalLaw.Survival(a)) + within : (whole * NormalLaw.Cumulative(a)) - within;
            }

            if (others is not null && from < to)
            {
                sum += NormalLaw.InverseSqrtTwoPi * MomentEvaluator.Sparse(others.Coefficients, others.Terms, _numbers.Pointer, u, _step, from / 4, (to + 3) / 4);
            }

            destination[j] = factor * sum;
        }
    }

    protected override MomentTable Make(int kind, double[] parts) => kind switch
    {
        Inside => MomentTable.OfInside(_cells.Records, _cells.Count, _step),
        RestBelow or RestAbove => MomentTable.OfDerivatives(_cells.Records, _cells.Count, _step, CountParts(parts, kind == RestAbove)),
        _ => MomentTable.OfDerivatives(_cells.Records, _cells.Count, _step, Shifted(parts, kind)),
    };

    private static double Polynomial(MomentTable table, int cell, double t)
    {
        double* c = table.Coefficients + ((long)(cell / 4) * table.Terms * 4) + (cell & 3);
        double p = 0;
        for (int s = table.Terms - 1; s >= 0; s--)
        {
            p = (p * t) + c[4 * s];
        }

        return p;
    }

    // Cells that can matter at u: the nearest one on either side tells how far to look.
    private bool Window(double u, double margin, out int from, out int to)
    {
        double[] numbers = _cells.Numbers!;
        int after = First(numbers, Math.Floor(u));
        double best = double.PositiveInfinity;
        for (int i = Math.Max(after - 1, 0); i <= Math.Min(after, numbers.Length - 1); i++)
        {
            double distance = (Math.Abs(u - numbers[i] - 0.5) + 0.5) * _step;
            best = Math.Min(best, (distance * distance) + _logWeight[i]);
        }

        (from, to) = (0, 0);
        if (!(best < 2 * Farthest * Farthest))
        {
            return false;
        }

        (from, to) = Run(numbers, u, Math.Min(Math.Sqrt(best + margin), Farthest) / _step);
        return from < to;
    }

    private static (int From, int To) Run(double[] numbers, double u, double cells) => (First(numbers, u - cells - 1), First(numbers, u + cells + 1));

    // The first cell whose number is at or above a place.
    private static int First(double[] numbers, double place)
    {
        int at = Array.BinarySearch(numbers, place);
        return at >= 0 ? at : ~at;
    }
}
