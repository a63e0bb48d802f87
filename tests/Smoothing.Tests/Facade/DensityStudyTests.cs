using System.Globalization;
using AngleSharp.Html.Parser;
using Smoothing.Bandwidths;
using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Facade;

public class DensityStudyTests
{
    private static readonly double[] s_waiting = TestData.Load("faithful_waiting_272");
    private static readonly double[] s_eruptions = TestData.Load("faithful_eruptions_272");

    [Fact]
    public void Of_OldFaithful_FindsTwoPeaksAndTheCountedShare()
    {
        DensityStudy study = DensityStudy.Of(s_eruptions, new StudyOptions { Name = "Eruption length", Unit = "min", Limits = [4.5] });
        Assert.Equal(2, study.Peaks!.Peaks.Count(p => p.Prominence > 0.02 * study.Peaks.Highest.Height));
        Assert.Equal(s_eruptions.Count(v => v > 4.5) / 272.0, study.Limits[0].Beyond.Estimate, 14);
        string text = study.ToText();
        Assert.Contains("at least two groups", text.Replace('\n', ' '), StringComparison.Ordinal);
        Assert.Contains("above 4.5 min", text, StringComparison.Ordinal);
        Assert.DoesNotContain("NaN", text, StringComparison.Ordinal);
        Assert.All(text.Split('\n'), line => Assert.True(new StringInfo(line).LengthInTextElements <= 80, line));
    }

    [Fact]
    public void Of_SameInput_GivesTheSameBytesInAnyCulture()
    {
        CultureInfo before = CultureInfo.CurrentCulture;
        string invariant = Everything(DensityStudy.Of(s_waiting, new StudyOptions { Unit = "min", Limits = [60.5], ReferenceValues = s_waiting.AsMemory(0, 100) }));
        try
        {
            foreach (string name in new[] { "de-DE", "ar-SA", "tr-TR" })
            {
                CultureInfo.CurrentCulture = new CultureInfo(name);
                Assert.Equal(invariant, Everything(DensityStudy.Of(s_waiting, new StudyOptions { Unit = "min", Limits = [60.5], ReferenceValues = s_waiting.AsMemory(0, 100) })));
            }
        }
        finally
        {
            CultureInfo.CurrentCulture = before;
        }
    }

    [Fact]
    public void Of_OwnBandwidth_IsUsedAndNamed()
    {
        DensityStudy study = DensityStudy.Of(s_eruptions, new StudyOptions { Bandwidth = 0.3 });
        Assert.Equal(0.3, study.Bandwidth.Value);
        Assert.Equal(BandwidthStatus.Given, study.Bandwidth.Status);
        Assert.Contains("given by the analyst", study.MethodSentence, StringComparison.Ordinal);
    }

    [Fact]
    public void Of_AllEqual_AsksForABandwidthAndWorksWithOne()
    {
        double[] same = [5, 5, 5, 5];
        Assert.Contains("bandwidth", Assert.ThrowsAny<ArgumentException>(() => DensityStudy.Of(same)).Message, StringComparison.OrdinalIgnoreCase);
        Assert.Contains("All 4 values equal 5", DensityStudy.Of(same, new StudyOptions { Bandwidth = 1 }).ToText(), StringComparison.Ordinal);
    }

    [Fact]
    public void Of_OneValueWithBandwidth_Works()
    {
        DensityStudy study = DensityStudy.Of([3.0], new StudyOptions { Bandwidth = 1, Limits = [2] });
        Near.Relative(1 / Math.Sqrt(2 * Math.PI), study.Density.Value(3), 1e-14);
        Assert.Contains("Only one value", study.Cautions.Single(c => c.Kind == CautionKind.FewValues).Text, StringComparison.Ordinal);
    }

