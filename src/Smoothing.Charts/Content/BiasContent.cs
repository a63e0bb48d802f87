using Smoothing.Charts.Drawing;
using Smoothing.Inference;
using Smoothing.Kernels;

namespace Smoothing.Charts.Content;

/// <summary>The curve and, beside it, where the truth probably runs: how much too low or too high smoothing makes it.</summary>
internal static class BiasContent
{
    // Where the curve is lower than this share of its highest point a correction in percent says nothing.
    private const double Foot = 0.03;
    private const int MostLabels = 7;

    public static Sheet Of(DensityStudy study)
    {
        var view = new StudyView(study);
        var marks = new List<Mark>();
        var labels = new List<Label>();
        List<Key> keys = [new("estimated density", Tone.Trace, Swatch.Line, Width: 2.6f)];
        double top = view.Top;
        string alternative = "The curve alone: nothing can be said about its bias.";
        string note = "How far the curve is off cannot be said: that takes at least three values that are not all equal.";
        if (study.Uncertainty is { } trust)
        {
            Stretch[] stretches = [.. Stretches(view, trust)];
            foreach (Stretch stretch in stretches)
            {
                marks.Add(new AreaMark(stretch.X, stretch.Lower, stretch.Upper, stretch.Tone));
                top = Math.Max(top, stretch.Upper.Max());
            }

            keys.Add(new Key("truth probably higher", Tone.Up, Swatch.Area));
            keys.Add(new Key("truth probably lower", Tone.Down, Swatch.Area));
            keys.Add(new Key("cannot be told", Tone.Open, Swatch.Area));
            foreach (Stretch stretch in stretches.Where(s => s.Tone != Tone.Open && s.Most >= 0).OrderByDescending(s => s.Weight).Take(MostLabels))
            {
                bool up = stretch.Tone == Tone.Up;
                double x = stretch.X[stretch.Most];
                double middle = (stretch.Lower[stretch.Most] + stretch.Upper[stretch.Most]) / 2;
                marks.Add(new PointMark(x, middle, Tone.Trace, up ? Shape.Up : Shape.Down, 9));
                labels.Add(new Label(Amount(stretch, up), x, up ? stretch.Upper[stretch.Most] : middle, up ? Standing.Above : Standing.Beside));
            }

            alternative = Alternative(view, stretches);
            note = Check.Text($"Estimated smoothing bias ± 2 standard errors; such estimates are right to about half of their size and rather understate.");
        }

        double ceiling = 1.16 * top;
        marks.Add(LineMark.Straight(view.Range.Lower, 0, view.Range.Upper, 0, Tone.Quiet, 1));
        marks.Add(new LineMark(view.X, view.Percent, Tone.Trace, 2.6f, KeepClear: true));
        return new Sheet
        {
            Title = Check.Text($"{view.Title}: where the curve is too low or too high"),
            Alternative = alternative,
            Keys = keys,
            Panels = [new Panel { X = view.Axis, Y = AxisScale.Linear(0, ceiling, 5), XCaption = view.Caption, YCaption = view.DensityCaption, Marks = marks, Labels = labels }],
            Notes = [view.Method + " " + note],
        };
    }

    /// <summary>Where the truth probably runs, cut where the statement changes.</summary>
    internal static IEnumerable<Stretch> Stretches(StudyView view, Uncertainty trust)
    {
        double[] x = [.. view.X];
        var bias = new double[x.Length];
        trust.Biases(x, bias);
        var lower = new double[x.Length];
        var upper = new double[x.Length];
        var tones = new Tone[x.Length];
        for (int i = 0; i < x.Length; i++)
        {
            double f = Math.Max(view.Study.Curve.Y[i], 0);
            double error = 2 * StandardError(view.Study, trust, f);
            (lower[i], upper[i]) = (100 * view.Share * Math.Max(f - bias[i] - error, 0), 100 * view.Share * Math.Max(f - bias[i] + error, 0));
            tones[i] = -bias[i] - error > 0 ? Tone.Up : -bias[i] + error < 0 ? Tone.Down : Tone.Open;
        }

        for (int start = 0, i = 1; i <= x.Length; i++)
        {
            if (i == x.Length || tones[i] != tones[start])
            {
                // One point of the neighbour closes the gap between two stretches.
                int end = Math.Min(i, x.Length - 1);
                int most = -1;
                double weight = 0;
                for (int j = start; j < i; j++)
                {
                    if (view.Percent[j] > Foot * view.Top && Math.Abs(bias[j]) > weight)
                    {
                        (most, weight) = (j - start, Math.Abs(bias[j]));
                    }
                }

                yield return new Stretch(x[start..(end + 1)], lower[start..(end + 1)], upper[start..(end + 1)], tones[start], most, weight, most < 0 ? 1 : view.Percent[start + most]);
                start = i;
            }
        }
    }

    /// <summary>The standard error of the estimated bias: (h²/2)√{R(φ'') f̂/(n g⁵)}, as <see cref="Uncertainty.BiasAt"/> states it, without a sum over the values for each place.</summary>
    internal static double StandardError(DensityStudy study, Uncertainty trust, double density)
    {
        double h = study.Density.Bandwidth * Kernel.Gaussian.CanonicalBandwidth / study.Options.Kernel.CanonicalBandwidth;
        return h * h / 2 * Math.Sqrt(Kernel.Gaussian.Roughness(2) * density / (trust.EffectiveCount * Math.Pow(trust.PilotBandwidth, 5)));
    }

    private static string Amount(Stretch stretch, bool up)
    {
        double least = 100 * ((up ? stretch.Lower[stretch.Most] : stretch.Upper[stretch.Most]) / stretch.Curve - 1);
        double most = 100 * ((up ? stretch.Upper[stretch.Most] : stretch.Lower[stretch.Most]) / stretch.Curve - 1);
        // Whole percents, or two digits of the larger where both are small.
        double unit = Math.Max(Math.Abs(most), 1e-3) / 2;
        string from = Math.Abs(most) >= 3 ? Check.Text($"{Math.Abs(least):F0}") : Words.Rounded(Math.Abs(least), unit);
        string to = Math.Abs(most) >= 3 ? Check.Text($"{Math.Abs(most):F0}") : Words.Rounded(Math.Abs(most), unit);
        return Check.Text($"{from} to {to} % {(up ? "higher" : "lower")}");
    }

    private static string Alternative(StudyView view, Stretch[] stretches)
    {
        string[] parts = [.. stretches.Where(s => s.Tone != Tone.Open && s.Most >= 0).OrderByDescending(s => s.Weight).Take(4)
            .Select(s => Check.Text($"near {view.Place(s.X[s.Most])} the truth is probably {Amount(s, s.Tone == Tone.Up)}"))];
        return parts.Length == 0 ? "Nowhere can it be told whether the curve is too low or too high." : Words.Sentence(string.Join("; ", parts)) + ".";
    }

    /// <summary>A stretch of one statement: the range of the truth in percent per unit, the place of the largest bias (−1: none worth a word), its size, and the curve there.</summary>
    internal sealed record Stretch(double[] X, double[] Lower, double[] Upper, Tone Tone, int Most, double Weight, double Curve);
}
