namespace Smoothing.Samples;

/// <summary>Finds the largest step of which nearly all values are multiples.</summary>
/// <remarks>
/// Method: own. (1) The decimal place: the coarsest power of ten of which at least 95 % of the weight off 0 are multiples, within the rounding
/// of a double, then within that of a single-precision number. (2) The whole number of such places that divides nearly all values: greatest common divisors
/// of 64 groups of eight distinct values, each tried from the largest down; groups without an exception hit it. (3) Values rounded
/// twice: steps common in practice, within half a place, and whole multiples of them. (4) Where no decimal place is found, approximate common
/// divisors of real numbers (Euclid with a tolerance), for data scaled by an arbitrary factor. A step above the decimal place is
/// believed only where chance would hardly produce it on so many distinct values.
/// Cost: the table of distinct values is passed a few dozen times, most passes ending after the first 5 %.
/// </remarks>
internal static class RoundingFinder
{
    private const double Needed = 0.95;

    /// <summary>Below three distinct values off 0 any step can be made to fit.</summary>
    private const int FewestDistinct = 3;

    public static RoundingUnit? Find(Sample sample) => Find(sample.Table);

    public static RoundingUnit? Find(ValueTable table)
    {
        RoundingUnit? found = Decimal(table, StepGrid.DoubleError) ?? (AreSingle(table) ? Decimal(table, StepGrid.SingleError) : null);
        return found ?? Generic(table);
    }

    // The wide tolerance is for numbers that were stored in single precision and for no others: beside far larger values it would take small ones for 0.
    private static bool AreSingle(ValueTable table)
    {
        double share = 0, total = 0;
        for (int i = 0; i < table.Values.Length; i++)
        {
            total += table.Shares[i];
            share += (float)table.Values[i] == table.Values[i] ? table.Shares[i] : 0;
        }

        return share >= Needed * total;
    }

    private static RoundingUnit? Decimal(ValueTable table, double relative)
    {
        double largest = table.LargestMagnitude;
        if (!(largest > 0 && double.IsFinite(largest)))
        {
            return null;
        }

        int top = (int)Math.Floor(Math.Log10(largest));
        for (int exponent = Math.Min(top, 22); exponent >= Math.Max(top - 16, -22); exponent--)
        {
            var grid = new StepGrid(Math.Pow(10, Math.Abs(exponent)), exponent < 0, 0, relative);
            if (grid.Share(table, Needed, out int distinct) > 0 && distinct >= FewestDistinct)
            {
                return Coarsen(table, grid);
            }
        }

        return null;
    }

    private static RoundingUnit Coarsen(ValueTable table, StepGrid place)
    {
        StepGrid best = Multiple(table, place);
        foreach (StepGrid unit in TwiceRounded.Units(place))
        {
            double chance = place.Size / unit.Size;
            if (!(unit.Size <= table.LargestMagnitude) || !(unit.Share(table, Needed, out int distinct) > 0))
            {
                continue;
            }

            // One in a million, for some eighty units tried: chance^distinct ≤ 1e-6.
            if (distinct * -Math.Log(chance) >= Math.Log(1e6))
            {
                StepGrid multiple = Multiple(table, unit);
                best = multiple.Size > best.Size * (1 + 1e-9) ? multiple : best;
            }
        }

        return Evidence(table, best, place.Size);
    }

    private static RoundingUnit Evidence(ValueTable table, StepGrid grid, double printed)
    {
        double share = 0;
        for (int i = 0; i < table.Values.Length; i++)
        {
            share += grid.Holds(table.Values[i], out _) ? table.Shares[i] : 0;
        }

        double total = Math.Max(table.Shares.Sum(), share);
        double step = grid.Size;
        bool coarser = step > printed * (1 + 1e-9);
        double expected = coarser ? printed / step : Math.Min(1, 2 * grid.Relative * table.LargestMagnitude / step);
        return new RoundingUnit(step, coarser ? printed : step, share / total, expected);
    }

