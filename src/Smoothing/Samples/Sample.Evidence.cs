namespace Smoothing.Samples;

/// <content>What the sample notices about itself. Nothing here changes a result by itself.</content>
public sealed partial class Sample
{
    private readonly Lazy<ValueTable> _table;
    private readonly Lazy<double> _tiedShare;
    private readonly Lazy<RoundingUnit?> _roundingUnit;
    private readonly Lazy<HeapingUnit?> _heapingUnit;
    private readonly Lazy<AtomFinder> _atoms;
    private readonly Lazy<double> _lagOne;

    /// <summary>Share of the weight on values that occur more than once, in [0, 1].</summary>
    /// <remarks>With counts as weights a count of 2 is a tie. First call: a sort and one pass.</remarks>
    public double TiedShare => _tiedShare.Value;

    /// <summary>The largest step of which at least 95 % of the weight are multiples, with its evidence; null where none is found.</summary>
    /// <remarks>
    /// Values rounded twice are recognised for seconds in minutes or hours, minutes in hours, hours in days, days in weeks, inches, feet,
    /// pounds, ounces and miles in metric units, degrees Fahrenheit in degrees Celsius, and binary fractions. Null for unrounded numbers, and
    /// where fewer than three distinct values other than 0 leave nothing to judge by. First call: a sort and a few passes.
    /// </remarks>
    public RoundingUnit? RoundingUnit => _roundingUnit.Value;

    /// <summary>A coarser step whose multiples hold at least 3 % of the weight more than the places beside them suggest; null where none is found.</summary>
    /// <remarks>
    /// Judged at 4.5 standard errors, with the single fullest multiple left aside so that one atom is not taken for heaping, on steps no
    /// wider than the robust standard deviation. Unrounded data of which a part lies on a grid count as heaped on that grid.
    /// </remarks>
    public HeapingUnit? HeapingUnit => _heapingUnit.Value;

    /// <summary>Values that hold over 5 % of the weight, at least eight rows and at least ten times any of their three neighbouring places on either side; ascending.</summary>
    /// <remarks>
    /// Places are multiples of the heaping unit where there is one, else of the rounding unit, else the neighbouring values. A value that
    /// holds all the weight is no atom: there is nothing beside it.
    /// </remarks>
    public IReadOnlyList<Atom> Atoms => _atoms.Value.Atoms;

    /// <summary>The smallest value where values pile up at it, as at a limit of detection nobody declared; null where they do not.</summary>
    /// <remarks>At least eight rows, four times any of the three places above it, and three standard errors more than the fullest of them.</remarks>
    public Atom? PilingAtMinimum => _atoms.Value.AtMinimum;

    /// <summary>The largest value where values pile up at it, as at the end of a scale or a censoring point; null where they do not.</summary>
    /// <remarks>The mirror image of <see cref="PilingAtMinimum"/>.</remarks>
    public Atom? PilingAtMaximum => _atoms.Value.AtMaximum;

    /// <summary>Lag-1 autocorrelation r₁ = Σ(xᵢ − x̄)(xᵢ₊₁ − x̄)/Σ(xᵢ − x̄)² in the caller's order, in [−1, 1]; 0 for fewer than three or for equal values.</summary>
    /// <remarks>
    /// Means something only where the rows are in order of time or place. Rows left out are skipped and weights are not used. Source: Box, Jenkins and
    /// Reinsel (1994), Time Series Analysis, section 2.1.5.
    /// </remarks>
    public double LagOneCorrelation => _lagOne.Value;

    /// <summary>2/√n: |<see cref="LagOneCorrelation"/>| beyond it speaks for dependence between neighbouring rows, at about the 5 % level.</summary>
    public double LagOneLimit => 2 / Math.Sqrt(Count);

    internal ValueTable Table => _table.Value;
}
