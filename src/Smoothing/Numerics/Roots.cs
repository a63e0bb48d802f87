using MathNet.Numerics.RootFinding;

namespace Smoothing.Numerics;

/// <summary>Roots of continuous functions between two ends of opposite sign.</summary>
internal static class Roots
{
    /// <summary>A root of f in [lower, upper] by Brent's method; the ends must bracket a change of sign.</summary>
    public static double Between(Func<double, double> f, double lower, double upper, double relativeAccuracy = 1e-14)
    {
        double atLower = f(lower);
        double atUpper = f(upper);
        if (atLower == 0)
        {
            return lower;
        }

        if (atUpper == 0)
        {
            return upper;
        }

        double scale = Math.Max(Math.Abs(lower), Math.Abs(upper));
        try
        {
            if (Brent.TryFindRoot(f, lower, upper, relativeAccuracy * scale, 200, out double root))
            {
                return root;
            }
        }
        catch (ArithmeticException)
        {
            // f was NaN on the way (sums that underflow between two good ends): halving takes such a place for the upper side and goes on.
        }

        // Brent's bookkeeping gives up on steep steps; halving never does.
        bool rising = atLower < 0;
        for (int i = 0; i < 1100 && upper - lower > relativeAccuracy * scale; i++)
        {
            double middle = lower + ((upper - lower) / 2);
            if (f(middle) < 0 == rising)
            {
                lower = middle;
            }
            else
            {
                upper = middle;
            }
        }

        return lower + ((upper - lower) / 2);
    }
}
