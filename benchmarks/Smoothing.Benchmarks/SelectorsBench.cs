using System.Globalization;
using Smoothing.Bandwidths;
using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Benchmarks;

/// <summary>All rules over known laws: <c>-- selectors [samples=100] [threads=1] [sizes=100,1000,10000] [seed=1] [set=…] [csv=file]</c>; <c>-- selectors page</c> writes the committed file's tables into docs/bandwidths.md.</summary>
internal static class SelectorsBench
{
    private const string Sharp = "Sharp";
    private const string Fourth = "BlockSpectrum order 4";

    private const string Header = "set,density,rule,n,samples,mean_ise,mean_oracle_ise,ratio_of_means,mean_of_ratios,worst_ratio,not_found";

    private sealed class Tally
    {
        public int Samples;
        public double Error, Oracle, Ratios, Worst;
        public int NotFound;
    }

    public static int Run(string[] args)
    {
        if (args.Length > 0 && args[0] == "page")
        {
            return SelectorsPage.Run();
        }

        string Option(string name, string fallback) => args.FirstOrDefault(a => a.StartsWith(name + "=", StringComparison.Ordinal))?[(name.Length + 1)..] ?? fallback;
        int samples = int.Parse(Option("samples", "100"), CultureInfo.InvariantCulture);
        int threads = int.Parse(Option("threads", "1"), CultureInfo.InvariantCulture);
        ulong seed = ulong.Parse(Option("seed", "1"), CultureInfo.InvariantCulture);
        int[] sizes = [.. Option("sizes", "100,1000,10000").Split(',').Select(s => int.Parse(s, CultureInfo.InvariantCulture))];
        string set = Option("set", "");
        SelectorTarget[] targets = [.. SelectorTargets.All().Where(t => set.Length == 0 || t.Set == set || t.Name == set)];
        var rows = new List<string>[targets.Length];
        var tallies = new Dictionary<string, Tally>[targets.Length, sizes.Length];
        Parallel.For(0, targets.Length, new ParallelOptions { MaxDegreeOfParallelism = threads }, t =>
        {
            var truth = new SelectorTruth(targets[t]);
            rows[t] = [];
            for (int s = 0; s < sizes.Length; s++)
            {
                tallies[t, s] = One(truth, sizes[s], samples, seed, (ulong)((t * 100) + s));
                foreach ((string rule, Tally tally) in tallies[t, s])
                {
                    rows[t].Add(Row(targets[t], rule, sizes[s], tally));
                }
            }
        });

        string csv = Option("csv", "");
        if (csv.Length > 0)
        {
            File.WriteAllLines(csv, [Header, .. rows.SelectMany(r => r)]);
        }

        Print(targets, sizes, tallies);
        return 0;
    }

    private static Dictionary<string, Tally> One(SelectorTruth truth, int n, int samples, ulong seed, ulong cell)
    {
        var tallies = new Dictionary<string, Tally>();
        SelectorTarget target = truth.Target;
        for (int r = 0; r < samples; r++)
        {
            var stream = new RandomStream(seed, (cell * 1_000_003) + (ulong)r);
            var x = new double[n];
            for (int i = 0; i < n; i++)
            {
                x[i] = target.DrawOne(ref stream);
            }

            double[] exact = [.. x];
            Array.Sort(exact);
            if (target.Step > 0)
            {
                for (int i = 0; i < n; i++)
                {
                    x[i] = stream.NextUniform() < target.RoundedShare ? Math.Round(x[i] / target.Step) * target.Step : x[i];
                }
            }

            double[] weights = [];
            if (target.Weight is { } weigh)
            {
                weights = new double[n];
                for (int i = 0; i < n; i++)
                {
                    weights[i] = weigh(x[i], ref stream);
                }
            }

            Sample sample = Sample.Of(x, new SampleOptions { Weights = weights });
            SelectorErrors errors = truth.For(sample.SortedValues, sample.SortedWeights, sample.EffectiveCount);
            double quartiles = exact[3 * n / 4] - exact[n / 4];
            double oracle = (target.Step > 0 ? truth.For(exact, [], n) : errors).Oracle(0.006 * quartiles, 1.5 * quartiles);
            Try(tallies, sample, errors, oracle, likelihood: r < Math.Max(1, samples / 5));
        }

        return tallies;
    }

