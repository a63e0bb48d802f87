using System.Text;
using Smoothing.Charts.Drawing;
using SkiaSharp;

namespace Smoothing.Charts;

/// <summary>A finished figure: written out as PNG or SVG as often as wanted.</summary>
/// <remarks>
/// Immutable and safe to share between threads; twenty figures may be written at once. On one machine the same figure gives the same bytes; on another
/// machine its letters may come from another font.
/// </remarks>
public sealed class Figure
{
    private readonly Sheet _sheet;

    internal Figure(Sheet sheet, FigureOptions options) => (_sheet, Options) = (sheet, options);

    /// <summary>The heading.</summary>
    public string Title => Options.Title.Length > 0 ? Options.Title : _sheet.Title;

    /// <summary>What one sees, in a sentence: for readers who cannot see the picture. An SVG holds it as its description.</summary>
    public string Alternative => _sheet.Alternative;

    /// <summary>Size, colours and words.</summary>
    public FigureOptions Options { get; }

    /// <summary>The same figure in another size, theme or under another heading; nothing is worked out again.</summary>
    /// <param name="options">Size, colours, words; null for the defaults.</param>
    /// <returns>The figure.</returns>
    /// <exception cref="ArgumentException">An option is unusable.</exception>
    public Figure With(FigureOptions? options) => new(_sheet, Check.Options(options));

    /// <summary>The figure as a PNG of <see cref="FigureOptions.Width"/> × <see cref="FigureOptions.Height"/>, each times <see cref="FigureOptions.Scale"/>.</summary>
    /// <returns>The bytes of the file. Cost: some 20 ms at the default size, the first call of a process half a second more.</returns>
    /// <exception cref="InvalidOperationException">The machine has no font to write with, and none was given in <see cref="FigureOptions.FontFile"/>.</exception>
    /// <exception cref="ArgumentException">The font file cannot be used.</exception>
    public byte[] ToPng()
    {
        int width = (int)Math.Round(Options.Width * Options.Scale);
        int height = (int)Math.Round(Options.Height * Options.Scale);
        using SKSurface surface = SKSurface.Create(new SKImageInfo(width, height))
            ?? throw new InvalidOperationException(Check.Text($"A picture of {width} × {height} pixels could not be made: choose a smaller Width, Height or Scale."));
        surface.Canvas.Scale((float)Options.Scale);
        using FontSource font = FontSource.Find(Options.FontFile);
        var ink = new TextInk(font);
        Layout layout = Place(ink);
        var painter = new SheetPainter(Options.Theme);
        painter.PaintShapes(surface.Canvas, layout);
        painter.PaintWords(surface.Canvas, layout, ink);
        using SKImage image = surface.Snapshot();
        using SKData data = image.Encode(SKEncodedImageFormat.Png, 100);
        return data.ToArray();
    }

    /// <summary>The figure as an SVG document with a text alternative; text stays text.</summary>
    /// <returns>One <c>svg</c> element, without an XML declaration so that it can stand in a page.</returns>
    /// <exception cref="InvalidOperationException">The machine has no font to measure with, and none was given in <see cref="FigureOptions.FontFile"/>.</exception>
    /// <exception cref="ArgumentException">The font file cannot be used.</exception>
    public string ToSvg()
    {
        Layout layout = Place();
        using var stream = new MemoryStream();
        using (SKCanvas canvas = SKSvgCanvas.Create(SKRect.Create(Options.Width, Options.Height), stream))
        {
            new SheetPainter(Options.Theme).PaintShapes(canvas, layout);
        }

        return SvgDocument.Finish(Encoding.UTF8.GetString(stream.ToArray()), this, layout);
    }

    /// <summary>Writes the figure to a file; its ending, <c>.png</c> or <c>.svg</c>, says how.</summary>
    /// <param name="path">Path of the file, replaced if it is there.</param>
    /// <exception cref="ArgumentException">The ending is another.</exception>
    /// <exception cref="InvalidOperationException">The machine has no font to write with.</exception>
    /// <exception cref="IOException">The file cannot be written.</exception>
    public void Save(string path)
    {
        switch (Path.GetExtension(Check.Given(path)).ToUpperInvariant())
        {
            case ".PNG":
                File.WriteAllBytes(path, ToPng());
                break;
            case ".SVG":
                File.WriteAllText(path, ToSvg());
                break;
            default:
                throw new ArgumentException(Check.Text($"path must end in .png or .svg, but ends in '{Path.GetExtension(path)}': choose one of the two."), nameof(path));
        }
    }

    /// <summary>Where everything stands, for tests.</summary>
    internal Layout Place()
    {
        using FontSource font = FontSource.Find(Options.FontFile);
        return Place(new TextInk(font));
    }

    private Layout Place(TextInk ink) => LayoutMaker.Of(_sheet with { Title = Title }, Options.Width, Options.Height, ink);
}
