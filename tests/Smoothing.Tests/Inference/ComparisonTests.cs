using MathNet.Numerics;
using MathNet.Numerics.Distributions;
using Smoothing.Inference;
using Smoothing.Numerics;
using Smoothing.Samples;
using Smoothing.Tests.Support;
using Smoothing.Theory;

namespace Smoothing.Tests.Inference;

public class ComparisonTests
{
    private static readonly ComparisonOptions Quick = new() { Permutations = 99, Points = 61 };

    // Every relabelling of 4 + 4 values, each statistic from pair sums of Gaussians, T_h = ΣΣ dᵢdⱼ φ_{√2h}(xᵢ − xⱼ): the exact p-value against the permutation one.
    [Fact]
    public void PValue_EightValues_IsThatOfAllRelabellings()
    {
        double[] x = [0.125, 1, 1.25, 2.125, 1.75, 2.75, 3.25, 4];   // on nodes of the grid, an eighth apart
        const double H = 0.5;
        int[][] subsets = [.. Enumerable.Range(0, 256).Where(m => int.PopCount(m) == 4).Select(m => Enumerable.Range(0, 8).Where(i => (m >> i & 1) == 1).ToArray())];
        int observed = Array.FindIndex(subsets, s => s.SequenceEqual([0, 1, 2, 3]));
        double[][] all = subsets.Where((_, i) => i != observed).Prepend(subsets[observed]).Select(first => new[] { 1, 2, 4, 8 }.Select(scale =>
        {
            double sum = 0;
            for (int i = 0; i < 8; i++)
            {
                for (int j = 0; j < 8; j++)
                {
                    double u = (x[i] - x[j]) / (scale * H);
                    sum += (first.Contains(i) ? 1 : -1) * (first.Contains(j) ? 1 : -1) * Math.Exp(-u * u / 4);
                }
            }

            return Math.Round(sum, 9);
        }).ToArray()).ToArray();
        double exact = PermutationTest.Combined(all);
        double p = PermutationTest.Of(Sample.Of(x[..4]), Sample.Of(x[4..]), H, 3, 4999, _ => { });
        // Relabellings whose smallest rank ties in the full list at another bandwidth may fall on either side among draws; only the reverse of the observed one always ties.
        double least = PermutationTest.Combined([.. all.Select((row, i) => i == 0 ? [.. row.Select(t => t + 1e-6)] : row)]) + (1.0 / 70);
        Assert.True(least <= exact);
        Assert.InRange(p, least - 0.012, exact + 0.012);   // three standard errors of 5,000 draws near 0.08
    }

    // Below the level in at most that share of samples: exact, so only the scatter of 200 samples is allowed for, and the test must not be idle.
    [Theory]
    [InlineData(0.05)]
    [InlineData(0.2)]
    public void PValue_EqualLaws_KeepsItsLevel(double level)
    {
        const int Repetitions = 200;
        int rejected = 0;
        for (ulong r = 0; r < Repetitions; r++)
        {
            Sample a = Sample.Of(NormalMixture.MarronWand[2].Draw(60, r));
            Sample b = Sample.Of(NormalMixture.MarronWand[2].Draw(90, r + 10_000));
            rejected += PermutationTest.Of(a, b, 0.2, r, 99, _ => { }) <= level ? 1 : 0;
        }

        Assert.InRange((double)rejected / Repetitions, Math.Max(0.005, level - (3 * Math.Sqrt(level * (1 - level) / Repetitions))), level + (3 * Math.Sqrt(level * (1 - level) / Repetitions)));
    }

    // Power at n = 400 for a shift of 0.35, a scale of 1.35, and the bimodal law of equal variance: at least 90 % is the aim; 40 samples leave 14 points.
    [Theory]
    [InlineData(0)]
    [InlineData(1)]
    [InlineData(2)]
    public void PValue_ThreeAlternatives_AreFound(int alternative)
    {
        NormalMixture other = alternative switch
        {
            0 => NormalMixture.Normal(0.35, 1),
            1 => NormalMixture.Normal(0, 1.35),
            _ => NormalMixture.MarronWand[5],
        };
        NormalMixture first = alternative == 2 ? NormalMixture.Normal(0, other.StandardDeviation) : NormalMixture.Normal();
        int found = 0;
        for (ulong r = 0; r < 40; r++)
        {
            found += Comparison.Of(Sample.Of(first.Draw(400, r)), Sample.Of(other.Draw(400, r + 999)), r, Quick).PValue <= 0.05 ? 1 : 0;
        }

        Assert.True(found >= (0.9 - 0.14) * 40, Guard.Text($"{found} of 40"));
    }

