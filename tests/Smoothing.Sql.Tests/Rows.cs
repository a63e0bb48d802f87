namespace Smoothing.Sql.Tests;

/// <summary>Seeded rows.</summary>
internal static class Rows
{
    public static List<(double? X, double W, string G)> Draw(int n, int seed)
    {
        var random = new Random(seed);
        var rows = new List<(double?, double, string)>();
        for (int i = 0; i < n; i++)
        {
            double normal = Math.Sqrt(-2 * Math.Log(1 - random.NextDouble())) * Math.Cos(2 * Math.PI * random.NextDouble());
            double x = random.NextDouble() < 0.4 ? -3 + (0.7 * normal) : 2 + normal;
            rows.Add((x, random.Next(1, 5), random.NextDouble() < 0.5 ? "north" : "south"));
        }

        return rows;
    }
}
