using System.Globalization;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace Smoothing.Benchmarks.Targets;

/// <summary>Writes the table of targets with the machine it was made on; run from the top folder.</summary>
internal static class TargetPage
{
    private static readonly string s_path = Path.Combine("benchmarks", "results", "targets.md");

    public static void Write(IEnumerable<string> rows, int rounds)
    {
        string text = $"""
            # Speed targets and what was reached

            Made by `dotnet run -c Release --project benchmarks/Smoothing.Benchmarks -- targets write {rounds}` on {Machine()}.

            One thread. Each ratio is the median of {rounds} rounds in which yardstick and job take turns in one process. "Reached" is of processor time, system time and page faults
            included; "wall" is the same of the clock, which on a shared machine also counts what others compute meanwhile. Milliseconds are of processor time.
            T14 counts bytes. T15 starts a process for each round.

            | target | measurement | limit | reached | wall | job, ms | yardstick, ms | |
            |---|---|---|---|---|---|---|---|
            {string.Join(Environment.NewLine, rows)}

            """;
        File.WriteAllText(s_path, text);
        Console.WriteLine(s_path + " written.");
    }

    private static string Machine()
    {
        const string info = "/proc/cpuinfo", load = "/proc/loadavg";
        string model = File.Exists(info) ? File.ReadLines(info).FirstOrDefault(l => l.StartsWith("model name", StringComparison.Ordinal))?.Split(':')[1].Trim() ?? "" : "";
        string others = File.Exists(load) ? $", load average {File.ReadAllText(load).Split(' ')[0]} at the end" : "";
        int width = Vector512.IsHardwareAccelerated ? 512 : Vector256.IsHardwareAccelerated ? 256 : 128;
        return string.Create(CultureInfo.InvariantCulture, $"{Environment.ProcessorCount} cores {model} ({RuntimeInformation.ProcessArchitecture}, vectors of {width} bits), {RuntimeInformation.FrameworkDescription}{others}");
    }
}
