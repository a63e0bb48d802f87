using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;
using Smoothing.Numerics;

namespace Smoothing.Estimation;

/// <summary>Gaussian sums at equally spaced points: one exponential for sixteen points, four values at a time.</summary>
/// <remarks>
/// <para>Method: sixteen points about a centre c, D the step in bandwidths, u = (c − X)/h: e^(−(u + kD)²/2) = e^(−u²/2) · ρᵏ · e^(−(kD)²/2 − kD(c − C)/h) with
/// ρ = e^(D(X − C)/h), C a place in the middle of many such sixteens. So ρ and 1/ρ are worked out once a value, each further point costs one product
/// and one sum, and the last factor is applied once at the end. Points are not spaced equally to the last bit: the small
/// rest e enters as 1 + e·(log f)′, the slope taken from the neighbours' logarithms.</para>
/// <para>Validity: D ≤ ½, so no factor leaves the range of doubles before the result is below 1e-240; |e| ≤ 1e-13 h within each sixteen. Dominant error: ρ⁸ carries
/// eight times the rounding of its exponent, which is kept below 4 where a value counts: 7e-15 of a term; relative 1e-12 down to densities of 1e-200.</para>
/// </remarks>
internal static unsafe class GaussianGrid
{
    private const int Group = 16;
    private const int Centre = 8;
    private const int Block = 512; // four arrays of so many fill half of a first-level cache
    private const int MostGroups = 64;
    private const double LargestStep = 0.5;
    private const double SpacingTolerance = 1e-13;
    private const double LargestExponent = 87; // e^(8·87) is still finite; values that far away have weight 0
    private const double KeptExponent = 4;
    private const double Seen = 8.5; // a value further away than this many bandwidths counts less than a rounding, e^(−8.5²/2) = 2e-16

    /// <summary>Whether points are equally spaced closely enough.</summary>
    public static bool Serves(ReadOnlySpan<double> x, double bandwidth)
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

    /// <summary>destination[j] = factor · Σ w e^(−u²/2), u = (x_j − X)/h, at points that <see cref="Serves"/> accepts; weights may be null.</summary>
    public static void Sums(double* values, double* weights, int count, ReadOnlySpan<double> x, double bandwidth, double factor, Span<double> destination)
    {
        double step = (x[^1] - x[0]) / (x.Length - 1), d = step / bandwidth, slope = d / bandwidth;
        int groups = (x.Length + Group - 1) / Group, together = Together(Math.Abs(d));
        double* place = stackalloc double[4 * Block], mass = place + Block, up = mass + Block, down = up + Block;
        double* sums = stackalloc double[MostGroups * Group];
        for (int first = 0; first < groups; first += together)
        {
            int held = Math.Min(together, groups - first);
            double middle = CentreOf(x, (first + (held / 2)) * Group, step);
            new Span<double>(sums, held * Group).Clear();
            for (int start = 0; start < count; start += Block)
            {
                int length = Math.Min(Block, count - start), whole = (length + 3) / 4 * 4;
                for (int i = 0; i < whole; i++)
                {
                    place[i] = values[start + Math.Min(i, length - 1)]; // the last one to three filled up with weight 0
                    mass[i] = i >= length ? 0 : weights == null ? 1 : weights[start + i];
                }

                Seed(place, whole, middle, slope, up, down);
                for (int g = 0; g < held; g++)
                {
                    Add(place, mass, up, down, whole, CentreOf(x, (first + g) * Group, step), 1 / bandwidth, sums + (g * Group));
                }
            }

            for (int g = 0; g < held; g++)
            {
                Finish(sums + (g * Group), x, (first + g) * Group, step, bandwidth, slope * (CentreOf(x, (first + g) * Group, step) - middle), factor, destination);
            }
        }
    }

    // How many sixteens may share ρ: 8·D(half of their length + what is seen) ≤ 8·4; at least one.
    private static int Together(double d) => (int)Math.Clamp(((KeptExponent / d) - Seen) / (Group / 2 * d), 1, MostGroups);

