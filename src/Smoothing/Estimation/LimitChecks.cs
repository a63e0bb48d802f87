using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Estimation;

/// <summary>Checks of a declared support against the data.</summary>
internal static class LimitChecks
{
    /// <summary>The support if it limits anything, null for the whole line; an error where values lie outside.</summary>
    public static Interval? Support(DensityOptions options, Interval range, Sample? sample)
    {
        if (options.Support is not { } support || support == Interval.WholeLine)
        {
            return null;
        }

        if (!(support.Lower < support.Upper))
        {
            throw new ArgumentException(Guard.Text($"Support must have a length, but both ends are {support.Lower}: pass two different limits."));
        }

        if (support.Contains(range.Lower) && support.Contains(range.Upper))
        {
            return support;
        }

        if (sample is null)
        {
            throw new ArgumentException(Guard.Text(
                $"Every value must lie in Support {support}, but the smallest is {range.Lower} and the largest {range.Upper}: correct the limit, or the data before condensing them."));
        }

        int first = -1;
        int count = 0;
        for (int i = 0; i < sample.Count; i++)
        {
            if (!support.Contains(sample.Values[i]))
            {
                first = first < 0 ? i : first;
                count++;
            }
        }

        throw new ArgumentException(Guard.Text(
            $"Every value must lie in Support {support}, but values[{first}] is {sample.Values[first]}, and {count} of {sample.Count} values in all lie outside: correct the limit or the data."));
    }
}
