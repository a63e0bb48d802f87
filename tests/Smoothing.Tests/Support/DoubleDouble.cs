namespace Smoothing.Tests.Support;

/// <summary>Numbers of about 31 digits as an unevaluated sum of two doubles, for reference sums. Source: Dekker (1971), Knuth (TAOCP 2, §4.2.2).</summary>
internal readonly struct DoubleDouble
{
    public readonly double High;
    public readonly double Low;

    private DoubleDouble(double high, double low)
    {
        High = high;
        Low = low;
    }

    public static implicit operator DoubleDouble(double value) => new(value, 0);

    public static explicit operator double(DoubleDouble value) => value.High + value.Low;

    public static DoubleDouble operator -(DoubleDouble a) => new(-a.High, -a.Low);

    public static DoubleDouble operator +(DoubleDouble a, DoubleDouble b)
    {
        (double s, double e) = TwoSum(a.High, b.High);
        (double t, double f) = TwoSum(a.Low, b.Low);
        (s, e) = TwoSum(s, e + t);
        return Renormalised(s, e + f);
    }

    public static DoubleDouble operator -(DoubleDouble a, DoubleDouble b) => a + -b;

    public static DoubleDouble operator *(DoubleDouble a, DoubleDouble b)
    {
        double p = a.High * b.High;
        double e = Math.FusedMultiplyAdd(a.High, b.High, -p);
        return Renormalised(p, e + ((a.High * b.Low) + (a.Low * b.High)));
    }

    public static DoubleDouble operator /(DoubleDouble a, DoubleDouble b)
    {
        double first = a.High / b.High;
        DoubleDouble rest = a - (b * first);
        double second = rest.High / b.High;
        rest -= b * second;
        return (DoubleDouble)first + second + (rest.High / b.High);
    }

    public static bool operator <(DoubleDouble a, DoubleDouble b) => (a - b).High < 0;

    public static bool operator >(DoubleDouble a, DoubleDouble b) => (a - b).High > 0;

    public static DoubleDouble Abs(DoubleDouble a) => a.High < 0 ? -a : a;

    public static DoubleDouble Power(DoubleDouble a, int exponent)
    {
        DoubleDouble result = 1;
        for (int i = 0; i < exponent; i++)
        {
            result *= a;
        }

        return result;
    }

    /// <summary>eᵃ by the Taylor series of a/2¹⁰, squared ten times; relative error about 1e-28 for |a| below 700.</summary>
    public static DoubleDouble Exp(DoubleDouble a)
    {
        // e^a = 2^k e^r with r = a − k ln 2, so that no square loses the small.
        double k = Math.Round(a.High / Math.Log(2));
        DoubleDouble ln2 = new(0.69314718055994528623, 2.3190468138462995584e-17);
        DoubleDouble r = (a - (ln2 * k)) / 1024;
        DoubleDouble term = 1, sum = 0;
        for (int i = 1; i <= 12; i++)
        {
            term = term * r / i;
            sum += term;
        }

        // (1 + s)² − 1 = s(2 + s): the small part keeps its digits.
        for (int i = 0; i < 10; i++)
        {
            sum *= sum + 2;
        }

        sum += 1;
        double half = Math.Floor(k / 2);
        double scale = Math.ScaleB(1, (int)half);
        double other = Math.ScaleB(1, (int)(k - half));
        return new DoubleDouble(sum.High * scale * other, sum.Low * scale * other);
    }

    private static (double Sum, double Error) TwoSum(double a, double b)
    {
        double sum = a + b;
        double part = sum - a;
        return (sum, (a - (sum - part)) + (b - part));
    }

    private static DoubleDouble Renormalised(double high, double low)
    {
        double sum = high + low;
        return new DoubleDouble(sum, low - (sum - high));
    }
}
