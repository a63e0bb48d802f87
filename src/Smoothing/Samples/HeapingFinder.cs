namespace Smoothing.Samples;

/// <summary>Finds a coarse step whose multiples hold more than the places beside them suggest.</summary>
/// <remarks>
/// Method: own. On a grid of rounding unit s, for each step of q places, the weight on multiples is compared with what the
/// (q − 1)/2 nearest places on either side hold per place, over multiples whose neighbourhood lies within the data: trends cancel by symmetry,
/// curvature nearly, as long as the step is no wider than the spread. The difference must reach 4.5 Poisson standard errors, also without the single
/// fullest multiple. Of the steps whose excess is at least 0.8 of the largest, the coarsest is taken: heaps on 10 show up, diluted, on 5 and 2.
/// Data without a rounding unit: share on any usual step, of which chance leaves none. Dominant error: atoms and sharp peaks on a multiple.
/// </remarks>
internal static class HeapingFinder
{
    /// <summary>With some forty steps tried, a chance of about 40 · 3e-6 a sample.</summary>
    private const double StandardErrors = 4.5;

    private const double SmallestExcess = 0.03;

    private static readonly double[] Mantissas = [1, 1.2, 1.5, 2, 2.5, 3, 5, 6];

    private static readonly double[] Multiples = [2, 3, 4, 5, 6, 7, 10, 12, 15, 20, 24, 30, 60];

    public static HeapingUnit? Find(Sample sample)
    {
        ValueTable table = sample.Table;
        double quartiles = sample.InterquartileRange / 1.349;
        double spread = quartiles > 0 ? Math.Min(quartiles, sample.StandardDeviation) : sample.StandardDeviation;
        if (!(spread > 0 && double.IsFinite(spread)))
        {
            return null;
        }

        return sample.RoundingUnit is RoundingUnit rounding ? OnGrid(table, rounding, spread) : Unrounded(table, spread);
    }

    private static HeapingUnit? OnGrid(ValueTable table, RoundingUnit rounding, double spread)
    {
        (double[] places, double[] shares) = Places(table, rounding);
        var found = new List<(double Factor, double Excess, double On)>();
        foreach (double factor in Factors(rounding.Step, spread))
        {
            if (Excess(places, shares, factor, table.EffectiveCount, out double on) is double excess and >= SmallestExcess)
            {
                found.Add((factor, excess, on));
            }
        }

        if (found.Count == 0)
        {
            return null;
        }

        double most = found.Max(step => step.Excess);
        (double chosen, double more, double share) = found.Where(step => step.Excess >= 0.8 * most).MaxBy(step => step.Factor);
        return new HeapingUnit(Tidy(rounding.Step * chosen), share, share - more);
    }

    private static IEnumerable<double> Factors(double step, double spread)
    {
        var factors = new SortedSet<double>(Multiples);
        int from = (int)Math.Floor(Math.Log10(step)), to = (int)Math.Ceiling(Math.Log10(spread));
        for (int exponent = from; exponent <= to; exponent++)
        {
            foreach (double mantissa in Mantissas)
            {
                double factor = mantissa * Math.Pow(10, exponent) / step;
                if (Math.Abs(factor - Math.Round(factor)) < 1e-6 * factor)
                {
                    factors.Add(Math.Round(factor));
                }
            }
        }

        return factors.Where(factor => factor >= 2 && factor * step <= spread);
    }

    /// <summary>Indices of the places, rising, with their shares; values off the grid are left aside.</summary>
    private static (double[] Places, double[] Shares) Places(ValueTable table, RoundingUnit rounding)
    {
        bool twice = rounding.Step > rounding.PrintedStep;
        var grid = new StepGrid(rounding.Step, false, twice ? rounding.PrintedStep / 2 * (1 + 1e-9) : rounding.Step * 1e-4, StepGrid.DoubleError);
        var places = new List<double>();
        var shares = new List<double>();
        for (int i = 0; i < table.Values.Length; i++)
        {
            if (!grid.Holds(table.Values[i], out double index))
            {
                continue;
            }

            if (places.Count > 0 && places[^1] == index)
            {
                shares[^1] += table.Shares[i];
            }
            else
            {
                places.Add(index);
                shares.Add(table.Shares[i]);
            }
        }

        return ([.. places], [.. shares]);
    }

