using Smoothing.Numerics;

namespace Smoothing.Inference;

/// <summary>A peak of the curve with intervals for the place and the height of the peak behind it.</summary>
public sealed class GroupPeak
{
    internal GroupPeak(double location, Interval locationInterval, double height, Interval heightInterval, bool standsApart) =>
        (Location, LocationInterval, Height, HeightInterval, StandsApart) = (location, locationInterval, height, heightInterval, standsApart);

    /// <summary>Where the curve has its peak, in the unit of the data.</summary>
    public double Location { get; }

    /// <summary>Where the true peak lies, given that there is one: places at which the slope may be zero. Ends at the neighbouring valleys where the slope never tells.</summary>
    public Interval LocationInterval { get; }

    /// <summary>Height of the curve there, in 1/unit.</summary>
    public double Height { get; }

    /// <summary>Limits for the density at the true peak, in 1/unit: from the lower limit at the place found to the largest upper limit over the places possible.</summary>
    public Interval HeightInterval { get; }

    /// <summary>Whether the slope is told from zero on both sides before the next valley: one peak by itself then stands apart from chance.</summary>
    public bool StandsApart { get; }
}
