using System.Collections.Concurrent;
using System.Diagnostics;
using System.Globalization;
using Smoothing.Theory;

namespace Smoothing.Benchmarks.Soak;

/// <summary>Whole reports at full load for minutes: <c>-- soak [minutes] [threads]</c>. Prints memory, open handles and the spread of times; fails when one of the bounds is passed.</summary>
internal static class SoakRun
{
    // After warm-up the memory in use may not rise by more than this, and the slowest hundredth may take five times the median.
    private const double MegabytesAllowed = 8;
    private const double SlownessAllowed = 5;

    public static int Run(string[] args)
    {
        double minutes = args.Length > 0 ? double.Parse(args[0], CultureInfo.InvariantCulture) : 10;
        int threads = args.Length > 1 ? int.Parse(args[1], CultureInfo.InvariantCulture) : Environment.ProcessorCount;
        var times = new ConcurrentQueue<double>();
        using var stop = new CancellationTokenSource();
        string expected = Report();
        long wrong = 0;
        Thread[] workers =
        [
            .. Enumerable.Range(0, threads).Select(_ => new Thread(() =>
            {
                while (!stop.IsCancellationRequested)
                {
                    long start = Stopwatch.GetTimestamp();
                    if (Report() != expected)
                    {
                        Interlocked.Increment(ref wrong);
                    }

                    times.Enqueue(Stopwatch.GetElapsedTime(start).TotalMilliseconds);
                }
            })),
        ];
        foreach (Thread worker in workers)
        {
            worker.Start();
        }

        // A fifth of the time warms up: code is compiled anew, pools fill.
        Thread.Sleep(TimeSpan.FromMinutes(minutes / 5));
        (double memoryBefore, int handlesBefore) = Measure();
        times.Clear();
        var memory = new List<double>();
        const int looks = 8;
        for (int i = 0; i < looks; i++)
        {
            Thread.Sleep(TimeSpan.FromMinutes(minutes * 0.8 / looks));
            (double megabytes, int handles) = Measure();
            memory.Add(megabytes);
            Console.WriteLine(FormattableString.Invariant($"{times.Count} reports, {megabytes:F1} MB in use (before: {memoryBefore:F1}), {handles} handles (before: {handlesBefore})"));
        }

        stop.Cancel();
        foreach (Thread worker in workers)
        {
            worker.Join();
        }

        double[] sorted = [.. times.Order()];
        double median = sorted[sorted.Length / 2], slow = sorted[(int)(0.99 * sorted.Length)];
        (double last, int handlesAfter) = Measure();
        double growth = memory.TakeLast(looks / 2).Min() - memoryBefore;
        bool good = wrong == 0 && growth <= MegabytesAllowed && slow <= SlownessAllowed * median && handlesAfter <= handlesBefore + 8;
        Console.WriteLine(FormattableString.Invariant($"{threads} threads, {minutes} minutes: {sorted.Length} reports, median {median:F1} ms, 99th percentile {slow:F1} ms ({slow / median:F1} × the median)"));
        Console.WriteLine(FormattableString.Invariant($"memory: {growth:+0.0;-0.0} MB after warm-up, {last:F1} MB at the end; handles {handlesBefore} before, {handlesAfter} after; {wrong} reports that differ"));
        Console.WriteLine(good ? "held" : "NOT HELD");
        return good ? 0 : 1;
    }

    private static string Report()
    {
        double[] values = NormalMixture.MarronWand[6].Draw(800, 3);
        DensityStudy study = DensityStudy.Of(values, new StudyOptions { Name = "level", Unit = "mm", Limits = [1.5] });
        return study.ToText() + study.ToHtml() + study.ToJson();
    }

    private static (double Megabytes, int Handles) Measure()
    {
        long bytes = GC.GetTotalMemory(forceFullCollection: true);
        string open = "/proc/self/fd";
        int handles = Directory.Exists(open) ? Directory.GetFiles(open).Length : Process.GetCurrentProcess().HandleCount;
        return (bytes / 1048576.0, handles);
    }
}
