using Smoothing.Bandwidths;
using Smoothing.Numerics;
using Smoothing.Samples;
using Smoothing.Tests.Support;
using Smoothing.Theory;

namespace Smoothing.Tests.Facade;

/// <summary>Each caution where it applies, with its number, and not where it does not.</summary>
public class CautionTests
{
    [Fact]
    public void Dependence_UndeclaredOrder_NamesTheCorrelationAndWhatItCosts()
    {
        double[] series = Series(600, 0.6);
        Caution caution = Assert.Single(DensityStudy.Of(series).Cautions, c => c.Kind == CautionKind.Dependence);
        double r = Sample.Of(series).LagOneCorrelation;
        Assert.Contains(FormattableString.Invariant($"autocorrelation {r:F2}"), caution.Text, StringComparison.Ordinal);
        Assert.Contains(FormattableString.Invariant($"as much as {Math.Floor(600 * (1 - r) / (1 + r)):F0} independent"), caution.Text, StringComparison.Ordinal);
        Assert.Contains("the band allow for it", Assert.Single(DensityStudy.Of(series, new StudyOptions { TimeOrdered = true }).Cautions, c => c.Kind == CautionKind.Dependence).Text, StringComparison.Ordinal);
    }

    // Independent values, in their order, sorted either way: the order says nothing. 40 samples at three standard errors: 0.05 false alarms expected.
    [Fact]
    public void Dependence_IndependentOrSorted_IsNotSaid()
    {
        for (ulong seed = 1; seed <= 40; seed++)
        {
            Assert.DoesNotContain(DensityStudy.Of(NormalMixture.Normal(0, 1).Draw(200, seed), Small()).Cautions, c => c.Kind == CautionKind.Dependence);
        }

        double[] sorted = [.. Series(200, 0.5).Order()];
        Assert.DoesNotContain(DensityStudy.Of(sorted, Small()).Cautions, c => c.Kind == CautionKind.Dependence);
        Assert.DoesNotContain(DensityStudy.Of([.. sorted.Reverse()], Small()).Cautions, c => c.Kind == CautionKind.Dependence);
    }

    // INVENTED durations cut off at 65: recording stopped there.
    [Theory]
    [InlineData(15.0, CautionKind.Atom)]
    [InlineData(9.0, CautionKind.PiledUp)]
    public void CutOffAtTheTop_AtomOrPile_SaysThatTheTrueValuesLieAbove(double spread, CautionKind kind)
    {
        double[] cut = [.. NormalMixture.Normal(50, spread).Draw(500, 5).Select(v => Math.Min(v, 65))];
        double share = cut.Count(v => v == 65) / 500.0;
        Caution caution = Assert.Single(DensityStudy.Of(cut, Small() with { Unit = "h" }).Cautions, c => c.Kind == kind);
        Assert.Contains(FormattableString.Invariant($"{100 * share:F0}"), caution.Text, StringComparison.Ordinal);
        Assert.Contains("the true values lie above it", caution.Text, StringComparison.Ordinal);
        Assert.Contains("censored values", caution.Text, StringComparison.Ordinal);
        Assert.DoesNotContain(DensityStudy.Of(cut, Small()).Cautions, c => c.Kind == CautionKind.UndeclaredLimit);
    }

    // At h = 0.5 a standard normal peak is 1 − 1/√1.25 = 10.6 % too low (exact), far beyond a band of 20,000 values.
    [Fact]
    public void SmoothingBias_OversmoothedNormal_IsSaidWithItsDirectionAndDrawn()
    {
        DensityStudy study = DensityStudy.Of(NormalMixture.Normal(0, 1).Draw(20_000, 3), Small() with { Bandwidth = 0.5 });
        Caution caution = Assert.Single(study.Cautions, c => c.Kind == CautionKind.SmoothingBias);
        Assert.Contains("from −0.", caution.Text, StringComparison.Ordinal);
        Assert.Contains(" too low", caution.Text, StringComparison.Ordinal);
        Assert.Contains(" too high", caution.Text, StringComparison.Ordinal);
        Assert.Contains("class=\"sm-w\" d=", study.ToSvg(), StringComparison.Ordinal);
        FigureModel figure = StudyFigure.Of(study);
        (double from, double to) = figure.Biased.Single(b => b.From < 0 && b.To > 0);
        int middle = Enumerable.Range(0, figure.X.Count).MinBy(i => Math.Abs(figure.X[i]));
        Assert.InRange(figure.Corrected[middle] / figure.Y[middle], 1.05, 1.15);
        Assert.True(from < -0.4 && to > 0.4);
        Assert.DoesNotContain(DensityStudy.Of(NormalMixture.Normal(0, 1).Draw(2_000, 3), Small()).Cautions, c => c.Kind == CautionKind.SmoothingBias);
    }

