using MathNet.Numerics.Integration;

namespace Smoothing.Numerics;

/// <summary>Adaptive integration of smooth pieces, on MathNet.Numerics' Gauss–Kronrod rule.</summary>
internal static class Quadrature
{
    /// <summary>∫ f over [from, to], one smooth piece; either end may be infinite (the rule maps it).</summary>
    public static double Integrate(Func<double, double> f, double from, double to, double relativeError = 1e-13, int order = 21) =>
        from == to ? 0 : GaussKronrodRule.Integrate(f, from, to, out _, out _, relativeError, 18, order);

    /// <summary>∫ f over [from, to], cut at the <paramref name="kinks"/> that lie inside, pieces summed with compensation.</summary>
    public static double Integrate(Func<double, double> f, double from, double to, IEnumerable<double> kinks, double relativeError = 1e-13)
    {
        var ends = new List<double> { from };
        ends.AddRange(kinks.Where(k => k > from && k < to).Distinct().Order());
        ends.Add(to);
        CompensatedSum sum = default;
        for (int i = 1; i < ends.Count; i++)
        {
            sum.Add(Integrate(f, ends[i - 1], ends[i], relativeError));
        }

        return sum.Value;
    }
}
