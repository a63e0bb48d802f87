namespace Smoothing.Theory;

/// <summary>The pairs of components of a normal mixture: ∫ of products of two smoothed mixtures are sums over them.</summary>
internal static class MixturePairs
{
    /// <summary>Weight w w' (twice for two different components), difference of means, and sum of variances.</summary>
    public static (double Weight, double Distance, double Variance)[] Of(NormalMixture target)
    {
        var pairs = new List<(double Weight, double Distance, double Variance)>();
        for (int i = 0; i < target.Weights.Count; i++)
        {
            for (int j = 0; j <= i; j++)
            {
                double a = target.StandardDeviations[i];
                double b = target.StandardDeviations[j];
                pairs.Add(((i == j ? 1 : 2) * target.Weights[i] * target.Weights[j], target.Means[i] - target.Means[j], (a * a) + (b * b)));
            }
        }

        return [.. pairs];
    }
}
