using System.Globalization;
using System.Text;
using Smoothing.Estimation;
using Smoothing.Kernels;
using Smoothing.Samples;
using Smoothing.Tests.Support;

namespace Smoothing.Benchmarks.Accuracy;

/// <summary>Writes the tables of docs/accuracy.md: largest errors against sums in 31-digit arithmetic, <c>-- accuracy [values]</c> from the top folder.</summary>
internal static class AccuracyDocument
{
    private const string Begin = "<!-- tables: written by the accuracy command -->";
    private const string End = "<!-- end of tables -->";
    private const double Floor = 1e-200;

    public static int Run(string[] args)
    {
        int count = args.Length > 0 ? int.Parse(args[0], CultureInfo.InvariantCulture) : 100_000;
        string page = Path.Combine("docs", "accuracy.md");
        if (!File.Exists(page))
        {
            Console.Error.WriteLine("docs/accuracy.md not found: run this from the top folder of the repository.");
            return 2;
        }

        string tables = Gaussian(count) + "\n" + Others(count / 4) + "\n" + Pairs();
        string text = File.ReadAllText(page);
        int from = text.IndexOf(Begin, StringComparison.Ordinal) + Begin.Length, to = text.IndexOf(End, StringComparison.Ordinal);
        File.WriteAllText(page, text[..from] + "\n" + tables + text[to..]);
        Console.WriteLine("docs/accuracy.md written.");
        return 0;
    }

    private static string Gaussian(int count)
    {
        var table = new StringBuilder(FormattableString.Invariant($"Gaussian kernel, n = {count:N0}, h between 16 and 32 cells; points inside, on values, and up to 30 h outside. First number: largest error in units of the largest value (for derivatives, of Σ|terms|); second: largest relative error where the result exceeds 1e-200 of the peak.\n\n"));
        table.Append("| values | h | density | from condensed cells | slope | second derivative | F | 1 − F |\n|---|---|---|---|---|---|---|---|\n");
        foreach (string name in HardSamples.Names)
        {
            const double width = 0.3;
            double[] values = HardSamples.Make(name, count);
            double[] x = Points(values, width, 8);
            Sample sample = Sample.Of(values);
            Density density = Density.Of(sample, Kernel.Gaussian, width), condensed = Density.Of(CondensedSample.Of(values, new CondensingOptions { CellWidth = width / 16 }), Kernel.Gaussian, width);
            double[] exact = Each(x, at => NormalOracle.Derivative(values, [], width, at, 0));
            table.Append("| ").Append(name).Append(" | ").Append(Number(width)).Append(" | ").Append(Both(exact, x, density.Value)).Append(" | ").Append(Both(exact, x, condensed.Value));
            for (int order = 1; order <= 2; order++)
            {
                double[] derivative = Each(x, at => NormalOracle.Derivative(values, [], width, at, order)), size = Each(x, at => NormalOracle.Size(values, [], width, at, order));
                double worst = 0;
                for (int j = 0; j < x.Length; j++)
                {
                    worst = Math.Max(worst, size[j] > 0 ? Math.Abs(density.Derivative(x[j], order) - derivative[j]) / size[j] : 0);
                }

                table.Append(" | ").Append(Number(worst));
            }

            double[] fewer = [.. x.Where((_, j) => j % 4 == 0)];
            table.Append(" | ").Append(Both(Each(fewer, at => NormalOracle.Cumulative(values, [], width, at, false)), fewer, density.Cumulative))
                .Append(" | ").Append(Both(Each(fewer, at => NormalOracle.Cumulative(values, [], width, at, true)), fewer, density.Survival)).Append(" |\n");
            Console.WriteLine($"Gaussian, {name}");
        }

        return table.ToString();
    }

