using Smoothing.Kernels;
using Smoothing.Numerics;

namespace Smoothing.Estimation;

/// <summary>The plain kernel sum on the whole line. Everything is in closed form.</summary>
/// <param name="sums">The sums.</param>
/// <param name="kernel">K.</param>
/// <param name="bandwidth">h.</param>
/// <param name="range">Smallest and largest value.</param>
/// <param name="draws">How to draw; null when the values were not kept.</param>
/// <param name="ends">Where the curve ends; null for the outermost values moved out by h times the support radius.</param>
internal sealed class LineForm(KernelSums sums, Kernel kernel, double bandwidth, Interval range, SmoothedDraws? draws = null, Interval? ends = null)
    : CurveForm
{
    private readonly double _reach = bandwidth * kernel.SupportRadius;
    private readonly Lazy<bool> _analytic = new(() => double.IsInfinity(kernel.SupportRadius) && PeakSearch.Smoothness(kernel) == 4);

    public override Interval Ends { get; } =
        ends ?? new Interval(range.Lower - (bandwidth * kernel.SupportRadius), range.Upper + (bandwidth * kernel.SupportRadius));

    public override Interval Core => range;

    public override double Scale => bandwidth;

    public override bool MayBeNegative => kernel.Order > 2;

    protected override bool IsAnalytic => _analytic.Value;

    protected override ReadOnlySpan<double> SortedValues => draws is null ? default : draws.Sample.SortedValues;

    protected override IReadOnlyList<double> Kinks => double.IsInfinity(_reach) ? [0] : [-_reach, 0, _reach];

    public override void Derivatives(ReadOnlySpan<double> x, int order, Span<double> destination) => sums.Derivatives(x, order, destination);

    public override void Cumulatives(ReadOnlySpan<double> x, bool upper, Span<double> destination) => sums.Cumulatives(x, upper, destination);

    public override void Evaluate(ReadOnlySpan<double> x, Span<double> values, Span<double> slopes, Span<double> cumulatives) => sums.Evaluate(x, values, slopes, cumulatives);

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
