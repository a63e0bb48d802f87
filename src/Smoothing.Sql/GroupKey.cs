namespace Smoothing.Sql;

/// <summary>The values of the group columns, compared one by one; NULL equals NULL.</summary>
internal sealed class GroupKey(IReadOnlyList<object?> values) : IEquatable<GroupKey>, IComparable<GroupKey>
{
    public static readonly GroupKey None = new([]);

    public IReadOnlyList<object?> Values { get; } = values;

    public bool Equals(GroupKey? other) => other is not null && Values.SequenceEqual(other.Values);

    public int CompareTo(GroupKey? other)
    {
        for (int i = 0; other is not null && i < Values.Count && i < other.Values.Count; i++)
        {
            (object? a, object? b) = (Values[i], other.Values[i]);
            int order = a is null || b is null ? (a is null ? 0 : 1) - (b is null ? 0 : 1)
                : a is not string && a is IComparable comparable && a.GetType() == b.GetType() ? comparable.CompareTo(b)
                : string.CompareOrdinal(SourceChecks.Text($"{a}"), SourceChecks.Text($"{b}"));
            if (order != 0)
            {
                return order;
            }
        }

        return Values.Count - (other?.Values.Count ?? -1);
    }

    public override bool Equals(object? obj) => Equals(obj as GroupKey);

    public override int GetHashCode()
    {
        var hash = default(HashCode);
        foreach (object? value in Values)
        {
            hash.Add(value);
        }

        return hash.ToHashCode();
    }

    public override string ToString() => Values.Count == 0 ? "" : string.Join(", ", Values.Select(value => SourceChecks.Text($"{value ?? "NULL"}")));
}