    private static string Others(int count)
    {
        var table = new StringBuilder(FormattableString.Invariant($"Density with other kernels, n = {count:N0}, h = 0.3: largest relative error (zeros must be exact zeros).\n\n| values |"));
        var kernels = new (Kernel Kernel, Func<DoubleDouble, DoubleDouble> Shape)[]
        {
            (Kernel.Uniform, _ => 0.5),
            (Kernel.Triangular, u => 1 - DoubleDouble.Abs(u)),
            (Kernel.Epanechnikov, u => (1 - (u * u)) * 0.75),
            (Kernel.Biweight, u => DoubleDouble.Power(1 - (u * u), 2) * 0.9375),
            (Kernel.Triweight, u => DoubleDouble.Power(1 - (u * u), 3) * 1.09375),
            (Kernel.Tricube, u => DoubleDouble.Power(1 - DoubleDouble.Power(DoubleDouble.Abs(u), 3), 3) * 70 / 81),
            (Kernel.Laplace, u => DoubleDouble.Exp(-DoubleDouble.Abs(u)) * 0.5),
            (Kernel.Logistic, Logistic),
        };
        table.AppendJoin(" | ", kernels.Select(k => " " + k.Kernel.Name)).Append(" |\n|---|").Append(string.Concat(kernels.Select(_ => "---|"))).Append('\n');
        foreach (string name in HardSamples.Names)
        {
            double[] values = HardSamples.Make(name, count);
            table.Append("| ").Append(name);
            foreach ((Kernel kernel, Func<DoubleDouble, DoubleDouble> shape) in kernels)
            {
                double[] x = HardSamples.Points(values, 0.3, 6);
                Density density = Density.Of(Sample.Of(values), kernel, 0.3);
                double worst = 0;
                foreach (double at in x)
                {
                    double expected = Exact(values, 0.3, at, shape, kernel.SupportRadius), got = density.Value(at);
                    worst = Math.Max(worst, expected == got ? 0 : expected == 0 ? double.PositiveInfinity : Math.Abs(got - expected) / expected);
                }

                table.Append(" | ").Append(Number(worst));
            }

            table.Append(" |\n");
            Console.WriteLine($"other kernels, {name}");
        }

        return table.ToString();
    }

    private static string Pairs()
    {
        const int count = 1200;
        var table = new StringBuilder(FormattableString.Invariant($"Sums over all pairs for cross-validation, Epanechnikov kernel, n = {count:N0}: largest relative error of Σᵢ<ⱼ K over five bandwidths from 0.05 to 1.\n\n| values | Σ K |\n|---|---|\n"));
        foreach (string name in HardSamples.Names)
        {
            double[] values = HardSamples.Make(name, count);
            var pairs = new CompactPairs(Sample.Of(values), Kernel.Epanechnikov);
            double worst = 0;
            foreach (double width in (double[])[0.05, 0.1, 0.23, 0.5, 1])
            {
                DoubleDouble sum = 0;
                for (int i = 1; i < values.Length; i++)
                {
                    for (int j = 0; j < i; j++)
                    {
                        DoubleDouble u = ((DoubleDouble)values[i] - values[j]) / width;
                        sum += DoubleDouble.Abs(u) > 1 ? 0 : (1 - (u * u)) * 0.75;
                    }
                }

                double expected = (double)sum;
                worst = Math.Max(worst, expected == 0 ? 0 : Math.Abs(pairs.Kernels(width) - expected) / expected);
            }

            table.Append("| ").Append(name).Append(" | ").Append(Number(worst)).Append(" |\n");
        }

        return table.ToString();
    }

    private static double Exact(double[] values, double width, double x, Func<DoubleDouble, DoubleDouble> shape, double radius)
    {
        DoubleDouble sum = 0;
        foreach (double value in values)
        {
            DoubleDouble u = ((DoubleDouble)x - value) / width;
            if (!(DoubleDouble.Abs(u) > radius) && Math.Abs(u.High) < 700)
            {
                sum += shape(u);
            }
        }

        return (double)(sum / ((DoubleDouble)values.Length * width));
    }

    private static DoubleDouble Logistic(DoubleDouble u)
    {
        DoubleDouble e = DoubleDouble.Exp(-DoubleDouble.Abs(u)), one = e + 1;
        return e / (one * one);
    }

    private static string Both(double[] exact, double[] x, Func<double, double> got)
    {
        double peak = exact.Max(), absolute = 0, relative = 0;
        for (int j = 0; j < x.Length; j++)
        {
            double error = Math.Abs(got(x[j]) - exact[j]);
            absolute = Math.Max(absolute, error / peak);
            relative = exact[j] > Floor * peak ? Math.Max(relative, error / exact[j]) : relative;
        }

        return Number(absolute) + ", " + Number(relative);
    }

    private static double[] Points(double[] values, double width, int count) =>
        [.. HardSamples.Points(values, width, count), values.Max() + (29 * width), values.Min() - (30 * width), values.Max() + (8 * width), values.Min() - (15 * width)];

    private static double[] Each(double[] x, Func<double, double> function) => [.. x.Select(function)];

    private static string Number(double value) => value == 0 ? "0" : value is >= 0.01 and < 100 ? value.ToString("G3", CultureInfo.InvariantCulture) : value.ToString("0.0e-0", CultureInfo.InvariantCulture);
}
