using MathNet.Numerics.Integration;

namespace Smoothing.Estimation;

/// <summary>The twelve-point Gauss–Legendre rule, for stretches on which a curve is smooth.</summary>
internal static class GaussRule
{
    /// <summary>Number of points on narrow stretches: the remainder falls like (stretch/2)⁸, below 1e-16 at <see cref="NarrowStretch"/>.</summary>
    public const int FewNodes = 4;

    /// <summary>Stretches up to this many bandwidths, between two kinks, need only <see cref="FewNodes"/> points.</summary>
    public const double NarrowStretch = 0.015625;

    /// <summary>Number of points. On an eighth of a bandwidth the remainder for the kernels and the quotients of their moments is below 1e-16 relative.</summary>
    public const int Nodes = 12;

    /// <summary>Stretches up to this many bandwidths are summed by one rule.</summary>
    public const double ShortStretch = 0.125;

    private static readonly double[] s_fewNodes = new GaussLegendreRule(-1, 1, FewNodes).Abscissas;
    private static readonly double[] s_fewWeights = new GaussLegendreRule(-1, 1, FewNodes).Weights;
    private static readonly double[] s_nodes = new GaussLegendreRule(-1, 1, Nodes).Abscissas;
    private static readonly double[] s_weights = new GaussLegendreRule(-1, 1, Nodes).Weights;

    /// <summary>Writes the points of the rule on [from, to]; the length of <paramref name="x"/> says which rule.</summary>
    public static void Place(double from, double to, Span<double> x)
    {
        double[] nodes = x.Length == FewNodes ? s_fewNodes : s_nodes;
        for (int i = 0; i < nodes.Length; i++)
        {
            x[i] = from + ((to - from) * (1 + nodes[i]) / 2);
        }
    }

    /// <summary>The integral from the ordinates at those points.</summary>
    public static double Sum(ReadOnlySpan<double> y, double width)
    {
        double[] weights = y.Length == FewNodes ? s_fewWeights : s_weights;
        double sum = 0;
        for (int i = 0; i < weights.Length; i++)
        {
            sum += weights[i] * y[i];
        }

        return sum * width / 2;
    }

    /// <summary>∫ of the curve over a short stretch.</summary>
    public static double Integrate(CurveForm form, double from, double to)
    {
        Span<double> x = stackalloc double[Nodes];
        Span<double> y = stackalloc double[Nodes];
        Place(from, to, x);
        form.Derivatives(x, 0, y);
        return Sum(y, to - from);
    }
}