    // Simultaneous coverage of the difference at 400/400: 95 % nominal, 150 samples, three standard errors of 5.3 points.
    [Fact]
    public void Band_NormalAndBimodal_HoldsTheDifference()
    {
        NormalMixture first = NormalMixture.Normal();
        NormalMixture second = NormalMixture.MarronWand[5];
        const int Repetitions = 150;
        int own = 0, common = 0;
        for (ulong r = 0; r < Repetitions; r++)
        {
            ComparisonResult result = Comparison.Of(Sample.Of(first.Draw(400, r)), Sample.Of(second.Draw(400, r + 555)), r, Quick);
            own += Holds(result.Band) ? 1 : 0;
            common += Holds(result.CommonBand) ? 1 : 0;
        }

        double least = (0.95 - (3 * Math.Sqrt(0.95 * 0.05 / Repetitions))) * Repetitions;
        Assert.True(own >= least && common >= least, Guard.Text($"{own}, {common} of {Repetitions}"));

        bool Holds(DifferenceBand band) => Enumerable.Range(0, band.X.Count).All(j =>
        {
            double d = second.Value(band.X[j]) - first.Value(band.X[j]);
            return band.Lower[j] <= d && d <= band.Upper[j];
        });
    }

    [Fact]
    public void Of_SwappedSamples_TurnsTheSign()
    {
        Sample a = Sample.Of(NormalMixture.Normal().Draw(300, 1));
        Sample b = Sample.Of(NormalMixture.Normal(0.8, 1).Draw(300, 2));
        ComparisonResult one = Comparison.Of(a, b, 1, Quick);
        ComparisonResult two = Comparison.Of(b, a, 1, Quick);
        for (int j = 0; j < one.Band.X.Count; j++)
        {
            Near.Absolute(one.Band.Lower[j], -two.Band.Upper[j], 1e-12);
        }

        Assert.Equal(one.Shifts[2].Shift, -two.Shifts[2].Shift, 12);
        Assert.Equal(0.01, one.PValue);
        Assert.True(one.Shifts[2].Interval.Contains(0.8) && !one.Shifts[2].Interval.Contains(0));
        Assert.True(one.Band.ExcludesZero);
        Assert.Contains("the second sample has more between", one.Sentence, StringComparison.Ordinal);
    }

    [Fact]
    public void Of_UnequalSizes_SmoothsBothAlike()
    {
        ComparisonResult result = Comparison.Of(Sample.Of(NormalMixture.MarronWand[9].Draw(100, 1)), Sample.Of(NormalMixture.MarronWand[9].Draw(1000, 2)), 1, Quick);
        Assert.True(result.Band.IsCommon);
        Assert.Contains(result.Notes, note => note.Contains("smoothed with the smaller bandwidth", StringComparison.Ordinal));
        ComparisonResult even = Comparison.Of(Sample.Of(NormalMixture.MarronWand[9].Draw(600, 1)), Sample.Of(NormalMixture.MarronWand[9].Draw(1000, 2)), 1, Quick);
        Assert.False(even.Band.IsCommon);
        Assert.True(even.CommonBand.IsCommon);
    }

    [Fact]
    public void Of_SameSeed_SameAnswer()
    {
        Sample a = Sample.Of(NormalMixture.Normal().Draw(80, 1));
        Sample b = Sample.Of(NormalMixture.Normal().Draw(70, 2));
        Assert.Equal(Comparison.Of(a, b, 4, Quick).PValue, Comparison.Of(a, b, 4, Quick).PValue);
    }

    // Counts as weights go by cells and hypergeometric numbers: the same p-value as repeated values, within the scatter of 999 permutations.
    [Fact]
    public void PValue_CountWeights_AgreesWithRepetition()
    {
        Sample a = Sample.Of(NormalMixture.Normal().Draw(150, 1));
        Sample b = Sample.Of(NormalMixture.Normal(0.22, 1).Draw(150, 2));
        double[] ones = [.. Enumerable.Repeat(1.0, 150)];
        Sample counted = Sample.Of(b.Values, new SampleOptions { Weights = ones, WeightMeaning = WeightMeaning.Counts });
        double p = PermutationTest.Of(a, b, 0.3, 1, 999, _ => { });
        double q = PermutationTest.Of(a, counted, 0.3, 1, 999, _ => { });
        Assert.InRange(p, 0.005, 0.9);
        Near.Absolute(p, q, 0.02 + (3 * Math.Sqrt(2 * p * (1 - p) / 999)));   // 0.02 for values rounded to nodes in place of shared between them
    }

