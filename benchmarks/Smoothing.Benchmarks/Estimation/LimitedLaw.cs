using Smoothing.Numerics;

namespace Smoothing.Benchmarks.Estimation;

/// <summary>A law to simulate: its density, its distribution function, a draw, where it lives and where its curve is read.</summary>
internal sealed record LimitedLaw(string Name, Func<double, double> Density, Func<double, double> Cumulative, LimitedLaw.Drawing Draw, Interval Support, Interval Shown)
{
    public delegate double Drawing(ref RandomStream random);

    private static readonly Interval s_positive = new(0, double.PositiveInfinity);

    public static IReadOnlyList<LimitedLaw> WithLimits { get; } =
    [
        new("exponential", x => Math.Exp(-x), x => -(Math.Exp(-x) - 1), (ref RandomStream r) => -Math.Log(r.NextUniform()), s_positive, new Interval(0, 9)),
        new("half-normal", x => 2 * NormalLaw.Density(x), x => 1 - (2 * NormalLaw.Survival(x)), (ref RandomStream r) => Math.Abs(r.NextNormal()), s_positive, new Interval(0, 5)),
        new("gamma(2)", x => x * Math.Exp(-x), x => 1 - ((1 + x) * Math.Exp(-x)), (ref RandomStream r) => -Math.Log(r.NextUniform() * r.NextUniform()), s_positive, new Interval(0, 13)),
        new("normal(1, 1) above 0", x => NormalLaw.Density(x - 1) / NormalLaw.Cumulative(1), x => (NormalLaw.Cumulative(x - 1) - NormalLaw.Cumulative(-1)) / NormalLaw.Cumulative(1), Truncated, s_positive, new Interval(0, 6)),
        new("beta(2, 3)", x => 12 * x * (1 - x) * (1 - x), x => x * x * (6 - (8 * x) + (3 * x * x)), BetaTwoThree, new Interval(0, 1), new Interval(0, 1)),
    ];

    public static IReadOnlyList<LimitedLaw> ForDistribution { get; } =
    [
        new("normal", NormalLaw.Density, NormalLaw.Cumulative, (ref RandomStream r) => r.NextNormal(), Interval.WholeLine, new Interval(-6, 6)),
        WithLimits[2] with { Support = Interval.WholeLine, Shown = new Interval(-1, 14) },
        new("t with 3 degrees", x => 2 / (Math.PI * Math.Sqrt(3) * Math.Pow(1 + (x * x / 3), 2)), StudentThree, DrawStudentThree, Interval.WholeLine, new Interval(-25, 25)),
    ];

    // Marron & Wand (1992), densities 1, 2, 3 and 10.
    public static IReadOnlyList<LimitedLaw> ForAdaptive { get; } =
    [
        Mixture("normal", new Interval(-5, 5), (1, 0, 1)),
        Mixture("skewed, one peak", new Interval(-4, 4), (0.2, 0, 1), (0.2, 0.5, 2.0 / 3), (0.6, 13.0 / 12, 5.0 / 9)),
        Mixture("strongly skewed", new Interval(-4, 3), [.. Enumerable.Range(0, 8).Select(l => (0.125, 3 * (Math.Pow(2.0 / 3, l) - 1), Math.Pow(2.0 / 3, l)))]),
        Mixture("claw", new Interval(-4, 4), [(0.5, 0, 1), .. Enumerable.Range(0, 5).Select(l => (0.1, (l / 2.0) - 1, 0.1))]),
    ];

    public double[] Sample(int n, ulong seed)
    {
        var random = new RandomStream(seed, 77);
        var x = new double[n];
        for (int i = 0; i < n; i++)
        {
            x[i] = Draw(ref random);
        }

        return x;
    }

    private static LimitedLaw Mixture(string name, Interval shown, params (double Weight, double Mean, double Deviation)[] parts)
    {
        double Draw(ref RandomStream random)
        {
            double u = random.NextUniform();
            int i = 0;
            while (i < parts.Length - 1 && u >= parts[i].Weight)
            {
                u -= parts[i++].Weight;
            }

            return parts[i].Mean + (parts[i].Deviation * random.NextNormal());
        }

        return new LimitedLaw(
            name,
            x => parts.Sum(p => p.Weight * NormalLaw.Density((x - p.Mean) / p.Deviation) / p.Deviation),
            x => parts.Sum(p => p.Weight * NormalLaw.Cumulative((x - p.Mean) / p.Deviation)),
            Draw,
            Interval.WholeLine,
            shown);
    }

    private static double Truncated(ref RandomStream random)
    {
        double x;
        do
        {
            x = 1 + random.NextNormal();
        }
        while (x < 0);

        return x;
    }

    // The second smallest of four uniform numbers.
    private static double BetaTwoThree(ref RandomStream random)
    {
        double[] u = [random.NextUniform(), random.NextUniform(), random.NextUniform(), random.NextUniform()];
        Array.Sort(u);
        return u[1];
    }

    private static double StudentThree(double x)
    {
        double t = x / Math.Sqrt(3);
        return 0.5 + ((Math.Atan(t) + (t / (1 + (t * t)))) / Math.PI);
    }

    private static double DrawStudentThree(ref RandomStream random)
    {
        double z = random.NextNormal();
        double a = random.NextNormal();
        double b = random.NextNormal();
        double c = random.NextNormal();
        return z / Math.Sqrt(((a * a) + (b * b) + (c * c)) / 3);
    }
}
