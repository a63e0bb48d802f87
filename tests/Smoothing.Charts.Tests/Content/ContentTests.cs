using Smoothing.Charts.Content;
using Smoothing.Charts.Drawing;
using Smoothing.Charts.Tests.Support;
using Smoothing.Estimation;
using Smoothing.Inference;
using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;
using Smoothing.Theory;

namespace Smoothing.Charts.Tests.Content;

/// <summary>What the figures show is what the library says.</summary>
public class ContentTests
{
    [Fact]
    public void BiasStretches_AgreeWithTheStatementsAtEachPlace()
    {
        DensityStudy study = Studies.Ordinary;
        var view = new StudyView(study);
        int told = 0;
        foreach (BiasContent.Stretch stretch in BiasContent.Stretches(view, study.Uncertainty!))
        {
            for (int i = 0; i + 1 < stretch.X.Length; i += 5)
            {
                BiasStatement statement = study.Uncertainty!.BiasAt(stretch.X[i]);
                Assert.Equal(100 * Math.Max(statement.Density - statement.Estimate - (2 * statement.StandardError), 0), stretch.Lower[i], 1e-9);
                Assert.Equal(100 * Math.Max(statement.Density - statement.Estimate + (2 * statement.StandardError), 0), stretch.Upper[i], 1e-9);
                Tone tone = statement.RelativeCorrection is { Lower: > 0 } ? Tone.Up : statement.RelativeCorrection is { Upper: < 0 } ? Tone.Down : Tone.Open;
                if (statement.Density > 1e-6)
                {
                    Assert.Equal(tone, stretch.Tone);
                    told += tone == Tone.Open ? 0 : 1;
                }
            }
        }

        Assert.True(told > 5, $"{told} places told");
    }

    [Fact]
    public void EstimatedTarget_IsTheCurveAtThePilot()
    {
        double[] values = Studies.TwoHumps.Draw(2000, 21);
        Sample sample = Sample.Of(values);
        const double Pilot = 2.5;
        NormalMixture target = EstimatedTarget.Of(sample, Pilot);
        Density curve = Density.Of(sample, Kernel.Gaussian, Pilot);
        double bend = Enumerable.Range(0, 70).Max(x => Math.Abs(curve.Derivative(x, 2)));
        for (int x = 0; x < 70; x++)
        {
            Assert.Equal(curve.Value(x), target.Value(x), 0.01 * curve.Value(22));
            Assert.Equal(curve.Derivative(x, 2), target.Derivative(x, 2), 0.03 * bend);
        }

        // Values far apart stay few: the cost must not run away.
        double[] wide = [.. NormalMixture.Normal().Draw(5000, 3).Select(v => v * v * v * 1e3)];
        Assert.True(EstimatedTarget.Of(Sample.Of(wide), 0.01).Weights.Count <= 300);
    }

    [Fact]
    public void ErrorOfAKnownTarget_MarksTheBandwidthOfTheTheory()
    {
        // Wand and Jones (1995), section 2.4: for N(0, 1) and the Gaussian kernel h = (4/3n)^(1/5) asymptotically; the exact one is a little larger.
        var theory = new ErrorTheory(Kernel.Gaussian, NormalMixture.Normal());
        Figure figure = Figures.Error(theory, 10_000, 0.2, unit: "mm", options: Machine.Options);
        double exact = theory.OptimalBandwidth(10_000);
        Assert.InRange(exact, Math.Pow(4.0 / 30_000, 0.2), 1.03 * Math.Pow(4.0 / 30_000, 0.2));
        Assert.Contains($"smallest at h = {Words.Three(exact)} mm", figure.Alternative, StringComparison.Ordinal);
        Assert.Contains($"{Words.Three(theory.Mise(0.2, 10_000) / theory.Mise(exact, 10_000))} times", figure.Alternative, StringComparison.Ordinal);
        Assert.Throws<ArgumentOutOfRangeException>(() => Figures.Error(theory, 0));
        Assert.Throws<ArgumentOutOfRangeException>(() => Figures.Error(theory, 10, double.NaN));
        Assert.Throws<ArgumentOutOfRangeException>(() => Figures.Error(theory, 10, 1, double.PositiveInfinity));
    }

    [Fact]
    public void CountedShares_AreThoseOfTheLibrary()
    {
        Sample sample = Sample.Of([1, 2, 2, 3, 5, 8, 8, 8, 9, 10]);
        (double[] x, double[] y) = DistributionContent.Counted(sample, new Interval(1.5, 9.5));
        Assert.Equal(x.Length, y.Length);
        foreach (double at in new[] { 1.6, 2.5, 4, 7, 8.5, 9.4 })
        {
            int last = Array.FindLastIndex(x, v => v <= at);
            Assert.Equal(100 * (1 - Shares.Beyond(sample, at).Estimate), y[last], 1e-9);
        }
    }

