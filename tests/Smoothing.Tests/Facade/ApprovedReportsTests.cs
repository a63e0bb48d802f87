using System.Text.Json;
using Smoothing.Numerics;
using Smoothing.Samples;
using Smoothing.Tests.Support;
using Smoothing.Theory;

namespace Smoothing.Tests.Facade;

/// <summary>
/// Whole reports on fixed seeds against files that somebody has read: text, Markdown and HTML sign by sign, numbers of the JSON to 1e-10, since wider vectors may
/// round differently. SMOOTHING_UPDATE_DOCS=1 rewrites the files; read the difference before committing it.
/// </summary>
[Trait("Category", "Widths")]
public class ApprovedReportsTests
{
    private const double Tolerance = 1e-10;

    private static readonly Dictionary<string, Func<DensityStudy>> s_studies = new()
    {
        ["small"] = () => DensityStudy.Of(
            [21, 25, 19, 48, 23, 28, 52, 22, 24, 31, 20, 26, 45, 23, 27, 18, 55, 22, 29, 24, 21, 49, 25, 30],
            new StudyOptions { Name = "Stay", Unit = "min", Limits = [45], Probabilities = [0.5, 0.99], Points = 81 }),
        ["heaped"] = () => DensityStudy.Of(
            Heaped(),
            new StudyOptions { Name = "Turnaround time", Unit = "min", Limits = [45], Support = new Interval(0, double.PositiveInfinity), Points = 81 }),
        ["compared"] = () => DensityStudy.Of(
            Rounded(NormalMixture.Normal(50, 8).Draw(900, 5)),
            new StudyOptions { Name = "Coating thickness", Unit = "µm", Limits = [60], ReferenceValues = Rounded(NormalMixture.Normal(47, 6).Draw(700, 6)), ReferenceName = "second quarter", Points = 81 }),
        ["rain"] = () => DensityStudy.Of(
            TestData.Load("seattle_precip_1461"),
            new StudyOptions { Name = "Daily rain", Unit = "mm", Limits = [20], Support = new Interval(0, double.PositiveInfinity), TimeOrdered = true, Points = 81 }),
        ["limit-outside"] = () => DensityStudy.Of(TestData.Load("faithful_eruptions_272"), new StudyOptions { Name = "Eruption length", Unit = "min", Limits = [0.5, 10], Points = 81 }),
        ["one"] = () => DensityStudy.Of([3.0], new StudyOptions { Bandwidth = 1, Limits = [2], Points = 81 }),
        ["all-equal"] = () => DensityStudy.Of([5.0, 5, 5, 5], new StudyOptions { Bandwidth = 1, Unit = "kg", Limits = [5], Points = 81 }),
        ["million"] = () => DensityStudy.Of(NormalMixture.MarronWand[7].Draw(1_000_000, 11), new StudyOptions { Limits = [2], Points = 81 }),
    };

    public static TheoryDataRow<string>[] Names() => [.. s_studies.Keys.Select(name => new TheoryDataRow<string>(name))];

    [Theory]
    [MemberData(nameof(Names))]
    public void Report_OfAFixedSeed_ReadsAsApproved(string name)
    {
        DensityStudy study = s_studies[name]();
        var written = new Dictionary<string, string> { ["txt"] = study.ToText(), ["md"] = study.ToMarkdown(), ["html"] = study.ToHtml(), ["json"] = study.ToJson() };
        foreach ((string kind, string text) in written)
        {
            string path = Path.Combine(Repository.Root, "tests", "Smoothing.Tests", "Facade", "Approved", name + "." + kind);
            string now = text.Replace("Smoothing " + StudyMethod.Version, "Smoothing VERSION", StringComparison.Ordinal).Replace("\"library\": \"" + StudyMethod.Version, "\"library\": \"VERSION", StringComparison.Ordinal);
            if (Environment.GetEnvironmentVariable("SMOOTHING_UPDATE_DOCS") == "1" && !(kind == "json" && Agrees(path, now)))
            {
                Directory.CreateDirectory(Path.GetDirectoryName(path)!);
                File.WriteAllText(path, now);
            }
            else if (kind == "json")
            {
                using JsonDocument approved = JsonDocument.Parse(File.ReadAllText(path));
                using JsonDocument actual = JsonDocument.Parse(now);
                Same(approved.RootElement, actual.RootElement, "$", 0);
            }
            else
            {
                Assert.Equal(File.ReadAllText(path), now);
            }
        }
    }

