using System.Diagnostics;
using System.Globalization;

namespace Smoothing.Benchmarks.Targets;

/// <summary>Prints every speed target with the ratio reached: medians over interleaved rounds, one thread.</summary>
internal static class TargetTable
{
    private const int WarmUps = 3;

    public static int Run(string[] args)
    {
        int rounds = args.Length > 0 ? int.Parse(args[0], CultureInfo.InvariantCulture) : 11;
        string only = args.Length > 1 ? args[1] : "";
        Console.WriteLine(FormattableString.Invariant($"{"target",-7} {"reached",9} {"limit",7}  {"job ms",9} {"base ms",9}  measurement"));
        foreach (Func<Target> make in (IEnumerable<Func<Target>>)[.. GaussianTargets.All, .. PairTargets.All, .. CompactTargets.All])
        {
            Target target = make();
            if (only.Length > 0 && target.Id != only)
            {
                continue;
            }

            (double ratio, double job, double yardstick) = Measure(target, rounds);
            string verdict = ratio <= target.Limit ? "" : "  MISSED";
            Console.WriteLine(FormattableString.Invariant(
                $"{target.Id,-7} {ratio,9:G3} {target.Limit,7:G3}  {job,9:F3} {yardstick,9:F3}  {target.Measurement}{verdict}"));
        }

        return 0;
    }

    private static (double Ratio, double Job, double Yardstick) Measure(Target target, int rounds)
    {
        var ratios = new double[rounds];
        var jobs = new double[rounds];
        var yardsticks = new double[rounds];
        for (int round = -WarmUps; round < rounds; round++)
        {
            target.Reset();
            double yardstick = Milliseconds(target.Yardstick) * target.Scale;
            double job = Milliseconds(target.Job);
            double own = target.Measure?.Invoke() ?? job / yardstick;
            if (round >= 0)
            {
                ratios[round] = own;
                jobs[round] = job;
                yardsticks[round] = yardstick;
            }
        }

        Array.Sort(ratios);
        Array.Sort(jobs);
        Array.Sort(yardsticks);
        return (ratios[rounds / 2], jobs[rounds / 2], yardsticks[rounds / 2]);
    }

    private static double Milliseconds(Action action)
    {
        long start = Stopwatch.GetTimestamp();
        action();
        return Stopwatch.GetElapsedTime(start).TotalMilliseconds;
    }
}
