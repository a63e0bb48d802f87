using System.Diagnostics;
using System.Globalization;
using System.Numerics.Tensors;
using Smoothing.Samples;

namespace Smoothing.Benchmarks.Samples;

/// <summary>"-- samples": what the sample notices in the open data, how rarely it errs, and what it costs. Tables in Markdown.</summary>
internal static class SampleBench
{
    public static int Run(string[] args)
    {
        CultureInfo.CurrentCulture = CultureInfo.InvariantCulture;
        OpenData(args.Length > 0 ? args[0] : Path.Combine("tests", "Smoothing.Tests", "Data"));
        Errors();
        Cost(args.Length > 1 ? int.Parse(args[1], CultureInfo.InvariantCulture) : 10_000_000);
        return 0;
    }

    private static void OpenData(string folder)
    {
        Console.WriteLine("| data | n | tied | rounding unit | printed to | heaping unit | on it | expected | atom |");
        Console.WriteLine("|---|---|---|---|---|---|---|---|---|");
        foreach (string file in Directory.GetFiles(folder, "*.csv").Order(StringComparer.Ordinal))
        {
            string[] lines = File.ReadAllLines(file);
            var values = new List<double>();
            if (lines[0].Contains(' ') || !lines.Skip(1).All(line => Add(values, line)))
            {
                continue;
            }

            Sample s = Sample.Of(values);
            string heaping = s.HeapingUnit is HeapingUnit h ? $"{h.Step:G4} | {h.Share:P1} | {h.ExpectedShare:P1}" : " | | ";
            Console.WriteLine(
                $"| {Path.GetFileNameWithoutExtension(file)} | {s.Count} | {s.TiedShare:P1} | {s.RoundingUnit?.Step:G4} | {s.RoundingUnit?.PrintedStep:G4} | {heaping} | {string.Join(", ", s.Atoms.Select(a => $"{a.Value:G4} with {a.Share:P1}"))} |");
        }
    }

    private static bool Add(List<double> values, string line)
    {
        bool number = double.TryParse(line, CultureInfo.InvariantCulture, out double value);
        values.Add(value);
        return number;
    }

    private static void Errors()
    {
        Console.WriteLine();
        Console.WriteLine("| 200 seeded normal samples, n = 400 | wrong or missing unit | heaping | atoms | piling |");
        Console.WriteLine("|---|---|---|---|---|");
        foreach (double step in new[] { 0, 0.05, 0.1, 0.25, 0.5, 1 })
        {
            int unit = 0, heaping = 0, atoms = 0, piling = 0;
            for (int seed = 0; seed < 200; seed++)
            {
                Sample s = Sample.Of(Normal(400, seed, step));
                unit += Math.Abs((s.RoundingUnit?.Step ?? 0) - step) < 1e-9 ? 0 : 1;
                heaping += s.HeapingUnit is null ? 0 : 1;
                atoms += s.Atoms.Count == 0 ? 0 : 1;
                piling += s.PilingAtMinimum is null && s.PilingAtMaximum is null ? 0 : 1;
            }

            Console.WriteLine($"| {(step == 0 ? "not rounded" : $"rounded to {step} standard deviations")} | {unit} | {heaping} | {atoms} | {piling} |");
        }
    }

    private static void Cost(int n)
    {
        double[] values = Normal(n, 1, 0);
        double[] rounded = Array.ConvertAll(values, x => Math.Round(x * 100) / 100);
        double sum = 0;
        double baseline = Best(() => sum += TensorPrimitives.Sum<double>(values));
        Console.WriteLine();
        Console.WriteLine($"| {n:N0} values | ns a value | times a plain sum |");
        Console.WriteLine("|---|---|---|");
        Row("plain vectorised sum", baseline);
        Row("Sample.Of", Best(() => Sample.Of(values)));
        Row("Sample.Of with weights", Best(() => Sample.Of(values, new SampleOptions { Weights = Array.ConvertAll(values, Math.Abs) })));
        Sample plain = Sample.Of(values), stepped = Sample.Of(rounded);
        Row("first sort", Once(() => _ = plain.Minimum));
        stepped.Quantile(0.5);
        Row("ties, rounding, heaping, atoms; not rounded", Once(() => _ = (plain.TiedShare, plain.Atoms)));
        Row("the same, rounded to 0.01", Once(() => _ = (stepped.TiedShare, stepped.Atoms)));

        void Row(string what, double seconds) => Console.WriteLine($"| {what} | {seconds / n * 1e9:F2} | {seconds / baseline:F1} |");
    }

    private static double Best(Action work) => Enumerable.Range(0, 5).Min(_ => Once(work));

    private static double Once(Action work)
    {
        long start = Stopwatch.GetTimestamp();
        work();
        return Stopwatch.GetElapsedTime(start).TotalSeconds;
    }

    private static double[] Normal(int n, int seed, double step)
    {
        var random = new Random(seed);
        var values = new double[n];
        for (int i = 0; i < n; i++)
        {
            double x = Math.Sqrt(-2 * Math.Log(1 - random.NextDouble())) * Math.Cos(2 * Math.PI * random.NextDouble());
            values[i] = step == 0 ? x : (double)(Math.Round((decimal)x / (decimal)step) * (decimal)step);
        }

        return values;
    }
}
