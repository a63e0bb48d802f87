using Smoothing.Numerics;

namespace Smoothing.Theory;

/// <summary>∫ (f⁽ʳ⁾)² of a target without closed form.</summary>
/// <remarks>
/// Method: panels between the places where f changes its scale; the first panel at a break is substituted, since f may behave there as a
/// power of the distance; open tails are mapped. Dominant error: such powers at an end that is not 0, where the distance itself is rounded.
/// </remarks>
internal static class RoughnessIntegral
{
    public static double Of(TargetDensity target, int order)
    {
        double Square(double x)
        {
            double v = order == 0 ? target.ValueCore(x) : target.DerivativeCore(x, order);
            return v * v;
        }

        (double lower, double upper) = target.Support;
        double[] ends = [.. target.Splits.Concat(target.Breaks).Where(s => s >= lower && s <= upper).Distinct().Order()];
        CompensatedSum sum = default;
        for (int i = 1; i < ends.Length; i++)
        {
            (double from, double to) = (ends[i - 1], ends[i]);
            double middle = from + ((to - from) / 2);
            sum.Add(target.Breaks.Contains(from) ? PanelRule.IntegrateFromPower(Square, from, middle) : PanelRule.Integrate(Square, [from, middle]));
            sum.Add(target.Breaks.Contains(to) ? PanelRule.IntegrateFromPower(Square, to, middle) : PanelRule.Integrate(Square, [middle, to]));
        }

        double body = sum.Value;
        double tail = (ends[^1] - ends[0]) / 4;
        return body
            + (double.IsFinite(lower) ? 0 : PanelRule.IntegrateTail(Square, ends[0], -tail, body))
            + (double.IsFinite(upper) ? 0 : PanelRule.IntegrateTail(Square, ends[^1], tail, body));
    }
}
