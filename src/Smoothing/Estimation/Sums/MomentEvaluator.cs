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

    /// <summary>Density, slope and count at once. Exponentials are shared, and (e^(−a²/2) g)′ = e^(−a²/2)(D g′(t) − a g(t)) takes the slope from the density's own coefficients.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public static void DenseThree(MomentTable density, MomentTable count, double offset, double step, int from, int to, double* sums)
    {
        Vector256<double> d = Vector256.Create(step), lanes = Vector256.Create(0.0, 1, 2, 3), minusHalf = Vector256.Create(-0.5);
        Vector256<double> s0 = default, s1 = default, s2 = default;
        int shared = Math.Min(density.Terms, count.Terms);
        double* c = density.Coefficients + (from * 4L * density.Terms), n = count.Coefficients + (from * 4L * count.Terms);
        int g = from, top = 4 * (shared - 1);
        long stride = 4L * density.Terms, pace = 4L * count.Terms;
        for (; g + 1 < to; g += 2, c += 2 * stride, n += 2 * pace)
        {
            Vector256<double> a = (Vector256.Create(offset - (4.0 * g)) - lanes) * d, a2 = (Vector256.Create(offset - (4.0 * (g + 1))) - lanes) * d;
            Vector256<double> t = a * d, t2 = a2 * d;
            Highest(c, density.Terms, shared, t, out Vector256<double> p, out Vector256<double> q);
            Highest(c + stride, density.Terms, shared, t2, out Vector256<double> p2, out Vector256<double> q2);
            Highest(n, count.Terms, shared, t, out Vector256<double> r, out _);
            Highest(n + pace, count.Terms, shared, t2, out Vector256<double> r2, out _);
            for (int k = top; k >= 0; k -= 4)
            {
                q = Vector256.MultiplyAddEstimate(q, t, p);
                q2 = Vector256.MultiplyAddEstimate(q2, t2, p2);
                p = Vector256.MultiplyAddEstimate(p, t, Vector256.Load(c + k));
                p2 = Vector256.MultiplyAddEstimate(p2, t2, Vector256.Load(c + stride + k));
                r = Vector256.MultiplyAddEstimate(r, t, Vector256.Load(n + k));
                r2 = Vector256.MultiplyAddEstimate(r2, t2, Vector256.Load(n + pace + k));
            }

            Vector256<double> e = VectorExp.Of(a * a * minusHalf), e2 = VectorExp.Of(a2 * a2 * minusHalf);
            s0 += (e * p) + (e2 * p2);
            s1 += (e * ((q * d) - (a * p))) + (e2 * ((q2 * d) - (a2 * p2)));
            s2 += (e * r) + (e2 * r2);
        }

        if (g < to)
        {
            Vector256<double> a = (Vector256.Create(offset - (4.0 * g)) - lanes) * d;
            Vector256<double> t = a * d;
            Highest(c, density.Terms, shared, t, out Vector256<double> p, out Vector256<double> q);
            Highest(n, count.Terms, shared, t, out Vector256<double> r, out _);
            for (int k = top; k >= 0; k -= 4)
            {
                q = Vector256.MultiplyAddEstimate(q, t, p);
                p = Vector256.MultiplyAddEstimate(p, t, Vector256.Load(c + k));
                r = Vector256.MultiplyAddEstimate(r, t, Vector256.Load(n + k));
            }

            Vector256<double> e = VectorExp.Of(a * a * minusHalf);
            s0 += e * p;
            s1 += e * ((q * d) - (a * p));
            s2 += e * r;
        }

        sums[0] = Vector256.Sum(s0);
        sums[1] = Vector256.Sum(s1);
        sums[2] = Vector256.Sum(s2);
    }

    // Horner over the coefficients that one polynomial has more than the other, with the derivative; usually none.
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static void Highest(double* c, int terms, int shared, Vector256<double> t, out Vector256<double> p, out Vector256<double> q)
    {
        p = default;
        q = default;
        for (int k = terms - 1; k >= shared; k--)
        {
            q = Vector256.MultiplyAddEstimate(q, t, p);
            p = Vector256.MultiplyAddEstimate(p, t, Vector256.Load(c + (4 * k)));
        }
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
