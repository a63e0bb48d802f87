using Smoothing.Numerics;

namespace Smoothing.Inference;

/// <summary>Whether and where two samples differ.</summary>
public sealed class ComparisonResult
{
    internal ComparisonResult(
        double pValue, int permutations, double bandwidth, DifferenceBand band, DifferenceBand common, IReadOnlyList<QuantileShift> shifts, string firstName, string secondName, string unit, IReadOnlyList<string> notes)
    {
        PValue = pValue;
        Permutations = permutations;
        Bandwidth = bandwidth;
        Band = band;
        CommonBand = common;
        Shifts = shifts;
        FirstName = firstName;
        SecondName = secondName;
        Unit = unit;
        Notes = notes;
    }

    /// <summary>How often samples of one population, divided by chance, differ at least as much; in [1/(<see cref="Permutations"/> + 1), 1].</summary>
    public double PValue { get; }

    /// <summary>Permutations behind <see cref="PValue"/>.</summary>
    public int Permutations { get; }

    /// <summary>The pooled bandwidth; the test looks at 1, 2, 4 and 8 times it.</summary>
    public double Bandwidth { get; }

    /// <summary>By how much the densities differ and where: each sample at its own bandwidth, or both at the smaller one with fewer than 200 values or sizes more than 3 : 1.</summary>
    public DifferenceBand Band { get; }

    /// <summary>Whether they differ at all, seen as a band: both samples at the smaller bandwidth, so that equal densities have equal bias.</summary>
    public DifferenceBand CommonBand { get; }

    /// <summary>Shifts of the quantiles asked for.</summary>
    public IReadOnlyList<QuantileShift> Shifts { get; }

    /// <summary>Name of the first sample; "the first sample" when it has none.</summary>
    public string FirstName { get; }

    /// <summary>Name of the second sample; "the second sample" when it has none.</summary>
    public string SecondName { get; }

    /// <summary>Unit of both; may be empty.</summary>
    public string Unit { get; }

    /// <summary>What a reader must know beside the numbers; empty when there is nothing.</summary>
    public IReadOnlyList<string> Notes { get; }

    /// <summary>The finding in words.</summary>
    public string Sentence
    {
        get
        {
            double significance = 1 - Band.Level;
            string test = Guard.Text($"p = {PValue:G2}, {Permutations} permutations");
            if (PValue > significance)
            {
                return Guard.Text($"A difference between {FirstName} and {SecondName} is not shown ({test}). That is no proof that there is none: the band says how large it could be.");
            }

            string where = string.Join("; ", Places(Band.Higher, "has more").Concat(Places(Band.Lesser, "has fewer")));
            string tail = where.Length > 0 ? Guard.Text($": {SecondName} {where}.") : "; where is not told at this level.";
            return Guard.Text($"{FirstName} and {SecondName} differ ({test}){tail}");
        }
    }

    /// <summary>The finding in words.</summary>
    /// <returns><see cref="Sentence"/>.</returns>
    public override string ToString() => Sentence;

    private IEnumerable<string> Places(IReadOnlyList<Interval> stretches, string what) =>
        stretches.Select(s => Guard.Text($"{what} between {s.Lower:G4} and {s.Upper:G4}{(Unit.Length > 0 ? " " + Unit : "")}"));
}
