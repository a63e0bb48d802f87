using Smoothing.Numerics;

namespace Smoothing.Estimation;

/// <summary>Every cell between the outermost values has a record; the same at up to three doublings of the width.</summary>
internal sealed unsafe class DenseField : MomentField
{
    private const int CoarsestLevel = 3;
    private const int Lower = 40, Upper = 48; // table numbers: order · 4 + level below them

    // (1.9/2)¹⁶/16! = 2e-14, relative; a derivative or a count loses a power or two of it.
    private const double Reach = 1.9;
    private const double WidestStep = 0.5;
    private const int FewestPointsAPanel = 48;

    private readonly MomentLevel[] _levels;
    private readonly double[] _steps;     // width of each level in units of h, and how many cells make an h
    private readonly double[] _paces;
    private readonly double[] _reaches;   // largest a*² each level serves
    private readonly double _inverse;     // of the coarsest level
    private readonly double _first;
    private readonly double _step;
    private readonly int _count;
    private readonly double[] _logWeight; // 2 ln(W/m₀) of the coarsest cells, +∞ where empty
    private readonly double[] _logBelow;  // the same for the weight up to and with the cell, and from the cell on
    private readonly double[] _logAbove;
    private readonly int[] _previous;     // nearest occupied cell at or below, at or above; −1 for none
    private readonly int[] _next;
    private readonly MomentPanels?[] _panels = new MomentPanels?[Lower / 4];

    public DenseField(MomentCells cells, double bandwidth, double totalWeight)
        : base(bandwidth, totalWeight)
    {
        int last = 0;
        while (!cells.IsTruncated && last < CoarsestLevel && Math.ScaleB(cells.Width, last + 1) <= WidestStep * bandwidth)
        {
            last++;
        }

        _levels = new MomentLevel[last + 1];
        _levels[0] = new MomentLevel(cells);
        for (int l = 1; l <= last; l++)
        {
            _levels[l] = new MomentLevel(_levels[l - 1]);
        }

        KnownMomentCount = cells.IsTruncated ? KnownMoments(cells) : MomentCells.Moments;
        (_steps, _paces, _reaches) = (new double[last + 1], new double[last + 1], new double[last + 1]);
        for (int l = 0; l <= last; l++)
        {
            double pace = _paces[l] = bandwidth / _levels[l].Width;
            _steps[l] = _levels[l].Width / bandwidth;
            _reaches[l] = l == 0 ? double.PositiveInfinity : Reach * pace * (Reach * pace);
        }

        MomentLevel coarsest = _levels[last];
        int count = coarsest.Count;
        (_inverse, _first, _step, _count) = (coarsest.Inverse, coarsest.First, _steps[last], count);
        (_logWeight, _logBelow, _logAbove, _previous, _next) = (new double[count], new double[count], new double[count], new int[count], new int[count]);
        CompensatedSum sum = default;
        int at = -1;
        for (int c = 0; c < count; c++)
        {
            double m0 = coarsest.Records[c * MomentCells.Moments];
            sum.Add(m0);
            at = m0 > 0 ? c : at;
            _previous[c] = at;
            _logWeight[c] = 2 * Math.Log(totalWeight / m0);
            _logBelow[c] = 2 * Math.Log(totalWeight / sum.Value);
        }

        sum = default;
        at = -1;
        for (int c = count - 1; c >= 0; c--)
        {
            double m0 = coarsest.Records[c * MomentCells.Moments];
            sum.Add(m0);
            at = m0 > 0 ? c : at;
            _next[c] = at;
            _logAbove[c] = 2 * Math.Log(totalWeight / sum.Value);
        }
    }

    private int KnownMomentCount { get; }

    /// <summary>Whether so many points at once were asked for that the curve of that derivative has been turned into polynomials.</summary>
    public bool HasPanels(int order) => Volatile.Read(ref _panels[order]) is not null;

    public override void Derivatives(ReadOnlySpan<double> x, int order, double[] parts, double factor, Span<double> destination)
    {
        MomentPanels? panels = Panels(x.Length, order, parts);
        if (panels is not null && panels.Evaluate(x, factor, destination))
        {
            return;
        }

        for (int j = 0; j < x.Length; j++)
        {
            if (panels is not null && !double.IsNaN(destination[j]))
            {
                continue;
            }

            double crowd = Crowding(x[j]);
            destination[j] = crowd < double.PositiveInfinity ? factor * Evaluate(x[j], crowd, Math.Min(Math.Sqrt(crowd + DensityMargin), Farthest), order * 4, parts, out _) : 0;
        }
    }

