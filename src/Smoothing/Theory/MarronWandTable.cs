namespace Smoothing.Theory;

/// <summary>The fifteen normal mixtures of Marron &amp; Wand (1992), Table 1.</summary>
internal static class MarronWandTable
{
    public static IReadOnlyList<NormalMixture> Make()
    {
        static IEnumerable<(double, double, double)> Run(int from, int to, Func<int, (double, double, double)> part) => Enumerable.Range(from, to - from + 1).Select(part);
        static double Power(double a, int l) => Math.Pow(a, l);
        return
        [
            Of("Gaussian", [(1, 0, 1)]),
            Of("Skewed unimodal", [(0.2, 0, 1), (0.2, 0.5, 2 / 3.0), (0.6, 13 / 12.0, 5 / 9.0)]),
            Of("Strongly skewed", Run(0, 7, l => (1 / 8.0, 3 * (Power(2 / 3.0, l) - 1), Power(2 / 3.0, l)))),
            Of("Kurtotic unimodal", [(2 / 3.0, 0, 1), (1 / 3.0, 0, 0.1)]),
            Of("Outlier", [(0.1, 0, 1), (0.9, 0, 0.1)]),
            Of("Bimodal", [(0.5, -1, 2 / 3.0), (0.5, 1, 2 / 3.0)]),
            Of("Separated bimodal", [(0.5, -1.5, 0.5), (0.5, 1.5, 0.5)]),
            Of("Skewed bimodal", [(0.75, 0, 1), (0.25, 1.5, 1 / 3.0)]),
            Of("Trimodal", [(0.45, -1.2, 0.6), (0.45, 1.2, 0.6), (0.1, 0, 0.25)]),
            Of("Claw", [(0.5, 0, 1), .. Run(0, 4, l => (0.1, (l / 2.0) - 1, 0.1))]),
            Of("Double claw", [(0.49, -1, 2 / 3.0), (0.49, 1, 2 / 3.0), .. Run(0, 6, l => (1 / 350.0, (l - 3) / 2.0, 0.01))]),
            Of("Asymmetric claw", [(0.5, 0, 1), .. Run(-2, 2, l => (Power(2, 1 - l) / 31, l + 0.5, Power(2, -l) / 10))]),
            Of("Asymmetric double claw", [.. Run(0, 1, l => (0.46, (2 * l) - 1, 2 / 3.0)), .. Run(1, 3, l => (1 / 300.0, -l / 2.0, 0.01)), .. Run(1, 3, l => (7 / 300.0, l / 2.0, 0.07))]),
            Of("Smooth comb", Run(0, 5, l => (Power(2, 5 - l) / 63, (65 - (96 * Power(0.5, l))) / 21, 32 / 63.0 / Power(2, l)))),
            Of("Discrete comb", [.. Run(0, 2, l => (2 / 7.0, ((12 * l) - 15) / 7.0, 2 / 7.0)), .. Run(8, 10, l => (1 / 21.0, 2 * l / 7.0, 1 / 21.0))]),
        ];
    }

    private static NormalMixture Of(string name, IEnumerable<(double Weight, double Mean, double Deviation)> parts)
    {
        var list = parts.ToList();
        return new(name, [.. list.Select(p => p.Weight)], [.. list.Select(p => p.Mean)], [.. list.Select(p => p.Deviation)]);
    }
}
