using Smoothing.Charts.Drawing;
using Smoothing.Charts.Tests.Support;
using Smoothing.Inference;
using SkiaSharp;

namespace Smoothing.Charts.Tests.Drawing;

/// <summary>Every figure of every study: drawn, nothing cut, nothing on top of anything else.</summary>
public class RenderTests
{
    private static readonly Lazy<(string Kind, Figure Figure)[]> s_ordinary = new(() => All(Studies.Ordinary, Machine.Options));

    public static TheoryData<string> Cases() => [.. Studies.Hard.Select(s => s.Name)];

    [Theory]
    [MemberData(nameof(Cases))]
    public void EveryFigure_OfAHardStudy_IsDrawnWithoutFault(string name)
    {
        foreach ((string kind, Figure figure) in All(Find(name), Machine.Options))
        {
            Layout layout = figure.Place();
            AssertInOrder(layout, kind);
            using var pixels = new Pixels(figure.ToPng());
            Assert.Equal((800, 480), (pixels.Width, pixels.Height));
            AssertCurvesAreThere(layout, pixels, kind);
            Assert.NotEqual("", figure.Alternative);
            Assert.DoesNotContain("NaN", figure.Alternative, StringComparison.Ordinal);
            Assert.DoesNotContain(layout.Words, w => w.Text.Contains("NaN", StringComparison.Ordinal));
        }
    }

    [Theory]
    [InlineData(320, 240)]
    [InlineData(480, 320)]
    [InlineData(1600, 900)]
    [InlineData(500, 1200)]
    public void EveryFigure_AtEverySize_KeepsItsOrder(int width, int height)
    {
        foreach ((string kind, Figure figure) in s_ordinary.Value)
        {
            AssertInOrder(figure.With(Machine.Options with { Width = width, Height = height }).Place(), kind);
        }
    }

    [Theory]
    [InlineData(FigureTheme.Light)]
    [InlineData(FigureTheme.Dark)]
    [InlineData(FigureTheme.Print)]
    public void ToPng_Scaled_HasMorePixelsOfTheSamePicture(FigureTheme theme)
    {
        FigureOptions options = Machine.Options with { Theme = theme, Scale = 2, Width = 400, Height = 300 };
        using var pixels = new Pixels(Figures.Density(Studies.Ordinary, options).ToPng());
        Assert.Equal((800, 600), (pixels.Width, pixels.Height));
        foreach ((int x, int y) in new[] { (0, 0), (799, 0), (0, 599), (799, 599) })
        {
            Assert.Equal(Palette.Of(Tone.Ground, theme), pixels[x, y]);
        }
    }

    [Fact]
    public void TranslucentBand_IsBlendedOnce()
    {
        // The drawing library draws a first rendering twice: a band would then be darker than its swatch in the legend.
        Figure figure = Figures.Density(Studies.Ordinary, Machine.Options);
        SKColor ground = Palette.Of(Tone.Ground, FigureTheme.Light);
        SKColor band = Palette.Of(Tone.Band, FigureTheme.Light);
        byte Blend(byte over, byte under) => (byte)Math.Round(((over * band.Alpha) + (under * (255 - band.Alpha))) / 255.0);
        var once = new SKColor(Blend(band.Red, ground.Red), Blend(band.Green, ground.Green), Blend(band.Blue, ground.Blue));
        using var pixels = new Pixels(figure.ToPng());
        int near = 0;
        Box data = figure.Place().Panels[0].Data;
        for (int y = (int)data.Top; y < data.Bottom; y++)
        {
            for (int x = (int)data.Left; x < data.Right; x++)
            {
                SKColor pixel = pixels[x, y];
                near += Math.Abs(pixel.Red - once.Red) <= 1 && Math.Abs(pixel.Green - once.Green) <= 1 && Math.Abs(pixel.Blue - once.Blue) <= 1 ? 1 : 0;
            }
        }

        Assert.True(near > 1000, $"only {near} pixels of the band");
    }

    [Fact]
    public void TwentyFigures_AtOnce_AreTheSameAsOneByOne()
    {
        (string, Figure)[] figures = [.. Enum.GetValues<FigureTheme>().SelectMany(theme => s_ordinary.Value.Select(f => (f.Kind, f.Figure.With(Machine.Options with { Theme = theme }))))];
        (byte[] Png, string Svg)[] alone = [.. figures.Select(f => (f.Item2.ToPng(), f.Item2.ToSvg()))];
        Assert.True(figures.Length >= 20);
        var together = new (byte[] Png, string Svg)[figures.Length];
        Thread[] threads = [.. figures.Select((f, i) => new Thread(() => together[i] = (f.Item2.ToPng(), f.Item2.ToSvg())))];
        Array.ForEach(threads, t => t.Start());
        Array.ForEach(threads, t => t.Join());
        for (int i = 0; i < figures.Length; i++)
        {
            Assert.Equal(alone[i].Png, together[i].Png);
            Assert.Equal(alone[i].Svg, together[i].Svg);
        }
    }

