namespace Smoothing.Estimation;

/// <summary>What the data say about a limit of the range.</summary>
internal enum LimitKind
{
    /// <summary>The density grows without bound towards a declared limit.</summary>
    InfiniteDensity,

    /// <summary>The density starts at 0 with infinite slope at a declared limit.</summary>
    InfiniteSlope,

    /// <summary>The values stop abruptly where no limit is declared.</summary>
    Suspected,
}

/// <summary>One finding, with the numbers behind it.</summary>
/// <param name="Kind">What was found.</param>
/// <param name="Limit">The declared limit, or the outermost value.</param>
/// <param name="IsLower">Whether it ends the range below.</param>
/// <param name="Exponent">α in F(limit + d) ~ dᵅ.</param>
/// <param name="StandardError">Of the exponent.</param>
/// <param name="Statement">The finding in a sentence.</param>
internal sealed record LimitFinding(LimitKind Kind, double Limit, bool IsLower, double Exponent, double StandardError, string Statement);
