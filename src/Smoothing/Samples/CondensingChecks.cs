using Smoothing.Numerics;

namespace Smoothing.Samples;

/// <summary>The checks on condensing, one message per fault.</summary>
internal static class CondensingChecks
{
    public static void Check(CondensingOptions options)
    {
        if (options.CellWidth is double width)
        {
            Guard.Positive(width, "pass a width in the unit of the data, or null for the rule", nameof(CondensingOptions.CellWidth));
        }

        Guard.InRange(options.Moments, 2, 16, nameof(CondensingOptions.Moments));
        Guard.AtLeast(options.MaximumCells, 16, nameof(CondensingOptions.MaximumCells));
        Limits(options.Limits);
    }

    public static void Limits(IReadOnlyList<double> limits)
    {
        for (int i = 0; i < limits.Count; i++)
        {
            if (!double.IsFinite(limits[i]) || limits.Take(i).Contains(limits[i]))
            {
                throw new ArgumentException(Guard.Text($"Limits[{i}] must be finite and not given before, but is {limits[i]}: leave it out."), nameof(limits));
            }
        }
    }

    /// <summary>Values and weights of one piece, before any of it is taken in.</summary>
    public static void Piece(ReadOnlySpan<double> values, ReadOnlySpan<double> weights, CondensingOptions options)
    {
        if (!weights.IsEmpty && weights.Length != values.Length)
        {
            throw new ArgumentException(Guard.Text($"weights must have one entry per value: there are {values.Length} values and {weights.Length} weights."), nameof(weights));
        }

        for (int i = 0; i < values.Length; i++)
        {
            if (double.IsInfinity(values[i]))
            {
                throw new ArgumentException(Guard.Text($"values[{i}] is {values[i]}: values must be finite; mend the source or leave the row out."), nameof(values));
            }

            if (double.IsNaN(values[i]) && options.Missing == MissingValues.Reject)
            {
                throw new ArgumentException(Guard.Text($"values[{i}] is NaN: leave missing values out with Missing = MissingValues.LeaveOut."), nameof(values));
            }
        }

        for (int i = 0; i < weights.Length; i++)
        {
            bool whole = options.WeightMeaning != WeightMeaning.Counts || weights[i] == Math.Floor(weights[i]);
            if (!(weights[i] >= 0 && double.IsFinite(weights[i]) && whole))
            {
                throw new ArgumentException(
                    Guard.Text($"weights[{i}] is {weights[i]}: weights must be finite and not negative, and counts whole numbers; use 0 to leave a value out."), nameof(weights));
            }
        }
    }

    public static void Same(CondensedSample other, int moments, IReadOnlyList<double> limits, WeightMeaning meaning)
    {
        if (other.Moments != moments)
        {
            throw new ArgumentException(Guard.Text($"both samples must have the same number of moments, but have {moments} and {other.Moments}: condense both with the same Moments."), nameof(other));
        }

        if (!other.Limits.SequenceEqual(limits))
        {
            throw new ArgumentException(
                Guard.Text($"both samples must count at the same limits, but one does at [{string.Join("; ", limits.Select(x => Guard.Text($"{x}")))}] and the other at [{string.Join("; ", other.Limits.Select(x => Guard.Text($"{x}")))}]: condense both with the same Limits."),
                nameof(other));
        }

        if (other.WeightMeaning != meaning)
        {
            throw new ArgumentException(Guard.Text($"both samples must give their weights the same meaning, but they are {meaning} and {other.WeightMeaning}: condense both with the same WeightMeaning."), nameof(other));
        }
    }
}