    // Dry days: 838 of 1,461 (57.4 %) in the open data set.
    [Fact]
    public void Of_RainWithDryDays_TakesTheAtomOutAndTheMassesAddToOne()
    {
        double[] rain = TestData.Load("seattle_precip_1461");
        DensityStudy study = DensityStudy.Of(rain, new StudyOptions { Name = "Daily rain", Unit = "mm", Limits = [20] });
        Atom atom = Assert.Single(study.Atoms);
        Assert.Equal(0, atom.Value);
        Assert.Equal(rain.Count(v => v == 0) / 1461.0, atom.Share, 12);
        Near.Absolute(1, atom.Share + study.CurveShare, 1e-14);
        Assert.Equal(rain.Count(v => v > 20) / 1461.0, study.Limits[0].Beyond.Estimate, 14);
        Assert.Contains("Exactly 0 mm", study.ToText(), StringComparison.Ordinal);
        Assert.Contains(study.Cautions, c => c.Kind == CautionKind.Atom);
    }

    [Fact]
    public void Cautions_RoundedOrMissing_AreSaidAndOtherwiseNot()
    {
        double[] withMissing = [.. s_waiting, double.NaN, double.NaN];
        DensityStudy study = DensityStudy.Of(withMissing, new StudyOptions { Missing = MissingValues.LeaveOut });
        Assert.Contains("2 missing values", study.Cautions.Single(c => c.Kind == CautionKind.LeftOut).Text, StringComparison.Ordinal);
        var random = new RandomStream(4);
        double[] smooth = new double[400];
        for (int i = 0; i < smooth.Length; i++)
        {
            smooth[i] = random.NextNormal();
        }

        Assert.Empty(DensityStudy.Of(smooth).Cautions);
    }

    [Fact]
    public void ToHtml_HostileNames_AreEscapedAndThePageIsWhole()
    {
        const string Hostile = "<script>alert(1)</script>\"'&\u202Egnirts";
        DensityStudy study = DensityStudy.Of(s_eruptions, new StudyOptions { Name = Hostile + new string('x', 10_000), Unit = "<b>", Limits = [4.5] });
        string html = study.ToHtml();
        var document = new HtmlParser(new HtmlParserOptions { IsStrictMode = true }).ParseDocument(html);
        Assert.Empty(document.QuerySelectorAll("script"));
        Assert.Empty(document.QuerySelectorAll("b"));
        Assert.Equal(2, document.QuerySelectorAll("svg").Length);
        Assert.NotNull(document.QuerySelector("svg desc"));
        Assert.DoesNotContain('\u202E', html);
        Assert.DoesNotContain("http://", html.Replace("http://www.w3.org/2000/svg", "", StringComparison.Ordinal), StringComparison.Ordinal);
        Assert.DoesNotContain("<script", study.ToMarkdown(), StringComparison.Ordinal);
        Assert.True(html.Length < 200_000);
    }

    [Fact]
    public void ToSvg_Curve_PassesThroughTheTabulatedPeak()
    {
        DensityStudy study = DensityStudy.Of(s_eruptions);
        Assert.Contains("class=\"sm-c\"", study.ToSvg(), StringComparison.Ordinal);
        Assert.Equal(401, study.Curve.X.Count);
        Near.Absolute(study.Peaks!.Highest.Height, study.Curve.Y.Max(), 0.01 * study.Peaks.Highest.Height);
    }

    [Theory]
    [InlineData(1e-9)]
    [InlineData(1e9)]
    public void ToText_AnyScale_ReadsTheSameApartFromNumbers(double scale)
    {
        string text = DensityStudy.Of([.. s_eruptions.Select(v => v * scale)]).ToText();
        Assert.Contains("two peaks", text, StringComparison.Ordinal);
        Assert.DoesNotContain("NaN", text, StringComparison.Ordinal);
    }

    [Fact]
    public void Of_FarOutlier_StillShowsTheRest()
    {
        DensityStudy study = DensityStudy.Of([.. s_eruptions, 1e9]);
        Assert.InRange(study.Picture.Upper, 5, 20);
        Assert.Contains("One value lies outside the picture", study.Cautions.Single(c => c.Kind == CautionKind.OutsidePicture).Text, StringComparison.Ordinal);
    }

