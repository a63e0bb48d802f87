using Smoothing.Numerics;

namespace Smoothing.Bandwidths;

/// <summary>L(u) = φ(u)(s₂ − s₁u)/(s₀s₂ − s₁²) on u ≥ 0: the Gaussian made one-sided without losing the second order.</summary>
/// <remarks>s₀ = s₂ = ½ and s₁ = 1/√(2π) are the moments of φ on the half line. Transform through Dawson's integral, tabulated once.</remarks>
internal static class OneSidedKernel
{
    private const double S1 = NormalLaw.InverseSqrtTwoPi;

    /// <summary>s₀s₂ − s₁² = ¼ − 1/(2π).</summary>
    private const double Determinant = 0.25 - (S1 * S1);

    /// <summary>Table of ∫φ sin(wu) over u ≥ 0 up to w = 30 in steps of 1/128; cubic interpolation with central slopes errs by 0.016·step³·max|S‴| = 2e-8.</summary>
    private const double TableEnd = 30;
    private const int PerUnit = 128;

    private static readonly Lazy<double[]> s_table = new(() =>
    {
        var table = new double[(int)(TableEnd * PerUnit) + 4];
        for (int i = 0; i < table.Length; i++)
        {
            table[i] = SineIntegral((i - 1.0) / PerUnit);
        }

        return table;
    });

    /// <summary>R(L) = ∫L²: with ∫φ², ∫uφ², ∫u²φ² over u ≥ 0 equal to 1/(4√π), 1/(4π), 1/(8√π).</summary>
    public static double Roughness { get; } =
        ((0.25 / (4 * NormalLaw.SqrtPi)) - (S1 / (4 * Math.PI)) + (S1 * S1 / (8 * NormalLaw.SqrtPi))) / (Determinant * Determinant);

    /// <summary>μ₂(L) = (s₂² − s₁s₃)/(s₀s₂ − s₁²), s₃ = 2/√(2π).</summary>
    public static double SecondMoment { get; } = (0.25 - (2 * S1 * S1)) / Determinant;

    /// <summary>C = {R(φ) μ₂(L)²/R(L)}^(1/5): two-sided over one-sided bandwidth.</summary>
    public static double Factor { get; } = Math.Pow(SecondMoment * SecondMoment / (2 * NormalLaw.SqrtPi * Roughness), 0.2);

    /// <summary>∫L(u) exp(iwu) du.</summary>
    public static (double Real, double Imaginary) Transform(double w)
    {
        double half = 0.5 * Math.Exp(-0.5 * w * w);
        double sine = Sine(w);
        // ∫uφ cos = φ(0) − w∫φ sin and ∫uφ sin = w∫φ cos, by parts.
        return (((0.5 * half) - (S1 * Remainder(w, sine))) / Determinant, ((0.5 * sine) - (S1 * w * half)) / Determinant);
    }

    // φ(0) − w S(w), by its series where the difference would cancel.
    private static double Remainder(double w, double sine)
    {
        if (w < TableEnd)
        {
            return S1 - (w * sine);
        }

        double v = 1 / (w * w);
        return -S1 * v * (1 + (v * (3 + (15 * v))));
    }

    private static double Sine(double w)
    {
        if (w >= TableEnd)
        {
            double v = 1 / (w * w);
            return S1 / w * (1 + (v * (1 + (v * (3 + (15 * v))))));
        }

        double[] table = s_table.Value;
        double place = w * PerUnit;
        int i = (int)place;
        double f = place - i;
        double a = table[i], b = table[i + 1], c = table[i + 2], d = table[i + 3];
        return b + (0.5 * f * (c - a + (f * ((2 * a) - (5 * b) + (4 * c) - d + (f * ((3 * (b - c)) + d - a))))));
    }

    /// <summary>∫φ(u) sin(wu) du over u ≥ 0 = D(w/√2)/√π; D by Rybicki's sum (1989) with step 0.2, error exp(−(π/0.4)²) = 2e-27.</summary>
    private static double SineIntegral(double w)
    {
        double x = w / Math.Sqrt(2);
        int centre = (int)Math.Round(x / 0.2);
        double sum = 0;
        for (int n = centre - 31; n <= centre + 31; n++)
        {
            if ((n & 1) != 0)
            {
                double d = x - (0.2 * n);
                sum += Math.Exp(-d * d) / n;
            }
        }

        return sum / Math.PI;
    }
}