    [Fact]
    public void Save_ByItsEnding_WritesPngOrSvg()
    {
        string path = Path.Combine(Path.GetTempPath(), $"figure-{Guid.NewGuid():N}");
        try
        {
            Figure figure = Figures.Density(Studies.Ordinary, Machine.Options);
            figure.Save(path + ".PNG");
            figure.Save(path + ".svg");
            Assert.Equal(figure.ToPng(), File.ReadAllBytes(path + ".PNG"));
            Assert.Equal(figure.ToSvg(), File.ReadAllText(path + ".svg"));
            Assert.Contains(".png or .svg", Assert.Throws<ArgumentException>(() => figure.Save(path + ".gif")).Message, StringComparison.Ordinal);
        }
        finally
        {
            File.Delete(path + ".PNG");
            File.Delete(path + ".svg");
        }
    }

    internal static (string Kind, Figure Figure)[] All(DensityStudy study, FigureOptions options) =>
    [
        ("density", Figures.Density(study, options)),
        ("bias", Figures.Bias(study, options)),
        ("error", Figures.Error(study, options)),
        ("rules", Figures.Rules(study, null, options)),
        ("distribution", Figures.Distribution(study, options)),
        ("difference", Figures.Difference(study, study, Compared(study), options)),
        ("peaks", Figures.PeakEvidence(study, options)),
    ];

    // Few permutations: what is tested is the drawing.
    private static ComparisonResult? Compared(DensityStudy study) =>
        study.Sample.Count < 3 ? null : Comparison.Of(study.Sample, study.Sample, 1, new ComparisonOptions { Permutations = 99 });

    private static DensityStudy Find(string name) => Studies.Hard.Single(s => s.Name == name).Study.Value;

    private static void AssertInOrder(Layout layout, string kind)
    {
        PlacedText[] words = [.. layout.Words];
        Assert.NotEmpty(words);
        Assert.All(words, w => Assert.True(layout.Sheet.Contains(w.Box), $"{kind}: '{w.Text}' is cut: {w.Box}"));
        for (int i = 0; i < layout.Texts.Count; i++)
        {
            for (int j = i + 1; j < layout.Texts.Count; j++)
            {
                // Line boxes hold the descenders too and may graze each other by a pixel.
                Assert.False(layout.Texts[i].Box.Meets(Shrunk(layout.Texts[j].Box)), $"{kind}: '{layout.Texts[i].Text}' lies on '{layout.Texts[j].Text}'");
            }
        }

        foreach (PlacedPanel panel in layout.Panels)
        {
            Assert.True(panel.Data is { Width: > 60, Height: > 35 }, $"{kind}: data area {panel.Data}");
            Assert.True(layout.Sheet.Contains(panel.Data));
            Assert.All(layout.Swatches, s => Assert.True(s.Box.Bottom <= panel.Data.Top, $"{kind}: the legend reaches into a panel"));
            Assert.All(panel.Labels, l => Assert.True(panel.Data.Contains(l.Box), $"{kind}: '{l.Text}' leaves the data area"));
        }
    }

    // Every line of the panel shows up in its own colour near its highest point inside the data area.
    private static void AssertCurvesAreThere(Layout layout, Pixels pixels, string kind)
    {
        foreach (PlacedPanel panel in layout.Panels)
        {
            foreach (LineMark line in panel.Panel.Marks.OfType<LineMark>().Where(l => l.Tone is Tone.Curve or Tone.Trace && l.X.Count > 2))
            {
                SKColor color = Palette.Of(line.Tone, FigureTheme.Light);
                (float X, float Y)[] places = [.. line.X.Select((x, i) => PanelLayout.Pixel(panel.Panel, panel.Data, x, line.Y[i])).Where(p => panel.Data.Contains(new Box(p.X, p.Y, p.X, p.Y)) && !panel.Labels.Any(l => l.Box.Contains(new Box(p.X, p.Y, p.X, p.Y))))];
                int seen = places.Count(p => pixels.Has(color, p.X, p.Y, 3));
                Assert.True(places.Length > 10 && seen >= 0.6 * places.Length, $"{kind}: the curve shows at {seen} of {places.Length} places");
            }
        }
    }

    private static Box Shrunk(Box box) => new(box.Left + 1, box.Top + 1.5f, box.Right - 1, box.Bottom - 1.5f);
}