    [Fact]
    public void Of_UnusableOptions_NameTheFault()
    {
        double[] x = [1, 2, 3, 4];
        Assert.Contains("Limits[1]", Assert.ThrowsAny<ArgumentException>(() => DensityStudy.Of(x, new StudyOptions { Limits = [1, double.NaN] })).Message, StringComparison.Ordinal);
        Assert.Contains("Probabilities[0]", Assert.ThrowsAny<ArgumentException>(() => DensityStudy.Of(x, new StudyOptions { Probabilities = [95] })).Message, StringComparison.Ordinal);
        Assert.ThrowsAny<ArgumentException>(() => DensityStudy.Of(x, new StudyOptions { Level = 95 }));
        Assert.ThrowsAny<ArgumentException>(() => DensityStudy.Of(x, new StudyOptions { Bandwidth = -1 }));
        Assert.ThrowsAny<ArgumentException>(() => DensityStudy.Of(x, new StudyOptions { Points = 3 }));
        Assert.ThrowsAny<ArgumentException>(() => DensityStudy.Of([]));
        Assert.Contains("values[1]", Assert.ThrowsAny<ArgumentException>(() => DensityStudy.Of([1, double.NaN])).Message, StringComparison.Ordinal);
        using var cancelled = new CancellationTokenSource();
        cancelled.Cancel();
        Assert.ThrowsAny<OperationCanceledException>(() => DensityStudy.Of(x, new StudyOptions { Cancellation = cancelled.Token }));
    }

    [Fact]
    public void Of_EveryKernelOfOrderTwo_GivesAReport()
    {
        foreach (Kernel kernel in Kernel.Standard)
        {
            string text = DensityStudy.Of(s_waiting, new StudyOptions { Kernel = kernel }).ToText();
            Assert.Contains(kernel.Name, text, StringComparison.Ordinal);
        }
    }

    [Fact]
    public void ToJson_RoundTrip_GivesTheSameDocumentAndNoNaN()
    {
        DensityStudy study = DensityStudy.Of(s_eruptions, new StudyOptions { Name = "<script>\"", Unit = "min", Limits = [4.5], Probabilities = [0.5, 0.999] });
        string json = study.ToJson();
        StudyDocument back = StudyDocument.FromJson(json);
        Assert.Equal(json, back.ToJson());
        Assert.DoesNotContain("NaN", json, StringComparison.Ordinal);
        Assert.DoesNotContain("Infinity", json, StringComparison.Ordinal);
        Assert.Null(back.Quantiles[1].Interval.Upper);
        Assert.Equal(study.Bandwidth.Value, back.Smoothing.Bandwidth);
        Assert.Equal(study.Curve.Y, back.Curve.Density);
        Assert.Equal(272, back.Data.Count);
    }

    [Theory]
    [InlineData("")]
    [InlineData("null")]
    [InlineData("[]")]
    [InlineData("{}")]
    [InlineData("{\"schemaVersion\":2}")]
    [InlineData("{\"schemaVersion\":1,\"curve\":{\"x\":[1],\"density\":[]}}")]
    [InlineData("{\"schemaVersion\":1,\"level\":\"NaN\"}")]
    public void FromJson_UnusableText_IsAnArgumentError(string json) => Assert.ThrowsAny<ArgumentException>(() => StudyDocument.FromJson(json));

    [Fact]
    public void FromJson_CutAnywhere_IsAnArgumentErrorOrTheWhole()
    {
        string json = DensityStudy.Of(s_waiting, new StudyOptions { Points = 51 }).ToJson();
        for (int length = 0; length < json.Length - 1; length += 97)
        {
            Assert.ThrowsAny<ArgumentException>(() => StudyDocument.FromJson(json[..length]));
        }
    }

    private static string Everything(DensityStudy study) => study.ToText() + study.ToMarkdown() + study.ToHtml() + study.ToJson();
}
