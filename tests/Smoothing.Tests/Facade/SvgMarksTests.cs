using AngleSharp.Html.Parser;
using Smoothing.Samples;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Facade;

public class SvgMarksTests
{
    private static readonly double[] s_waiting = TestData.Load("faithful_waiting_272");

    [Fact]
    public void Limits_NearTheRightEnd_AllHaveLabelsThatMeetNothing()
    {
        FigureModel figure = Figure(75, 85, 90, 95);
        var layout = new SvgLayout(figure, 760, 400);
        Assert.Equal(4, layout.Marks.Count(m => m.Label.Length > 0));
        AssertClear(layout.Marks);
    }

    [Fact]
    public void Limits_MoreThanRows_KeepTheirLinesAndMeetNothing()
    {
        FigureModel figure = Figure([.. Enumerable.Range(0, 30).Select(i => 50.0 + i)]);
        foreach (double width in new[] { 760.0, 400.0 })
        {
            var layout = new SvgLayout(figure, width, 400);
            Assert.Equal(30, layout.Marks.Count);
            AssertClear(layout.Marks);
            Assert.True(layout.Top < 200);
        }
    }

    // The atom of a study may lie beside the curve: the picture is made wide enough for it.
    [Fact]
    public void Atom_BesideTheCurve_IsInThePicture()
    {
        double[] values = [.. Enumerable.Repeat(0.0, 100), .. s_waiting];
        DensityStudy study = DensityStudy.Of(values);
        Assert.Equal(0, Assert.Single(study.Atoms).Value);
        Assert.True(study.Picture.Lower < 0);
        var document = new HtmlParser().ParseDocument(study.ToSvg());
        Assert.Contains(document.QuerySelectorAll("text"), t => t.TextContent.StartsWith("0: 27 %", StringComparison.Ordinal));
    }

    private static FigureModel Figure(params double[] limits) =>
        StudyFigure.Of(DensityStudy.Of(s_waiting, new StudyOptions { Unit = "min", Limits = limits }));

    private static void AssertClear(IReadOnlyList<SvgMark> marks)
    {
        (double Left, double Right, double Y, double X)[] labels =
        [
            .. marks.Where(m => m.Label.Length > 0).Select(m =>
            {
                double length = SvgText.Width(m.Label, bold: true);
                return m.Anchor == "end" ? (m.LabelX - length, m.LabelX, m.Y, m.X) : (m.LabelX, m.LabelX + length, m.Y, m.X);
            }),
        ];
        foreach (var label in labels)
        {
            Assert.DoesNotContain(labels, other => other != label && other.Y == label.Y && other.Left < label.Right && label.Left < other.Right);
            Assert.DoesNotContain(marks, mark => mark.X != label.X && mark.Y < label.Y && mark.X > label.Left && mark.X < label.Right);
        }
    }
}
