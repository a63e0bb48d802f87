using FsCheck;
using FsCheck.Fluent;
using Smoothing.Numerics;

namespace Smoothing.Tests.Hostile;

/// <summary>Columns of finite numbers that love trouble.</summary>
internal static class HostileColumns
{
    private static readonly double[] s_values =
    [
        0, -0.0, 1, -1, 0.1, 1e-3, 3, 1e6, -1e6, 1e12, 1e300, -1e300, 1e308, -1e308, double.MaxValue, double.MinValue, double.Epsilon, -double.Epsilon, 2.2e-308, 1e-310,
        Math.BitIncrement(1), Math.BitDecrement(1), Math.BitIncrement(1e6), 5, 5, 5,
    ];

    public static Arbitrary<double[]> Any() => Gen.OneOf(Loose(), Equal(), Neighbours(), Clusters(), Outlier(), Ordered(), Rounded()).ToArbitrary();

    private static Gen<double[]> Loose() => Gen.Elements(s_values).NonEmptyListOf().Select(list => list.ToArray());

    private static Gen<double[]> Equal() => Gen.Elements(s_values).Zip(Gen.Choose(1, 400)).Select(p => Enumerable.Repeat(p.Item1, p.Item2).ToArray());

    // Values one unit in the last place apart.
    private static Gen<double[]> Neighbours() => Gen.Elements(1.0, 1e6, 1e-300, -7.5).Zip(Gen.Choose(2, 60)).Select(p =>
    {
        var x = new double[p.Item2];
        x[0] = p.Item1;
        for (int i = 1; i < x.Length; i++)
        {
            x[i] = Math.BitIncrement(x[i - 1]);
        }

        return x;
    });

    private static Gen<double[]> Clusters() => Normals().Zip(Gen.Elements(1e9, 1e12, 1e-9)).Select(p => p.Item1.Select((v, i) => v + (i % 2 == 0 ? 0 : p.Item2)).ToArray());

    private static Gen<double[]> Outlier() => Normals().Zip(Gen.Elements(1e300, -1e12, 1e5)).Select(p => p.Item1.Append(p.Item2).ToArray());

    private static Gen<double[]> Ordered() => Normals().Zip(Gen.Elements(true, false)).Select(p => (p.Item2 ? p.Item1.Order() : p.Item1.OrderDescending()).ToArray());

    private static Gen<double[]> Rounded() => Normals().Zip(Gen.Elements(0.5, 1.0, 5.0)).Select(p => p.Item1.Select(v => Math.Round(v / p.Item2) * p.Item2).ToArray());

    private static Gen<double[]> Normals() => Gen.Choose(0, 1_000_000).Zip(Gen.Choose(2, 300)).Select(p =>
    {
        var random = new RandomStream((ulong)p.Item1);
        var x = new double[p.Item2];
        for (int i = 0; i < x.Length; i++)
        {
            x[i] = random.NextNormal();
        }

        return x;
    });
}
