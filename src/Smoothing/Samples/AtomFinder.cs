namespace Smoothing.Samples;

/// <summary>Finds single values that hold a share of their own.</summary>
/// <remarks>
/// Method: a value with over 5 % of the weight and eight rows is compared with the fullest of the three places on either side, on the heaping
/// grid where the value lies on it, else on the rounding grid, else among the distinct values. The factor ten keeps coarse but smooth data
/// out: a normal distribution rounded to its own standard deviation reaches 1.6.
/// </remarks>
internal sealed class AtomFinder
{
    private const int Neighbours = 3;

    /// <summary>With fewer rows chance alone fills single places of a finely rounded small sample.</summary>
    private const double FewestRows = 8;

    private readonly ValueTable _table;
    private readonly StepGrid[] _grids;

    public AtomFinder(Sample sample)
    {
        _table = sample.Table;
        _grids = [.. Grids(sample)];
        var atoms = new List<Atom>();
        for (int i = 0; i < _table.Values.Length; i++)
        {
            if (_table.Shares[i] > 0.05 && _table.Rows[i] >= FewestRows)
            {
                double beside = Math.Max(Beside(i, -1), Beside(i, 1));
                if (_table.Values.Length > 1 && _table.Shares[i] >= 10 * beside)
                {
                    atoms.Add(new Atom(_table.Values[i], _table.Shares[i], beside));
                }
            }
        }

        Atoms = atoms.AsReadOnly();
        AtMinimum = Piled(0, 1);
        AtMaximum = Piled(_table.Values.Length - 1, -1);
    }

    public IReadOnlyList<Atom> Atoms { get; }

    public Atom? AtMinimum { get; }

    public Atom? AtMaximum { get; }

    private static IEnumerable<StepGrid> Grids(Sample sample)
    {
        double reach = sample.RoundingUnit is RoundingUnit unit && unit.Step > unit.PrintedStep ? unit.PrintedStep / 2 * (1 + 1e-9) : 0;
        if (sample.HeapingUnit is HeapingUnit heaping)
        {
            yield return new StepGrid(heaping.Step, false, reach > 0 ? reach : heaping.Step * 1e-6, StepGrid.DoubleError);
        }

        if (sample.RoundingUnit is RoundingUnit rounding)
        {
            yield return new StepGrid(rounding.Step, false, reach > 0 ? reach : rounding.Step * 1e-4, StepGrid.DoubleError);
        }
    }

    private Atom? Piled(int at, int direction)
    {
        double share = _table.Shares[at];
        if (_table.Values.Length < 2 || _table.Rows[at] < FewestRows)
        {
            return null;
        }

        double beside = Beside(at, direction);
        double n = _table.EffectiveCount;
        bool certain = (share - beside) * n >= 3 * Math.Sqrt((share + beside) * n);
        return share >= 4 * beside && certain ? new Atom(_table.Values[at], share, beside) : null;
    }

    /// <summary>The fullest of the three places on one side.</summary>
    private double Beside(int at, int direction)
    {
        double value = _table.Values[at];
        foreach (StepGrid grid in _grids)
        {
            if (!grid.Holds(value, out double index))
            {
                continue;
            }

            double most = 0;
            for (int k = 1; k <= Neighbours; k++)
            {
                double place = (index + (direction * k)) * grid.Step;
                most = Math.Max(most, _table.ShareBetween(place - (1.01 * grid.Distance), place + (1.01 * grid.Distance)));
            }

            return most;
        }

        double fullest = 0;
        for (int k = 1; k <= Neighbours; k++)
        {
            int other = at + (direction * k);
            fullest = other >= 0 && other < _table.Values.Length ? Math.Max(fullest, _table.Shares[other]) : fullest;
        }

        return fullest;
    }
}
