using Smoothing.Numerics;

namespace Smoothing.Inference;

/// <summary>What the data say about the number of groups: a lower bound for the number of peaks, the tests behind it, and the curve's peaks.</summary>
public sealed class GroupEvidence
{
    internal GroupEvidence(IReadOnlyList<GroupTest> tests, double dip, double dipPValue, double significance, double level, double bandwidth, IReadOnlyList<GroupPeak> peaks, double effectiveCount, IReadOnlyList<(GroupWarning Kind, string Text)> findings)
    {
        Tests = tests;
        Dip = dip;
        DipPValue = dipPValue;
        Significance = significance;
        Level = level;
        Bandwidth = bandwidth;
        Peaks = peaks;
        EffectiveCount = effectiveCount;
        Findings = findings;
        Warnings = Array.AsReadOnly([.. findings.Select(f => f.Text)]);
        AtLeast = 1;
        foreach (GroupTest test in tests)
        {
            if (!test.IsRejected)
            {
                break;
            }

            AtLeast = test.Peaks + 1;
        }
    }

    /// <summary>The number of peaks that the data establish at <see cref="Significance"/>: a lower bound. 1 when nothing more is shown.</summary>
    public int AtLeast { get; }

    /// <summary>The tests from one peak up, to the first that is not rejected; empty where nothing can be said.</summary>
    public IReadOnlyList<GroupTest> Tests { get; }

    /// <summary>Hartigan's dip of the values, in (0, 0.25]; NaN where nothing can be said or weights are relative.</summary>
    public double Dip { get; }

    /// <summary>Its p-value against uniform samples: a second opinion that is never too quick to see groups, and often too slow. NaN with <see cref="Dip"/>.</summary>
    public double DipPValue { get; }

    /// <summary>Whether the dip alone also rejects one peak.</summary>
    public bool DipAgrees => DipPValue <= Significance;

    /// <summary>Significance level of the tests.</summary>
    public double Significance { get; }

    /// <summary>Confidence level of the peaks' intervals.</summary>
    public double Level { get; }

    /// <summary>Bandwidth of the curve whose peaks are listed, for the Gaussian kernel, in the unit of the data; NaN where nothing can be said.</summary>
    public double Bandwidth { get; }

    /// <summary>The peaks of that curve from left to right, on the central 95 % of the data; empty where nothing can be said.</summary>
    public IReadOnlyList<GroupPeak> Peaks { get; }

    /// <summary>n as the tests used it.</summary>
    public double EffectiveCount { get; }

    /// <summary>Where the tests are known to be too quick to see groups, and what else a reader must know; usually empty.</summary>
    public IReadOnlyList<string> Warnings { get; }

    /// <summary>The warnings with what each is about.</summary>
    internal IReadOnlyList<(GroupWarning Kind, string Text)> Findings { get; }

    /// <summary>The finding in words.</summary>
    public string Sentence
    {
        get
        {
            if (Tests.Count == 0)
            {
                return Guard.Text($"With {EffectiveCount:G6} values as they are, nothing can be said about groups.");
            }

            string level = Guard.Text($"At the {100 * Significance:G3} % level the data (central 95 %)");
            string bands = string.Join(", ", Tests.Select(test => Guard.Text($"{test.CriticalBandwidth:G4}")));
            string shown = Guard.Text($"Critical bandwidths {bands}; the curve with h = {Bandwidth:G4} has {Count(Peaks.Count)}.");
            if (AtLeast == 1)
            {
                string second = double.IsNaN(DipPValue) ? "" : DipAgrees ? " The dip alone would see more than one." : " The dip agrees.";
                string extra = Peaks.Count > 1 ? " More than one is not established." : "";
                return Guard.Text($"{level} do not contradict one peak (p = {Tests[0].PValue:G2}).{second} {shown}{extra}");
            }

            string against = string.Join(" and ", Tests.Where(test => test.IsRejected).Select(test => Count(test.Peaks)));
            string dip = double.IsNaN(DipPValue) ? "" : DipAgrees ? " The dip alone rejects one peak too." : " The dip alone, which is slower, does not reject one peak.";
            string open = Peaks.Count > AtLeast ? Guard.Text($" The other {Peaks.Count - AtLeast} are not established.") : "";
            return Guard.Text($"{level} contradict {against}: at least {AtLeast} peaks. This is a lower bound; the test is cautious, and further small peaks are not excluded.{dip} {shown}{open}");
        }
    }

    /// <summary>The finding in words.</summary>
    /// <returns><see cref="Sentence"/>.</returns>
    public override string ToString() => Sentence;

    private static string Count(int peaks) => peaks == 1 ? "one peak" : peaks == 2 ? "two peaks" : Guard.Text($"{peaks} peaks");
}