    public override void Cumulatives(ReadOnlySpan<double> x, bool upper, double[] parts, double factor, Span<double> destination)
    {
        for (int j = 0; j < x.Length; j++)
        {
            destination[j] = factor * Count(x[j], upper, parts);
        }
    }

    public override bool TryEvaluate(ReadOnlySpan<double> x, double[] parts, double totalWeight, Span<double> values, Span<double> slopes, Span<double> cumulatives)
    {
        double factor = NormalLaw.InverseSqrtTwoPi / totalWeight;
        double* sums = stackalloc double[3];
        for (int j = 0; j < x.Length; j++)
        {
            double crowd = Crowding(x[j]);
            if (!(crowd < double.PositiveInfinity))
            {
                (values[j], slopes[j], cumulatives[j]) = (0, 0, Count(x[j], false, parts) / totalWeight);
                continue;
            }

            if (CountCrowding(x[j], false, out double counted))
            {
                crowd = Math.Max(crowd, counted);
            }

            int l = LevelFor(crowd);
            MomentTable density = TableOf(l, parts), count = TableOf(Lower + l, parts);
            double radius = Math.Min(Math.Sqrt(crowd + CountMargin), Farthest);
            double offset = Window(x[j], l, radius, density.Groups, out int from, out int to);
            MomentEvaluator.DenseThree(density, count, offset, _steps[l], from, to, sums);
            values[j] = factor / Bandwidth * sums[0];
            slopes[j] = factor / Bandwidth / Bandwidth * sums[1];
            cumulatives[j] = (factor * sums[2]) + (Beyond(x[j], l, radius, false) / totalWeight);
        }

        return true;
    }

    // With this many points for each wide cell a polynomial a cell pays; made once for each order.
    private MomentPanels? Panels(int points, int order, double[] parts)
    {
        if (points < FewestPointsAPanel * (long)_count)
        {
            return null;
        }

        return Volatile.Read(ref _panels[order]) ?? MakePanels(order, parts);
    }

    private MomentPanels MakePanels(int order, double[] parts)
    {
        lock (_panels)
        {
            double width = MomentPanels.Reach / _step;
            MomentPanels made = _panels[order] ?? new MomentPanels(
                _inverse,
                _first,
                _count,
                cell => Math.Max(Crowding((_first + cell) / _inverse), Crowding((_first + cell + 1) / _inverse)) <= width * width,
                (x, y) => Points(x, order, parts, y));
            Volatile.Write(ref _panels[order], made);
            return made;
        }
    }

    private void Points(double[] x, int order, double[] parts, double[] destination)
    {
        for (int j = 0; j < x.Length; j++)
        {
            double crowd = Crowding(x[j]);
            destination[j] = Evaluate(x[j], crowd, Math.Min(Math.Sqrt(crowd + DensityMargin), Farthest), order * 4, parts, out _);
        }
    }

    private double Count(double x, bool upper, double[] parts)
    {
        if (!CountCrowding(x, upper, out double crowd))
        {
            return crowd;
        }

        double radius = Math.Min(Math.Sqrt(crowd + CountMargin), Farthest);
        double sum = Evaluate(x, crowd, radius, upper ? Upper : Lower, parts, out int l) * NormalLaw.InverseSqrtTwoPi;
        return sum + Beyond(x, l, radius, upper);
    }

    // Beyond the far end of the table the count stays at the total; further away than the radius that can't be seen.
    private double Beyond(double x, int l, double radius, bool upper)
    {
        MomentLevel level = _levels[l];
        double u = x * level.Inverse;
        double v = (upper ? level.First - u : u - (level.First + level.Count)) * _steps[l];
        return v < -radius ? 0 : TotalWeight * NormalLaw.Cumulative(v);
    }

