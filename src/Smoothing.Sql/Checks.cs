using System.Data.Common;

namespace Smoothing.Sql;

/// <summary>What must hold before the first and before the second pass.</summary>
internal static class Checks
{
    public static void Before(IReadOnlyList<DbConnection> shards, ColumnSource source, TableOptions options, bool grouped)
    {
        ArgumentNullException.ThrowIfNull(shards);
        if (shards.Count == 0)
        {
            throw new ArgumentException("shards must hold at least one connection, but is empty: pass one for each part of the table.", nameof(shards));
        }

        for (int i = 0; i < shards.Count; i++)
        {
            ArgumentNullException.ThrowIfNull(shards[i], shards.Count == 1 ? "connection" : SourceChecks.Text($"shards[{i}]"));
        }

        SourceChecks.Check(source);
        if (source.Groups.Count > 0 != grouped)
        {
            throw new ArgumentException(
                SourceChecks.Text($"Groups holds {source.Groups.Count} names: use CondenseGroups for a source with groups, Condense for one without."), nameof(source));
        }

        if (options.CellWidth is double width && !(width > 0 && double.IsFinite(width)))
        {
            throw new ArgumentException(SourceChecks.Text($"CellWidth must be positive and finite, but is {width}: pass a width in the unit of the data, or null for the rule."), nameof(options));
        }

        if (options.Bandwidth is double h && !(h > 0 && double.IsFinite(h)))
        {
            throw new ArgumentException(SourceChecks.Text($"Bandwidth must be positive and finite, but is {h}: pass the one you mean to use, or null."), nameof(options));
        }

        if (options.MaximumCells < 1 || options.ShardsAtOnce < 1)
        {
            throw new ArgumentException(
                SourceChecks.Text($"MaximumCells and ShardsAtOnce must be at least 1, but are {options.MaximumCells} and {options.ShardsAtOnce}."), nameof(options));
        }

        if (options.CommandTimeout is TimeSpan limit && !(limit > TimeSpan.Zero && limit.TotalSeconds < int.MaxValue))
        {
            throw new ArgumentException(SourceChecks.Text($"CommandTimeout must be above zero, but is {limit}: pass null for the provider's own."), nameof(options));
        }

        if (options.Transaction is not null && shards.Count > 1)
        {
            throw new ArgumentException(SourceChecks.Text($"a Transaction belongs to one connection, but there are {shards.Count}: leave it out."), nameof(options));
        }
    }

    public static void Ranges(IReadOnlyCollection<ColumnRange> ranges, ColumnSource source)
    {
        ColumnRange all = ranges.Aggregate(new ColumnRange(), (sum, range) => sum.Add(range));
        string where = SourceChecks.Describe(source);
        if (all.Texts > 0)
        {
            throw new ArgumentException(
                SourceChecks.Text($"column '{source.Value}' of {where} must be numeric, but holds text in {all.Texts} of {all.Rows} rows: name another column, or convert it in a Query."), nameof(source));
        }

        if (all.TextWeights > 0)
        {
            throw new ArgumentException(
                SourceChecks.Text($"column '{source.Weight}' of {where} must be numeric, but holds text in {all.TextWeights} of {all.Rows} rows: name another column, or convert it in a Query."), nameof(source));
        }

        if (all.Rows == 0)
        {
            throw new ArgumentException(SourceChecks.Text($"{where} must hold at least one row that passes the filter, but holds none: check the name and the filter."), nameof(source));
        }

        if (all.Kept == 0)
        {
            throw new ArgumentException(
                SourceChecks.Text($"column '{source.Value}' of {where} must hold at least one finite value, but of {all.Rows} rows {all.Missing} are NULL and {all.NotFinite} not finite: name another column."), nameof(source));
        }

        if (all.BadWeights > 0)
        {
            throw new ArgumentException(
                SourceChecks.Text($"column '{source.Weight}' of {where} must hold weights that are finite and not negative (whole numbers for counts), but {all.BadWeights} of {all.Kept} rows do not: mend them or leave the rows out with a Filter."),
                nameof(source));
        }

        if (!(all.Weight > 0 && double.IsFinite(all.Weight)))
        {
            throw new ArgumentException(SourceChecks.Text($"weights in column '{source.Weight}' of {where} sum to {all.Weight}: at least one must be above zero and the sum finite."), nameof(source));
        }
    }
}
