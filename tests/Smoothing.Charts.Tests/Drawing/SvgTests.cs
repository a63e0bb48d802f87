using System.Xml.Linq;
using Smoothing.Charts.Tests.Support;

namespace Smoothing.Charts.Tests.Drawing;

public class SvgTests
{
    private static readonly XNamespace s_svg = "http://www.w3.org/2000/svg";

    [Fact]
    public void ToSvg_OfAHostileName_IsOneEscapedDocumentWithoutOutsideReferences()
    {
        DensityStudy study = DensityStudy.Of(Studies.TwoHumps.Draw(40, 1), new StudyOptions { Name = "<script>alert('&\"')</script>\u202E\u0001", Unit = "\u05D3\u05E7\u05D5\u05EA" });
        Figure figure = Figures.Density(study, Machine.Options with { Title = "\uFFFE<b>&" });
        string text = figure.ToSvg();
        XElement root = XDocument.Parse(text).Root!;
        Assert.Equal(s_svg + "svg", root.Name);
        Assert.DoesNotContain(root.Descendants(), e => e.Name.LocalName is "script" or "image" or "foreignObject" or "a" or "b");
        Assert.DoesNotContain(root.DescendantsAndSelf().Attributes(), a => a.Name.LocalName is "href" or "src" || a.Name.LocalName.StartsWith("on", StringComparison.Ordinal));
        Assert.Equal("\uFFFD<b>&", root.Element(s_svg + "title")!.Value);
        Assert.Equal(figure.Alternative, root.Element(s_svg + "desc")!.Value);
        Assert.Contains(root.Descendants(s_svg + "text"), t => t.Value.Contains("\u05D3\u05E7\u05D5\u05EA", StringComparison.Ordinal));
    }

    [Fact]
    public void ToSvg_TwoFiguresInOnePage_ShareNoName()
    {
        string[] a = Names(Figures.Density(Studies.Ordinary, Machine.Options).ToSvg());
        string[] b = Names(Figures.Density(Studies.Ordinary, Machine.Options with { Theme = FigureTheme.Dark }).ToSvg());
        Assert.True(a.Length > 3);
        Assert.Equal(a.Length, a.Distinct().Count());
        Assert.Empty(a.Intersect(b));
    }

    [Fact]
    public void ToSvg_EveryReference_LeadsToAName()
    {
        string text = Figures.Difference(Studies.Ordinary, Studies.Ordinary, null, Machine.Options).ToSvg();
        string[] names = Names(text);
        string[] used = [.. XDocument.Parse(text).Descendants().Attributes("clip-path").Select(a => a.Value["url(#".Length..^1])];
        Assert.NotEmpty(used);
        Assert.All(used, u => Assert.Contains(u, names));
    }

    // A shape without a fill is black in SVG: only clip paths and stroked lines may leave it out.
    [Fact]
    public void ToSvg_NoRectangle_IsBlackByOmission()
    {
        XElement root = XDocument.Parse(Figures.Bias(Studies.Ordinary, Machine.Options).ToSvg()).Root!;
        Assert.All(root.Descendants(s_svg + "rect").Where(r => r.Parent!.Name.LocalName != "clipPath"), r => Assert.NotNull(r.Attribute("fill")));
    }

    private static string[] Names(string svg) => [.. XDocument.Parse(svg).Descendants().Attributes("id").Select(a => a.Value)];
}
