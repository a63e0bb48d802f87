using System.Numerics.Tensors;
using Smoothing.Numerics;

namespace Smoothing.Samples;

/// <summary>The checks on a column of values and its weights, one message per fault.</summary>
internal static class SampleChecks
{
    public static bool Options(SampleOptions options) =>
        (options.WeightMeaning is WeightMeaning.Relative or WeightMeaning.Counts) && (options.Missing is MissingValues.Reject or MissingValues.LeaveOut);

    public static void Check(ReadOnlySpan<double> values, ReadOnlySpan<double> weights, SampleOptions options, out int missing, out int weightless)
    {
        missing = 0;
        weightless = 0;
        if (values.IsEmpty)
        {
            throw new ArgumentException("values must hold at least one number, but is empty: pass the measurements.", nameof(values));
        }

        if (!Options(options))
        {
            throw new ArgumentException(
                Guard.Text($"WeightMeaning and Missing must be one of their names, but are {options.WeightMeaning} and {options.Missing}: see the two enumerations."), nameof(options));
        }

        // One vectorised pass when all is well, as it nearly always is.
        if (!TensorPrimitives.IsFiniteAll<double>(values))
        {
            missing = CheckValues(values, options);
        }

        if (!weights.IsEmpty)
        {
            weightless = CheckWeights(values, weights, options);
        }
    }

    private static int CheckValues(ReadOnlySpan<double> values, SampleOptions options)
    {
        int firstMissing = -1;
        int missing = 0;
        for (int i = 0; i < values.Length; i++)
        {
            if (double.IsInfinity(values[i]))
            {
                throw new ArgumentException(Guard.Text($"values[{i}] is {values[i]}: values must be finite; mend the source or leave the row out."), nameof(values));
            }

            if (double.IsNaN(values[i]))
            {
                firstMissing = firstMissing < 0 ? i : firstMissing;
                missing++;
            }
        }

        if (missing > 0 && options.Missing == MissingValues.Reject)
        {
            throw new ArgumentException(
                Guard.Text($"values[{firstMissing}] is NaN, {missing} of {values.Length} values in all: leave missing values out with Missing = MissingValues.LeaveOut."),
                nameof(values));
        }

        if (missing == values.Length)
        {
            throw new ArgumentException(Guard.Text($"all {missing} values are missing: pass at least one number."), nameof(values));
        }

        return missing;
    }

    private static int CheckWeights(ReadOnlySpan<double> values, ReadOnlySpan<double> weights, SampleOptions options)
    {
        if (weights.Length != values.Length)
        {
            throw new ArgumentException(Guard.Text($"Weights must have one entry per value: there are {values.Length} values and {weights.Length} weights: pass both in the same order."), nameof(weights));
        }

        bool counts = options.WeightMeaning == WeightMeaning.Counts;
        int weightless = 0;
        double total = 0;
        for (int i = 0; i < weights.Length; i++)
        {
            double w = weights[i];
            if (!(w >= 0 && double.IsFinite(w)))
            {
                throw new ArgumentException(Guard.Text($"Weights[{i}] is {w}: weights must be finite and not negative; use 0 to leave a value out."), nameof(weights));
            }

            if (counts && w != Math.Floor(w))
            {
                throw new ArgumentException(Guard.Text($"Weights[{i}] is {w}: counts must be whole numbers; use WeightMeaning.Relative for others."), nameof(weights));
            }

            if (!double.IsNaN(values[i]))
            {
                total += w;
                weightless += w == 0 ? 1 : 0;
            }
        }

        if (!(total > 0 && double.IsFinite(total)))
        {
            throw new ArgumentException(Guard.Text($"Weights of the values kept sum to {total}: at least one must be above zero and the sum finite."), nameof(weights));
        }

        return weightless;
    }
}
