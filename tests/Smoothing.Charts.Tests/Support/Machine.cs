using Smoothing.Charts.Drawing;

namespace Smoothing.Charts.Tests.Support;

/// <summary>What this machine offers.</summary>
internal static class Machine
{
    private static readonly Lazy<bool> s_hasFont = new(() =>
    {
        try
        {
            FontSource.Find("").Dispose();
            return true;
        }
        catch (InvalidOperationException)
        {
            return false;
        }
    });

    /// <summary>Whether a font is installed: a machine with the SDK alone has none.</summary>
    public static bool HasFont => s_hasFont.Value;

    /// <summary>Options that work on every machine: a font of the machine, or the tests' own.</summary>
    public static FigureOptions Options { get; } = new() { FontFile = HasFont ? "" : BlockFont.Name };
}
