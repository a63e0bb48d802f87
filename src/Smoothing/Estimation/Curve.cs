namespace Smoothing.Estimation;

/// <summary>A tabulated curve: ordinates at increasing abscissae.</summary>
public sealed class Curve
{
    internal Curve(double[] x, double[] y)
    {
        X = Array.AsReadOnly(x);
        Y = Array.AsReadOnly(y);
    }

    /// <summary>Abscissae, in the unit of the data, increasing.</summary>
    public IReadOnlyList<double> X { get; }

    /// <summary>Ordinates, one per abscissa; for a density in 1/unit.</summary>
    public IReadOnlyList<double> Y { get; }
}