    // a*² for a count; false, with the count itself, where the table is so far away that nothing needs summing.
    private bool CountCrowding(double x, bool upper, out double crowd)
    {
        double u = (x * _inverse) - _first;
        double below = u * _step, above = (_count - u) * _step;
        if (below < -Farthest || above < -Farthest)
        {
            crowd = (below < -Farthest) == upper ? TotalWeight : 0;
            return false;
        }

        // Where no weight lies on the asked side yet, the nearest cell decides; inside, the weight passed so far.
        int cell = (int)Math.Clamp(u, 0, _count - 1);
        int first = upper ? _previous[^1] : _next[0];
        double[] logs = upper ? _logAbove : _logBelow;
        if (upper ? cell <= first : cell >= first)
        {
            double outside = Math.Max(0, upper ? -above : -below) + _step;
            crowd = logs[cell] + (outside * outside);
        }
        else
        {
            double distance = (Math.Abs(u - first - 0.5) + 0.5) * _step;
            crowd = logs[first] + (distance * distance);
        }

        return true;
    }

    // a*²: 2 ln(W/m₀) plus the squared distance of the farthest place of the nearest occupied cell, in units of h; ∞ where the density is 0.
    private double Crowding(double x)
    {
        double place = (x * _inverse) - _first;
        if (!(place * _step > -Farthest && (place - _count) * _step < Farthest))
        {
            return double.PositiveInfinity;
        }

        int cell = (int)Math.Clamp(place, 0, _count - 1);
        double best = double.PositiveInfinity;
        if (_previous[cell] is >= 0 and int before)
        {
            double distance = (Math.Abs(place - before - 0.5) + 0.5) * _step;
            best = (distance * distance) + _logWeight[before];
        }

        if (_next[cell] is >= 0 and int after)
        {
            double distance = (Math.Abs(place - after - 0.5) + 0.5) * _step;
            best = Math.Min(best, (distance * distance) + _logWeight[after]);
        }

        return best < 2 * Farthest * Farthest ? best : double.PositiveInfinity;
    }

    private double Evaluate(double x, double crowd, double radius, int kind, double[] parts, out int l)
    {
        l = LevelFor(crowd);
        MomentTable table = TableOf(kind + l, parts);
        double offset = Window(x, l, radius, table.Groups, out int from, out int to);
        return MomentEvaluator.Dense(table.Coefficients, table.Terms, offset, _steps[l], from, to);
    }

    // The widest cells whose truncation is still below what the result can show.
    private int LevelFor(double crowd)
    {
        int l = _levels.Length - 1;
        while (crowd > _reaches[l])
        {
            l--;
        }

        return l;
    }

    // The place of x in cells from the middle of the first one, and the groups of four cells that can matter.
    private double Window(double x, int l, double radius, int groups, out int from, out int to)
    {
        MomentLevel level = _levels[l];
        double cells = radius * _paces[l];
        double offset = (x * level.Inverse) - level.First - 0.5;

        // Truncation toward zero differs from the floor below zero only, where it is cut off anyway.
        from = (int)Math.Clamp((offset - cells) * 0.25, 0, groups);
        to = offset + cells < 0 ? from : (int)Math.Clamp(((offset + cells) * 0.25) + 1, from, groups);
        return offset;
    }

    private MomentTable TableOf(int kind, double[] parts) => Known(kind) ?? Table(kind, parts);

    protected override MomentTable Make(int kind, double[] parts)
    {
        MomentLevel level = _levels[kind & 3];
        double step = level.Width / Bandwidth;
        if (kind < Lower)
        {
            return MomentTable.OfDerivatives(level.Records, level.Count, step, Shifted(parts, kind / 4));
        }

        bool upper = kind >= Upper;
        var counts = new double[level.Count];
        CompensatedSum sum = default;
        for (int i = 0; i < counts.Length; i++)
        {
            int c = upper ? counts.Length - 1 - i : i;
            counts[c] = sum.Value;
            sum.Add(level.Records[c * MomentCells.Moments]);
        }

        return MomentTable.OfCount(level.Records, level.Count, KnownMomentCount, step, upper, counts, CountParts(parts, upper));
    }

    private static int KnownMoments(MomentCells cells)
    {
        int known = 1;
        for (int i = 0; i < cells.Count * MomentCells.Moments; i++)
        {
            known = cells.Records[i] != 0 ? Math.Max(known, (i % MomentCells.Moments) + 1) : known;
        }

        return known;
    }
}
