using Smoothing.Charts.Drawing;
using Smoothing.Charts.Tests.Support;
using SkiaSharp;

namespace Smoothing.Charts.Tests.Drawing;

public class FontTests
{
    [Fact]
    public void Choose_MachineWithoutFonts_SaysWhatIsNeeded()
    {
        var error = Assert.Throws<InvalidOperationException>(() => FontSource.Choose([], (_, _) => null));
        Assert.Contains("No font", error.Message, StringComparison.Ordinal);
        Assert.Contains("FontFile", error.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Choose_FontWithoutLetters_IsPassedOver()
    {
        using SKTypeface signs = Typeface(BlockFont.Bytes([(0x2212, 0x2212)]));
        using SKTypeface letters = Typeface(BlockFont.Bytes([(0x20, 0x7E)]));
        Assert.Throws<InvalidOperationException>(() => FontSource.Choose(["Signs"], (_, _) => signs));
        using FontSource found = FontSource.Choose(["Signs", "Words"], (family, _) => family == "Signs" ? signs : letters);
        Assert.Equal(letters.Handle, found.Regular.Handle);
    }

    [Fact]
    public void ToPng_WithAFontFile_WritesWithIt()
    {
        Figure figure = Figures.Density(Studies.One, new FigureOptions { FontFile = BlockFont.Name });
        using var pixels = new Pixels(figure.ToPng());
        PlacedText title = figure.Place().Texts[0];

        // Every letter of this font is a block from the baseline to 0.7 of the size: its middle is ink.
        Assert.Equal(Palette.Of(Tone.Ink, FigureTheme.Light), pixels[(int)(title.Box.Left + (0.3f * title.Size)), (int)(title.Baseline - (0.35f * title.Size))]);
    }

    [Fact]
    public void FontFile_MissingOrNoFont_IsRefused()
    {
        Assert.Contains("there is none at", Assert.Throws<ArgumentException>(() => Figures.Density(Studies.One, new FigureOptions { FontFile = "/nowhere/font.ttf" })).Message, StringComparison.Ordinal);
        string path = Path.GetTempFileName();
        try
        {
            File.WriteAllText(path, "no font");
            Figure figure = Figures.Density(Studies.One, new FigureOptions { FontFile = path });
            Assert.Contains("cannot be read", Assert.Throws<ArgumentException>(figure.ToPng).Message, StringComparison.Ordinal);
            File.WriteAllBytes(path, BlockFont.Bytes([(0x2212, 0x2212)]));
            Assert.Contains("digits and Latin letters", Assert.Throws<ArgumentException>(figure.ToSvg).Message, StringComparison.Ordinal);
        }
        finally
        {
            File.Delete(path);
        }
    }

    [Theory]
    [InlineData(319, 480, 1)]
    [InlineData(800, 4001, 1)]
    [InlineData(800, 480, double.NaN)]
    [InlineData(800, 480, 8.1)]
    public void Options_OutOfRange_AreRefused(int width, int height, double scale) =>
        Assert.Throws<ArgumentOutOfRangeException>(() => Figures.Density(Studies.One, new FigureOptions { Width = width, Height = height, Scale = scale }));

    private static SKTypeface Typeface(byte[] bytes) => SKTypeface.FromData(SKData.CreateCopy(bytes)) ?? throw new InvalidDataException("the tests' own font cannot be read");
}
