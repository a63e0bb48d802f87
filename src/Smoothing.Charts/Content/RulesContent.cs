using Smoothing.Bandwidths;
using Smoothing.Charts.Drawing;
using Smoothing.Estimation;
using Smoothing.Numerics;

namespace Smoothing.Charts.Content;

/// <summary>The curve as each rule would draw it, one above the other, from the smoothest to the most detailed.</summary>
internal static class RulesContent
{
    private const int Points = 301;
    private const double Height = 0.86;

    public static IReadOnlyList<BandwidthRule> All { get; } =
    [
        BandwidthRule.NormalReference, BandwidthRule.Oversmoothed, BandwidthRule.SheatherJones, BandwidthRule.DirectPlugIn, BandwidthRule.DiffusionFixedPoint,
        BandwidthRule.LeastSquaresCrossValidation, BandwidthRule.BiasedCrossValidation, BandwidthRule.OneSidedCrossValidation, BandwidthRule.LikelihoodCrossValidation, BandwidthRule.BlockSpectrum,
    ];

    public static Sheet Of(DensityStudy study, IReadOnlyList<BandwidthRule> rules)
    {
        var view = new StudyView(study);
        List<Row> rows = [new(Words.Sentence(Words.Rule(study.Bandwidth)) + ", chosen", study.Bandwidth, Sign(study.Bandwidth), true)];
        List<string> silent = [];
        foreach (BandwidthRule rule in rules.Distinct())
        {
            try
            {
                BandwidthChoice choice = BandwidthRules.Choose(rule, study.CurveSample, study.Options.Kernel, new BandwidthOptions { Support = study.Options.Support });
                rows.Add(new Row(Words.Sentence(BandwidthRules.NameOf(rule)), choice, Sign(choice), false));
            }
            catch (ArgumentException)
            {
                silent.Add(BandwidthRules.NameOf(rule));
            }
        }

        rows = [.. rows.OrderBy(r => r.Bandwidth).ThenBy(r => r.Chosen)];
        double[] x = [.. Enumerable.Range(0, Points).Select(i => view.Range.Lower + (view.Range.Length * i / (Points - 1)))];
        double[][] curves = [.. rows.Select(row => Curve(study, row.Bandwidth, x))];
        var marks = new List<Mark>();

        // All rows to one scale, so that heights can be compared.
        double scale = Height / Math.Max(curves.Max(c => c.Max()), double.Epsilon);
        for (int i = rows.Count - 1; i >= 0; i--)
        {
            double ground = i;
            double[] y = [.. curves[i].Select(f => ground + (scale * Math.Max(f, 0)))];
            marks.Add(new AreaMark(x, [.. x.Select(_ => ground)], y, rows[i].Chosen ? Tone.Interval : Tone.Open));
            marks.Add(LineMark.Straight(view.Range.Lower, ground, view.Range.Upper, ground, Tone.Grid, 1));
            marks.Add(new LineMark(x, y, rows[i].Chosen ? Tone.Curve : Tone.Third, rows[i].Chosen ? 2.8f : 1.6f));
        }

        string[] notes =
        [
            Check.Text($"n = {Words.Count(study.Sample.Count)}, {study.Options.Kernel.Name} kernel; h stands at the right. All curves have one scale."),
            .. rows.Any(r => r.Sign == "*") ? ["* The rule found nothing and another stands in."] : Array.Empty<string>(),
            .. rows.Any(r => r.Sign == "†") ? ["† Raised to the least bandwidth that the rounding of the values allows."] : Array.Empty<string>(),
            .. silent.Count > 0 ? [Check.Text($"Cannot choose from these values: {string.Join(", ", silent)}.")] : Array.Empty<string>(),
        ];
        return new Sheet
        {
            Title = Check.Text($"{view.Title}: the rules side by side"),
            Alternative = Check.Text($"The curve under {rows.Count} choices of the bandwidth, from {Words.WithUnit(Words.Three(rows[0].Bandwidth), view.Unit)} to {Words.WithUnit(Words.Three(rows[^1].Bandwidth), view.Unit)}; chosen: {Words.WithUnit(Words.Three(study.Bandwidth), view.Unit)}."),
            Panels =
            [
                new Panel
                {
                    X = view.Axis,
                    Y = AxisScale.Marked(-0.15, rows.Count, [.. rows.Select((r, i) => (i + 0.3, r.Name))]),
                    XCaption = view.Caption,
                    Marks = marks,
                    Beside = [.. rows.Select((r, i) => (i + 0.3, Words.WithUnit(Words.Three(r.Bandwidth), view.Unit) + r.Sign))],
                    Grid = false,
                },
            ],
            Notes = notes,
        };
    }

    private static string Sign(BandwidthChoice choice) => choice.Status switch
    {
        BandwidthStatus.Replaced => "*",
        BandwidthStatus.RoundingFloor => "†",
        _ => "",
    };

    private static double[] Curve(DensityStudy study, double bandwidth, double[] x)
    {
        Density density = Density.Of(study.CurveSample, study.Options.Kernel, bandwidth, study.Density.Options);
        var y = new double[x.Length];
        Interval support = study.Options.Support ?? Interval.WholeLine;
        density.Values([.. x.Select(at => Math.Clamp(at, support.Lower, support.Upper))], y);
        for (int i = 0; i < x.Length; i++)
        {
            y[i] = support.Contains(x[i]) ? y[i] : 0;
        }

        return y;
    }

    private sealed record Row(string Name, double Bandwidth, string Sign, bool Chosen);
}
