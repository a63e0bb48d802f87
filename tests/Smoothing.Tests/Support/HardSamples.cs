using Smoothing.Numerics;

namespace Smoothing.Tests.Support;

/// <summary>Seeded artificial values on which sums usually lose digits.</summary>
internal static class HardSamples
{
    public static readonly string[] Names = ["normal", "offset", "clusters", "gap", "rounded", "edge", "heavy", "equal"];

    public static double[] Make(string name, int count)
    {
        var random = new RandomStream(20260101);
        var values = new double[count];
        for (int i = 0; i < count; i++)
        {
            double z = random.NextNormal();
            values[i] = name switch
            {
                "offset" => 1e6 + z,
                "clusters" => ((i % 3) * 5.0) + (z * (i % 3 == 0 ? 1e-6 : i % 3 == 1 ? 0.01 : 1)),
                "gap" => (i % 2 * 8) + (0.3 * z),
                "rounded" => Math.Round(z, 1),
                "edge" => i % 100 == 0 ? z : 0.3 + (1e-9 * z), // a cluster 1e-9 wide that windows ending near 0.3 cut
                "heavy" => z / random.NextNormal(), // Cauchy
                "equal" => 0.1,
                _ => z,
            };
        }

        return values;
    }

    /// <summary>Points that meet values, window ends and gaps: spread over the range, on values, and a window width away from values.</summary>
    public static double[] Points(double[] values, double width, int count)
    {
        double[] sorted = [.. values.Order()];
        double low = sorted[sorted.Length / 50];
        double high = sorted[sorted.Length - 1 - (sorted.Length / 50)];
        var points = new List<double>();
        for (int j = 0; j < count; j++)
        {
            double value = sorted[(int)((long)j * (sorted.Length - 1) / (count - 1))];
            points.Add(low - (1.1 * width) + ((high - low + (2.2 * width)) * j / (count - 1)));
            points.Add(value);
            points.Add(value + width);
            points.Add(value - width);
            points.Add(value + (width * (1 - 1e-9)));
        }

        points.Add(sorted[0] - (2 * width));
        points.Add(sorted[^1] + (2 * width));
        return [.. points];
    }
}