    [Theory]
    [InlineData(30, 50, 20)]
    [InlineData(400, 300, 350)]
    [InlineData(60, 5000, 1000)]
    [InlineData(900, 100, 500)]
    public void HypergeometricDraws_AnySizes_FollowTheLaw(int good, int bad, int draws)
    {
        const int Count = 20_000;
        var random = new RandomStream(5);
        var seen = new Dictionary<int, int>();
        for (int i = 0; i < Count; i++)
        {
            int k = (int)HypergeometricDraws.One(ref random, good, bad, draws);
            seen[k] = seen.GetValueOrDefault(k) + 1;
        }

        double Law(int k) => Math.Exp(SpecialFunctions.BinomialLn(good, k) + SpecialFunctions.BinomialLn(bad, draws - k) - SpecialFunctions.BinomialLn(good + bad, draws));
        double chi = 0;
        int cells = 0;
        for (int k = Math.Max(0, draws - bad); k <= Math.Min(good, draws); k++)
        {
            double expected = Count * Law(k);
            if (expected >= 5)
            {
                chi += Math.Pow(seen.GetValueOrDefault(k) - expected, 2) / expected;
                cells++;
            }
            else
            {
                Assert.True(seen.GetValueOrDefault(k) <= 30, Guard.Text($"{k}"));
            }
        }

        Assert.True(chi < ChiSquared.InvCDF(cells, 0.999), Guard.Text($"{chi} over {cells}"));
    }

    // Holm (1979), worked by hand: 0.01·3, 0.03·2, then not below the one before.
    [Fact]
    public void Holm_ThreeValues_IsTheStepDown()
    {
        double[] adjusted = Comparison.Holm([0.04, 0.01, 0.03]);
        Near.Relative(0.06, adjusted[0], 1e-14);
        Near.Relative(0.03, adjusted[1], 1e-14);
        Near.Relative(0.06, adjusted[2], 1e-14);
    }

    [Fact]
    public void Among_ThreeSamples_GivesThreePairs()
    {
        Sample[] samples = [Sample.Of(NormalMixture.Normal().Draw(200, 1)), Sample.Of(NormalMixture.Normal().Draw(200, 2)), Sample.Of(NormalMixture.Normal(2, 1).Draw(200, 3))];
        IReadOnlyList<PairComparison> pairs = Comparison.Among(samples, 1, Quick);
        Assert.Equal([(0, 1), (0, 2), (1, 2)], pairs.Select(p => (p.First, p.Second)));
        Assert.True(pairs[0].AdjustedPValue > 0.05 && pairs[1].AdjustedPValue <= 0.05 && pairs[2].AdjustedPValue <= 0.05);
        Assert.All(pairs, pair => Assert.True(pair.AdjustedPValue >= pair.Result.PValue));
    }

    [Fact]
    public void Of_BadInput_Throws()
    {
        Sample a = Sample.Of(NormalMixture.Normal().Draw(20, 1), new SampleOptions { Unit = "min" });
        Sample two = Sample.Of([1.0, 2.0]);
        Sample hours = Sample.Of([1.0, 2.0, 3.0], new SampleOptions { Unit = "h" });
        Sample ties = Sample.Of([1.0, 1.0, 1.0]);
        Assert.Throws<ArgumentException>(() => Comparison.Of(a, two, 1));
        Assert.Throws<ArgumentException>(() => Comparison.Of(Sample.Of([1.0]), a, 1));
        Assert.Throws<ArgumentException>(() => Comparison.Of(ties, ties, 1));
        ArgumentException units = Assert.Throws<ArgumentException>(() => Comparison.Of(a, hours, 1));
        Assert.Contains("min", units.Message, StringComparison.Ordinal);
        Assert.Throws<ArgumentNullException>(() => Comparison.Of(a, null!, 1));
        Assert.Throws<ArgumentException>(() => Comparison.Among([a], 1));
        foreach (ComparisonOptions options in new ComparisonOptions[]
        {
            new() { Level = 95 }, new() { Level = double.NaN }, new() { Permutations = 98 }, new() { Points = 1 }, new() { Probabilities = [0.5, 1] },
            new() { Range = new Interval(-9, -8), Support = new Interval(-5, 5) },
        })
        {
            Assert.ThrowsAny<ArgumentException>(() => Comparison.Of(a, a, 1, options));
        }

        using var stop = new CancellationTokenSource();
        stop.Cancel();
        Assert.Throws<OperationCanceledException>(() => Comparison.Of(a, a, 1, Quick with { Cancellation = stop.Token }));

        // One sample of equal values can still be compared.
        Assert.True(Comparison.Of(a, ties, 1, Quick).PValue <= 1);
    }
}
