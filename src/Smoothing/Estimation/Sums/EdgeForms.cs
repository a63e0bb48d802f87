using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;

namespace Smoothing.Estimation;

/// <summary>A kernel's polynomial in edge distances, at four distances at once and from moments: a type per degree, so that loops are compiled for it.</summary>
internal unsafe interface IEdgeForm
{
    /// <summary>P(s).</summary>
    Vector256<double> At(Vector256<double> s);

    /// <summary>Σ w P(a + s) from the moments of s.</summary>
    Vector256<double> From(double* moments, Vector256<double> a);
}

/// <summary>Degrees up to 2: uniform, triangular, Epanechnikov.</summary>
internal readonly unsafe struct QuadraticForm(double* coefficients, int degree) : IEdgeForm
{
    private readonly Vector256<double> _p0 = Vector256.Create(coefficients[0]);
    private readonly Vector256<double> _p1 = Vector256.Create(degree < 1 ? 0 : coefficients[1]);
    private readonly Vector256<double> _p2 = Vector256.Create(degree < 2 ? 0 : coefficients[2]);
    private readonly int _degree = degree;

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public Vector256<double> At(Vector256<double> s) => Vector256.MultiplyAddEstimate(Vector256.MultiplyAddEstimate(_p2, s, _p1), s, _p0);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public Vector256<double> From(double* moments, Vector256<double> a)
    {
        Vector256<double> m0 = Vector256.Create(moments[0]);
        Vector256<double> m1 = Vector256.Create(_degree < 1 ? 0 : moments[1]);
        Vector256<double> m2 = Vector256.Create(_degree < 2 ? 0 : moments[2]);
        Vector256<double> s1 = Vector256.MultiplyAddEstimate(a, m0, m1);
        Vector256<double> s2 = Vector256.MultiplyAddEstimate(a, s1 + m1, m2);
        return Vector256.MultiplyAddEstimate(_p2, s2, Vector256.MultiplyAddEstimate(_p1, s1, _p0 * m0));
    }
}

/// <summary>Any degree.</summary>
internal readonly unsafe struct GeneralForm(double* coefficients, int degree) : IEdgeForm
{
    private readonly double* _coefficients = coefficients;
    private readonly int _degree = degree;

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public Vector256<double> At(Vector256<double> s)
    {
        Vector256<double> p = Vector256.Create(_coefficients[_degree]);
        for (int k = _degree - 1; k >= 0; k--)
        {
            p = Vector256.MultiplyAddEstimate(p, s, Vector256.Create(_coefficients[k]));
        }

        return p;
    }

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public Vector256<double> From(double* moments, Vector256<double> a)
    {
        Vector256<double>* m = stackalloc Vector256<double>[EdgeMoments.MaximumDegree + 1];
        for (int k = 0; k <= _degree; k++)
        {
            m[k] = Vector256.Create(moments[k]);
        }

        for (int pass = 1; pass <= _degree; pass++)
        {
            for (int k = _degree; k >= pass; k--)
            {
                m[k] = Vector256.MultiplyAddEstimate(a, m[k - 1], m[k]);
            }
        }

        Vector256<double> sum = default;
        for (int k = _degree; k >= 0; k--)
        {
            sum = Vector256.MultiplyAddEstimate(Vector256.Create(_coefficients[k]), m[k], sum);
        }

        return sum;
    }
}