    /// <summary>The excess share on multiples of a factor, or null where it may be chance or comes from one multiple alone.</summary>
    private static double? Excess(double[] places, double[] shares, double factor, double count, out double on)
    {
        on = 0;
        if (places.Length == 0)
        {
            return null;
        }

        double half = Math.Max(1, Math.Floor((factor - 1) / 2));
        double dilution = factor == 2 ? 1 : 2 * half;
        double inside = 0, beside = 0, fullest = 0, besideFullest = 0;
        double multiple = double.NaN, here = 0, near = 0;
        for (int i = 0; i < places.Length; i++)
        {
            double nearest = Math.Round(places[i] / factor) * factor;
            double distance = Math.Abs(places[i] - nearest);
            if (distance == 0)
            {
                on += shares[i];
                Put(nearest, shares[i], 0);
            }
            else if (factor == 2)
            {
                // An odd place lies beside two multiples and counts half for each.
                Put(places[i] - 1, 0, shares[i] / 2);
                Put(places[i] + 1, 0, shares[i] / 2);
            }
            else if (distance <= half)
            {
                Put(nearest, 0, shares[i] / dilution);
            }
        }

        Close();
        bool certain = Significant(inside, beside) && Significant(inside - fullest, beside - besideFullest);
        return certain ? inside - beside : null;

        void Put(double at, double atIt, double besideIt)
        {
            if (at - half < places[0] || at + half > places[^1])
            {
                return;
            }

            if (at != multiple)
            {
                Close();
                multiple = at;
            }

            here += atIt;
            near += besideIt;
        }

        void Close()
        {
            inside += here;
            beside += near;
            if (here - near > fullest - besideFullest)
            {
                (fullest, besideFullest) = (here, near);
            }

            (here, near) = (0, 0);
        }

        bool Significant(double a, double b) => (a - b) * count >= StandardErrors * Math.Sqrt(((a + (b / dilution)) * count) + 1);
    }

    private static HeapingUnit? Unrounded(ValueTable table, double spread)
    {
        var found = new List<(double Step, double Share)>();
        for (int exponent = (int)Math.Ceiling(Math.Log10(spread)); exponent > Math.Log10(spread) - 5; exponent--)
        {
            foreach (double mantissa in Mantissas)
            {
                double step = mantissa * Math.Pow(10, exponent);
                if (step <= spread)
                {
                    Add(found, table, exponent < 0 ? new StepGrid(Math.Pow(10, -exponent) / mantissa, true, 0, 2 * StepGrid.DoubleError) : new StepGrid(step, false, 0, StepGrid.DoubleError));
                }
            }
        }

        if (found.Count == 0 && RoundingFinder.Find(table.Where(i => table.Rows[i] > 1)) is RoundingUnit tied && tied.Step <= spread)
        {
            Add(found, table, new StepGrid(tied.Step, false, tied.Step * 1e-4, StepGrid.DoubleError));
        }

        if (found.Count == 0)
        {
            return null;
        }

        double most = found.Max(step => step.Share);
        (double chosen, double share) = found.Where(step => step.Share >= 0.8 * most).MaxBy(step => step.Step);
        // An unrounded number passes for a multiple with a chance of at most 2 · 1/2000 (see StepGrid).
        return new HeapingUnit(Tidy(chosen), share, 0.001);
    }

    private static void Add(List<(double Step, double Share)> found, ValueTable table, StepGrid grid)
    {
        double share = 0, rows = 0;
        int distinct = 0;
        for (int i = 0; i < table.Values.Length; i++)
        {
            if (table.Values[i] != 0 && grid.Holds(table.Values[i], out _))
            {
                share += table.Shares[i];
                rows += table.Rows[i];
                distinct++;
            }
        }

        if (share >= SmallestExcess && rows >= 5 && distinct >= 3)
        {
            found.Add((grid.Size, share));
        }
    }

    /// <summary>A product such as 0.1 · 3 as it would be written.</summary>
    private static double Tidy(double step)
    {
        double written = double.Parse(step.ToString("G12", System.Globalization.CultureInfo.InvariantCulture), System.Globalization.CultureInfo.InvariantCulture);
        return Math.Abs(written - step) <= 1e-14 * step ? written : step;
    }
}
