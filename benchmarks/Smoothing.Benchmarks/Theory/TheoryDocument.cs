using System.Diagnostics;
using System.Globalization;
using System.Text;
using Smoothing.Kernels;
using Smoothing.Theory;

namespace Smoothing.Benchmarks.Theory;

/// <summary>Writes the two tables of docs/theory.md and benchmarks/results/theory.md, with the speed of the closed forms: <c>-- theory</c> from the top folder.</summary>
internal static class TheoryDocument
{
    public static int Run()
    {
        string page = Path.Combine("docs", "theory.md");
        if (!File.Exists(page))
        {
            Console.Error.WriteLine("docs/theory.md not found: run this from the top folder of the repository.");
            return 2;
        }

        string convergence = Convergence();
        string misleading = Misleading();
        string text = Put(Put(File.ReadAllText(page), "convergence", convergence), "misleading", misleading);
        File.WriteAllText(page, text);
        string results = "# Exact and asymptotic errors, and the speed of the closed forms\n\n"
            + "Made by `dotnet run -c Release --project benchmarks/Smoothing.Benchmarks -- theory` on a virtual machine with 2 cores (AMD EPYC), other work running beside it.\n\n"
            + "## Convergence\n\n" + convergence + "\n## Where the asymptotic bandwidth misleads\n\n" + misleading + "\n## Speed\n\n" + Speed();
        File.WriteAllText(Path.Combine("benchmarks", "results", "theory.md"), results);
        Console.WriteLine(results);
        return 0;
    }

    private static string Put(string text, string name, string table)
    {
        string begin = "<!-- " + name + ": written by the theory command -->\n";
        int from = text.IndexOf(begin, StringComparison.Ordinal) + begin.Length;
        int to = text.IndexOf("<!-- end of " + name + " -->", StringComparison.Ordinal);
        return text[..from] + table + text[to..];
    }

    // The claw at its middle tooth: the bias, its leading term, and the same with the next term; the integrated error at n = h⁻⁵.
    private static string Convergence()
    {
        var theory = new ErrorTheory(Kernel.Gaussian, NormalMixture.MarronWand[9]);
        var table = new StringBuilder("| h | bias at 0 | one term / exact | two terms / exact | n | MISE | AMISE / MISE |\n|---|---|---|---|---|---|---|\n");
        for (double h = 0.32; h > 0.004; h /= 2)
        {
            double bias = theory.Bias(0, h);
            long n = (long)Math.Round(Math.Pow(h, -5));
            table.Append(Invariant($"| {h} | {Digits(bias, 4)} | {theory.AsymptoticBias(0, h) / bias:F5} | {theory.AsymptoticBias(0, h, 2) / bias:F5} | {n} | {Digits(theory.Mise(h, n), 4)} | {theory.Amise(h, n) / theory.Mise(h, n):F5} |\n"));
        }

        return table.ToString();
    }

    private static string Misleading()
    {
        var table = new StringBuilder("| # | target | n | h_MISE | h_AMISE | h_AMISE / h_MISE | MISE at h_AMISE / least MISE |\n|---|---|---|---|---|---|---|\n");
        for (int i = 0; i < 15; i++)
        {
            var theory = new ErrorTheory(Kernel.Gaussian, NormalMixture.MarronWand[i]);
            foreach (long n in new[] { 100L, 1_000L, 10_000L })
            {
                double h = theory.OptimalBandwidth(n);
                double a = theory.AsymptoticOptimalBandwidth(n);
                table.Append(Invariant($"| {i + 1} | {theory.Target.Name} | {n} | {Digits(h, 4)} | {Digits(a, 4)} | {a / h:F3} | {theory.Mise(a, n) / theory.Mise(h, n):F2} |\n"));
            }
        }

        return table.ToString();
    }

    private static string Speed()
    {
        double[] w = [.. Enumerable.Repeat(1 / 15.0, 15)];
        w[0] += 1 - w.Sum();
        double[] m = [.. Enumerable.Range(0, 15).Select(i => i * 0.7)];
        double[] s = [.. Enumerable.Range(0, 15).Select(i => 0.2 + (0.05 * i))];
        var theory = new ErrorTheory(Kernel.Gaussian, new NormalMixture(w, m, s));
        var text = new StringBuilder("15 components, Gaussian kernel; medians of 15 interleaved rounds of 2,000 calls, wall clock of one core. The baseline is the textbook double loop over all 225 pairs with Math.Exp.\n\n| h | MISE(h, n), µs | double loop, µs | ratio | relative difference |\n|---|---|---|---|---|\n");
        foreach (double h in new[] { 1, 0.2, 0.05, 0.005 })
        {
            var ours = new List<double>();
            var plain = new List<double>();
            double sink = 0;
            for (int round = 0; round < 18; round++)
            {
                double a = Time(() => sink += theory.Mise(h, 1_000), 2_000);
                double b = Time(() => sink += Loop(w, m, s, h, 1_000), 2_000);
                if (round >= 3)
                {
                    ours.Add(a);
                    plain.Add(b);
                }
            }

            (double x, double y) = (Median(ours), Median(plain));
            text.Append(Invariant($"| {h} | {x:F2} | {y:F2} | {x / y:F2} | {Math.Abs((theory.Mise(h, 1_000) / Loop(w, m, s, h, 1_000)) - 1):E0} |\n"));
            GC.KeepAlive(sink);
        }

        var tables = new List<double>();
        for (int round = 0; round < 9; round++)
        {
            tables.Add(Time(() => NormalMixture.MarronWand.Sum(t => new ErrorTheory(Kernel.Gaussian, t).OptimalBandwidth(1_000)), 1) / 1e6);
        }

        return text + Invariant($"\nOptimal bandwidths of the fifteen mixtures at n = 1,000: {Median(tables):F4} s for all (median of 9; the first, with compilation, {tables[0]:F3} s).\n");
    }

    private static double Loop(double[] w, double[] m, double[] s, double h, long n)
    {
        double U(double q)
        {
            double sum = 0;
            for (int i = 0; i < w.Length; i++)
            {
                for (int j = 0; j < w.Length; j++)
                {
                    double v = (s[i] * s[i]) + (s[j] * s[j]) + (q * h * h);
                    double d = m[i] - m[j];
                    sum += w[i] * w[j] * Math.Exp(-d * d / (2 * v)) / Math.Sqrt(2 * Math.PI * v);
                }
            }

            return sum;
        }

        return (1 / (2 * Math.Sqrt(Math.PI) * n * h)) + ((1 - (1.0 / n)) * U(2)) - (2 * U(1)) + U(0);
    }

    /// <summary>Microseconds a call.</summary>
    private static double Time(Action call, int count)
    {
        long start = Stopwatch.GetTimestamp();
        for (int i = 0; i < count; i++)
        {
            call();
        }

        return Stopwatch.GetElapsedTime(start).TotalMicroseconds / count;
    }

    private static double Median(List<double> values) => values.Order().ElementAt(values.Count / 2);

    private static string Digits(double value, int digits) => value.ToString("G" + digits.ToString(CultureInfo.InvariantCulture), CultureInfo.InvariantCulture);

    private static string Invariant(FormattableString text) => FormattableString.Invariant(text);
}