    [Theory]
    [MemberData(nameof(Names))]
    public void Report_OfAnyKind_FitsItsFrame(string name)
    {
        DensityStudy study = s_studies[name]();
        foreach (string line in study.ToText().Split('\n'))
        {
            Assert.True(new System.Globalization.StringInfo(line).LengthInTextElements <= 80, line);
            Assert.Equal(line.TrimEnd(), line);
        }

        foreach (string text in new[] { study.ToText(), study.ToMarkdown(), study.ToHtml(), study.ToJson() })
        {
            Assert.DoesNotContain("NaN", text, StringComparison.Ordinal);
            Assert.DoesNotContain("Infinity", text, StringComparison.Ordinal);
            Assert.DoesNotMatch(@"\d[Ee][+-]\d", name == "million" || text.StartsWith('{') ? "" : text);
            Assert.DoesNotContain("  .", text, StringComparison.Ordinal);
            Assert.DoesNotContain("..", text.Replace("...", "", StringComparison.Ordinal), StringComparison.Ordinal);
        }
    }

    // The comparison itself must be able to fail.
    [Theory]
    [InlineData("{\"a\":[1,2]}", "{\"a\":[1,2.000001]}")]
    [InlineData("{\"a\":[1,2]}", "{\"a\":[1]}")]
    [InlineData("{\"a\":1}", "{\"b\":1}")]
    [InlineData("{\"a\":\"x\"}", "{\"a\":\"y\"}")]
    [InlineData("{\"a\":null}", "{\"a\":0}")]
    public void Same_DifferentDocuments_Fails(string approved, string actual)
    {
        using JsonDocument first = JsonDocument.Parse(approved);
        using JsonDocument second = JsonDocument.Parse(actual);
        Assert.ThrowsAny<Xunit.Sdk.XunitException>(() => Same(first.RootElement, second.RootElement, "$", 0));
    }

    // Last digits differ from machine to machine: a file that agrees is left as it is.
    private static bool Agrees(string path, string now)
    {
        try
        {
            using JsonDocument approved = JsonDocument.Parse(File.ReadAllText(path));
            using JsonDocument actual = JsonDocument.Parse(now);
            Same(approved.RootElement, actual.RootElement, "$", 0);
            return true;
        }
        catch (Exception error) when (error is Xunit.Sdk.XunitException or IOException or JsonException)
        {
            return false;
        }
    }

    // Numbers against the largest of their list: what cancels to nothing has no digits of its own.
    private static void Same(JsonElement approved, JsonElement actual, string place, double scale)
    {
        Assert.True(approved.ValueKind == actual.ValueKind, $"{place}: {approved.ValueKind} became {actual.ValueKind}");
        switch (approved.ValueKind)
        {
            case JsonValueKind.Object:
                JsonProperty[] before = [.. approved.EnumerateObject()];
                JsonProperty[] now = [.. actual.EnumerateObject()];
                Assert.Equal(before.Select(p => p.Name), now.Select(p => p.Name));
                for (int i = 0; i < before.Length; i++)
                {
                    Same(before[i].Value, now[i].Value, place + "." + before[i].Name, 0);
                }

                break;
            case JsonValueKind.Array:
                JsonElement[] first = [.. approved.EnumerateArray()];
                JsonElement[] second = [.. actual.EnumerateArray()];
                Assert.True(first.Length == second.Length, $"{place}: {first.Length} became {second.Length} members");
                double largest = first.Select(e => e.ValueKind == JsonValueKind.Number ? Math.Abs(e.GetDouble()) : 0).DefaultIfEmpty(0).Max();
                for (int i = 0; i < first.Length; i++)
                {
                    Same(first[i], second[i], $"{place}[{i}]", largest);
                }

                break;
            case JsonValueKind.Number:
                double a = approved.GetDouble();
                double b = actual.GetDouble();
                Assert.True(Math.Abs(a - b) <= Tolerance * Math.Max(scale, Math.Max(Math.Abs(a), Math.Abs(b))), $"{place}: {a:R} became {b:R}");
                break;
            default:
                Assert.Equal(approved.ToString(), actual.ToString());
                break;
        }
    }

    // INVENTED: two groups of stays, every third value noted to the nearest five minutes.
    private static double[] Heaped()
    {
        double[] drawn = new NormalMixture([0.8, 0.2], [23, 50], [4.5, 5]).Draw(600, 9);
        return [.. drawn.Select((v, i) => Math.Max(1, i % 3 == 0 ? 5 * Math.Round(v / 5) : Math.Round(v)))];
    }

    private static double[] Rounded(double[] values) => [.. values.Select(v => Math.Round(v, 1))];
}
