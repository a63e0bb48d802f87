using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;
using Smoothing.Numerics;

namespace Smoothing.Estimation;

/// <summary>Plain double loops for the Gaussian, four values at a time: the shortest way for few values and points.</summary>
/// <remarks>
/// <para>Method: at any points Σ w e^(−u²/2) q(u), q a polynomial. At equally spaced points, sixteen at a time about a centre c: with u = (c − X)/h and
/// r = e^(−uD), D the step in bandwidths, e^(−(u + kD)²/2) = e^(−(kD)²/2) · e^(−u²/2) rᵏ, so each further point costs one
/// product and one sum per value, and its constant factor is applied once at the end. Points are not spaced equally to the
/// last bit: the small rest e enters as 1 + e·(log f)′, the slope taken from the neighbours' logarithms.</para>
/// <para>Validity of the grid form: D ≤ ½, so no factor leaves the range of doubles before the result is below 1e-240; |e| ≤ 1e-13 h
/// within each sixteen. Dominant error: rounding of the exponents, about |u + kD|·k·D·1e-16, and the curvature that the slope
/// of e misses: below 1e-14 of the peak, relative 1e-12 down to densities of 1e-200.</para>
/// </remarks>
internal static unsafe class GaussianDirect
{
    private const int Group = 16;
    private const int Centre = 8;
    private const double LargestStep = 0.5;
    private const double SpacingTolerance = 1e-13;
    private const double LargestExponent = 87; // e^(8·87) is still finite; values that far away have weight 0

    /// <summary>Whether points are equally spaced closely enough for <see cref="Grid"/>.</summary>
    public static bool IsGrid(ReadOnlySpan<double> x, double bandwidth)
    {
        if (x.Length < Group)
        {
            return false;
        }

        double step = (x[^1] - x[0]) / (x.Length - 1);
        if (!(Math.Abs(step) <= LargestStep * bandwidth) || step == 0)
        {
            return false;
        }

        for (int j = 0; j < x.Length; j++)
        {
            if (!(Math.Abs(Deviation(x, j, step)) <= SpacingTolerance * bandwidth))
            {
                return false;
            }
        }

        return true;
    }

    // The point about which the sixteen that hold point j are expanded; beyond the last point, continued.
    private static double CentreOf(ReadOnlySpan<double> x, int j, double step)
    {
        int centre = (j / Group * Group) + Centre;
        return centre < x.Length ? x[centre] : x[^1] + ((centre - x.Length + 1) * step);
    }

    private static double Deviation(ReadOnlySpan<double> x, int j, double step) =>
        x[j] - CentreOf(x, j, step) - (((j % Group) - Centre) * step);

