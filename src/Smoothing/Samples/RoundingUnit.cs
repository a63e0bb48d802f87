namespace Smoothing.Samples;

/// <summary>The step that the values of a sample are multiples of, with the evidence for it.</summary>
/// <remarks>
/// Read from <see cref="Sample.RoundingUnit"/>. It is a statement about the data and is acted on by no one silently.
/// A curve cannot show anything finer than about half this step.
/// </remarks>
public sealed record RoundingUnit
{
    internal RoundingUnit(double step, double printedStep, double share, double expectedShare) =>
        (Step, PrintedStep, Share, ExpectedShare) = (step, printedStep, share, expectedShare);

    /// <summary>The largest step found of which at least 95 % of the weight are multiples, in the unit of the data; above 0.</summary>
    public double Step { get; }

    /// <summary>
    /// The decimal place the values are printed to, such as 0.001, in the unit of the data; not above <see cref="Step"/>.
    /// It differs from the step where values were rounded twice: seconds printed as minutes with three decimals have the
    /// step 1/60 and the printed step 0.001.
    /// </summary>
    public double PrintedStep { get; }

    /// <summary>Share of the weight that lies on multiples of <see cref="Step"/>, in [0.95, 1].</summary>
    public double Share { get; }

    /// <summary>
    /// Share that would lie on multiples by chance if the values were rounded to <see cref="PrintedStep"/> alone, in [0, 1].
    /// Where step and printed step agree it is the chance that an unrounded number looks like a multiple, practically 0.
    /// </summary>
    public double ExpectedShare { get; }
}
