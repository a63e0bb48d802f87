using System.Text.Json.Nodes;
using Smoothing.Numerics;
using Smoothing.Samples;
using Smoothing.Theory;

namespace Smoothing.Html.Outside;

/// <summary>What a real browser shows: the curve is there along its whole path, no label is cut, nothing is fetched, nothing is complained about.</summary>
public sealed class PageTests(Browser browser) : IClassFixture<Browser>
{
    // The visible forms of the picture: the page holds a wide and a narrow one.
    private const string Visible = "[...document.querySelectorAll('svg')].filter(s => s.getBoundingClientRect().width > 0)";

    private static readonly Dictionary<string, Func<DensityStudy>> s_studies = new()
    {
        ["two groups"] = () => DensityStudy.Of(Stays(), new StudyOptions { Name = "Stay (invented)", Unit = "min", Limits = [45, 60], Support = new Interval(0, double.PositiveInfinity) }),
        ["compared"] = () => DensityStudy.Of(
            NormalMixture.Normal(50, 8).Draw(900, 5),
            new StudyOptions { Name = "Coating thickness (invented)", Unit = "µm", Limits = [60], ReferenceValues = NormalMixture.Normal(47, 6).Draw(700, 6), ReferenceName = "second quarter" }),
        ["too smooth"] = () => DensityStudy.Of(NormalMixture.Normal(0, 1).Draw(20_000, 3), new StudyOptions { Bandwidth = 0.5, Name = "Oversmoothed on purpose" }),
        ["point mass"] = () => DensityStudy.Of([.. Enumerable.Repeat(0.0, 400), .. NormalMixture.Normal(8, 2).Draw(600, 4).Select(Math.Abs)], new StudyOptions { Name = "Rain (invented)", Unit = "mm", Limits = [12] }),
        ["one value"] = () => DensityStudy.Of([3.0], new StudyOptions { Bandwidth = 1, Limits = [2] }),
        ["many limits"] = () => DensityStudy.Of(Stays(), new StudyOptions { Name = new string('w', 300), Unit = "minutes at the bay", Limits = [15, 18, 20, 22, 25, 30, 45, 60, 65, 100] }),
        ["large numbers"] = () => DensityStudy.Of([.. Stays().Select(v => 1e8 * v)], new StudyOptions { Unit = "EUR", Limits = [4.5e9] }),
        ["hostile"] = () => DensityStudy.Of(Stays(), new StudyOptions
        {
            Name = "</title></svg><script>console.log('owned')</script>\"'><img src=x onerror=console.log(1)>\u202E" + new string('x', 10_000),
            Unit = "\u05D3\u05E7<style>*{display:none}</style>",
            Limits = [45],
            ReferenceValues = NormalMixture.Normal(30, 6).Draw(300, 2),
            ReferenceName = "&lt;b&gt;<a href='https://example.org'>" + new string('y', 10_000),
        }),
    };

    public static TheoryData<string, string> Views()
    {
        var data = new TheoryData<string, string>();
        foreach (string study in s_studies.Keys)
        {
            foreach (string view in new[] { "light", "dark", "print", "phone" })
            {
                data.Add(study, view);
            }
        }

        return data;
    }

    [Theory]
    [MemberData(nameof(Views))]
    public async Task Page_InABrowser_ShowsTheCurveAndCutsNothing(string study, string view)
    {
        await Show(s_studies[study]().ToHtml(), view);
        Assert.Empty(browser.Complaints);
        Assert.Equal(0, (int)await browser.Evaluate("document.querySelectorAll('script, img, link[rel=stylesheet], iframe, a').length"));
        Assert.True((bool)await browser.Evaluate("document.documentElement.scrollWidth <= innerWidth"), "the page is wider than the window");

        PngImage picture = PngImage.Read(await Keep(study, view));
        JsonNode curves = await browser.Evaluate(Visible + ".map(s => { const p = s.querySelector('path.sm-c'), m = p.getScreenCTM(), n = p.getTotalLength(); return { color: getComputedStyle(p).stroke, points: [...Array(300).keys()].map(i => { const q = p.getPointAtLength(n * (i + 0.5) / 300); return [m.a * q.x + m.e, m.d * q.y + m.f]; }) }; })");
        Assert.NotEmpty(curves.AsArray());
        foreach (JsonNode? curve in curves.AsArray())
        {
            (int R, int G, int B) color = Color((string)curve!["color"]!);
            int seen = curve["points"]!.AsArray().Count(p => Near(picture, (double)p![0]!, (double)p[1]!, color));

            // A label, a limit's line or a peak's mark may cover a few of the 300 places.
            Assert.True(seen >= 285, $"the curve's colour {color} is at {seen} of 300 places of its path");
        }
    }

