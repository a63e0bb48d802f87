using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;
using Smoothing.Numerics;

namespace Smoothing.Estimation;

/// <summary>Σ over a run of cells of e^(−a²/2) Σ gₛ tˢ: the one loop behind densities, derivatives and distribution functions.</summary>
internal static unsafe class MomentEvaluator
{
    /// <summary>Cells of a dense table: a = (offset − lane − 4·group)·D, with <paramref name="offset"/> the place of x in cells from the middle of the first one.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public static double Dense(double* coefficients, int terms, double offset, double step, int from, int to)
    {
        Vector256<double> d = Vector256.Create(step), lanes = Vector256.Create(0.0, 1, 2, 3), minusHalf = Vector256.Create(-0.5);
        Vector256<double> sum = default, second = default;
        int g = from;
        long stride = 4L * terms;
        double* c = coefficients + (from * stride);
        for (; g + 1 < to; g += 2, c += 2 * stride)
        {
            // offset − 4g has an exact result near the window, so a carries one rounding.
            Vector256<double> a = (Vector256.Create(offset - (4.0 * g)) - lanes) * d, b = (Vector256.Create(offset - (4.0 * (g + 1))) - lanes) * d;
            Vector256<double> t = a * d, v = b * d;
            double* top = c + stride - 4;
            Vector256<double> p = Vector256.Load(top), q = Vector256.Load(top + stride);
            for (top -= 4; top >= c; top -= 4)
            {
                p = Vector256.MultiplyAddEstimate(p, t, Vector256.Load(top));
                q = Vector256.MultiplyAddEstimate(q, v, Vector256.Load(top + stride));
            }

            sum += VectorExp.Of(a * a * minusHalf) * p;
            second += VectorExp.Of(b * b * minusHalf) * q;
        }

        if (g < to)
        {
            Vector256<double> a = (Vector256.Create(offset - (4.0 * g)) - lanes) * d;
            Vector256<double> t = a * d;
            double* top = c + stride - 4;
            Vector256<double> p = Vector256.Load(top);
            for (top -= 4; top >= c; top -= 4)
            {
                p = Vector256.MultiplyAddEstimate(p, t, Vector256.Load(top));
            }

            sum += VectorExp.Of(a * a * minusHalf) * p;
        }

        return Vector256.Sum(sum + second);
    }

    /// <summary>Three tables of one lattice at once: the exponentials are shared.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public static void DenseThree(MomentTable first, MomentTable second, MomentTable third, double offset, double step, int from, int to, double* sums)
    {
        Vector256<double> d = Vector256.Create(step), lanes = Vector256.Create(0.0, 1, 2, 3), minusHalf = Vector256.Create(-0.5);
        Vector256<double> s0 = default, s1 = default, s2 = default;
        double* c0 = first.Coefficients + (from * 4L * first.Terms), c1 = second.Coefficients + (from * 4L * second.Terms), c2 = third.Coefficients + (from * 4L * third.Terms);
        int shared = Math.Min(first.Terms, Math.Min(second.Terms, third.Terms));
        for (int g = from; g < to; g++, c0 += 4 * first.Terms, c1 += 4 * second.Terms, c2 += 4 * third.Terms)
        {
            Vector256<double> a = (Vector256.Create(offset - (4.0 * g)) - lanes) * d;
            Vector256<double> t = a * d;
            Vector256<double> p = Above(c0, first.Terms, shared, t), q = Above(c1, second.Terms, shared, t), r = Above(c2, third.Terms, shared, t);
            for (int k = 4 * (shared - 1); k >= 0; k -= 4)
            {
                p = Vector256.MultiplyAddEstimate(p, t, Vector256.Load(c0 + k));
                q = Vector256.MultiplyAddEstimate(q, t, Vector256.Load(c1 + k));
                r = Vector256.MultiplyAddEstimate(r, t, Vector256.Load(c2 + k));
            }

            Vector256<double> e = VectorExp.Of(a * a * minusHalf);
            s0 += e * p;
            s1 += e * q;
            s2 += e * r;
        }

        sums[0] = Vector256.Sum(s0);
        sums[1] = Vector256.Sum(s1);
        sums[2] = Vector256.Sum(s2);
    }

    // Horner over the coefficients from the highest down to, and not with, the shared ones.
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static Vector256<double> Above(double* c, int terms, int shared, Vector256<double> t)
    {
        Vector256<double> p = default;
        for (int k = terms - 1; k >= shared; k--)
        {
            p = Vector256.MultiplyAddEstimate(p, t, Vector256.Load(c + (4 * k)));
        }

        return p;
    }

    /// <summary>Occupied cells with numbers of their own; x in cells is <paramref name="u"/>.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public static double Sparse(double* coefficients, int terms, double* numbers, double u, double step, int from, int to)
    {
        Vector256<double> d = Vector256.Create(step), place = Vector256.Create(u), half = Vector256.Create(0.5), minusHalf = Vector256.Create(-0.5);
        Vector256<double> sum = default;
        long stride = 4L * terms;
        double* c = coefficients + (from * stride);
        for (int g = from; g < to; g++, c += stride)
        {
            // u − k is exact where it matters: both are near each other.
            Vector256<double> a = (place - Vector256.Load(numbers + (4 * g)) - half) * d;
            Vector256<double> t = a * d;
            double* top = c + stride - 4;
            Vector256<double> p = Vector256.Load(top);
            for (top -= 4; top >= c; top -= 4)
            {
                p = Vector256.MultiplyAddEstimate(p, t, Vector256.Load(top));
            }

            // Far from a cell the polynomial may be infinite where the exponential is 0.
            Vector256<double> e = VectorExp.Of(a * a * minusHalf);
            sum += Vector256.ConditionalSelect(Vector256.Equals(e, Vector256<double>.Zero), e, e * p);
        }

        return Vector256.Sum(sum);
    }
}