    private static void Try(Dictionary<string, Tally> tallies, Sample sample, SelectorErrors errors, double oracle, bool likelihood)
    {
        SelectionInput input = SelectionInput.Of(sample, null);
        double automatic = double.NaN;
        foreach (BandwidthRule rule in Enum.GetValues<BandwidthRule>())
        {
            // The likelihood costs more than all others together: every fifth sample is enough to place it.
            if (rule == BandwidthRule.LikelihoodCrossValidation && !likelihood)
            {
                continue;
            }

            BandwidthChoice choice = RuleDispatch.Choose(rule, input, Kernel.Gaussian);
            automatic = rule == BandwidthRule.Automatic ? choice.Value : automatic;
            Add(tallies, rule.ToString(), errors.Gaussian(choice.Value), oracle, choice.Status is BandwidthStatus.Replaced or BandwidthStatus.EndOfSearch);
        }

        double fourth = RuleDispatch.SharpBandwidth(input);
        Add(tallies, Fourth, errors.Gaussian(fourth, 4), oracle, false);
        Add(tallies, Sharp, errors.Sharp(automatic, fourth, input.LatticeStep * input.Unit), oracle, false);
    }

    private static void Add(Dictionary<string, Tally> tallies, string rule, double error, double oracle, bool notFound)
    {
        if (!tallies.TryGetValue(rule, out Tally? tally))
        {
            tallies[rule] = tally = new Tally();
        }

        tally.Samples++;
        tally.Error += error;
        tally.Oracle += oracle;
        tally.Ratios += error / oracle;
        tally.Worst = Math.Max(tally.Worst, error / oracle);
        tally.NotFound += notFound ? 1 : 0;
    }

    private static string Row(SelectorTarget target, string rule, int n, Tally t) => FormattableString.Invariant(
        $"{target.Set},\"{target.Name}\",{rule},{n},{t.Samples},{t.Error / t.Samples:G5},{t.Oracle / t.Samples:G5},{t.Error / t.Oracle:F3},{t.Ratios / t.Samples:F3},{t.Worst:F2},{t.NotFound}");

    private static void Print(SelectorTarget[] targets, int[] sizes, Dictionary<string, Tally>[,] tallies)
    {
        foreach (IGrouping<string, int> group in Enumerable.Range(0, targets.Length).GroupBy(t => targets[t].Set))
        {
            Console.WriteLine(FormattableString.Invariant($"\n{group.Key}: mean error / mean least error, averaged over {group.Count()} laws (worst law; mean of ratios)"));
            foreach (string rule in tallies[group.First(), 0].Keys)
            {
                Console.Write($"{rule,-30}");
                for (int s = 0; s < sizes.Length; s++)
                {
                    double[] ratios = [.. group.Select(t => tallies[t, s][rule].Error / tallies[t, s][rule].Oracle)];
                    double means = group.Average(t => tallies[t, s][rule].Ratios / tallies[t, s][rule].Samples);
                    Console.Write(FormattableString.Invariant($"  n={sizes[s]}: {ratios.Average():F3} ({ratios.Max():F2}; {means:F3})"));
                }

                Console.WriteLine();
            }

            foreach (string rule in new[] { nameof(BandwidthRule.Automatic), Sharp })
            {
                for (int s = 0; s < sizes.Length; s++)
                {
                    Console.WriteLine(FormattableString.Invariant($"  {rule} n={sizes[s]}: {string.Join(" ", group.Select(t => FormattableString.Invariant($"{tallies[t, s][rule].Error / tallies[t, s][rule].Oracle:F2}")))}"));
                }
            }
        }
    }
}
