namespace Smoothing.Theory;

/// <summary>Derivatives of a smooth function known by its values only.</summary>
/// <remarks>
/// Method: interpolation at 17 Chebyshev points of a neighbourhood, differentiated as a series. Where f is analytic with no
/// singularity nearer than three half-widths the truncation is (3 + √8)⁻¹⁶ = 6e-13; rounding grows by about (17/half-width)ʳ. Dominant error: rounding.
/// </remarks>
internal static class LocalPolynomial
{
    private const int Degree = 16;

    /// <summary>f⁽ʳ⁾(x) from values of f on [from, to], which holds x.</summary>
    public static double Derivative(Func<double, double> f, double x, double from, double to, int order)
    {
        double middle = from + ((to - from) / 2);
        double half = (to - from) / 2;
        var values = new double[Degree + 1];
        for (int j = 0; j <= Degree; j++)
        {
            values[j] = f(middle + (half * Math.Cos(Math.PI * (j + 0.5) / (Degree + 1))));
        }

        var c = new double[Degree + 1];
        for (int k = 0; k <= Degree; k++)
        {
            for (int j = 0; j <= Degree; j++)
            {
                c[k] += values[j] * Math.Cos(Math.PI * k * (j + 0.5) / (Degree + 1)) * (k == 0 ? 1 : 2) / (Degree + 1);
            }
        }

        for (int r = 0; r < order; r++)
        {
            var next = new double[Degree + 3];
            for (int k = Degree; k >= 1; k--)
            {
                next[k - 1] = next[k + 1] + (2 * k * c[k]);
            }

            next[0] /= 2;
            Array.Copy(next, c, Degree + 1);
        }

        // Clenshaw's sum.
        double t = (x - middle) / half;
        double above = 0;
        double value = 0;
        for (int k = Degree; k >= 1; k--)
        {
            (value, above) = ((2 * t * value) - above + c[k], value);
        }

        return ((t * value) - above + c[0]) / Math.Pow(half, order);
    }
}