    /// <summary>The largest whole multiple of a grid that nearly all values stay on.</summary>
    private static StepGrid Multiple(ValueTable table, StepGrid grid)
    {
        var indices = new List<long>();
        foreach (double x in table.Values)
        {
            if (grid.Holds(x, out double index) && index != 0 && Math.Abs(index) < long.MaxValue / 2)
            {
                indices.Add(Math.Abs((long)index));
            }
        }

        foreach (long factor in Divisors(indices).OrderDescending())
        {
            StepGrid coarse = grid.Inverse && grid.Step % factor != 0
                ? grid with { Step = factor / grid.Step, Inverse = false }
                : grid with { Step = grid.Inverse ? grid.Step / factor : grid.Step * factor };
            coarse = coarse with { Relative = grid.Relative + StepGrid.DoubleError };
            // By chance one index in "factor" is a multiple: one in a hundred that all distinct ones are.
            if (coarse.Share(table, Needed, out int distinct) > 0 && distinct * Math.Log(factor) >= Math.Log(100))
            {
                return coarse;
            }
        }

        return grid;
    }

    private static HashSet<long> Divisors(List<long> indices)
    {
        var divisors = new HashSet<long>();
        for (int group = 0; group < 64; group++)
        {
            long divisor = 0;
            for (int member = 0; member < Math.Min(8, indices.Count); member++)
            {
                long other = indices[Scattered((group * 5) + member, indices.Count)];
                for (; other != 0; (divisor, other) = (other, divisor % other))
                {
                }
            }

            if (divisor > 1)
            {
                divisors.Add(divisor);
            }
        }

        return divisors;
    }

    /// <summary>A place far from that of the number before: golden-section steps through the list.</summary>
    private static int Scattered(int number, int count)
    {
        double turn = (number + 0.5) * 0.6180339887498949;
        return Math.Min((int)((turn - Math.Floor(turn)) * count), count - 1);
    }

    /// <summary>A common step of real numbers, at least 1e-5 of the largest, exact to 1e-9 of it.</summary>
    private static RoundingUnit? Generic(ValueTable table)
    {
        double largest = table.LargestMagnitude;
        double[] off = Array.FindAll(table.Values, x => x != 0);
        if (off.Length < FewestDistinct || !double.IsFinite(largest))
        {
            return null;
        }

        double tolerance = 1e-9 * largest;
        var steps = new HashSet<double>();
        for (int group = 0; group < 64; group++)
        {
            double step = 0;
            for (int member = 0; member < Math.Min(8, off.Length); member++)
            {
                double other = Math.Abs(off[Scattered((group * 5) + member, off.Length)]);
                while (other > tolerance)
                {
                    (step, other) = (other, step == 0 ? 0 : Math.Abs(step - (Math.Round(step / other) * other)));
                }
            }

            if (step >= 1e4 * tolerance)
            {
                steps.Add(Refined(off, step, tolerance));
            }
        }

        foreach (double step in steps.OrderDescending())
        {
            var grid = new StepGrid(step, false, tolerance, StepGrid.DoubleError);
            if (grid.Share(table, Needed, out int distinct) > 0 && distinct >= FewestDistinct)
            {
                return Evidence(table, grid, step);
            }
        }

        return null;
    }

    /// <summary>The least-squares step through the values whose index the rough one makes certain, smallest first.</summary>
    private static double Refined(double[] values, double step, double tolerance)
    {
        double product = 0, square = 0, refined = step;
        foreach (double x in values.OrderBy(Math.Abs))
        {
            double index = Math.Round(x / refined);
            if (Math.Abs(x - (index * refined)) <= 10 * tolerance)
            {
                // In units of the step, so that squares stay in range whatever the unit of the data is.
                product += x / step * index;
                square += index * index;
                refined = square > 0 ? step * (product / square) : step;
            }
        }

        return refined;
    }
}
