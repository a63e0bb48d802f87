namespace Smoothing.Sql;

/// <summary>A column condensed by groups.</summary>
public sealed record CondensedGroups
{
    internal CondensedGroups(IReadOnlyList<CondensedColumn> groups, IReadOnlyList<ColumnRange> withoutValues) => (Groups, WithoutValues) = (groups, withoutValues);

    /// <summary>One condensed sample a group, in the order of the group columns (NULL first, text by its code points).</summary>
    public IReadOnlyList<CondensedColumn> Groups { get; }

    /// <summary>Groups that hold no usable value: all NULL, not finite, or of weight 0.</summary>
    public IReadOnlyList<ColumnRange> WithoutValues { get; }
}
