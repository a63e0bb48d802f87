using System.Diagnostics;
using System.Globalization;

namespace Smoothing.Benchmarks.Targets;

/// <summary>Prints every speed target with the ratio reached: medians over interleaved rounds, one thread.</summary>
/// <remarks>
/// Ratios are of processor time of this process (system time, and with it page faults, included), because on a shared machine the clock on the wall also counts
/// what others compute meanwhile; the ratio of wall times stands beside it. On an idle machine the two agree.
/// </remarks>
internal static class TargetTable
{
    private const int WarmUps = 3;

    public static int Run(string[] args)
    {
        bool write = args.Length > 0 && args[0] == "write";
        args = write ? args[1..] : args;
        int rounds = args.Length > 0 ? int.Parse(args[0], CultureInfo.InvariantCulture) : 11;
        string[] only = args.Length > 1 ? args[1].Split(',') : [];
        var rows = new List<string>();
        Console.WriteLine(FormattableString.Invariant($"{"target",-7} {"limit",9} {"reached",9} {"wall",9} {"job ms",9} {"base ms",9}  measurement"));
        foreach (Func<Target> make in (IEnumerable<Func<Target>>)[.. GaussianTargets.All, .. PairTargets.All, .. CompactTargets.All])
        {
            Target target = make();
            if (only.Length > 0 && !only.Contains(target.Id))
            {
                continue;
            }

            Median median = Measure(target, rounds);
            string verdict = median.Ratio <= target.Limit ? "" : "MISSED";
            Console.WriteLine(FormattableString.Invariant(
                $"{target.Id,-7} {target.Limit,9:G3} {median.Ratio,9:G3} {median.WallRatio,9:G3} {median.Job,9:F3} {median.Yardstick,9:F3}  {target.Measurement}  {verdict}"));
            rows.Add(FormattableString.Invariant(
                $"| {target.Id} | {target.Measurement} | {target.Limit:G3} | {median.Ratio:G3} | {median.WallRatio:G3} | {median.Job:F2} | {median.Yardstick:F2} | {(verdict.Length == 0 ? "met" : "missed")} |"));
        }

        if (write)
        {
            TargetPage.Write(rows, rounds);
        }

        return 0;
    }

    private static Median Measure(Target target, int rounds)
    {
        double[] ratios = new double[rounds], wallRatios = new double[rounds], jobs = new double[rounds], yardsticks = new double[rounds];
        for (int round = -WarmUps; round < rounds; round++)
        {
            target.Reset();
            Times yardstick = Timed(target.Yardstick), job = Timed(target.Job);
            double? own = target.Measure?.Invoke();
            if (round >= 0)
            {
                ratios[round] = own ?? job.Processor / (yardstick.Processor * target.Scale);
                wallRatios[round] = own ?? job.Wall / (yardstick.Wall * target.Scale);
                jobs[round] = job.Processor;
                yardsticks[round] = yardstick.Processor * target.Scale;
            }
        }

        return new Median(Middle(ratios), Middle(wallRatios), Middle(jobs), Middle(yardsticks));
    }

    private static double Middle(double[] values)
    {
        Array.Sort(values);
        return values[values.Length / 2];
    }

    private static Times Timed(Action action)
    {
        TimeSpan before = Environment.CpuUsage.TotalTime;
        long start = Stopwatch.GetTimestamp();
        action();
        double wall = Stopwatch.GetElapsedTime(start).TotalMilliseconds;
        return new Times(wall, (Environment.CpuUsage.TotalTime - before).TotalMilliseconds);
    }

    private readonly record struct Times(double Wall, double Processor);

    private readonly record struct Median(double Ratio, double WallRatio, double Job, double Yardstick);
}
