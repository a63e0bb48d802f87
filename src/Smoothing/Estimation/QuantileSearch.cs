using Smoothing.Numerics;

namespace Smoothing.Estimation;

/// <summary>inf{x : F(x) ≥ p} of a curve, from the tail that keeps relative accuracy.</summary>
/// <remarks>
/// Method: a bracket F(low) &lt; p ≤ F(high) is kept throughout. Inside, Newton steps on log F (on log of the survival in the upper half), which are
/// nearly exact in tails; a step that leaves the bracket or fails to halve it in three turns is replaced by bisection. Flat stretches of F end at
/// their left end because the bracket never gives up F(low) &lt; p. Where a curve may be negative, F climbs and dips between its sign changes: the
/// first climb that reaches p is taken. Accuracy: the rounding of F divided by f.
/// </remarks>
internal static class QuantileSearch
{
    // Bisection from the widest double range needs about 1100 steps at most; Newton needs about ten.
    private const int MaximumSteps = 1200;

    /// <summary>The quantile for a lower tail <paramref name="tail"/> (upper tail when <paramref name="upper"/>), 0 &lt; tail ≤ ½.</summary>
    public static double Find(CurveForm form, double tail, bool upper, IReadOnlyList<double> signChanges)
    {
        (double low, double high) = signChanges.Count == 0 ? Bracket(form, tail, upper) : FirstClimb(form, tail, upper, signChanges);
        return Refine(form, tail, upper, low, high);
    }

    // Positive from the quantile on: F − p, or tail − survival.
    private static double Excess(CurveForm form, double x, double tail, bool upper) =>
        upper ? tail - form.Tail(x, upper: true) : form.Tail(x, upper: false) - tail;

    private static (double Low, double High) Bracket(CurveForm form, double tail, bool upper)
    {
        // At least the spacing of doubles at the core, so that doubling gets somewhere.
        double smallest = Math.BitIncrement(Math.Max(Math.Abs(form.Core.Lower), Math.Abs(form.Core.Upper))) - Math.Max(Math.Abs(form.Core.Lower), Math.Abs(form.Core.Upper));
        double first = Math.Max(form.Scale, smallest);
        double step = first;
        double low = form.Core.Lower;
        while (Excess(form, low, tail, upper) >= 0 && low > form.Ends.Lower)
        {
            low = Math.Max(form.Core.Lower - step, form.Ends.Lower);
            step *= 2;
        }

        step = first;
        double high = form.Core.Upper;
        while (Excess(form, high, tail, upper) < 0 && high < form.Ends.Upper)
        {
            high = Math.Min(form.Core.Upper + step, form.Ends.Upper);
            step *= 2;
        }

        return (low, high);
    }

    private static (double Low, double High) FirstClimb(CurveForm form, double tail, bool upper, IReadOnlyList<double> signChanges)
    {
        (double low, double end) = Bracket(form, tail, upper);
        low = Math.Min(low, signChanges[0] - form.Scale);
        foreach (double change in signChanges)
        {
            if (change > low && Excess(form, change, tail, upper) >= 0)
            {
                return (low, change);
            }

            low = Math.Max(low, change);
        }

        return (low, Math.Max(end, low + form.Scale));
    }

    private static double Refine(CurveForm form, double tail, bool upper, double low, double high)
    {
        double x = low + ((high - low) / 2);
        double lastWidth = high - low;
        for (int i = 0; i < MaximumSteps; i++)
        {
            double t = form.Tail(x, upper);
            if (upper ? tail - t >= 0 : t - tail >= 0)
            {
                high = x;
            }
            else
            {
                low = x;
            }

            double middle = low + ((high - low) / 2);
            if (!(middle > low && middle < high))
            {
                return high;
            }

            double next = NewtonStep(form, x, t, tail, upper);
            if (i % 3 == 2)
            {
                next = high - low > lastWidth / 2 ? middle : next;
                lastWidth = high - low;
            }

            // A step below the spacing of doubles: one more look at each neighbour closes the bracket.
            if (Math.Abs(next - x) <= Math.BitIncrement(Math.Abs(x)) - Math.Abs(x))
            {
                return Close(form, x, tail, upper, low, high);
            }

            x = next > low && next < high ? next : middle;
        }

        return high;
    }

    private static double NewtonStep(CurveForm form, double x, double t, double tail, bool upper)
    {
        double f = form.Value(x);
        if (!(t > 0 && f > 0))
        {
            return double.NaN;
        }

        double step = t / f * Math.Log(t / tail);
        return upper ? x + step : x - step;
    }

    private static double Close(CurveForm form, double x, double tail, bool upper, double low, double high)
    {
        // Widening looks around x find a tight bracket when Newton has landed next to the root on one side only.
        double reach = Math.BitIncrement(Math.Abs(x)) - Math.Abs(x);
        for (int i = 0; i < 8 && high - low > 2 * reach; i++)
        {
            double left = Math.Max(low, x - reach);
            double right = Math.Min(high, x + reach);
            low = left > low && Excess(form, left, tail, upper) < 0 ? left : low;
            high = right < high && Excess(form, right, tail, upper) >= 0 ? right : high;
            reach *= 2;
        }

        return high - x <= reach ? high : x;
    }
}
