using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;
using Smoothing.Numerics;

namespace Smoothing.Estimation;

/// <summary>The plain double loop for the Gaussian at any points, four values at a time: the shortest way for few values and points.</summary>
/// <remarks>Method: Σ w e^(−u²/2) q(u), q a polynomial; a handful of roundings a term. Equally spaced points go to <see cref="GaussianGrid"/>.</remarks>
internal static unsafe class GaussianDirect
{
    /// <summary>destination[j] = factor · Σ w e^(−u²/2) q(u), u = (x_j − X)/h; coefficients of q lowest power first; weights may be null.</summary>
    public static void Scattered(
        double* values, double* weights, int count, double* x, int points, double bandwidth, ReadOnlySpan<double> q, double factor, double* destination)
    {
        int whole = count / 4 * 4; // the last one to three values wait, filled up with weight 0, in a place of their own
        double* rest = stackalloc double[12];
        new Span<double>(rest + 8, 4).Fill(1);
        Remainder(values, weights, whole, count, rest);
        double* mass = weights == null ? rest + 8 : weights;
        int pace = weights == null ? 0 : 4;
        fixed (double* coefficients = q)
        {
            for (int j = 0; j < points; j++)
            {
                double sum = Sum(values, mass, pace, whole, x[j], 1 / bandwidth, coefficients, q.Length);
                sum += whole < count ? Sum(rest, rest + 4, 4, 4, x[j], 1 / bandwidth, coefficients, q.Length) : 0;
                destination[j] = sum * factor;
            }
        }
    }

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private static double Sum(double* values, double* mass, int pace, int count, double x, double inverse, double* q, int terms)
    {
        Vector256<double> centre = Vector256.Create(x), scale = Vector256.Create(inverse), minusHalf = Vector256.Create(-0.5), sum = default;
        Vector256<double> lowest = Vector256.Create(q[0]);
        for (int i = 0; i < count; i += 4, mass += pace)
        {
            Vector256<double> u = (centre - Vector256.Load(values + i)) * scale;
            Vector256<double> term = VectorExp.Of(u * u * minusHalf) * Vector256.Load(mass);
            if (terms == 1)
            {
                sum += term * lowest;
                continue;
            }

            Vector256<double> p = Vector256.Create(q[terms - 1]);
            for (int k = terms - 2; k >= 0; k--)
            {
                p = Vector256.MultiplyAddEstimate(p, u, Vector256.Create(q[k]));
            }

            // Far away the polynomial may be infinite where the exponential is 0.
            sum += Vector256.ConditionalSelect(Vector256.Equals(term, Vector256<double>.Zero), term, term * p);
        }

        return Vector256.Sum(sum);
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
