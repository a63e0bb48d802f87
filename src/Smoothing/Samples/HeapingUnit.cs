namespace Smoothing.Samples;

/// <summary>A coarse step whose multiples hold more values than a smooth distribution puts there, with the evidence.</summary>
/// <remarks>Read from <see cref="Sample.HeapingUnit"/>: people who write down 25 when it was 23 or 26, scales read to the next mark.</remarks>
public sealed record HeapingUnit
{
    internal HeapingUnit(double step, double share, double expectedShare) => (Step, Share, ExpectedShare) = (step, share, expectedShare);

    /// <summary>The step, coarser than the rounding unit, in the unit of the data; above 0.</summary>
    public double Step { get; }

    /// <summary>Share of the weight that lies on multiples of <see cref="Step"/>, in [0, 1].</summary>
    public double Share { get; }

    /// <summary>Share that the places beside the multiples lead one to expect on them, in [0, 1].</summary>
    public double ExpectedShare { get; }

    /// <summary><see cref="Share"/> − <see cref="ExpectedShare"/>: the part of the values that was probably rounded to this step rather than to the rounding unit.</summary>
    public double Excess => Share - ExpectedShare;
}
