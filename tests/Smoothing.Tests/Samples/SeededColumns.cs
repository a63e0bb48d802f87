namespace Smoothing.Tests.Samples;

/// <summary>Seeded columns from six shapes, with a spread of about 1.</summary>
internal static class SeededColumns
{
    public static readonly string[] Shapes = ["normal", "exponential", "uniform", "two groups", "skewed", "peaked"];

    public static double[] Draw(string shape, int n, int seed)
    {
        var random = new Random(seed);
        double Normal() => Math.Sqrt(-2 * Math.Log(1 - random.NextDouble())) * Math.Cos(2 * Math.PI * random.NextDouble());
        var values = new double[n];
        for (int i = 0; i < n; i++)
        {
            values[i] = shape switch
            {
                "normal" => Normal(),
                "exponential" => -Math.Log(1 - random.NextDouble()),
                "uniform" => random.NextDouble() * 3.46,
                "two groups" => (random.NextDouble() < 0.4 ? -1.2 : 1) + (0.4 * Normal()),
                "skewed" => Math.Exp(0.6 * Normal()),
                _ => -Math.Log(1 - random.NextDouble()) * (random.NextDouble() < 0.5 ? -0.7 : 0.7),
            };
        }

        return values;
    }

    /// <summary>A decimal step as people round: the nearest multiple, computed in decimal so that 0.15 is the double nearest to 0.15.</summary>
    public static double[] Round(double[] values, decimal step) =>
        Array.ConvertAll(values, x => (double)(Math.Round((decimal)x / step) * step));
}
