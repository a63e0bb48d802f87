using Smoothing.Numerics;

namespace Smoothing.Inference;

/// <summary>How far smoothing pushes the curve off the truth at one place: an estimate with its standard error.</summary>
public sealed record BiasStatement
{
    internal BiasStatement(double x, double density, double estimate, double standardError) =>
        (X, Density, Estimate, StandardError) = (x, density, estimate, standardError);

    /// <summary>The place, in the unit of the data.</summary>
    public double X { get; }

    /// <summary>The curve there, f̂(x), in 1/unit.</summary>
    public double Density { get; }

    /// <summary>Estimated E f̂(x) − f(x), in 1/unit: negative where the curve is too low (peaks), positive where it is too high (valleys).</summary>
    public double Estimate { get; }

    /// <summary>Standard error of <see cref="Estimate"/>, in 1/unit.</summary>
    public double StandardError { get; }

    /// <summary>Where the truth probably lies relative to the curve: −(estimate ± 2 standard errors)/f̂, as a fraction of the curve's height; the whole line where the curve is 0.</summary>
    public Interval RelativeCorrection => Density > 0
        ? new Interval((-Estimate - (2 * StandardError)) / Density, (-Estimate + (2 * StandardError)) / Density)
        : Interval.WholeLine;

    /// <summary>The statement in words, with the caution that such estimates are typically right to about half of their size and tend to understate peaks.</summary>
    public string Sentence
    {
        get
        {
            Interval relative = RelativeCorrection;
            if (relative.Lower > 0)
            {
                return Guard.Text($"The truth is probably {100 * relative.Lower:F0} to {100 * relative.Upper:F0} % higher than drawn here; such estimates are right to about half of their size and rather understate.");
            }

            return relative.Upper < 0
                ? Guard.Text($"The truth is probably {-100 * relative.Upper:F0} to {Math.Min(-100 * relative.Lower, 100):F0} % lower than drawn here; such estimates are right to about half of their size and rather understate.")
                : "Whether the curve is too high or too low here cannot be told from these data.";
        }
    }
}
