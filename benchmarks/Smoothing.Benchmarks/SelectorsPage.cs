using System.Globalization;
using System.Text;

namespace Smoothing.Benchmarks;

/// <summary>Writes the tables of docs/bandwidths.md from benchmarks/results/selectors.csv: <c>-- selectors page</c> from the top folder.</summary>
internal static class SelectorsPage
{
    private const string Begin = "<!-- tables: written by the selectors page command -->";
    private const string End = "<!-- end of tables -->";

    private static readonly (string Rule, string Label)[] s_rules =
    [
        ("Automatic", "`Automatic`"), ("DiffusionFixedPoint", "`DiffusionFixedPoint`"), ("BlockSpectrum", "`BlockSpectrum`"),
        ("OneSidedCrossValidation", "`OneSidedCrossValidation`"), ("LeastSquaresCrossValidation", "`LeastSquaresCrossValidation`"), ("SheatherJones", "`SheatherJones`"),
        ("DirectPlugIn", "`DirectPlugIn`"), ("BiasedCrossValidation", "`BiasedCrossValidation`"), ("LikelihoodCrossValidation", "`LikelihoodCrossValidation`"),
        ("NormalReference", "`NormalReference`"), ("Oversmoothed", "`Oversmoothed`"), ("BlockSpectrum order 4", "fourth-order kernel, `BlockSpectrum`"), ("Sharp", "`SharpEstimate`"),
    ];

    private sealed record Row(string Set, string Law, string Rule, int N, int Samples, double Ratio);

    public static int Run()
    {
        string page = Path.Combine("docs", "bandwidths.md"), csv = Path.Combine("benchmarks", "results", "selectors.csv");
        if (!File.Exists(page) || !File.Exists(csv))
        {
            Console.Error.WriteLine("docs/bandwidths.md or benchmarks/results/selectors.csv not found: run this from the top folder of the repository.");
            return 2;
        }

        string text = File.ReadAllText(page);
        int from = text.IndexOf(Begin, StringComparison.Ordinal) + Begin.Length, to = text.IndexOf(End, StringComparison.Ordinal);
        Row[] rows = [.. File.ReadLines(csv).Skip(1).Select(Parse)];
        File.WriteAllText(page, text[..from] + "\n\n" + Tables(rows) + "\n" + text[to..]);
        Console.WriteLine("docs/bandwidths.md written.");
        return 0;
    }

    private static string Tables(Row[] rows)
    {
        var text = new StringBuilder();
        text.AppendLine("The fifteen normal mixtures of Marron and Wand (1992): average over the laws, worst law in brackets.").AppendLine();
        ByRule(text, [.. rows.Where(r => r.Set == "Marron-Wand")]);
        text.AppendLine().AppendLine("Skewed, heavy-tailed and flat laws.").AppendLine();
        ByLaw(text, [.. rows.Where(r => r.Set == "other")]);
        text.AppendLine().AppendLine("Laws that no setting was chosen on.").AppendLine();
        ByLaw(text, [.. rows.Where(r => r.Set == "fresh")]);
        text.AppendLine().AppendLine("Rounded and heaped values, against the best h of the *unrounded* values.").AppendLine();
        ByLaw(text, [.. rows.Where(r => r.Set == "rounded")]);
        text.AppendLine().AppendLine("Weighted values, against the best h of the same weighted values; weights of a coefficient of variation, or growing with the value.").AppendLine();
        ByLaw(text, [.. rows.Where(r => r.Set == "weighted")]);
        return text.Replace("\r\n", "\n").ToString();
    }

    private static void ByRule(StringBuilder text, Row[] rows)
    {
        int[] sizes = [.. rows.Select(r => r.N).Distinct().Order()];
        Head(text, "rule", sizes.Select(Size));
        foreach ((string rule, string label) in s_rules)
        {
            text.Append("| ").Append(label);
            foreach (int n in sizes)
            {
                Row[] cell = [.. rows.Where(r => r.Rule == rule && r.N == n)];
                text.Append(" | ").Append(cell.Length == 0 ? "–" : $"{Number(cell.Average(r => r.Ratio))} ({Number(cell.Max(r => r.Ratio))})");
            }

            text.AppendLine(" |");
        }

        text.AppendLine().AppendLine(CultureInfo.InvariantCulture, $"Samples of each law: {Counts(rows.Where(r => r.Rule == "Automatic"))}; of the likelihood {Counts(rows.Where(r => r.Rule == "LikelihoodCrossValidation"))}, which costs more than all others together.");
    }

    private static void ByLaw(StringBuilder text, Row[] rows)
    {
        string[] rules = ["Automatic", "SheatherJones", "LeastSquaresCrossValidation", "Sharp"];
        int[] sizes = [.. rows.Select(r => r.N).Distinct().Order()];
        Head(text, "law", rules.SelectMany(rule => sizes.Select(n => $"{s_rules.First(r => r.Rule == rule).Label}, {Size(n)}")));
        foreach (string law in rows.Select(r => r.Law).Distinct())
        {
            text.Append("| ").Append(law);
            foreach (string rule in rules)
            {
                foreach (int n in sizes)
                {
                    Row? row = rows.FirstOrDefault(r => r.Law == law && r.Rule == rule && r.N == n);
                    text.Append(" | ").Append(row is null ? "–" : Number(row.Ratio));
                }
            }

            text.AppendLine(" |");
        }

        text.AppendLine().AppendLine(CultureInfo.InvariantCulture, $"Samples of each law: {Counts(rows.Where(r => r.Rule == "Automatic"))}.");
    }

    private static string Counts(IEnumerable<Row> rows) => string.Join(", ", rows.GroupBy(r => r.N).OrderBy(g => g.Key).Select(g => $"{g.Min(r => r.Samples)} at {Size(g.Key)}"));

    private static void Head(StringBuilder text, string first, IEnumerable<string> columns)
    {
        string[] all = [first, .. columns];
        text.Append("| ").Append(string.Join(" | ", all)).AppendLine(" |").Append('|').AppendLine(string.Concat(all.Select(_ => "---|")));
    }

    private static string Size(int n) => FormattableString.Invariant($"n = {n:N0}");

    private static string Number(double value) => value < 10 ? FormattableString.Invariant($"{value:F2}") : FormattableString.Invariant($"{value:F1}");

    // A law's name stands in quotation marks and may hold commas.
    private static Row Parse(string line)
    {
        int open = line.IndexOf('"', StringComparison.Ordinal), close = line.IndexOf('"', open + 1);
        string[] rest = line[(close + 2)..].Split(',');
        return new Row(line[..(open - 1)], line[(open + 1)..close], rest[0], int.Parse(rest[1], CultureInfo.InvariantCulture), int.Parse(rest[2], CultureInfo.InvariantCulture), double.Parse(rest[5], CultureInfo.InvariantCulture));
    }
}
