namespace Smoothing.Theory;

/// <summary>What an exact error is made of, for g = f⁽ʳ⁾: E = K_h∗g, the bias E − g and the spread S = h^(−2r−1) ∫ K⁽ʳ⁾(u)² f(x − hu) du.</summary>
internal abstract class SmoothingError
{
    public abstract double Bias(double x, double h);

    public abstract double BiasSlope(double x, double h);

    public abstract double Spread(double x, double h);

    public abstract double SpreadSlope(double x, double h);

    /// <summary>∫ bias² and ∫ E².</summary>
    public abstract (double Bias2, double Mean2) Integrals(double h);

    /// <summary>Derivatives of the two integrals by h.</summary>
    public abstract (double Bias2, double Mean2) IntegralSlopes(double h);
}
