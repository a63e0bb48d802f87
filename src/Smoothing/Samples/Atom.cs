namespace Smoothing.Samples;

/// <summary>A single value that holds a share of its own: dry days, claims of nothing, a reading at the end of the scale.</summary>
/// <remarks>
/// Read from <see cref="Sample.Atoms"/>, <see cref="Sample.PilingAtMinimum"/> and <see cref="Sample.PilingAtMaximum"/>.
/// No curve can show such a value: state its share and draw the curve for the rest.
/// </remarks>
public sealed record Atom
{
    internal Atom(double value, double share, double neighbourShare) => (Value, Share, NeighbourShare) = (value, share, neighbourShare);

    /// <summary>The value, in the unit of the data.</summary>
    public double Value { get; }

    /// <summary>Share of the weight exactly at the value, in (0, 1].</summary>
    public double Share { get; }

    /// <summary>The largest share that one of the three neighbouring places on either side holds, in [0, 1).</summary>
    public double NeighbourShare { get; }
}