    [Theory]
    [MemberData(nameof(Views))]
    public async Task Picture_InABrowser_CutsNoLabelAndKeepsTheLegendOffTheCurve(string study, string view)
    {
        await Show(s_studies[study]().ToHtml(), view);
        JsonNode cut = await browser.Evaluate(Visible + ".flatMap(s => { const o = s.getBoundingClientRect(); return [...s.querySelectorAll('text')].filter(t => { const r = t.getBoundingClientRect(); return r.left < o.left - 0.5 || r.right > o.right + 0.5 || r.top < o.top - 0.5 || r.bottom > o.bottom + 0.5; }).map(t => t.textContent); })");
        Assert.Empty(cut.AsArray().Select(t => (string?)t));
        JsonNode below = await browser.Evaluate(Visible + ".map(s => Math.max(...[...s.querySelectorAll('g text')].map(t => t.getBoundingClientRect().bottom)) - Math.min(...[...s.querySelectorAll('path.sm-c, path.sm-b, path.sm-s')].map(p => p.getBoundingClientRect().top)))");
        Assert.All(below.AsArray(), gap => Assert.True((double)gap! <= 1, $"the legend reaches {gap} pixels into the curve"));
        JsonNode over = await browser.Evaluate(Visible + ".flatMap(s => { const t = [...s.querySelectorAll('text')].map(e => [e.textContent, e.getBoundingClientRect()]); return t.flatMap(([a, p], i) => t.slice(i + 1).filter(([b, q]) => p.left + 1 < q.right && q.left + 1 < p.right && p.top + 3 < q.bottom && q.top + 3 < p.bottom).map(([b]) => a + ' / ' + b)); })");
        Assert.Empty(over.AsArray().Select(t => (string?)t));
    }

    [Fact]
    public async Task Svg_Alone_IsOnePictureThatNothingComplainsAbout()
    {
        DensityStudy study = s_studies["compared"]();
        foreach (string svg in new[] { study.ToSvg(), study.ToComparisonSvg()! })
        {
            await Show("<!DOCTYPE html><html lang=\"en\"><head><title>picture</title><link rel=\"icon\" href=\"data:,\"></head><body><img alt=\"\" src=\"data:image/svg+xml;base64," + Convert.ToBase64String(System.Text.Encoding.UTF8.GetBytes(svg)) + "\"></body></html>", "light");
            Assert.Empty(browser.Complaints);
            Assert.True((double)await browser.Evaluate("document.querySelector('img').naturalWidth") > 0);
        }
    }

    // A check that finds nothing wrong anywhere proves nothing.
    [Theory]
    [InlineData("<script>console.log('here')</script>")]
    [InlineData("<script>throw new Error('here')</script>")]
    [InlineData("<img src=\"http://127.0.0.1:9/none.png\">")]
    public async Task Complaints_APageThatTalksOrFetches_AreSeen(string fault)
    {
        await Show(s_studies["one value"]().ToHtml().Replace("</main>", fault + "</main>", StringComparison.Ordinal), "light");
        await browser.Evaluate("1");
        Assert.NotEmpty(browser.Complaints);
    }

    [Fact]
    public async Task Curve_WhereNoneIsDrawn_IsMissed()
    {
        await Show(s_studies["two groups"]().ToHtml().Replace("class=\"sm-c\" d=", "class=\"sm-c\" style=\"opacity:0\" d=", StringComparison.Ordinal), "light");
        PngImage picture = PngImage.Read(await browser.Screenshot());
        JsonNode points = await browser.Evaluate("(() => { const p = document.querySelector('path.sm-c'), m = p.getScreenCTM(), n = p.getTotalLength(); return [...Array(300).keys()].map(i => { const q = p.getPointAtLength(n * (i + 0.5) / 300); return [m.a * q.x + m.e, m.d * q.y + m.f]; }); })()");
        Assert.True(points.AsArray().Count(p => Near(picture, (double)p![0]!, (double)p[1]!, (0x17, 0x47, 0x6f))) < 100);
    }

    private async Task Show(string html, string view)
    {
        (int width, int height) = view == "phone" ? (390, 4200) : (1000, 3600);
        await browser.Show(html, width, height, view == "dark" ? "dark" : "light", view == "print" ? "print" : "screen", view == "phone");
    }

    // Kept where SMOOTHING_PICTURES names a folder, for looking at.
    private async Task<byte[]> Keep(string study, string view)
    {
        byte[] png = await browser.Screenshot();
        if (Environment.GetEnvironmentVariable("SMOOTHING_PICTURES") is { Length: > 0 } folder)
        {
            Directory.CreateDirectory(folder);
            await File.WriteAllBytesAsync(Path.Combine(folder, study.Replace(' ', '-') + "-" + view + ".png"), png);
        }

        return png;
    }

    private static (int R, int G, int B) Color(string css)
    {
        int[] parts = [.. css[(css.IndexOf('(', StringComparison.Ordinal) + 1)..].TrimEnd(')').Split(',').Take(3).Select(p => int.Parse(p, System.Globalization.CultureInfo.InvariantCulture))];
        return (parts[0], parts[1], parts[2]);
    }

    // The stroke is 2.4 units wide: one of the nine pixels around the place is covered by it almost whole.
    private static bool Near(PngImage picture, double x, double y, (int R, int G, int B) color)
    {
        for (int dy = -1; dy <= 1; dy++)
        {
            for (int dx = -1; dx <= 1; dx++)
            {
                (int px, int py) = ((int)Math.Floor(x) + dx, (int)Math.Floor(y) + dy);
                if (px < 0 || py < 0 || px >= picture.Width || py >= picture.Height)
                {
                    continue;
                }

                (int r, int g, int b) = picture.At(px, py);
                if (Math.Abs(r - color.R) + Math.Abs(g - color.G) + Math.Abs(b - color.B) < 90)
                {
                    return true;
                }
            }
        }

        return false;
    }

    // INVENTED: two groups of stays, noted to the minute.
    private static double[] Stays() => [.. new NormalMixture([0.8, 0.2], [23, 50], [4.5, 5]).Draw(600, 9).Select(v => Math.Max(1, Math.Round(v)))];
}
