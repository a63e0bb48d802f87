using Smoothing.Charts.Drawing;
using Smoothing.Inference;
using Smoothing.Theory;

namespace Smoothing.Charts.Content;

/// <summary>Squared bias, variance and their sum against the bandwidth.</summary>
internal static class ErrorContent
{
    private const int Points = 61;

    // The axis reaches this factor beyond the best and the chosen bandwidth.
    private const double Reach = 4;

    // Errors beyond this multiple of the smallest are cut off.
    private const double Ceiling = 4;

    public static Sheet Of(DensityStudy study)
    {
        var view = new StudyView(study);
        string title = Check.Text($"{view.Title}: error against the bandwidth");
        if (study.Uncertainty is not { } trust)
        {
            const string Why = "The error cannot be worked out: that takes at least three values that are not all equal.";
            return Bare(title, Why, view.Method);
        }

        NormalMixture target = EstimatedTarget.Of(study.CurveSample, trust.PilotBandwidth);
        var theory = new ErrorTheory(study.Options.Kernel, target);
        long n = Math.Max(1, (long)Math.Round(trust.EffectiveCount));
        string about = Check.Text($"Worked out for n = {Words.Count(n)} and a density estimated from the values with smoothing {Words.WithUnit(Words.Three(trust.PilotBandwidth), view.Unit)}; {study.Options.Kernel.Name} kernel.");
        string limits = study.Options.Support is null ? "" : " Known limits of the range are not allowed for.";
        return Draw(theory, n, study.Bandwidth, null, title, view.Unit, about + limits);
    }

    public static Sheet Of(ErrorTheory theory, long n, double? chosen, double? at, string unit)
    {
        string place = at is { } x ? Check.Text($" at {Words.WithUnit(Words.AsGiven(x), unit)}") : "";
        return Draw(theory, n, chosen, at, Check.Text($"Error{place} against the bandwidth"), unit, Check.Text($"Exact for the {theory.Target.Name} target, n = {Words.Count(n)}, {theory.Kernel.Name} kernel."));
    }

    private static Sheet Draw(ErrorTheory theory, long n, double? chosen, double? at, string title, string unit, string about)
    {
        (double Bias, double Variance) Error(double h)
        {
            double bias = at is { } x ? theory.Bias(x, h) : 0;
            return at is { } place ? (bias * bias, theory.Variance(place, h, n)) : (theory.IntegratedSquaredBias(h), theory.IntegratedVariance(h, n));
        }

        double best = Best(theory, n, at, chosen);
        double low = Math.Min(best, chosen ?? best) / Reach;
        double high = Math.Max(best, chosen ?? best) * Reach;

        // Closer and closer to the best, which at a single place can be a narrow dip where the bias changes its sign.
        double[] h =
        [
            .. Enumerable.Range(0, Points).Select(i => low * Math.Pow(high / low, i / (Points - 1.0)))
                .Concat(Enumerable.Range(0, 8).SelectMany(k => new[] { best * Math.Exp(0.2 * Math.Pow(0.5, k)), best * Math.Exp(-0.2 * Math.Pow(0.5, k)) }))
                .Append(best).Order(),
        ];
        (double Bias, double Variance)[] errors = [.. h.Select(Error)];
        (double bestBias, double bestVariance) = Error(best);
        double smallest = bestBias + bestVariance;
        double[] sum = [.. errors.Select(e => (e.Bias + e.Variance) / smallest)];
        List<Mark> marks =
        [
            new LineMark(h, [.. errors.Select(e => e.Bias / smallest)], Tone.Second, 2.2f, Dash.Long, KeepClear: true),
            new LineMark(h, [.. errors.Select(e => e.Variance / smallest)], Tone.Third, 2.2f, Dash.Short, KeepClear: true),
            new LineMark(h, sum, Tone.Curve, 2.8f, KeepClear: true),
            new PointMark(best, 1, Tone.Curve, Shape.Disc, 9),
        ];
        List<Label> labels = [];
        string alternative = Check.Text($"The error is smallest at h = {Words.WithUnit(Words.Three(best), unit)}.");
        if (chosen is { } mine)
        {
            (double bias, double variance) = Error(mine);
            string times = Check.Text($"{Words.Three((bias + variance) / smallest)} times the smallest error");
            marks.Add(LineMark.Straight(mine, 0, mine, Ceiling, Tone.Limit, 2, Dash.Long, keepClear: true));
            labels.Add(new Label(Check.Text($"chosen h = {Words.WithUnit(Words.Three(mine), unit)}"), mine, Ceiling, Standing.Top, Tone.Limit));
            alternative += Check.Text($" The chosen h = {Words.WithUnit(Words.Three(mine), unit)} has {times}, {100 * bias / (bias + variance):F0} % of it squared bias.");
        }

        return new Sheet
        {
            Title = title,
            Alternative = alternative,
            Keys =
            [
                new Key("mean squared error", Tone.Curve, Swatch.Line, Width: 2.8f),
                new Key("squared bias", Tone.Second, Swatch.Line, Dash.Long),
                new Key("variance", Tone.Third, Swatch.Line, Dash.Short),
                new Key(Check.Text($"smallest at h = {Words.WithUnit(Words.Three(best), unit)}"), Tone.Curve, Swatch.Point),
            ],
            Panels =
            [
                new Panel
                {
                    X = AxisScale.Logarithmic(low, high),
                    Y = AxisScale.Linear(0, Ceiling, 4),
                    XCaption = "bandwidth h" + (unit.Length > 0 ? ", " + unit : ""),
                    YCaption = at is null ? "integrated error, smallest = 1" : "error at the place, smallest = 1",
                    Marks = marks,
                    Labels = labels,
                },
            ],
            Notes = [alternative + " " + about],
        };
    }

    private static double Best(ErrorTheory theory, long n, double? at, double? chosen)
    {
        try
        {
            return at is { } x ? theory.OptimalBandwidthAt(x, n) : theory.OptimalBandwidth(n);
        }
        catch (InvalidOperationException) when (chosen is not null)
        {
            // No minimum inside any sensible range: the picture is drawn around the chosen one.
            return chosen.Value;
        }
    }

    private static Sheet Bare(string title, string why, string note) => new()
    {
        Title = title,
        Alternative = why,
        Panels = [new Panel { X = AxisScale.Marked(0, 1, []), Y = AxisScale.Marked(0, 1, []), XCaption = "bandwidth h", Statement = why }],
        Notes = [note],
    };
}