    [Fact]
    public void SmoothedShares_WithAPointMass_JumpByItsShare()
    {
        DensityStudy study = DensityStudy.Of([.. Studies.TwoHumps.Draw(300, 7), .. new double[60]], new StudyOptions());
        Atom atom = Assert.Single(study.Atoms);
        (double[] x, double[] y) = DistributionContent.Smoothed(new StudyView(study));
        int first = Array.IndexOf(x, 0.0);
        Assert.Equal(0.0, x[first + 1]);
        Assert.Equal(100 * atom.Share, y[first + 1] - y[first], 1e-9);
        Assert.InRange(y[^1], 99.9, 100.0001);
    }

    [Fact]
    public void SlopeMap_EveryState_FollowsFromDirectSums()
    {
        double[] values = Studies.TwoHumps.Draw(300, 12);
        double[] x = [.. Enumerable.Range(0, 60).Select(i => i + 0.5)];
        double[] bandwidths = [1.5, 4];
        SlopeMap map = SlopeMap.Of(Sample.Of(values), x, bandwidths, 0.95, null);
        for (int r = 0; r < bandwidths.Length; r++)
        {
            double h = bandwidths[r];
            (double Count, double Slope, double Error)[] direct = [.. x.Select(at => Direct(values, at, h))];
            double mean = direct.Where(d => d.Count >= 5).Average(d => d.Count);
            double q = MathNet.Numerics.Distributions.Normal.InvCDF(0, 1, (1 + Math.Pow(0.95, mean / values.Length)) / 2);
            for (int i = 0; i < x.Length; i++)
            {
                double ratio = direct[i].Slope / direct[i].Error;
                if (Math.Abs(Math.Abs(ratio) - q) > 1e-6 && Math.Abs(direct[i].Count - 5) > 1e-6)
                {
                    Assert.Equal(direct[i].Count < 5 ? Slope.Sparse : ratio > q ? Slope.Rising : ratio < -q ? Slope.Falling : Slope.Open, map.Rows[r][i]);
                }
            }
        }

        Assert.Equal(2, map.Peaks[1].Count(p => p.Established));
    }

    [Fact]
    public void SlopeMap_OfANormalSample_RarelySeesASecondPeak()
    {
        // At one row the level is 95 %: of 200 samples of one normal hump at most 5 % + 3 standard errors (9.6 %) may show two established peaks.
        double[] x = [.. Enumerable.Range(0, 121).Select(i => (i - 60) / 20.0)];
        int wrong = 0;
        for (ulong seed = 0; seed < 200; seed++)
        {
            SlopeMap map = SlopeMap.Of(Sample.Of(NormalMixture.Normal().Draw(200, seed)), x, [0.35], 0.95, null);
            wrong += map.Peaks[0].Count(p => p.Established) > 1 ? 1 : 0;
        }

        Assert.InRange(wrong, 0, 19);
    }

    [Fact]
    public void Difference_OfStudiesThatDiffer_FillsWhereTheBandLeavesOutZero()
    {
        DensityStudy first = DensityStudy.Of(NormalMixture.Normal(20, 3).Draw(400, 1), new StudyOptions { Name = "A", Unit = "min" });
        DensityStudy second = DensityStudy.Of(NormalMixture.Normal(24, 3).Draw(400, 2), new StudyOptions { Name = "B", Unit = "min" });
        ComparisonResult result = Comparison.Of(first.Sample, second.Sample, 1, new ComparisonOptions { Permutations = 99 });
        Assert.True(result.Band.ExcludesZero);
        Figure figure = Figures.Difference(first, second, result, Machine.Options);
        Panel lower = figure.Place().Panels[1].Panel;
        Assert.Equal(result.Band.Higher.Count, lower.Marks.Count(m => m.Tone == Tone.Up));
        Assert.Equal(result.Band.Lesser.Count, lower.Marks.Count(m => m.Tone == Tone.Down));
        Assert.Equal(result.Sentence, figure.Alternative);
    }

    private static (double Count, double Slope, double Error) Direct(double[] values, double at, double h)
    {
        double count = 0, sum = 0, squares = 0;
        foreach (double value in values)
        {
            double u = (at - value) / h;
            double bell = Math.Exp(-u * u / 2);
            double slope = -u * bell / (h * h * Math.Sqrt(2 * Math.PI));
            count += bell;
            sum += slope;
            squares += slope * slope;
        }

        double mean = sum / values.Length;
        return (count, mean, Math.Sqrt(((squares / values.Length) - (mean * mean)) / values.Length));
    }
}
