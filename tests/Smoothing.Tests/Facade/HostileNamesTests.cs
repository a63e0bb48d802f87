using System.Globalization;
using System.Text.Json;
using AngleSharp.Dom;
using AngleSharp.Html.Parser;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Facade;

/// <summary>Names and units come from column headings and file names: nothing in them may act, escape its place or break a line.</summary>
public class HostileNamesTests
{
    private static readonly double[] s_eruptions = TestData.Load("faithful_eruptions_272");

    private static readonly string[] s_tags = ["html", "head", "meta", "link", "title", "style", "body", "main", "h1", "h2", "figure", "figcaption", "div", "section", "p", "ul", "li", "table", "thead", "tbody", "tr", "th", "td", "svg", "desc", "path", "line", "rect", "g", "text"];

    public static TheoryDataRow<string>[] Names() =>
    [
        new("<script>alert(1)</script>"),
        new("\"'`&<>"),
        new("\" onload=\"alert(1)"),
        new("</title></style></svg><img src=x onerror=alert(1)>"),
        new("]]><!-- --><![CDATA["),
        new("\u202Egnirts\u2066\u2069"),
        new("\u05D3\u05E7\u05D5\u05EA"),
        new("line\r\nbreak\t\u0000\u0007"),
        new("| a | b |\n# heading\n```\n[link](javascript:alert(1)) ![x](http://x) *bold* _it_ ~~no~~ $x$"),
        new("\uD800 lone \uDC00 halves \uD83D\uDE9A"),
        new(new string('x', 10_000)),
        new(string.Concat(Enumerable.Repeat("\uD83D\uDE9A", 5_000))),
        new(string.Concat(Enumerable.Repeat("word ", 2_000))),
        new("{0} {1:F3} %s \\u0041 \\"),
    ];

    [Theory]
    [MemberData(nameof(Names))]
    public void ToHtml_AnyName_HoldsOnlyTheReportsOwnElements(string name)
    {
        string html = Study(name).ToHtml();
        IDocument document = new HtmlParser(new HtmlParserOptions { IsStrictMode = true }).ParseDocument(html);
        Assert.All(document.All, element =>
        {
            Assert.Contains(element.LocalName, s_tags);
            Assert.DoesNotContain(element.Attributes, a => a.Name.StartsWith("on", StringComparison.OrdinalIgnoreCase) || a.Name is "src" or "xlink:href" || (a.Name == "href" && a.Value != "data:,"));
            Assert.DoesNotContain("url(", element.LocalName == "style" ? element.TextContent : "", StringComparison.Ordinal);
        });
        Assert.Equal(4, document.QuerySelectorAll("svg").Length);
        Assert.All(document.QuerySelectorAll("svg"), svg => Assert.True(svg.GetAttribute("aria-label")!.Length > 20));
        string[] ids = [.. document.All.Select(e => e.Id).OfType<string>().Where(id => id.Length > 0)];
        Assert.Equal(ids.Distinct().Count(), ids.Length);
        Assert.Equal(1, document.QuerySelectorAll("h1").Length);
        Plain(html);
        Assert.True(html.Length < 200_000);
    }

    [Theory]
    [MemberData(nameof(Names))]
    public void ToSvg_AnyName_IsWellFormedXml(string name)
    {
        DensityStudy study = Study(name);
        foreach (string svg in new[] { study.ToSvg(), study.ToComparisonSvg()! })
        {
            var settings = new System.Xml.XmlReaderSettings { DtdProcessing = System.Xml.DtdProcessing.Prohibit };
            using var reader = System.Xml.XmlReader.Create(new StringReader(svg), settings);
            while (reader.Read())
            {
                Assert.DoesNotContain(reader.LocalName, new[] { "script", "image", "foreignObject", "use", "a" });
            }

            Plain(svg);
        }
    }

    [Theory]
    [MemberData(nameof(Names))]
    public void ToText_AnyName_KeepsItsLinesAndColumns(string name)
    {
        string text = Study(name).ToText();
        Plain(text);
        string[] lines = text.Split('\n');
        Assert.All(lines, line => Assert.True(new StringInfo(line).LengthInTextElements <= 80, line));
        Assert.Equal(1, lines.Count(line => line == "In short"));
        Assert.DoesNotContain('\r', text);
        Assert.DoesNotContain('\t', text);
    }

    [Theory]
    [MemberData(nameof(Names))]
    public void ToMarkdown_AnyName_KeepsItsHeadingsTablesAndBlocks(string name)
    {
        string markdown = Study(name).ToMarkdown();
        Plain(markdown);
        string[] lines = markdown.Split('\n');
        Assert.Equal(1, lines.Count(line => line.StartsWith("# ", StringComparison.Ordinal)));
        Assert.Equal(Study("plain").ToMarkdown().Split('\n').Count(line => line.StartsWith("## ", StringComparison.Ordinal)), lines.Count(line => line.StartsWith("## ", StringComparison.Ordinal)));

        // Two pictures, each in a block of its own.
        Assert.Equal(4, lines.Count(line => line.StartsWith("```", StringComparison.Ordinal)));
        foreach (string table in markdown.Split("\n\n").Where(block => block.StartsWith('|')))
        {
            int[] bars = [.. table.TrimEnd('\n').Split('\n').Select(Bars)];
            Assert.All(bars, count => Assert.Equal(bars[0], count));
        }

        string outside = string.Concat(markdown.Split("```").Where((_, i) => i % 2 == 0));
        Assert.DoesNotContain('<', outside);
        Assert.DoesNotMatch(@"(?<!\\)\]\(", outside);
    }

    [Theory]
    [MemberData(nameof(Names))]
    public void ToJson_AnyName_RoundTrips(string name)
    {
        string json = Study(name).ToJson();
        using JsonDocument document = JsonDocument.Parse(json);
        Assert.Equal(json, StudyDocument.FromJson(json).ToJson());
        Assert.True(document.RootElement.GetProperty("name").GetString()!.Length <= TextCleaner.Longest + 1);
        Assert.DoesNotContain("\\u202E", json, StringComparison.OrdinalIgnoreCase);
    }

    private static DensityStudy Study(string name) => DensityStudy.Of(
        s_eruptions,
        new StudyOptions { Name = name, Unit = name, Limits = [4.5], ReferenceValues = s_eruptions.AsMemory(0, 120), ReferenceName = name + " before", Points = 51 });

    private static int Bars(string line) => System.Text.RegularExpressions.Regex.Count(line, @"(?<!\\)\|");

    // No sign that turns text around, acts on a terminal or is half a character.
    private static void Plain(string text)
    {
        foreach (System.Text.Rune rune in text.EnumerateRunes())
        {
            Assert.False(rune.Value is (>= 0x202A and <= 0x202E) or (>= 0x2066 and <= 0x2069), $"U+{rune.Value:X4}");
            Assert.False(System.Text.Rune.IsControl(rune) && rune.Value != '\n', $"U+{rune.Value:X4}");
        }

        for (int i = 0; i < text.Length; i++)
        {
            Assert.False(char.IsHighSurrogate(text[i]) && (i + 1 == text.Length || !char.IsLowSurrogate(text[i + 1])), $"half a character at {i}");
            Assert.False(char.IsLowSurrogate(text[i]) && (i == 0 || !char.IsHighSurrogate(text[i - 1])), $"half a character at {i}");
        }
    }
}
