using Smoothing.Numerics;

namespace Smoothing.Estimation;

/// <summary>Cells of a sample at one bandwidth, ready to be evaluated; tables are made on first need and kept. Safe to share between threads.</summary>
internal abstract unsafe class MomentField(double bandwidth, double totalWeight)
{
    /// <summary>2 ln 1e15 and 2 ln 1e17: what is left out of a density, or of a distribution function, counts less than this.</summary>
    protected const double DensityMargin = 69.077552789821371, CountMargin = 78.287893161797554;

    /// <summary>e^(−40²/2) is below the smallest double.</summary>
    protected const double Farthest = 40;

    private readonly Lock _lock = new();
    private readonly MomentTable?[] _tables = new MomentTable?[64];

    protected double Bandwidth { get; } = bandwidth;

    protected double TotalWeight { get; } = totalWeight;

    public static MomentField Of(MomentCells cells, double bandwidth, double totalWeight) =>
        cells.Numbers is null ? new DenseField(cells, bandwidth, totalWeight) : new SparseField(cells, bandwidth, totalWeight);

    /// <summary>destination[j] = factor · Σᵢ parts[i] · (order + i)-th derivative in units of h of Σ w e^(−u²/2) at x_j.</summary>
    public abstract void Derivatives(ReadOnlySpan<double> x, int order, double[] parts, double factor, Span<double> destination);

    /// <summary>destination[j] = factor · (weight below x_j, or above it, smoothed by Σᵢ parts[i] φ⁽ⁱ⁾).</summary>
    public abstract void Cumulatives(ReadOnlySpan<double> x, bool upper, double[] parts, double factor, Span<double> destination);

    /// <summary>Value, slope and lower tail at once, divided by the total weight; false where the field can't share the work.</summary>
    public virtual bool TryEvaluate(ReadOnlySpan<double> x, double[] parts, double totalWeight, Span<double> values, Span<double> slopes, Span<double> cumulatives) => false;

    // A field belongs to one kernel, so order and level name a table.
    protected MomentTable? Known(int kind) => Volatile.Read(ref _tables[kind]);

    protected abstract MomentTable Make(int kind, double[] parts);

    protected MomentTable Table(int kind, double[] parts)
    {
        if (Known(kind) is { } known)
        {
            return known;
        }

        lock (_lock)
        {
            MomentTable table = _tables[kind] ?? Make(kind, parts);
            Volatile.Write(ref _tables[kind], table);
            return table;
        }
    }

    // Derivative k of the family: zeros, then the kernel's own parts.
    protected static double[] Shifted(double[] parts, int order)
    {
        var shifted = new double[parts.Length + order];
        parts.CopyTo(shifted, order);
        return shifted;
    }

    // The smoothed count holds the first part; the others are derivatives one order lower: ∫φ⁽ⁱ⁾ = φ⁽ⁱ⁻¹⁾, with the other sign above.
    protected static double[] CountParts(double[] parts, bool upper)
    {
        if (parts.Length == 1)
        {
            return [];
        }

        double[] rest = parts[1..];
        for (int i = 0; i < rest.Length; i++)
        {
            rest[i] *= upper ? -1 : 1;
        }

        return rest;
    }
}
