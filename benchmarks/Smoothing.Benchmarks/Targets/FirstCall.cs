using System.Diagnostics;
using System.Globalization;
using Smoothing.Estimation;
using Smoothing.Kernels;
using Smoothing.Samples;

namespace Smoothing.Benchmarks.Targets;

/// <summary>T15: the first call in a fresh process, measured by starting this program anew for each round.</summary>
internal static class FirstCall
{
    public const string Command = "first-call";

    private const int Count = 100_000;
    private const int Points = 512;
    private const int LoopPoints = 16;

    public static Target Make() => new(
        "T15",
        "first call in a fresh process, n = 10^5, m = 512 / first call of the Math.Exp double loop, scaled",
        0.03,
        () => { },
        () => { },
        () => { },
        Measure: () =>
        {
            double job = Child("curve"), loop = Child("loop") * Points / LoopPoints;
            return job / loop;
        });

    /// <summary>In the fresh process: milliseconds of one call, of the processor and on the wall, printed.</summary>
    public static int Run(string[] args)
    {
        double[] values = GaussianTargets.Normal(Count, 1);
        double width = 1.06 * Math.Pow(Count, -0.2);
        double[] x = GaussianTargets.Equal(-4, 4, args[0] == "loop" ? LoopPoints : Points), y = new double[x.Length];
        TimeSpan before = Environment.CpuUsage.TotalTime;
        long start = Stopwatch.GetTimestamp();
        if (args[0] == "loop")
        {
            for (int j = 0; j < x.Length; j++)
            {
                double sum = 0;
                foreach (double value in values)
                {
                    double u = (x[j] - value) / width;
                    sum += Math.Exp(-0.5 * u * u);
                }

                y[j] = sum;
            }
        }
        else
        {
            Density.Of(Sample.Of(values), Kernel.Gaussian, width).Values(x, y);
        }

        double wall = Stopwatch.GetElapsedTime(start).TotalMilliseconds, processor = (Environment.CpuUsage.TotalTime - before).TotalMilliseconds;
        Console.WriteLine(FormattableString.Invariant($"{processor:R} {wall:R}"));
        return 0;
    }

    private static double Child(string what)
    {
        var start = new ProcessStartInfo(Environment.ProcessPath!) { RedirectStandardOutput = true };
        if (Path.GetFileNameWithoutExtension(Environment.ProcessPath!) == "dotnet")
        {
            start.ArgumentList.Add(typeof(FirstCall).Assembly.Location);
        }

        start.ArgumentList.Add(Command);
        start.ArgumentList.Add(what);
        using Process child = Process.Start(start)!;
        string printed = child.StandardOutput.ReadToEnd();
        child.WaitForExit();
        return double.Parse(printed.Split(' ')[0], CultureInfo.InvariantCulture);
    }
}
