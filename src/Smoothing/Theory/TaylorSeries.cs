namespace Smoothing.Theory;

/// <summary>A truncated power series a₀ + a₁t + …: derivatives of any order of a formula, without differences.</summary>
/// <remarks>Method: the usual recurrences of power-series arithmetic (Knuth, TAOCP 2, sec. 4.7); rounding only.</remarks>
internal sealed class TaylorSeries
{
    private readonly double[] _a;

    private TaylorSeries(double[] a) => _a = a;

    public double this[int i] => _a[i];

    public static TaylorSeries Variable(double x, int order)
    {
        var a = new double[order + 1];
        a[0] = x;
        if (order > 0)
        {
            a[1] = 1;
        }

        return new(a);
    }

    public static TaylorSeries operator +(TaylorSeries s, double c)
    {
        double[] a = [.. s._a];
        a[0] += c;
        return new(a);
    }

    public static TaylorSeries operator +(TaylorSeries s, TaylorSeries t) => new([.. s._a.Zip(t._a, (x, y) => x + y)]);

    public static TaylorSeries operator *(TaylorSeries s, double c) => new([.. s._a.Select(v => v * c)]);

    public static TaylorSeries operator *(TaylorSeries s, TaylorSeries t)
    {
        var a = new double[s._a.Length];
        for (int i = 0; i < a.Length; i++)
        {
            for (int j = 0; j <= i; j++)
            {
                a[i] += s._a[j] * t._a[i - j];
            }
        }

        return new(a);
    }

    public TaylorSeries Exp()
    {
        var a = new double[_a.Length];
        a[0] = Math.Exp(_a[0]);
        for (int i = 1; i < a.Length; i++)
        {
            for (int j = 1; j <= i; j++)
            {
                a[i] += j * _a[j] * a[i - j] / i;
            }
        }

        return new(a);
    }

    public TaylorSeries Log()
    {
        var a = new double[_a.Length];
        a[0] = Math.Log(_a[0]);
        for (int i = 1; i < a.Length; i++)
        {
            double sum = i * _a[i];
            for (int j = 1; j < i; j++)
            {
                sum -= j * a[j] * _a[i - j];
            }

            a[i] = sum / (i * _a[0]);
        }

        return new(a);
    }

    /// <summary>sᵖ for s₀ > 0, and for whole p ≥ 0 at any s₀.</summary>
    public TaylorSeries Power(double p)
    {
        if (p >= 0 && p <= 64 && p == Math.Floor(p))
        {
            TaylorSeries result = (this * 0) + 1;
            for (int i = 0; i < p; i++)
            {
                result *= this;
            }

            return result;
        }

        var a = new double[_a.Length];
        a[0] = Math.Pow(_a[0], p);
        for (int i = 1; i < a.Length; i++)
        {
            for (int j = 1; j <= i; j++)
            {
                a[i] += ((p * j) - (i - j)) * _a[j] * a[i - j] / (i * _a[0]);
            }
        }

        return new(a);
    }
}
