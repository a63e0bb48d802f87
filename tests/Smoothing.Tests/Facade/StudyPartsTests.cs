using Smoothing.Bandwidths;
using Smoothing.Estimation;
using Smoothing.Inference;
using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Facade;

/// <summary>Each part of a study is what its module gives by itself.</summary>
public class StudyPartsTests
{
    private static readonly double[] s_eruptions = TestData.Load("faithful_eruptions_272");

    [Fact]
    public void Groups_OldFaithful_AreThoseOfTheModuleWithTheStudysSeed()
    {
        DensityStudy study = DensityStudy.Of(s_eruptions, new StudyOptions { Seed = 7 });
        GroupEvidence expected = Groups.Of(Sample.Of(s_eruptions), 7, new GroupOptions { Bandwidth = study.Bandwidth });
        Assert.Equal(expected.Sentence, study.Groups!.Sentence);
        Assert.Equal(2, study.Groups.AtLeast);
        Assert.Contains("There are at least two groups, around 1.9 and 4.5", study.ToText().Replace('\n', ' '), StringComparison.Ordinal);
    }

    [Fact]
    public void Groups_OtherKernel_UseTheEquivalentGaussianBandwidth()
    {
        DensityStudy study = DensityStudy.Of(s_eruptions, new StudyOptions { Kernel = Kernel.Epanechnikov });
        Near.Relative(study.Bandwidth * Kernel.Gaussian.CanonicalBandwidth / Kernel.Epanechnikov.CanonicalBandwidth, study.Groups!.Bandwidth, 1e-14);
    }

    [Fact]
    public void Groups_OneNormalHill_AreNotClaimed()
    {
        DensityStudy study = DensityStudy.Of(Normal(400, 4));
        Assert.Equal(1, study.Groups!.AtLeast);
        string text = study.ToText().Replace('\n', ' ');
        Assert.DoesNotContain("at least two", text, StringComparison.Ordinal);
        Assert.True(text.Contains("Nothing in the values speaks for more than one group", StringComparison.Ordinal) || text.Contains("not established", StringComparison.Ordinal), text);
    }

    [Fact]
    public void Comparison_ShiftedHalf_IsThatOfTheModuleAndSaidInWords()
    {
        double[] reference = Normal(300, 5);
        double[] now = [.. Normal(350, 6).Select(v => v + 0.8)];
        var options = new StudyOptions { Name = "level", Unit = "mm", Limits = [1.5], ReferenceValues = reference, ReferenceName = "last quarter", Seed = 3 };
        DensityStudy study = DensityStudy.Of(now, options);
        ComparisonResult expected = Comparison.Of(Sample.Of(reference), Sample.Of(now), 3, new ComparisonOptions { Probabilities = options.Probabilities });
        Assert.Equal(expected.PValue, study.Comparison!.PValue);
        Assert.Equal(expected.Band.Lower, study.Comparison.Band.Lower);
        Assert.Equal(expected.Shifts.Select(s => s.Shift), study.Comparison.Shifts.Select(s => s.Shift));
        Assert.Equal("last quarter", study.Comparison.FirstName);
        string text = study.ToText().Replace('\n', ' ');
        Assert.Contains("The values differ from last quarter (p at most 0.001): more from", text, StringComparison.Ordinal);
        Assert.Contains("Compared with last quarter", text, StringComparison.Ordinal);
        Assert.NotNull(study.ToComparisonSvg());
        StudyDocument document = StudyDocument.FromJson(study.ToJson());
        Assert.Equal(expected.PValue, document.Comparison!.PValue);
        Assert.Equal(expected.Band.X.Count, document.Comparison.Difference!.Count);
    }

    // Newcombe (1998, method 10) combines two intervals by squares; the single intervals are tested in Shares. Written out anew here.
    [Fact]
    public void LimitChanges_KnownShares_CombineBothIntervals()
    {
        double[] before = [.. Enumerable.Range(1, 200).Select(i => (double)i)];
        double[] now = [.. Enumerable.Range(41, 100).Select(i => (double)i)];
        DensityStudy study = DensityStudy.Of(now, new StudyOptions { Limits = [120.5], Reference = Sample.Of(before) });
        LimitChange change = Assert.Single(study.LimitChanges);
        Assert.Equal(0.2 - 0.4, change.Change, 14);
        ShareEstimate first = Shares.Beyond(Sample.Of(before), 120.5);
        ShareEstimate second = Shares.Beyond(Sample.Of(now), 120.5);
        double down = Math.Sqrt(Math.Pow(0.2 - second.Interval.Lower, 2) + Math.Pow(first.Interval.Upper - 0.4, 2));
        double up = Math.Sqrt(Math.Pow(second.Interval.Upper - 0.2, 2) + Math.Pow(0.4 - first.Interval.Lower, 2));
        Near.Relative(-0.2 - down, change.Interval.Lower, 1e-12);
        Near.Relative(-0.2 + up, change.Interval.Upper, 1e-12);
    }

