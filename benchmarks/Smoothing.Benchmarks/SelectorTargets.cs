using Smoothing.Numerics;

namespace Smoothing.Benchmarks;

/// <summary>The laws of the selector table: fifteen normal mixtures, skewed, heavy and flat ones, rounded data and weighted ones.</summary>
internal static class SelectorTargets
{
    public static IReadOnlyList<SelectorTarget> All() => [.. Mixtures(), .. Others(), .. Rounded(), .. Weighted()];

    /// <summary>Marron &amp; Wand (1992), Table 1.</summary>
    private static IEnumerable<SelectorTarget> Mixtures()
    {
        for (int number = 1; number <= 15; number++)
        {
            (double[] w, double[] m, double[] s) = Parameters(number);
            yield return Mixture("Marron-Wand", $"MW{number:00}", w, m, s);
        }
    }

    private static (double[] W, double[] M, double[] S) Parameters(int number)
    {
        static double[] Each(int from, int to, Func<int, double> f) => [.. Enumerable.Range(from, to - from + 1).Select(f)];
        return number switch
        {
            1 => ([1], [0], [1]),
            2 => ([0.2, 0.2, 0.6], [0, 0.5, 13.0 / 12], [1, 2.0 / 3, 5.0 / 9]),
            3 => (Each(0, 7, _ => 0.125), Each(0, 7, l => 3 * (Math.Pow(2.0 / 3, l) - 1)), Each(0, 7, l => Math.Pow(2.0 / 3, l))),
            4 => ([2.0 / 3, 1.0 / 3], [0, 0], [1, 0.1]),
            5 => ([0.1, 0.9], [0, 0], [1, 0.1]),
            6 => ([0.5, 0.5], [-1, 1], [2.0 / 3, 2.0 / 3]),
            7 => ([0.5, 0.5], [-1.5, 1.5], [0.5, 0.5]),
            8 => ([0.75, 0.25], [0, 1.5], [1, 1.0 / 3]),
            9 => ([0.45, 0.45, 0.1], [-1.2, 1.2, 0], [0.6, 0.6, 0.25]),
            10 => ([0.5, .. Each(0, 4, _ => 0.1)], [0, .. Each(0, 4, l => (l / 2.0) - 1)], [1, .. Each(0, 4, _ => 0.1)]),
            11 => ([0.49, 0.49, .. Each(0, 6, _ => 1.0 / 350)], [-1, 1, .. Each(0, 6, l => (l - 3) / 2.0)], [2.0 / 3, 2.0 / 3, .. Each(0, 6, _ => 0.01)]),
            12 => ([0.5, .. Each(-2, 2, l => Math.Pow(2, 1 - l) / 31)], [0, .. Each(-2, 2, l => l + 0.5)], [1, .. Each(-2, 2, l => Math.Pow(2, -l) / 10)]),
            13 => (
                [0.46, 0.46, .. Each(1, 3, _ => 1.0 / 300), .. Each(1, 3, _ => 7.0 / 300)],
                [-1, 1, .. Each(1, 3, l => -l / 2.0), .. Each(1, 3, l => l / 2.0)],
                [2.0 / 3, 2.0 / 3, .. Each(1, 3, _ => 0.01), .. Each(1, 3, _ => 0.07)]),
            14 => (Each(0, 5, l => Math.Pow(2, 5 - l) / 63), Each(0, 5, l => (65 - (96 * Math.Pow(0.5, l))) / 21), Each(0, 5, l => 32.0 / 63 / Math.Pow(2, l))),
            _ => (
                [.. Each(0, 2, _ => 2.0 / 7), .. Each(8, 10, _ => 1.0 / 21)],
                [.. Each(0, 2, l => ((12 * l) - 15) / 7.0), .. Each(8, 10, l => 2 * l / 7.0)],
                [.. Each(0, 2, _ => 2.0 / 7), .. Each(8, 10, _ => 1.0 / 21)]),
        };
    }

    private static SelectorTarget Mixture(string set, string name, double[] weights, double[] means, double[] deviations, double step = 0, double share = 1)
    {
        double Density(double x)
        {
            double sum = 0;
            for (int i = 0; i < weights.Length; i++)
            {
                sum += weights[i] / deviations[i] * NormalLaw.Density((x - means[i]) / deviations[i]);
            }

            return sum;
        }

        double Draw(ref RandomStream stream)
        {
            double u = stream.NextUniform();
            int i = 0;
            while (i < weights.Length - 1 && u >= weights[i])
            {
                u -= weights[i++];
            }

            return means[i] + (deviations[i] * stream.NextNormal());
        }

        return new SelectorTarget(set, name, Draw, Density, -7, 7) { Step = step, RoundedShare = share };
    }