    /// <summary>destination[j] = factor · Σ w e^(−u²/2) q(u), u = (x_j − X)/h; coefficients of q lowest power first; weights may be null.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public static void Scattered(
        double* values, double* weights, int count, double* x, int points, double bandwidth, ReadOnlySpan<double> q, double factor, double* destination)
    {
        Vector256<double> inverse = Vector256.Create(1 / bandwidth);
        Vector256<double> minusHalf = Vector256.Create(-0.5);
        int degree = q.Length - 1;
        double* rest = stackalloc double[8];
        for (int j = 0; j < points; j++)
        {
            Vector256<double> centre = Vector256.Create(x[j]);
            Vector256<double> sum = default;
            for (int i = 0; i < count; i += 4)
            {
                Vector256<double> value;
                Vector256<double> weight;
                if (i + 4 <= count)
                {
                    value = Vector256.Load(values + i);
                    weight = weights == null ? Vector256<double>.One : Vector256.Load(weights + i);
                }
                else
                {
                    Remainder(values, weights, i, count, rest);
                    value = Vector256.Load(rest);
                    weight = Vector256.Load(rest + 4);
                }

                Vector256<double> u = (centre - value) * inverse;
                Vector256<double> term = VectorExp.Of(u * u * minusHalf) * weight;
                if (degree > 0)
                {
                    Vector256<double> p = Vector256.Create(q[degree]);
                    for (int k = degree - 1; k >= 0; k--)
                    {
                        p = Vector256.MultiplyAddEstimate(p, u, Vector256.Create(q[k]));
                    }

                    // Far away the polynomial may be infinite where the exponential is 0.
                    term = Vector256.ConditionalSelect(Vector256.Equals(term, Vector256<double>.Zero), term, term * p);
                }

                sum += term;
            }

            destination[j] = Vector256.Sum(sum) * (degree > 0 ? factor : factor * q[0]);
        }
    }

    /// <summary>destination[j] = factor · Σ w e^(−u²/2) at points that <see cref="IsGrid"/> accepts.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public static void Grid(double* values, double* weights, int count, ReadOnlySpan<double> x, double bandwidth, double factor, Span<double> destination)
    {
        int points = x.Length;
        double step = (x[^1] - x[0]) / (points - 1);
        double d = step / bandwidth;
        Vector256<double> inverse = Vector256.Create(1 / bandwidth);
        Vector256<double> minusHalf = Vector256.Create(-0.5);
        Vector256<double> minusStep = Vector256.Create(-d);
        Vector256<double> most = Vector256.Create(LargestExponent);
        double* rest = stackalloc double[8];
        double* group = stackalloc double[Group];
        double* ones = stackalloc double[4];
        new Span<double>(ones, 4).Fill(1);
        int whole = count / 4 * 4; // the last one to three values wait, filled up with weight 0, in a place of their own
        int extent = whole < count ? 4 : 0;
        int begin = whole > 0 ? 0 : 1;
        int stride = weights == null ? 0 : 4;
        if (extent > 0)
        {
            Remainder(values, weights, whole, count, rest);
        }

        for (int j = 0; j < points; j += Group)
        {
            Vector256<double> s0 = default, s1 = default, s2 = default, s3 = default, s4 = default, s5 = default, s6 = default, s7 = default;
            Vector256<double> s8 = default, s9 = default, s10 = default, s11 = default, s12 = default, s13 = default, s14 = default, s15 = default;
            Vector256<double> centre = Vector256.Create(CentreOf(x, j, step));
            for (int part = begin; part < 2; part++)
            {
                double* source = part == 0 ? values : rest;
                double* stop = part == 0 ? values + whole : rest + extent;
                double* mass = part == 1 ? rest + 4 : weights == null ? ones : weights;
                for (; source < stop; source += 4, mass += stride)
                {
                    Vector256<double> u = (centre - Vector256.Load(source)) * inverse;
                    Vector256<double> exponent = Vector256.MinNative(Vector256.MaxNative(u * minusStep, -most), most);
                    Vector256<double> g = VectorExp.Of(u * u * minusHalf) * Vector256.Load(mass);
                    Vector256<double> up = VectorExp.Of(exponent);
                    Vector256<double> down = Vector256<double>.One / up;

                    // Powers by squares: chains of seven products would keep the next value waiting.
                    Vector256<double> square = up * up, first = g * up;
                    Vector256<double> fourth = square * square, second = g * square, third = first * square;
                    s8 += g;
                    s9 += first;
                    s10 += second;
                    s11 += third;
                    s12 += g * fourth;
                    s13 += first * fourth;
                    s14 += second * fourth;
                    s15 += third * fourth;
                    square = down * down;
                    first = g * down;
                    fourth = square * square;
                    second = g * square;
                    third = first * square;
                    s7 += first;
                    s6 += second;
                    s5 += third;
                    s4 += g * fourth;
                    s3 += first * fourth;
                    s2 += second * fourth;
                    s1 += third * fourth;
                    s0 += g * (fourth * fourth);
                }
            }

            group[0] = Vector256.Sum(s0);
            group[1] = Vector256.Sum(s1);
            group[2] = Vector256.Sum(s2);
            group[3] = Vector256.Sum(s3);
            group[4] = Vector256.Sum(s4);
            group[5] = Vector256.Sum(s5);
            group[6] = Vector256.Sum(s6);
            group[7] = Vector256.Sum(s7);
            group[8] = Vector256.Sum(s8);
            group[9] = Vector256.Sum(s9);
            group[10] = Vector256.Sum(s10);
            group[11] = Vector256.Sum(s11);
            group[12] = Vector256.Sum(s12);
            group[13] = Vector256.Sum(s13);
            group[14] = Vector256.Sum(s14);
            group[15] = Vector256.Sum(s15);
            for (int t = 0; t < Group; t++)
            {
                double shift = (t - Centre) * d;
                group[t] *= Math.Exp(-0.5 * shift * shift);
            }

            for (int t = 0; t < Group && j + t < points; t++)
            {
                int below = Math.Max(t - 1, 0);
                int above = Math.Min(t + 1, Group - 1);
                double slope = group[below] > 0 && group[above] > 0 ? Math.Log(group[above] / group[below]) / ((above - below) * d) : 0;
                destination[j + t] = group[t] * (1 + (Deviation(x, j + t, step) / bandwidth * slope)) * factor;
            }
        }
    }

    // The last few values, filled up with weight 0.
    private static void Remainder(double* values, double* weights, int start, int count, double* rest)
    {
        for (int k = 0; k < 4; k++)
        {
            bool given = start + k < count;
            rest[k] = values[given ? start + k : count - 1];
            rest[4 + k] = !given ? 0 : weights == null ? 1 : weights[start + k];
        }
    }
}
