using Smoothing.Estimation;
using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Inference;

/// <summary>The smallest bandwidth at which the Gaussian estimate has at most k modes inside an interval.</summary>
/// <remarks>
/// Method: bisection on the number of modes, which never grows with h for the Gaussian kernel on the whole line (Silverman 1981). Where the last mode
/// disappears in a fold, f′ = f″ = 0, Newton's method in place and bandwidth finishes the job on the exact sums, with ∂f/∂h = h f″; where it leaves
/// through an end of the interval the bisection's value stands. Accuracy 1e-9 at folds, else 1e-4.
/// </remarks>
internal static class CriticalBandwidth
{
    private const double Ratio = 0.9;        // downward steps of the search
    private const double Accuracy = 1e-4;    // of the bisection, relative

    /// <param name="x">Places.</param>
    /// <param name="weights">Weights; empty for equal ones.</param>
    /// <param name="modes">k, 1 or more.</param>
    /// <param name="range">Where modes count.</param>
    /// <param name="start">A bandwidth with at most k modes, or 0 to start from the length of the range.</param>
    public static double Of(ReadOnlySpan<double> x, ReadOnlySpan<double> weights, int modes, Interval range, double start = 0)
    {
        double high = start > 0 ? start : range.Length;
        while (ModeCounter.Count(x, weights, high, range, ModeCounter.Fine) > modes)
        {
            high /= Ratio * Ratio;
        }

        double low = high * Ratio;

        // At a hundred-thousandth of the range every separate value is a mode; fewer than k + 1 of them never give more.
        double smallest = range.Length * 1e-5;
        while (ModeCounter.Count(x, weights, low, range, ModeCounter.Fine) <= modes)
        {
            high = low;
            low *= Ratio;
            if (low < smallest)
            {
                return 0;
            }
        }

        while (high - low > Accuracy * high)
        {
            double middle = Math.Sqrt(high * low);
            (low, high) = ModeCounter.Count(x, weights, middle, range, ModeCounter.Fine) > modes ? (middle, high) : (low, middle);
        }

        return high;
    }

    /// <summary>The same for a sample, polished on the exact sums.</summary>
    public static double Polished(Sample sample, ReadOnlySpan<double> x, ReadOnlySpan<double> weights, int modes, Interval range, double start = 0)
    {
        double rough = Of(x, weights, modes, range, start);
        if (rough == 0)
        {
            return 0;
        }

        // Just below the critical value: the closest pair of turning points is the one about to merge.
        double h = rough * (1 - (10 * Accuracy));
        double[] slope = ModeCounter.Slopes(x, weights, h, range, ModeCounter.Fine);
        double step = range.Length / (slope.Length - 1);
        double best = double.PositiveInfinity;
        double place = double.NaN;
        double last = double.NaN;
        for (int j = 1; j < slope.Length; j++)
        {
            if (slope[j - 1] != 0 && slope[j] != 0 && slope[j - 1] > 0 != slope[j] > 0)
            {
                double here = range.Lower + ((j - (slope[j] / (slope[j] - slope[j - 1]))) * step);
                if (here - last < best)
                {
                    best = here - last;
                    place = (here + last) / 2;
                }

                last = here;
            }
        }

        if (double.IsNaN(place))
        {
            return rough;
        }

        Span<double> d = stackalloc double[5];
        for (int i = 0; i < 40; i++)
        {
            KernelSums sums = SumsChoice.For(sample, Kernel.Gaussian, h);
            for (int r = 1; r <= 4; r++)
            {
                double value = 0;
                sums.Derivatives(new ReadOnlySpan<double>(in place), r, new Span<double>(ref value));
                d[r] = value;
            }

            // (f″, hf‴; f‴, hf⁗)(δx, δh) = −(f′, f″)
            double determinant = h * ((d[2] * d[4]) - (d[3] * d[3]));
            double moved = -(h * ((d[1] * d[4]) - (d[2] * d[3]))) / determinant;
            double changed = -((d[2] * d[2]) - (d[3] * d[1])) / determinant;
            place += moved;
            h += changed;
            if (!(Math.Abs(h - rough) < 0.01 * rough && range.Contains(place)))
            {
                return rough;
            }

            if (Math.Abs(changed) < 1e-12 * h && Math.Abs(moved) < 1e-10 * h)
            {
                return h;
            }
        }

        return rough;
    }
}
