namespace Smoothing.Numerics;

/// <summary>A closed interval of the real line; an end may be infinite.</summary>
/// <remarks>The default value is the single point 0. Ends keep the order <c>Lower ≤ Upper</c> and are never NaN.</remarks>
public readonly record struct Interval
{
    /// <summary>Makes the interval from <paramref name="lower"/> to <paramref name="upper"/>.</summary>
    /// <param name="lower">Lower end, in the unit of the data; −∞ allowed.</param>
    /// <param name="upper">Upper end, in the unit of the data, at least <paramref name="lower"/>; +∞ allowed.</param>
    /// <exception cref="ArgumentException">An end is NaN, or <paramref name="lower"/> exceeds <paramref name="upper"/>.</exception>
    public Interval(double lower, double upper)
    {
        if (!(lower <= upper))
        {
            throw new ArgumentException(Guard.Text($"An interval needs lower ≤ upper and no NaN, but got {lower} and {upper}: exchange the ends or mend the missing one."));
        }

        Lower = lower;
        Upper = upper;
    }

    /// <summary>The whole line, −∞ to +∞.</summary>
    public static Interval WholeLine { get; } = new(double.NegativeInfinity, double.PositiveInfinity);

    /// <summary>Lower end, in the unit of the data; may be −∞.</summary>
    public double Lower { get; }

    /// <summary>Upper end, in the unit of the data; may be +∞.</summary>
    public double Upper { get; }

    /// <summary>Upper − Lower; +∞ when an end is infinite.</summary>
    public double Length => Upper - Lower;

    /// <summary>Whether <paramref name="value"/> lies in the closed interval; false for NaN.</summary>
    /// <param name="value">The value to place, in the unit of the data.</param>
    /// <returns>True when <c>Lower ≤ value ≤ Upper</c>.</returns>
    public bool Contains(double value) => value >= Lower && value <= Upper;

    /// <summary>Takes the interval apart into its two ends.</summary>
    /// <param name="lower">Receives the lower end.</param>
    /// <param name="upper">Receives the upper end.</param>
    public void Deconstruct(out double lower, out double upper)
    {
        lower = Lower;
        upper = Upper;
    }

    /// <summary>The interval as <c>[lower, upper]</c> in the invariant culture.</summary>
    /// <returns>Text that reads the same in every culture.</returns>
    public override string ToString() => Guard.Text($"[{Lower}, {Upper}]");
}
