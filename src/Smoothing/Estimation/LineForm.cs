using Smoothing.Kernels;
using Smoothing.Numerics;

namespace Smoothing.Estimation;

/// <summary>The plain kernel sum on the whole line. Everything is in closed form.</summary>
/// <param name="sums">The sums.</param>
/// <param name="kernel">K.</param>
/// <param name="bandwidth">h.</param>
/// <param name="range">Smallest and largest value.</param>
/// <param name="draws">How to draw; null when the values were not kept.</param>
/// <param name="reach">How far the curve goes beyond the outermost values; null for h times the support radius.</param>
internal sealed class LineForm(KernelSums sums, Kernel kernel, double bandwidth, Interval range, SmoothedDraws? draws = null, double? reach = null)
    : CurveForm
{
    private readonly double _reach = reach ?? (bandwidth * kernel.SupportRadius);

    public override Interval Ends => new(range.Lower - _reach, range.Upper + _reach);

    public override Interval Core => range;

    public override double Scale => bandwidth;

    public override bool MayBeNegative => kernel.Order > 2;

    protected override ReadOnlySpan<double> SortedValues => draws is null ? default : draws.Sample.SortedValues;

    protected override IReadOnlyList<double> Kinks => double.IsInfinity(_reach) ? [0] : [-_reach, 0, _reach];

    public override void Derivatives(ReadOnlySpan<double> x, int order, Span<double> destination) => sums.Derivatives(x, order, destination);

    public override void Cumulatives(ReadOnlySpan<double> x, bool upper, Span<double> destination) => sums.Cumulatives(x, upper, destination);

    public override bool TryDraw(ref RandomStream random, Span<double> destination)
    {
        if (draws is null || MayBeNegative)
        {
            return false;
        }

        draws.Fill(ref random, destination);
        return true;
    }
}
