using System.Globalization;

namespace Smoothing.Tests.Support;

/// <summary>The open data sets copied into Data/, each with its source in Data/README.md.</summary>
internal static class TestData
{
    public static double[] Load(string name) =>
        File.ReadLines(Path.Combine(AppContext.BaseDirectory, "Data", name + ".csv"))
            .Skip(1)
            .Where(line => line.Length > 0)
            .Select(line => double.Parse(line, CultureInfo.InvariantCulture))
            .ToArray();

    /// <summary>A path to a file below Data/, for tables with several columns.</summary>
    public static string PathOf(string name) => Path.Combine(AppContext.BaseDirectory, "Data", name);
}
