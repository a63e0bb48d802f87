using Smoothing.Kernels;

namespace Smoothing.Estimation;

/// <summary>What a polynomial kernel, its derivatives and its distribution function are in s = 1 − |u|, on either side of x.</summary>
/// <remarks>
/// With K(u) = P(1 − |u|): values left of x have u &gt; 0 and contribute (−1)ʳP⁽ʳ⁾(s), values right of x P⁽ʳ⁾(s). With
/// Q(s) = ∫₀ˢ P the mass below x is 1 − Q(s) for a value left of x and Q(s) for one right of it: no difference of near
/// numbers, because Q ≤ ½ for kernels that are nowhere negative.
/// </remarks>
internal static class EdgePolynomials
{
    /// <summary>Writes the coefficients of P⁽ʳ⁾, lowest power first; returns the degree, −1 when nothing is left.</summary>
    public static int Derivative(Kernel kernel, int order, Span<double> coefficients)
    {
        ReadOnlySpan<double> polynomial = kernel.EdgePolynomial;
        int degree = polynomial.Length - 1 - order;
        for (int k = 0; k <= degree; k++)
        {
            double factor = 1;
            for (int j = 1; j <= order; j++)
            {
                factor *= k + j;
            }

            coefficients[k] = factor * polynomial[k + order];
        }

        return Math.Max(degree, -1);
    }

    /// <summary>Writes the coefficients of ∫₀ˢ P; returns the degree.</summary>
    public static int Integral(Kernel kernel, Span<double> coefficients)
    {
        ReadOnlySpan<double> polynomial = kernel.EdgePolynomial;
        coefficients[0] = 0;
        for (int k = 0; k < polynomial.Length; k++)
        {
            coefficients[k + 1] = polynomial[k] / (k + 1);
        }

        return polynomial.Length;
    }
}