    [Fact]
    public void Smoothing_FarMorePeaksThanEstablished_SuggestsAWiderBandwidth()
    {
        DensityStudy study = DensityStudy.Of(NormalMixture.Normal(0, 1).Draw(400, 3), Small() with { Bandwidth = 0.02, Points = 401 });
        string text = Assert.Single(study.Cautions, c => c.Kind == CautionKind.Smoothing).Text;
        Assert.Contains(FormattableString.Invariant($"{StudyPeaks.Named(study).Count} peaks where the tests establish one"), text, StringComparison.Ordinal);
        Assert.Contains("a wider bandwidth than 0.020", text, StringComparison.Ordinal);
        Assert.Contains("smaller peaks are not listed", study.ToText(), StringComparison.Ordinal);
    }

    [Fact]
    public void Groups_FlatValues_AreToldToTrustTheDip()
    {
        double[] flat = [.. Enumerable.Range(0, 300).Select(i => i + (0.3 * Math.Sin(i)))];
        Assert.Contains("Trust the dip", Assert.Single(DensityStudy.Of(flat, Small()).Cautions, c => c.Kind == CautionKind.Groups).Text, StringComparison.Ordinal);
    }

    [Fact]
    public void Heaping_SmoothingKeptAtItsFloor_SaysAtWhat()
    {
        double[] values = [.. NormalMixture.Normal(40, 9).Draw(600, 2).Select((v, i) => i % 3 == 0 ? 5 * Math.Round(v / 5) : Math.Round(v))];
        DensityStudy study = DensityStudy.Of(values, Small() with { Unit = "min" });
        Caution caution = Assert.Single(study.Cautions, c => c.Kind == CautionKind.Heaping);
        Assert.Contains("multiples of 5 min", caution.Text, StringComparison.Ordinal);
        Assert.Equal(study.Bandwidth.Status == BandwidthStatus.RoundingFloor, caution.Text.Contains("was kept at", StringComparison.Ordinal));
    }

    [Fact]
    public void Cautions_OfEveryStudy_AreWholeSentencesWithANumberOrPlace()
    {
        DensityStudy[] studies =
        [
            DensityStudy.Of(TestData.Load("cps_wages_534"), Small()), DensityStudy.Of(TestData.Load("penguin_flipper_342"), Small()),
            DensityStudy.Of(TestData.Load("seattle_precip_1461"), Small()), DensityStudy.Of([.. TestData.Load("faithful_eruptions_272"), 1e9], Small()),
            DensityStudy.Of([1, 2, 4], Small()),
        ];
        foreach (Caution caution in studies.SelectMany(s => s.Cautions))
        {
            Assert.EndsWith(".", caution.Text, StringComparison.Ordinal);
            Assert.True(char.IsUpper(caution.Text[0]) || char.IsDigit(caution.Text[0]), caution.Text);
            Assert.Matches("[0-9]|Only [a-z]+ value|more than [a-z]+ groups|flat", caution.Text);
            Assert.DoesNotMatch(@"\d\.\d{7}", caution.Text);
        }
    }

    private static StudyOptions Small() => new() { Points = 81 };

    // A first-order autoregression with the correlation given.
    private static double[] Series(int count, double correlation)
    {
        var random = new RandomStream(8);
        var values = new double[count];
        double state = 0;
        for (int i = 0; i < count; i++)
        {
            state = (correlation * state) + (Math.Sqrt(1 - (correlation * correlation)) * random.NextNormal());
            values[i] = state;
        }

        return values;
    }
}
