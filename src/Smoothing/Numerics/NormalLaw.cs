using MathNet.Numerics;

namespace Smoothing.Numerics;

/// <summary>The standard normal law: density, both tails, quantile. Thin wraps of MathNet.Numerics' error functions.</summary>
internal static class NormalLaw
{
    /// <summary>1/√(2π).</summary>
    public const double InverseSqrtTwoPi = 0.39894228040143267793994605993438;

    /// <summary>√π.</summary>
    public const double SqrtPi = 1.7724538509055160272981674833411;

    private const double InverseSqrtTwo = 0.70710678118654752440084436210485;

    public static double Density(double u) => InverseSqrtTwoPi * Math.Exp(-0.5 * u * u);

    /// <summary>Φ(u), relative accuracy kept in the lower tail.</summary>
    public static double Cumulative(double u) => 0.5 * SpecialFunctions.Erfc(-u * InverseSqrtTwo);

    /// <summary>1 − Φ(u), relative accuracy kept in the upper tail.</summary>
    public static double Survival(double u) => 0.5 * SpecialFunctions.Erfc(u * InverseSqrtTwo);

    /// <summary>Φ⁻¹(p), ±∞ at 0 and 1.</summary>
    public static double Quantile(double p) =>
        p <= 0 ? double.NegativeInfinity
        : p >= 1 ? double.PositiveInfinity
        : p <= 0.5 ? -SpecialFunctions.ErfcInv(2 * p) / InverseSqrtTwo
        : SpecialFunctions.ErfcInv(2 * (1 - p)) / InverseSqrtTwo;
}
