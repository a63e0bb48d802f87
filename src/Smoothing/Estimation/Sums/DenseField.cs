using Smoothing.Numerics;

namespace Smoothing.Estimation;

/// <summary>Every cell between the outermost values has a record; the same at up to three doublings of the width.</summary>
internal sealed unsafe class DenseField : MomentField
{
    private const int CoarsestLevel = 3;
    private const int Lower = 40, Upper = 48; // table numbers: order · 4 + level below them

    // (1.57/2)¹⁶/16! ≤ 1e-15; a derivative or a count loses a power or two, so their cells stay a little narrower.
    private const double DensityReach = 1.57, CountReach = 1.35;
    private const double WidestStep = 0.5;

    private readonly MomentLevel[] _levels;
    private readonly double[] _logWeight; // 2 ln(W/m₀) of the coarsest cells, +∞ where empty
    private readonly double[] _logBelow;  // the same for the weight up to and with the cell, and from the cell on
    private readonly double[] _logAbove;
    private readonly int[] _previous;     // nearest occupied cell at or below, at or above; −1 for none
    private readonly int[] _next;

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

        Known = cells.IsTruncated ? KnownMoments(cells) : MomentCells.Moments;
        MomentLevel coarsest = _levels[last];
        int count = coarsest.Count;
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

    private int Known { get; }

    public override void Derivatives(ReadOnlySpan<double> x, int order, double[] parts, double factor, Span<double> destination)
    {
        double reach = order + parts.Length > 1 ? CountReach : DensityReach;
        for (int j = 0; j < x.Length; j++)
        {
            double crowd = Crowding(x[j]);
            destination[j] = crowd < double.PositiveInfinity ? factor * Evaluate(x[j], crowd, crowd + DensityMargin, reach, order * 4, parts, out _) : 0;
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

            MomentLevel level = LevelFor(crowd, CountReach, out int l);
            MomentTable density = TableOf(l, parts), slope = TableOf(4 + l, parts), count = TableOf(Lower + l, parts);
            double step = level.Width / Bandwidth;
            double offset = Window(x[j], level, crowd + CountMargin, density.Groups, out int from, out int to);
            MomentEvaluator.DenseThree(density, slope, count, offset, step, from, to, sums);
            values[j] = factor / Bandwidth * sums[0];
            slopes[j] = factor / Bandwidth / Bandwidth * sums[1];
            cumulatives[j] = (factor * sums[2]) + (Beyond(x[j], level, false) / totalWeight);
        }

        return true;
    }

    private double Count(double x, bool upper, double[] parts)
    {
        if (!CountCrowding(x, upper, out double crowd))
        {
            return crowd;
        }

        double sum = Evaluate(x, crowd, crowd + CountMargin, CountReach, upper ? Upper : Lower, parts, out MomentLevel level) * NormalLaw.InverseSqrtTwoPi;
        return sum + Beyond(x, level, upper);
    }

    // Beyond the far end of the table the count stays at the total.
    private double Beyond(double x, MomentLevel level, bool upper)
    {
        double u = x * level.Inverse;
        double v = (upper ? level.First - u : u - (level.First + level.Count)) * (level.Width / Bandwidth);
        return v < -Farthest ? 0 : TotalWeight * NormalLaw.Cumulative(v);
    }

    // a*² for a count; false, with the count itself, where the table is so far away that nothing needs summing.
    private bool CountCrowding(double x, bool upper, out double crowd)
    {
        MomentLevel coarsest = _levels[^1];
        double u = x * coarsest.Inverse, step = coarsest.Width / Bandwidth;
        double below = (u - coarsest.First) * step, above = (coarsest.First + coarsest.Count - u) * step;
        if (below < -Farthest || above < -Farthest)
        {
            crowd = (below < -Farthest) == upper ? TotalWeight : 0;
            return false;
        }

        // Where no weight lies on the asked side yet, the nearest cell decides; inside, the weight passed so far.
        int cell = (int)Math.Clamp(Math.Floor(u) - coarsest.First, 0, coarsest.Count - 1);
        int first = upper ? _previous[^1] : _next[0];
        double[] logs = upper ? _logAbove : _logBelow;
        if (upper ? cell <= first : cell >= first)
        {
            double outside = Math.Max(0, upper ? -above : -below) + step;
            crowd = logs[cell] + (outside * outside);
        }
        else
        {
            double distance = (Math.Abs(u - (coarsest.First + first) - 0.5) + 0.5) * step;
            crowd = logs[first] + (distance * distance);
        }

        return true;
    }

    // a*²: 2 ln(W/m₀) plus the squared distance of the farthest place of the nearest occupied cell, in units of h; ∞ where the density is 0.
    private double Crowding(double x)
    {
        MomentLevel coarsest = _levels[^1];
        double u = x * coarsest.Inverse, step = coarsest.Width / Bandwidth;
        double place = u - coarsest.First;
        if (!(place * step > -Farthest && (place - coarsest.Count) * step < Farthest))
        {
            return double.PositiveInfinity;
        }

        int cell = (int)Math.Clamp(Math.Floor(place), 0, coarsest.Count - 1);
        double best = double.PositiveInfinity;
        if (_previous[cell] is >= 0 and int before)
        {
            double distance = (Math.Abs(place - before - 0.5) + 0.5) * step;
            best = (distance * distance) + _logWeight[before];
        }

        if (_next[cell] is >= 0 and int after)
        {
            double distance = (Math.Abs(place - after - 0.5) + 0.5) * step;
            best = Math.Min(best, (distance * distance) + _logWeight[after]);
        }

        return best < 2 * Farthest * Farthest ? best : double.PositiveInfinity;
    }

    private double Evaluate(double x, double crowd, double radius, double reach, int kind, double[] parts, out MomentLevel level)
    {
        level = LevelFor(crowd, reach, out int l);
        MomentTable table = TableOf(kind + l, parts);
        double offset = Window(x, level, radius, table.Groups, out int from, out int to);
        return MomentEvaluator.Dense(table.Coefficients, table.Terms, offset, level.Width / Bandwidth, from, to);
    }

    // The widest cells whose truncation is still below what the result can show.
    private MomentLevel LevelFor(double crowd, double reach, out int l)
    {
        double crowding = Math.Sqrt(crowd);
        l = _levels.Length - 1;
        while (l > 0 && crowding * _levels[l].Width > reach * Bandwidth)
        {
            l--;
        }

        return _levels[l];
    }

    // The place of x in cells from the middle of the first one, and the groups of four cells that can matter.
    private double Window(double x, MomentLevel level, double radius, int groups, out int from, out int to)
    {
        double cells = Math.Min(Math.Sqrt(radius), Farthest) * Bandwidth / level.Width;
        double offset = (x * level.Inverse) - level.First - 0.5;
        from = (int)Math.Clamp(Math.Floor((offset - cells) / 4), 0, groups);
        to = (int)Math.Clamp(Math.Floor((offset + cells) / 4) + 1, from, groups);
        return offset;
    }

    private MomentTable TableOf(int kind, double[] parts) => Table(kind, (Field: this, Parts: parts), static (state, kind) => state.Field.Make(kind, state.Parts));

    private MomentTable Make(int kind, double[] parts)
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

        return MomentTable.OfCount(level.Records, level.Count, Known, step, upper, counts, CountParts(parts, upper));
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
