using System.Globalization;
using Smoothing.Bandwidths;
using Smoothing.Kernels;
using Smoothing.Samples;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Bandwidths;

/// <summary>Roots and minima against Data/reference_bandwidths.csv (exact double sums over all pairs, an independent program).</summary>
public class ReferenceBandwidthTests
{
    private static readonly ILookup<(string Data, string Quantity), double> s_reference = File.ReadLines(TestData.PathOf("reference_bandwidths.csv"))
        .Skip(2)
        .Select(line => line.Split(','))
        .ToLookup(p => (p[0], p[1]), p => double.Parse(p[2], CultureInfo.InvariantCulture));

    private static readonly BandwidthOptions s_plain = new() { RoundingUnit = 0 };

    public static TheoryData<string> AllSets => new(s_reference.Select(g => g.Key.Data).Distinct());

    [Theory]
    [MemberData(nameof(AllSets))]
    public void NormalReference_SharedData_MatchesBothScales(string data)
    {
        Near.Relative(One(data, "h_normal_min"), BandwidthRules.NormalReference(Load(data), Kernel.Gaussian, s_plain), 1e-12, data);
        Near.Relative(One(data, "h_normal_sd"), BandwidthRules.NormalReference(Load(data), Kernel.Gaussian, s_plain with { Scale = BandwidthScale.StandardDeviation }), 1e-12, data);
    }

    [Theory]
    [MemberData(nameof(AllSets))]
    public void Oversmoothed_SharedData_MatchesTerrell(string data) =>
        Near.Relative(One(data, "h_oversmoothed"), BandwidthRules.Oversmoothed(Load(data), Kernel.Gaussian, s_plain), 1e-12, data);

    [Theory]
    [MemberData(nameof(AllSets))]
    public void SheatherJones_SharedData_MatchesPublishedAndExactForms(string data)
    {
        BandwidthChoice published = BandwidthRules.SheatherJones(Load(data), Kernel.Gaussian, s_plain with { Scale = BandwidthScale.InterquartileRange });
        Near.Relative(One(data, "sj_published"), published, 1e-9, data);
        BandwidthChoice exact = BandwidthRules.SheatherJones(Load(data), Kernel.Gaussian, s_plain);
        Near.Relative(One(data, "sj_exact_nn1"), exact, 1e-9, data);
        Assert.Single(exact.Roots);
        Assert.Equal(BandwidthStatus.Found, exact.Status);
    }

    [Theory]
    [MemberData(nameof(AllSets))]
    public void DiffusionFixedPoint_SharedData_FindsTheReferenceRoots(string data)
    {
        double[] expected = [.. s_reference[(data, "fixed_point_from_6_root")]];
        BandwidthChoice choice = BandwidthRules.DiffusionFixedPoint(Load(data), Kernel.Gaussian, s_plain with { HighestDerivative = 6 });
        // The reference was scanned up to 1.5 times the oversmoothed bandwidth; the rule's own scan goes further.
        double[] inside = [.. choice.Roots.Where(h => h <= 1.5 * One(data, "h_oversmoothed"))];
        Assert.Equal(expected.Length, inside.Length);
        for (int i = 0; i < inside.Length; i++)
        {
            Near.Relative(expected[i], inside[i], 1e-8, data);
        }

        if (expected.Length == 0)
        {
            Assert.Equal(BandwidthStatus.Replaced, choice.Status);
            Assert.Equal(BandwidthRule.SheatherJones, choice.ReplacedBy);
        }
    }

    private static double One(string data, string quantity) => s_reference[(data, quantity)].Last();

    private static Sample Load(string data) => Sample.Of(TestData.Load(data));
}