    [Fact]
    public void Comparison_TooFewOrNone_SaysWhy()
    {
        Assert.Null(DensityStudy.Of(s_eruptions).Comparison);
        Assert.Empty(DensityStudy.Of(s_eruptions, new StudyOptions { Limits = [3] }).LimitChanges);
        DensityStudy study = DensityStudy.Of(s_eruptions, new StudyOptions { ReferenceValues = new double[] { 1, 2 } });
        Assert.Null(study.Comparison);
        Assert.Null(study.ToComparisonSvg());
        Assert.Contains("at least three on either side", study.ToText().Replace('\n', ' '), StringComparison.Ordinal);
        Assert.Null(StudyDocument.FromJson(study.ToJson()).Comparison!.PValue);
    }

    [Fact]
    public void Reference_Unusable_NamesTheFault()
    {
        Sample other = Sample.Of([1.0, 2, 3], new SampleOptions { Unit = "s" });
        Assert.Contains("in s and they are in min", Assert.ThrowsAny<ArgumentException>(() => DensityStudy.Of(s_eruptions, new StudyOptions { Unit = "min", Reference = other })).Message, StringComparison.Ordinal);
        Assert.Contains("leave one out", Assert.ThrowsAny<ArgumentException>(() => DensityStudy.Of(s_eruptions, new StudyOptions { Reference = other, ReferenceValues = new double[] { 1 } })).Message, StringComparison.Ordinal);
        Assert.Contains("inside Support", Assert.ThrowsAny<ArgumentException>(() => DensityStudy.Of(s_eruptions, new StudyOptions { Support = new Interval(0, 10), ReferenceValues = new double[] { 1, 2, 30 } })).Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Plan_Counts_AreFourTimesAndTwoToTheFiveHalves()
    {
        PrecisionPlan plan = DensityStudy.Of(s_eruptions).Plan;
        Assert.Equal(272, plan.Count);
        Assert.Equal(1088, plan.ForShares);
        Assert.Equal(Math.Ceiling(272 * 4 * Math.Sqrt(2)), plan.ForCurve);
        Assert.Null(DensityStudy.Of([.. s_eruptions.Select(v => Math.Round(v))]).Plan.ForCurve);
        double[] counts = [.. Enumerable.Repeat(3.0, 272)];
        Assert.Equal(816, DensityStudy.Of(s_eruptions, new StudyOptions { Weights = counts, WeightMeaning = WeightMeaning.Counts }).Plan.Count);
    }

    [Fact]
    public void AtHalfAndDouble_AreTheCurvesAtThoseBandwidths()
    {
        DensityStudy study = DensityStudy.Of(s_eruptions);
        foreach ((SmoothingVariant? variant, double factor) in new[] { (study.AtHalf, 0.5), (study.AtDouble, 2.0) })
        {
            Density curve = Density.Of(Sample.Of(s_eruptions), Kernel.Gaussian, factor * study.Bandwidth);
            Assert.Equal(factor * study.Bandwidth, variant!.Bandwidth);
            Near.Relative(curve.Value(variant.HighestLocation), variant.HighestHeight, 1e-9);
            Near.Relative(variant.HighestHeight / study.Peaks!.Highest.Height, variant.RelativeHeight, 1e-12);
        }

        Assert.True(study.AtHalf!.Peaks >= study.AtDouble!.Peaks);
        Assert.Null(DensityStudy.Of(s_eruptions, new StudyOptions { Kernel = Kernel.Uniform }).AtHalf);
    }

    [Fact]
    public void Sharp_NoLimits_IsOfferedWithBothBandwidths()
    {
        DensityStudy study = DensityStudy.Of(s_eruptions);
        SharpEstimate expected = SharpEstimate.Of(Sample.Of(s_eruptions), study.Bandwidth, BandwidthRules.BlockSpectrum(Sample.Of(s_eruptions), Kernel.GaussianOfOrder(4)));
        Assert.Equal(expected.Value(2), study.Sharp!.Value(2));
        Assert.Null(DensityStudy.Of(s_eruptions, new StudyOptions { Support = new Interval(0, double.PositiveInfinity) }).Sharp);
    }

    [Fact]
    public void Columns_OfEveryKind_GiveTheSameReport()
    {
        var options = new StudyOptions { Unit = "min", Limits = [4.5] };
        string expected = DensityStudy.Of(s_eruptions.AsSpan(), options).ToText();
        Assert.Equal(expected, DensityStudy.Of(s_eruptions, options).ToText());
        Assert.Equal(expected, DensityStudy.Of(s_eruptions.Select(v => v), options).ToText());
        Assert.Equal(expected, DensityStudy.Of(s_eruptions.Select(v => (double?)v), options).ToText());
        var durations = s_eruptions.Select(v => TimeSpan.FromTicks((long)Math.Round(v * TimeSpan.TicksPerMinute))).ToArray();
        Assert.Equal(expected, DensityStudy.Of(durations, TimeUnit.Minutes, options with { Unit = "" }).ToText());
        DensityStudy missing = DensityStudy.Of(durations.Select(d => (TimeSpan?)d).Append(null), TimeUnit.Minutes, options with { Missing = MissingValues.LeaveOut });
        Assert.Equal(1, missing.Sample.LeftOut);
        Assert.Equal(1, DensityStudy.Of(s_eruptions.Select(v => (double?)v).Append(null), options with { Missing = MissingValues.LeaveOut }).Sample.LeftOut);
        Assert.Throws<ArgumentNullException>(() => DensityStudy.Of((IEnumerable<double>)null!));
    }

    [Fact]
    public void Progress_WholeReport_RisesToOneAndNeverFalls()
    {
        var told = new Told();
        DensityStudy study = DensityStudy.Of(s_eruptions, new StudyOptions { Progress = told, ReferenceValues = s_eruptions.AsMemory(0, 100) });
        Assert.InRange(told.Values[^1], 0.29, 0.31);
        study.ToText();
        Assert.Equal(1, told.Values[^1]);
        Assert.True(told.Values.Count > 20);
        Assert.Equal(told.Values.Order(), told.Values);
        Assert.Equal(told.Values.Distinct().Count(), told.Values.Count);
    }

    [Fact]
    public void Cancellation_WhileAPartIsWorkedOut_StopsIt()
    {
        using var source = new CancellationTokenSource();
        DensityStudy study = DensityStudy.Of(s_eruptions, new StudyOptions { Cancellation = source.Token, ReferenceValues = s_eruptions.AsMemory(0, 100) });
        source.Cancel();
        Assert.ThrowsAny<OperationCanceledException>(() => study.Groups);
        Assert.ThrowsAny<OperationCanceledException>(() => study.Comparison);
        Assert.ThrowsAny<OperationCanceledException>(() => study.ToText());
    }

    [Fact]
    public void FromJson_ComparisonListsOfUnequalLength_AreAnArgumentError()
    {
        string json = DensityStudy.Of(s_eruptions, new StudyOptions { ReferenceValues = s_eruptions.AsMemory(0, 100), Points = 51 }).ToJson();
        var node = System.Text.Json.Nodes.JsonNode.Parse(json)!;
        node["comparison"]!["lower"]!.AsArray().RemoveAt(0);
        Assert.Contains("comparison.lower", Assert.Throws<ArgumentException>(() => StudyDocument.FromJson(node.ToJsonString())).Message, StringComparison.Ordinal);
        node["comparison"]!["x"] = null;
        Assert.Throws<ArgumentException>(() => StudyDocument.FromJson(node.ToJsonString()));
        node["comparison"] = null;
        node["groups"]!["peaks"] = null;
        Assert.Contains("groups", Assert.Throws<ArgumentException>(() => StudyDocument.FromJson(node.ToJsonString())).Message, StringComparison.Ordinal);
    }

    // Members were added after the first documents were written: those still read.
    [Fact]
    public void FromJson_WithoutTheLaterMembers_StillReads()
    {
        var node = System.Text.Json.Nodes.JsonNode.Parse(DensityStudy.Of(s_eruptions, new StudyOptions { Points = 51 }).ToJson())!.AsObject();
        foreach (string member in new[] { "groups", "comparison", "atHalf", "atDouble", "plan" })
        {
            Assert.True(node.Remove(member), member);
        }

        StudyDocument document = StudyDocument.FromJson(node.ToJsonString());
        Assert.Null(document.Groups);
        Assert.Equal(272, document.Data.Count);
    }

    [Fact]
    public void Seed_Another_ChangesOnlyWhatIsDrawn()
    {
        string Text(ulong seed) => DensityStudy.Of(s_eruptions, new StudyOptions { Seed = seed }).ToJson();
        Assert.Equal(Text(1), Text(1));
        StudyDocument first = StudyDocument.FromJson(Text(1));
        StudyDocument second = StudyDocument.FromJson(Text(2));
        Assert.Equal(first.Curve.Upper, second.Curve.Upper);
        Assert.NotEqual(first.Groups!.DipPValue + first.Groups.Tests.Sum(t => t.PValue), second.Groups!.DipPValue + second.Groups.Tests.Sum(t => t.PValue));
    }

    private static double[] Normal(int count, ulong seed)
    {
        var random = new RandomStream(seed);
        var values = new double[count];
        for (int i = 0; i < count; i++)
        {
            values[i] = random.NextNormal();
        }

        return values;
    }

    private sealed class Told : IProgress<double>
    {
        public List<double> Values { get; } = [];

        public void Report(double value) => Values.Add(value);
    }
}
