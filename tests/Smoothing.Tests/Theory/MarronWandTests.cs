using System.Globalization;
using Smoothing.Kernels;
using Smoothing.Tests.Support;
using Smoothing.Theory;

namespace Smoothing.Tests.Theory;

/// <summary>The fifteen mixtures of Marron and Wand (1992) against tables made by an independent program in extended precision.</summary>
public class MarronWandTests
{
    public static TheoryData<int, long, double, double, double, double, int> Errors
    {
        get
        {
            var rows = new TheoryData<int, long, double, double, double, double, int>();
            foreach (string[] c in Rows("mixture_errors.csv"))
            {
                rows.Add(int.Parse(c[0], CultureInfo.InvariantCulture), long.Parse(c[1], CultureInfo.InvariantCulture), Number(c[2]), Number(c[3]), Number(c[4]), Number(c[5]), int.Parse(c[7], CultureInfo.InvariantCulture));
            }

            return rows;
        }
    }

    [Fact]
    public void MarronWand_EveryMixture_HasTheTabulatedNameMomentsAndRoughness()
    {
        List<string[]> rows = [.. Rows("mixture_constants.csv")];
        Assert.Equal(15, NormalMixture.MarronWand.Count);
        for (int i = 0; i < 15; i++)
        {
            NormalMixture target = NormalMixture.MarronWand[i];
            Assert.Equal(rows[i][1], target.Name);
            Near.Absolute(Number(rows[i][2]), target.Mean, 1e-14, target.Name);
            Near.Relative(Number(rows[i][3]), target.StandardDeviation, 1e-14, target.Name);
            for (int r = 0; r <= 3; r++)
            {
                Near.Relative(Number(rows[i][4 + r]), target.Roughness(r), 1e-12, target.Name + " R" + r);
            }
        }
    }

    [Theory]
    [MemberData(nameof(Errors))]
    public void OptimalBandwidth_GaussianKernel_IsTheTabulatedOne(int number, long n, double best, double least, double asymptotic, double asymptoticLeast, int minima)
    {
        NormalMixture target = NormalMixture.MarronWand[number - 1];
        var theory = new ErrorTheory(Kernel.Gaussian, target);
        double h = theory.OptimalBandwidth(n);
        Near.Relative(best, h, 1e-9, target.Name);
        Near.Relative(least, theory.Mise(h, n), 1e-12, target.Name);
        double a = theory.AsymptoticOptimalBandwidth(n);
        Near.Relative(asymptotic, a, 1e-12, target.Name);
        Near.Relative(asymptoticLeast, theory.Amise(a, n), 1e-12, target.Name);
        Assert.Equal(minima, theory.LocallyOptimalBandwidths(n).Count);
    }

    [Fact]
    public void LocallyOptimalBandwidths_ClawAtFifty_HasTwoAndTheBetterWins()
    {
        // Marron & Wand (1992), sec. 3: the MISE of the claw has two local minima for some n.
        var theory = new ErrorTheory(Kernel.Gaussian, NormalMixture.MarronWand[9]);
        IReadOnlyList<double> minima = theory.LocallyOptimalBandwidths(50);
        Assert.Equal(2, minima.Count);
        Assert.Equal(minima.MinBy(h => theory.Mise(h, 50)), theory.OptimalBandwidth(50));
    }

    private static double Number(string text) => double.Parse(text, CultureInfo.InvariantCulture);

    private static IEnumerable<string[]> Rows(string name) =>
        File.ReadLines(TestData.PathOf(name)).Skip(2).Where(line => line.Length > 0).Select(line => line.Split(','));
}
