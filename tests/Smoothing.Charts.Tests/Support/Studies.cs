using Smoothing.Numerics;
using Smoothing.Samples;
using Smoothing.Theory;

namespace Smoothing.Charts.Tests.Support;

/// <summary>Invented studies that the figures must cope with.</summary>
internal static class Studies
{
    public static NormalMixture TwoHumps { get; } = new([0.8, 0.2], [22, 48], [5, 4]);

    /// <summary>The ordinary case: 400 values, a limit inside, a known lower end.</summary>
    public static DensityStudy Ordinary { get; } = DensityStudy.Of(TwoHumps.Draw(400, 11), new StudyOptions { Name = "Stay", Unit = "min", Limits = [45], Support = new Interval(-100, double.PositiveInfinity) });

    public static DensityStudy One { get; } = DensityStudy.Of([5.0], new StudyOptions { Name = "One", Bandwidth = 1, Limits = [4] });

    public static IEnumerable<(string Name, Lazy<DensityStudy> Study)> Hard { get; } =
    [
        ("one value", new(() => One)),
        ("two values", new(() => DensityStudy.Of([5.0, 6.0], new StudyOptions { Name = "Two" }))),
        ("ten values", new(() => DensityStudy.Of(TwoHumps.Draw(10, 3), new StudyOptions { Name = "Ten", Unit = "min", Limits = [30] }))),
        ("a million values", new(() => DensityStudy.Of(Million, new StudyOptions { Name = "Million", Unit = "mm", Limits = [40, 60] }))),
        ("heaped values", new(() => DensityStudy.Of([.. TwoHumps.Draw(500, 4).Select((v, i) => Math.Round(v / (i % 2 == 0 ? 5 : 1)) * (i % 2 == 0 ? 5 : 1))], new StudyOptions { Name = "Heaped", Unit = "min" }))),
        ("a limit far outside", new(() => DensityStudy.Of(TwoHumps.Draw(200, 5), new StudyOptions { Name = "Far", Unit = "min", Limits = [5000, -5000] }))),
        ("a limit just outside", new(() => DensityStudy.Of(TwoHumps.Draw(200, 5), new StudyOptions { Name = "Near", Unit = "min", Limits = [75] }))),
        ("many limits", new(() => DensityStudy.Of(TwoHumps.Draw(200, 6), new StudyOptions { Name = "Many", Unit = "min", Limits = [20, 21, 22, 30, 40, 50] }))),
        ("a point mass", new(() => DensityStudy.Of([.. TwoHumps.Draw(300, 7), .. new double[60]], new StudyOptions { Name = "Rain", Unit = "mm" }))),
        ("tiny values", new(() => DensityStudy.Of([.. TwoHumps.Draw(60, 8).Select(v => v * 1e-40)], new StudyOptions { Name = "Tiny" }))),
        ("huge values", new(() => DensityStudy.Of([.. TwoHumps.Draw(60, 8).Select(v => v * 1e40)], new StudyOptions { Name = "Huge", Limits = [1e41] }))),
        ("values near a limit", new(() => DensityStudy.Of([.. TwoHumps.Draw(300, 9).Select(v => Math.Abs(v - 22))], new StudyOptions { Name = "Ends", Unit = "s", Support = new Interval(0, double.PositiveInfinity), Limits = [1] }))),
        ("a long hostile name", new(() => DensityStudy.Of(TwoHumps.Draw(50, 10), new StudyOptions { Name = "<script>alert('&\"')</script> " + new string('x', 10_000), Unit = "\u05D3\u05E7\u05D5\u05EA", Limits = [30] }))),
    ];

    // A million observations as counts on a grid of a hundredth: as many values one by one take a study some seconds.
    private static Sample Million
    {
        get
        {
            double[] grid = [.. Enumerable.Range(0, 8000).Select(i => i / 100.0)];
            double[] counts = [.. grid.Select(x => Math.Round(TwoHumps.Value(x) * 10_000))];
            double[] kept = [.. grid.Where((_, i) => counts[i] > 0)];
            return Sample.Of(kept, new SampleOptions { Weights = (double[])[.. counts.Where(c => c > 0)], WeightMeaning = WeightMeaning.Counts });
        }
    }
}
