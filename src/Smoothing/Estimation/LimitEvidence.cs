using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Estimation;

/// <summary>How the values crowd towards an end of the range: the exponent α in F(limit + d) ~ dᵅ.</summary>
/// <remarks>
/// Method: the k smallest positive distances from the limit, k = 2√n, give α̂ = k/Σ log(d₍ₖ₊₁₎/d₍ᵢ₎) with standard error α̂/√k (Hill 1975, at a finite
/// end point). α &lt; 1 is an unbounded density, 1 &lt; α &lt; 2 an infinite slope, α = 1 a jump, larger values a smooth end. Dominant error: a
/// bend of the density within the k values, of relative size k/n. Thresholds in standard errors are chosen so that exponential, half-normal,
/// gamma(2) and normal samples are rarely flagged (common practice: two and a half to three). Rounded data whose nearest values are mostly ties
/// say nothing and are left alone.
/// </remarks>
internal static class LimitEvidence
{
    // Fewer values than this near the limit can't tell the exponents apart: at k = 14 the standard error is above a quarter.
    private const int SmallestCount = 49;
    private const double Unbounded = 3;
    private const double Steep = 2.5;

    // A smooth end has an exponent of 1.7 or more on lognormal and normal samples, a jump 1: halfway, less two standard errors.
    private const double LargestJumpExponent = 1.5;

    /// <summary>Infinite density or slope at the declared limits.</summary>
    public static IReadOnlyList<LimitFinding> Declared(Sample sample, Interval support)
    {
        var findings = new List<LimitFinding>();
        foreach (bool lower in new[] { true, false })
        {
            double limit = lower ? support.Lower : support.Upper;
            if (!double.IsFinite(limit) || Exponent(sample, limit, lower) is not { } found)
            {
                continue;
            }

            (double alpha, double error) = found;
            if (alpha + (Unbounded * error) < 1)
            {
                findings.Add(new LimitFinding(LimitKind.InfiniteDensity, limit, lower, alpha, error, Guard.Text(
                    $"The density seems to grow without bound towards the limit {limit}: shares near it go like distance^{alpha:F2} ± {error:F2}. No height there means anything; BoundaryCorrection.LogScale, or a display on the log scale, suits such data.")));
            }
            else if (1 + (Steep * error) < alpha && alpha + (Steep * error) < 2)
            {
                findings.Add(new LimitFinding(LimitKind.InfiniteSlope, limit, lower, alpha, error, Guard.Text(
                    $"The density seems to leave 0 at the limit {limit} with infinite slope: shares near it go like distance^{alpha:F2} ± {error:F2}. Every boundary correction is too high or too low within a bandwidth of it.")));
            }
        }

        return findings;
    }

    /// <summary>Ends of the data that look like limits nobody declared.</summary>
    public static IReadOnlyList<LimitFinding> Suspected(Sample sample)
    {
        var findings = new List<LimitFinding>();
        foreach (bool lower in new[] { true, false })
        {
            double end = lower ? sample.Minimum : sample.Maximum;
            if (Exponent(sample, end, lower) is { } found && found.Alpha + (2 * found.Error) < LargestJumpExponent)
            {
                string side = lower ? "below" : "above";
                findings.Add(new LimitFinding(LimitKind.Suspected, end, lower, found.Alpha, found.Error, Guard.Text(
                    $"The values stop abruptly at {end}: shares near it go like distance^{found.Alpha:F2} ± {found.Error:F2}, where a smooth end gives 2 or more. If the quantity can't lie {side} a limit there, declare it as Support; the curve now runs past it and is too low before it.")));
            }
        }

        return findings;
    }

    /// <summary>α̂ and its standard error; null where the values near the limit are too few or mostly tied.</summary>
    public static (double Alpha, double Error)? Exponent(Sample sample, double limit, bool lower)
    {
        ReadOnlySpan<double> sorted = sample.SortedValues;
        if (sorted.Length < SmallestCount)
        {
            return null;
        }

        int k = (int)(2 * Math.Sqrt(sorted.Length));
        var distances = new List<double>(k + 1);
        int distinct = 0;
        for (int i = 0; i < sorted.Length && distances.Count <= k; i++)
        {
            double d = lower ? sorted[i] - limit : limit - sorted[sorted.Length - 1 - i];
            if (d > 0)
            {
                distinct += distances.Count == 0 || d > distances[^1] ? 1 : 0;
                distances.Add(d);
            }
        }

        if (distances.Count <= k || distinct <= k / 2)
        {
            return null;
        }

        double sum = 0;
        for (int i = 0; i < k; i++)
        {
            sum += Math.Log(distances[k] / distances[i]);
        }

        double alpha = k / sum;
        return (alpha, alpha / Math.Sqrt(k));
    }
}
