using Smoothing.Inference;

namespace Smoothing;

/// <summary>What a study says about one limit.</summary>
/// <param name="Limit">The limit, in the unit of the data.</param>
/// <param name="Beyond">Share of values above the limit, with its interval.</param>
public sealed record LimitAnswer(double Limit, ShareEstimate Beyond);
