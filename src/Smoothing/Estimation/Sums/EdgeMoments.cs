using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;
using System.Runtime.Intrinsics.X86;

namespace Smoothing.Estimation;

/// <summary>Arithmetic of edge-distance moments M_k = Σ w sᵏ, s ≥ 0 the distance from a point of reference in bandwidths.</summary>
/// <remarks>
/// <para>Method: a polynomial kernel on [−1, 1] is, on either half, a polynomial in the distance s to the nearer end of its window. Moments
/// of s move to a reference further out by M_k ← Σ_q C(k, q) aᵏ⁻ᵠ M_q with a ≥ 0: every term is positive and nothing cancels,
/// whatever the offset, the spread or the number of values. Only the kernel's own coefficients mix signs.</para>
/// <para>Dominant error: that mix. Its condition at s is Σ|p_k|sᵏ/|P(s)|: 3, 9, 27 for (1 − u²)ʳ, r = 1, 2, 3, at s = 1, and 1 towards the edge.</para>
/// </remarks>
internal static unsafe class EdgeMoments
{
    /// <summary>Room for moments and coefficients on the stack: the tricube's distribution function has degree 10.</summary>
    public const int MaximumDegree = 15;

    /// <summary>Moves moments of degree up to <paramref name="degree"/> to a reference that lies <paramref name="a"/> bandwidths further out.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static void Shift(double* m, int degree, double a)
    {
        for (int pass = 1; pass <= degree; pass++)
        {
            for (int k = degree; k >= pass; k--)
            {
                m[k] += a * m[k - 1];
            }
        }
    }

    /// <summary>Σ w P(a + s) from moments of s.</summary>
    [SkipLocalsInit]
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public static double Evaluate(double* moments, double a, double* polynomial, int degree)
    {
        double* m = stackalloc double[MaximumDegree + 1];
        for (int k = 0; k <= degree; k++)
        {
            m[k] = moments[k];
        }

        Shift(m, degree, a);
        double sum = 0;
        for (int k = degree; k >= 0; k--)
        {
            sum += polynomial[k] * m[k];
        }

        return sum;
    }

    /// <summary>Σ w P(s), s = sign·((X − high) − low)·inverse, over <paramref name="count"/> values; weights may be null.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public static double Direct(double* values, double* weights, int count, WindowEnd end, double signedInverse, double* polynomial, int degree)
    {
        Vector256<double> high = Vector256.Create(end.High);
        Vector256<double> low = Vector256.Create(end.Low);
        Vector256<double> inverse = Vector256.Create(signedInverse);
        Vector256<double> sum = default;
        int i = 0;
        for (; i + 4 <= count; i += 4)
        {
            Vector256<double> s = (Vector256.Load(values + i) - high - low) * inverse;
            Vector256<double> p = Vector256.Create(polynomial[degree]);
            for (int k = degree - 1; k >= 0; k--)
            {
                p = Vector256.MultiplyAddEstimate(p, s, Vector256.Create(polynomial[k]));
            }

            sum += weights == null ? p : p * Vector256.Load(weights + i);
        }

        double total = Vector256.Sum(sum);
        for (; i < count; i++)
        {
            double s = (values[i] - end.High - end.Low) * signedInverse;
            double p = polynomial[degree];
            for (int k = degree - 1; k >= 0; k--)
            {
                p = (p * s) + polynomial[k];
            }

            total += weights == null ? p : p * weights[i];
        }

        return total;
    }

    /// <summary>Moments of sign·(X − reference)·inverse over one block, added up in a fixed order; weights may be null.</summary>
    [SkipLocalsInit]
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public static void OfBlock(double* values, double* weights, int count, double reference, double signedInverse, double* m, int degree)
    {
        if (degree == 2 && weights == null)
        {
            OfBlockSquares(values, count, reference, signedInverse, m);
            return;
        }

        Vector256<double>* sums = stackalloc Vector256<double>[MaximumDegree + 1];
        for (int k = 0; k <= degree; k++)
        {
            sums[k] = default;
        }

        Vector256<double> origin = Vector256.Create(reference);
        Vector256<double> inverse = Vector256.Create(signedInverse);
        for (int i = 0; i + 4 <= count; i += 4)
        {
            Vector256<double> s = (Vector256.Load(values + i) - origin) * inverse;
            Vector256<double> power = weights == null ? Vector256<double>.One : Vector256.Load(weights + i);
            for (int k = 0; k <= degree; k++)
            {
                sums[k] += power;
                power *= s;
            }
        }

        for (int k = 0; k <= degree; k++)
        {
            m[k] = Vector256.Sum(sums[k]);
        }
    }

    /// <summary>The same over positions [from, to) that lie within one run of sixteen from a multiple of sixteen.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public static void OfPart(double* values, double* weights, int from, int to, double reference, double signedInverse, double* m, int degree)
    {
        if (degree != 2 || weights != null)
        {
            OfFew(values + from, weights == null ? null : weights + from, to - from, reference, signedInverse, m, degree);
            return;
        }

        // Four vectors from the front, what lies outside put to 0.
        int start = from / 16 * 16;
        Vector256<double> origin = Vector256.Create(reference);
        Vector256<double> inverse = Vector256.Create(signedInverse);
        Vector256<double> place = Vector256.Create(0.0, 1, 2, 3);
        Vector256<double> low = Vector256.Create((double)(from - start));
        Vector256<double> high = Vector256.Create((double)(to - start));
        Vector256<double> four = Vector256.Create(4.0);
        Vector256<double> first = default, second = default;
        for (int i = 0; i < 16; i += 4)
        {
            Vector256<double> s = (Vector256.Load(values + start + i) - origin) * inverse;
            s &= Vector256.GreaterThanOrEqual(place, low) & Vector256.LessThan(place, high);
            first += s;
            second = Vector256.MultiplyAddEstimate(s, s, second);
            place += four;
        }

        m[0] = to - from;
        if (Avx.IsSupported)
        {
            Vector256<double> pairs = Avx.HorizontalAdd(first, second);
            (pairs.GetLower() + pairs.GetUpper()).Store(m + 1);
        }
        else
        {
            m[1] = Vector256.Sum(first);
            m[2] = Vector256.Sum(second);
        }
    }

    private static void OfFew(double* values, double* weights, int count, double reference, double signedInverse, double* m, int degree)
    {
        for (int k = 0; k <= degree; k++)
        {
            m[k] = 0;
        }

        for (int i = 0; i < count; i++)
        {
            double s = (values[i] - reference) * signedInverse;
            double power = weights == null ? 1 : weights[i];
            for (int k = 0; k <= degree; k++)
            {
                m[k] += power;
                power *= s;
            }
        }
    }

    // The common case in registers.
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static void OfBlockSquares(double* values, int count, double reference, double signedInverse, double* m)
    {
        Vector256<double> origin = Vector256.Create(reference);
        Vector256<double> inverse = Vector256.Create(signedInverse);
        Vector256<double> first = default, second = default;
        for (int i = 0; i < count; i += 4)
        {
            Vector256<double> s = (Vector256.Load(values + i) - origin) * inverse;
            first += s;
            second = Vector256.MultiplyAddEstimate(s, s, second);
        }

        m[0] = count;
        m[1] = Vector256.Sum(first);
        m[2] = Vector256.Sum(second);
    }
}
