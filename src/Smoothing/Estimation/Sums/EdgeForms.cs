using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;

namespace Smoothing.Estimation;

/// <summary>A kernel's polynomial in edge distances, at four distances at once and from moments: a type per degree, so that loops are compiled for it.</summary>
internal unsafe interface IEdgeForm
{
    /// <summary>sum + P(s) where s ≥ 0, sum elsewhere.</summary>
    Vector256<double> Add(Vector256<double> sum, Vector256<double> s);

    /// <summary>sum + w P(s) where s ≥ 0, sum elsewhere.</summary>
    Vector256<double> Add(Vector256<double> sum, Vector256<double> s, Vector256<double> w);

    /// <summary>sum + P(s) where chosen, sum elsewhere; s in [0, 1] there.</summary>
    Vector256<double> AddChosen(Vector256<double> sum, Vector256<double> s, Vector256<double> chosen);

    /// <summary>Σ w P(a + s) from the moments of s.</summary>
    Vector256<double> From(double* moments, Vector256<double> a);
}

/// <summary>Degrees up to 2 with P(0) = 0: triangular, Epanechnikov.</summary>
internal readonly unsafe struct RisingForm(double* coefficients, int degree) : IEdgeForm
{
    private readonly Vector256<double> _p1 = Vector256.Create(coefficients[1]);
    private readonly Vector256<double> _p2 = Vector256.Create(degree < 2 ? 0 : coefficients[2]);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public Vector256<double> Add(Vector256<double> sum, Vector256<double> s)
    {
        Vector256<double> inside = Vector256.MaxNative(s, Vector256<double>.Zero);
        return Vector256.MultiplyAddEstimate(inside, Vector256.MultiplyAddEstimate(_p2, inside, _p1), sum);
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public Vector256<double> Add(Vector256<double> sum, Vector256<double> s, Vector256<double> w)
    {
        Vector256<double> inside = Vector256.MaxNative(s, Vector256<double>.Zero);
        return Vector256.MultiplyAddEstimate(inside * w, Vector256.MultiplyAddEstimate(_p2, inside, _p1), sum);
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public Vector256<double> AddChosen(Vector256<double> sum, Vector256<double> s, Vector256<double> chosen)
    {
        Vector256<double> inside = s & chosen;
        return Vector256.MultiplyAddEstimate(inside, Vector256.MultiplyAddEstimate(_p2, inside, _p1), sum);
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public Vector256<double> From(double* moments, Vector256<double> a)
    {
        Vector256<double> s1 = Vector256.MultiplyAddEstimate(a, Vector256.Create(moments[0]), Vector256.Create(moments[1]));
        Vector256<double> s2 = Vector256.MultiplyAddEstimate(a, s1 + Vector256.Create(moments[1]), Vector256.Create(moments[2]));
        return Vector256.MultiplyAddEstimate(_p2, s2, _p1 * s1);
    }
}

/// <summary>Any degree.</summary>
internal readonly unsafe struct GeneralForm(double* coefficients, int degree) : IEdgeForm
{
    private readonly double* _coefficients = coefficients;
    private readonly int _degree = degree;

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public Vector256<double> Add(Vector256<double> sum, Vector256<double> s) => sum + (Vector256.GreaterThanOrEqual(s, Vector256<double>.Zero) & At(s));

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public Vector256<double> Add(Vector256<double> sum, Vector256<double> s, Vector256<double> w) =>
        sum + (w * (Vector256.GreaterThanOrEqual(s, Vector256<double>.Zero) & At(s)));

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public Vector256<double> AddChosen(Vector256<double> sum, Vector256<double> s, Vector256<double> chosen) => sum + (chosen & At(s));

    [SkipLocalsInit]
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

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private Vector256<double> At(Vector256<double> s)
    {
        Vector256<double> p = Vector256.Create(_coefficients[_degree]);
        for (int k = _degree - 1; k >= 0; k--)
        {
            p = Vector256.MultiplyAddEstimate(p, s, Vector256.Create(_coefficients[k]));
        }

        return p;
    }
}
