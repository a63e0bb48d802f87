using SkiaSharp;

namespace Smoothing.Charts.Drawing;

/// <summary>The colours of each theme.</summary>
/// <remarks>
/// Blue against orange is told apart with every common form of colour blindness, and the blue is always at least three times darker (in the dark
/// theme lighter) than the orange, so that a grey copy keeps the order. A test converts them to grey and compares.
/// </remarks>
internal static class Palette
{
    public static SKColor Of(Tone tone, FigureTheme theme) => new(theme switch
    {
        FigureTheme.Dark => Dark(tone),
        FigureTheme.Print => Print(tone),
        _ => Light(tone),
    });

    private static uint Light(Tone tone) => tone switch
    {
        Tone.Ground => 0xFFFFFFFF,
        Tone.Ink => 0xFF20303C,
        Tone.Quiet => 0xFF51606B,
        Tone.Grid => 0x285B6B77,
        Tone.Curve => 0xFF17476F,
        Tone.Band => 0x527FA8C9,
        Tone.Interval => 0x7A5C8FB8,
        Tone.Limit => 0xFFA8431B,
        Tone.Second => 0xFFB8660F,
        Tone.Third => 0xFF55606A,
        Tone.Up => 0xFF1D4E7E,
        Tone.Down => 0xFFF0A24A,
        Tone.Open => 0xFFDDE2E6,
        Tone.Sparse => 0xFFFFFFFF,
        Tone.Strip => 0xFF20303C,
        _ => 0xFF000000,
    };

    private static uint Dark(Tone tone) => tone switch
    {
        Tone.Ground => 0xFF17212A,
        Tone.Ink => 0xFFE3EAF0,
        Tone.Quiet => 0xFFA9B8C4,
        Tone.Grid => 0x30A9B8C4,
        Tone.Curve => 0xFFA9D3F5,
        Tone.Band => 0x485D8FB8,
        Tone.Interval => 0x6B6FA5D0,
        Tone.Limit => 0xFFF0A37E,
        Tone.Second => 0xFFF2BE73,
        Tone.Third => 0xFF9FB0BC,
        Tone.Up => 0xFFA9D3F5,
        Tone.Down => 0xFFA8590F,
        Tone.Open => 0xFF33424E,
        Tone.Sparse => 0xFF17212A,
        Tone.Strip => 0xFFE3EAF0,
        _ => 0xFFFFFFFF,
    };

    private static uint Print(Tone tone) => tone switch
    {
        Tone.Ground => 0xFFFFFFFF,
        Tone.Grid => 0x26000000,
        Tone.Quiet => 0xFF404040,
        Tone.Band => 0x38808080,
        Tone.Interval => 0x4C606060,
        Tone.Second => 0xFF4A4A4A,
        Tone.Third => 0xFF6A6A6A,
        Tone.Up => 0xFF484848,
        Tone.Down => 0xFFA6A6A6,
        Tone.Open => 0xFFDEDEDE,
        Tone.Sparse => 0xFFFFFFFF,
        _ => 0xFF000000,
    };
}
