using Smoothing.Numerics;

namespace Smoothing.Benchmarks;

/// <summary>A known law that the rules are tried on: how to draw from it, its density, and the range that holds all but 1e-4 of it.</summary>
/// <param name="Set">Which group of the table it belongs to.</param>
/// <param name="Name">Its name in the table.</param>
/// <param name="DrawOne">One draw.</param>
/// <param name="Density">The density.</param>
/// <param name="Lower">Left end of the circle on which errors are integrated.</param>
/// <param name="Upper">Right end.</param>
internal sealed record SelectorTarget(string Set, string Name, SelectorDraw DrawOne, Func<double, double> Density, double Lower, double Upper)
{
    /// <summary>Step that a share of the values is rounded to after drawing; 0 for none.</summary>
    public double Step { get; init; }

    /// <summary>Share of the values that are rounded.</summary>
    public double RoundedShare { get; init; } = 1;

    /// <summary>Weight of a drawn value; null for a sample without weights.</summary>
    public SelectorWeight? Weight { get; init; }
}

/// <summary>Draws one value from a stream.</summary>
internal delegate double SelectorDraw(ref RandomStream stream);

/// <summary>The weight of one drawn value.</summary>
internal delegate double SelectorWeight(double value, ref RandomStream stream);