    /// <summary>The set of the measurements behind the rules, then laws that no setting was chosen on.</summary>
    private static IEnumerable<SelectorTarget> Others()
    {
        yield return new("other", "lognormal(1)", (ref s) => Math.Exp(s.NextNormal()), x => x > 0 ? NormalLaw.Density(Math.Log(x)) / x : 0, -4, 40);
        yield return new("other", "lognormal(.5)", (ref s) => Math.Exp(0.5 * s.NextNormal()), x => x > 0 ? 2 * NormalLaw.Density(2 * Math.Log(x)) / x : 0, -3, 9);
        yield return new("other", "exponential", (ref s) => -Math.Log(s.NextUniform()), x => x >= 0 ? Math.Exp(-x) : 0, -4, 14);
        yield return new("other", "gamma(2)", (ref s) => -Math.Log(s.NextUniform() * s.NextUniform()), x => x >= 0 ? x * Math.Exp(-x) : 0, -4, 16);
        yield return new("other", "Lomax(2)", (ref s) => Math.Pow(s.NextUniform(), -0.5) - 1, x => x >= 0 ? 2 * Math.Pow(1 + x, -3) : 0, -3, 35);
        yield return new("other", "t(3)", DrawT3, x => 2 / (Math.PI * Math.Sqrt(3)) / ((1 + (x * x / 3)) * (1 + (x * x / 3))), -30, 30);
        yield return new("other", "uniform", (ref s) => s.NextUniform(), x => x is >= 0 and <= 1 ? 1 : 0, -1, 2);
        yield return new("other", "Cauchy", (ref s) => Math.Tan(Math.PI * (s.NextUniform() - 0.5)), x => 1 / (Math.PI * (1 + (x * x))), -80, 80);
        yield return new("fresh", "Laplace", DrawLaplace, x => 0.5 * Math.Exp(-Math.Abs(x)), -14, 14);
        yield return new("fresh", "Gumbel", (ref s) => -Math.Log(-Math.Log(s.NextUniform())), x => Math.Exp(-x - Math.Exp(-x)), -5, 15);
        yield return new("fresh", "Weibull(1.8)", (ref s) => Math.Pow(-Math.Log(s.NextUniform()), 1 / 1.8), x => x > 0 ? 1.8 * Math.Pow(x, 0.8) * Math.Exp(-Math.Pow(x, 1.8)) : 0, -2, 6);
        yield return new("fresh", "Maxwell", DrawMaxwell, x => x > 0 ? 2 * x * x * NormalLaw.Density(x) : 0, -3, 8);
        yield return new("fresh", "beta(3,5)", DrawBeta35, x => x is > 0 and < 1 ? 105 * x * x * Math.Pow(1 - x, 4) : 0, -0.6, 1.6);
        yield return new("fresh", "two logistics", DrawLogistics, x => (0.7 * Logistic(x, -1.5, 0.5)) + (0.3 * Logistic(x, 2.5, 0.3)), -9, 8);
        yield return Mixture("fresh", "5% spike", [0.95, 0.05], [0, -0.8], [1, 0.05]);
        yield return Mixture("fresh", "three scales", [0.6, 0.3, 0.1], [0, 3, 4.2], [1, 0.2, 0.05]);
    }

    private static IEnumerable<SelectorTarget> Rounded()
    {
        foreach (double step in new[] { 0.05, 0.1, 0.25, 0.5 })
        {
            yield return Mixture("rounded", FormattableString.Invariant($"normal to {step}"), [1], [0], [1], step);
        }

        yield return Mixture("rounded", "MW06 to 0.25", [0.5, 0.5], [-1, 1], [2.0 / 3, 2.0 / 3], 0.25);
        yield return Mixture("rounded", "normal 60% to 0.5", [1], [0], [1], 0.5, 0.6);
        yield return Mixture("rounded", "normal 30% to 0.25", [1], [0], [1], 0.25, 0.3);
    }

    /// <summary>Lognormal weights of a coefficient of variation; then weights e^(bx) on values drawn from the law tilted by e^(−bx), as surveys have them.</summary>
    private static IEnumerable<SelectorTarget> Weighted()
    {
        (double[] w, double[] m, double[] s) = Parameters(6);
        foreach (double variation in new[] { 0.5, 1.0, 2.0 })
        {
            double sigma = Math.Sqrt(Math.Log(1 + (variation * variation)));
            double Noise(double value, ref RandomStream stream) => Math.Exp(sigma * stream.NextNormal());
            yield return Mixture("weighted", FormattableString.Invariant($"normal, cv {variation}"), [1], [0], [1]) with { Weight = Noise };
            yield return Mixture("weighted", FormattableString.Invariant($"MW06, cv {variation}"), w, m, s) with { Weight = Noise };
        }

        foreach (double tilt in new[] { 0.5, 1.0 })
        {
            // A normal law tilted by e^(−bx) is the same one, moved by −b.
            SelectorTarget law = Mixture("weighted", FormattableString.Invariant($"normal, weight exp({tilt} x)"), [1], [0], [1]);
            yield return law with { DrawOne = (ref s) => s.NextNormal() - tilt, Weight = (double x, ref RandomStream _) => Math.Exp(tilt * x) };
        }
    }

    private static double DrawT3(ref RandomStream s)
    {
        double z = s.NextNormal();
        double a = s.NextNormal(), b = s.NextNormal(), c = s.NextNormal();
        return z / Math.Sqrt(((a * a) + (b * b) + (c * c)) / 3);
    }

    private static double DrawLaplace(ref RandomStream s)
    {
        double size = -Math.Log(s.NextUniform());
        return s.NextUniform() < 0.5 ? -size : size;
    }

    private static double DrawMaxwell(ref RandomStream s)
    {
        double a = s.NextNormal(), b = s.NextNormal(), c = s.NextNormal();
        return Math.Sqrt((a * a) + (b * b) + (c * c));
    }

    // The third smallest of seven uniform numbers.
    private static double DrawBeta35(ref RandomStream s)
    {
        Span<double> u = stackalloc double[7];
        for (int i = 0; i < 7; i++)
        {
            u[i] = s.NextUniform();
        }

        u.Sort();
        return u[2];
    }

    private static double DrawLogistics(ref RandomStream s)
    {
        bool first = s.NextUniform() < 0.7;
        double u = s.NextUniform();
        double z = Math.Log(u / (1 - u));
        return first ? -1.5 + (0.5 * z) : 2.5 + (0.3 * z);
    }

    private static double Logistic(double x, double centre, double scale)
    {
        double e = Math.Exp(-Math.Abs(x - centre) / scale);
        return e / (scale * (1 + e) * (1 + e));
    }
}
