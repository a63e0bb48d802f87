using Smoothing.Samples;

namespace Smoothing.Sql;

/// <summary>A column, or one group of it, condensed where it lies, with what was left out.</summary>
public sealed record CondensedColumn
{
    internal CondensedColumn(ColumnRange range, CondensedSample sample) => (Range, Sample) = (range, sample);

    /// <summary>The values of the group columns, in the order of <see cref="ColumnSource.Groups"/>; empty where there are none.</summary>
    public IReadOnlyList<object?> Group => Range.Group;

    /// <summary>What the first pass found: rows, missing and infinite values, range.</summary>
    public ColumnRange Range { get; }

    /// <summary>The condensed sample, as if the values had been condensed in process.</summary>
    public CondensedSample Sample { get; }
}
