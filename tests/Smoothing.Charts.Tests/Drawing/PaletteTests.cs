using Smoothing.Charts.Drawing;
using SkiaSharp;

namespace Smoothing.Charts.Tests.Drawing;

public class PaletteTests
{
    [Theory]
    [InlineData(FigureTheme.Light)]
    [InlineData(FigureTheme.Dark)]
    [InlineData(FigureTheme.Print)]
    public void ColoursOfOnePicture_InGrey_ArePartedByLightness(FigureTheme theme)
    {
        // What stands side by side in the evidence for peaks, from one end of the grey scale to the other.
        double[] lightness = [.. new[] { Tone.Up, Tone.Down, Tone.Open, Tone.Sparse }.Select(tone => Lightness(Palette.Of(tone, theme)))];
        for (int i = 1; i < lightness.Length; i++)
        {
            Assert.True(Math.Abs(lightness[i] - lightness[i - 1]) >= 9, $"{theme}: {string.Join(", ", lightness)}");
            Assert.Equal(Math.Sign(lightness[1] - lightness[0]), Math.Sign(lightness[i] - lightness[i - 1]));
        }
    }

    [Theory]
    [InlineData(FigureTheme.Light)]
    [InlineData(FigureTheme.Dark)]
    [InlineData(FigureTheme.Print)]
    public void Words_OnTheSheet_HaveTheContrastOfTheWebGuidelines(FigureTheme theme)
    {
        // WCAG 2.1, success criterion 1.4.3: 4.5 : 1 for text.
        foreach (Tone tone in new[] { Tone.Ink, Tone.Quiet, Tone.Limit })
        {
            double a = Luminance(Palette.Of(tone, theme)) + 0.05;
            double b = Luminance(Palette.Of(Tone.Ground, theme)) + 0.05;
            Assert.True(Math.Max(a, b) / Math.Min(a, b) >= 4.5, $"{theme} {tone}");
        }
    }

    // Relative luminance, WCAG 2.1.
    private static double Luminance(SKColor c)
    {
        static double Linear(byte v) => v / 255.0 <= 0.04045 ? v / 255.0 / 12.92 : Math.Pow(((v / 255.0) + 0.055) / 1.055, 2.4);
        return (0.2126 * Linear(c.Red)) + (0.7152 * Linear(c.Green)) + (0.0722 * Linear(c.Blue));
    }

    // CIE 1976 L*.
    private static double Lightness(SKColor c) => Luminance(c) is var y && y > 216.0 / 24389 ? (116 * Math.Cbrt(y)) - 16 : y * 24389 / 27;
}
