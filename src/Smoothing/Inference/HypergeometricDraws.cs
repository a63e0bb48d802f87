using MathNet.Numerics;
using Smoothing.Numerics;

namespace Smoothing.Inference;

/// <summary>Exact hypergeometric numbers whose cost does not grow with their size: relabelling cells of counts by chance.</summary>
/// <remarks>Method: inversion for small means, otherwise the ratio of uniforms, algorithm HRUA of Stadlober (1990), from memory; the tests compare with the law.</remarks>
internal static class HypergeometricDraws
{
    private const double InversionBelow = 10;

    // 2√(2/e) and 3 − 2√(3/e): the hat of the ratio of uniforms.
    private const double Width = 1.7155277699214135;
    private const double Shift = 0.8989161620588988;

    /// <summary>destination[j] of the cells[j] marked when <paramref name="draws"/> of all are marked by chance.</summary>
    public static void Cells(ref RandomStream random, ReadOnlySpan<long> cells, long total, long draws, Span<double> destination)
    {
        for (int j = 0; j < cells.Length; j++)
        {
            long k = cells[j] == 0 || draws == 0 ? 0 : One(ref random, cells[j], total - cells[j], draws);
            destination[j] = k;
            total -= cells[j];
            draws -= k;
        }
    }

    /// <summary>How many of <paramref name="good"/> are among <paramref name="draws"/> from good + bad.</summary>
    public static long One(ref RandomStream random, long good, long bad, long draws)
    {
        long total = good + bad;
        if (bad == 0 || draws == total)
        {
            return Math.Min(good, draws);
        }

        // Count the rarer kind among the smaller part, then turn the answer round.
        long rare = Math.Min(good, bad);
        long part = Math.Min(draws, total - draws);
        long z = (double)rare * part / total < InversionBelow ? Inversion(ref random, rare, total, part) : Ratio(ref random, rare, total, part);
        long inPart = good <= bad ? z : part - z;
        return draws <= total - draws ? inPart : good - inPart;
    }

    private static long Inversion(ref RandomStream random, long rare, long total, long part)
    {
        // P(0) = C(total − rare, part)/C(total, part)
        double log = SpecialFunctions.GammaLn(total - rare + 1) + SpecialFunctions.GammaLn(total - part + 1) - SpecialFunctions.GammaLn(total - rare - part + 1) - SpecialFunctions.GammaLn(total + 1);
        double mass = Math.Exp(log);
        double u = random.NextUniform();
        long k = 0;
        long most = Math.Min(rare, part);
        while (u > mass && k < most)
        {
            u -= mass;
            mass *= (double)(rare - k) * (part - k) / ((k + 1.0) * (total - rare - part + k + 1));
            k++;
        }

        return k;
    }

    private static long Ratio(ref RandomStream random, long rare, long total, long part)
    {
        double share = (double)rare / total;
        double centre = (part * share) + 0.5;
        double deviation = Math.Sqrt(((double)(total - part) * part * share * (1 - share) / (total - 1)) + 0.5);
        double hat = (Width * deviation) + Shift;
        double mode = Math.Floor((part + 1.0) * (rare + 1) / (total + 2));
        double Log(double z) => SpecialFunctions.GammaLn(z + 1) + SpecialFunctions.GammaLn(rare - z + 1) + SpecialFunctions.GammaLn(part - z + 1) + SpecialFunctions.GammaLn(total - rare - part + z + 1);
        double atMode = Log(mode);

        // Sixteen deviations: beyond it the law holds less than 1e-50.
        double end = Math.Min(Math.Min(part, rare) + 1.0, Math.Floor(centre + (16 * deviation)));
        while (true)
        {
            double u = random.NextUniform();
            double w = centre + (hat * (random.NextUniform() - 0.5) / u);
            if (w < 0 || w >= end)
            {
                continue;
            }

            double z = Math.Floor(w);
            double t = atMode - Log(z);
            if ((u * (4 - u)) - 3 <= t || (u * (u - t) < 1 && 2 * Math.Log(u) <= t))
            {
                return (long)z;
            }
        }
    }
}