    // The point about which the sixteen that hold point j are expanded; beyond the last point, continued.
    private static double CentreOf(ReadOnlySpan<double> x, int j, double step)
    {
        int centre = (j / Group * Group) + Centre;
        return centre < x.Length ? x[centre] : x[^1] + ((centre - x.Length + 1) * step);
    }

    private static double Deviation(ReadOnlySpan<double> x, int j, double step) =>
        x[j] - CentreOf(x, j, step) - (((j % Group) - Centre) * step);

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private static void Seed(double* place, int count, double middle, double slope, double* up, double* down)
    {
        Vector256<double> centre = Vector256.Create(middle), factor = Vector256.Create(slope), most = Vector256.Create(LargestExponent);
        for (int i = 0; i < count; i += 4)
        {
            Vector256<double> exponent = (Vector256.Load(place + i) - centre) * factor;
            Vector256<double> ratio = VectorExp.Of(Vector256.MinNative(Vector256.MaxNative(exponent, -most), most));
            ratio.Store(up + i);
            (Vector256<double>.One / ratio).Store(down + i);
        }
    }

    // sums[t] += Σ w e^(−u²/2) ρ^(t − 8). Powers by squares: chains of eight products would keep the next value waiting.
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private static void Add(double* place, double* mass, double* up, double* down, int count, double centre, double inverse, double* sums)
    {
        Vector256<double> c = Vector256.Create(centre), scale = Vector256.Create(inverse), minusHalf = Vector256.Create(-0.5);
        Vector256<double> s0 = default, s1 = default, s2 = default, s3 = default, s4 = default, s5 = default, s6 = default, s7 = default;
        Vector256<double> s8 = default, s9 = default, s10 = default, s11 = default, s12 = default, s13 = default, s14 = default, s15 = default;
        for (int i = 0; i < count; i += 4)
        {
            Vector256<double> u = (c - Vector256.Load(place + i)) * scale;
            Vector256<double> g = VectorExp.Of(u * u * minusHalf) * Vector256.Load(mass + i), ratio = Vector256.Load(up + i);
            Vector256<double> square = ratio * ratio, first = g * ratio;
            Vector256<double> fourth = square * square, second = g * square, third = first * square;
            s8 += g;
            s9 += first;
            s10 += second;
            s11 += third;
            s12 += g * fourth;
            s13 += first * fourth;
            s14 += second * fourth;
            s15 += third * fourth;
            ratio = Vector256.Load(down + i);
            square = ratio * ratio;
            first = g * ratio;
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

        Gather(s0, s1, s2, s3, sums);
        Gather(s4, s5, s6, s7, sums + 4);
        Gather(s8, s9, s10, s11, sums + 8);
        Gather(s12, s13, s14, s15, sums + 12);
    }

    private static void Gather(Vector256<double> a, Vector256<double> b, Vector256<double> c, Vector256<double> d, double* sums) =>
        (Vector256.Load(sums) + Vector256.Create(Vector256.Sum(a), Vector256.Sum(b), Vector256.Sum(c), Vector256.Sum(d))).Store(sums);

    private static void Finish(double* group, ReadOnlySpan<double> x, int from, double step, double bandwidth, double shift, double factor, Span<double> destination)
    {
        double d = step / bandwidth;
        for (int t = 0; t < Group; t++)
        {
            double k = t - Centre;
            group[t] *= Math.Exp((-0.5 * k * d * (k * d)) - (k * shift));
        }

        for (int t = 0; t < Group && from + t < x.Length; t++)
        {
            double deviation = Deviation(x, from + t, step);
            double correction = 1;
            int below = Math.Max(t - 1, 0), above = Math.Min(t + 1, Group - 1);
            if (deviation != 0 && group[below] > 0 && group[above] > 0)
            {
                correction += deviation / bandwidth * Math.Log(group[above] / group[below]) / ((above - below) * d);
            }

            destination[from + t] = group[t] * correction * factor;
        }
    }
}
