using System.Numerics;

namespace Smoothing.Numerics;

/// <summary>An exact fraction, for constants that are rounded once, at the end.</summary>
internal readonly record struct Rational(BigInteger Numerator, BigInteger Denominator)
{
    public static Rational Zero { get; } = new(0, 1);

    public static Rational Of(long numerator, long denominator = 1) => new(numerator, denominator);

    public static Rational operator +(Rational a, Rational b) => Reduced((a.Numerator * b.Denominator) + (b.Numerator * a.Denominator), a.Denominator * b.Denominator);

    public static Rational operator *(Rational a, Rational b) => Reduced(a.Numerator * b.Numerator, a.Denominator * b.Denominator);

    /// <summary>The nearest double, to one rounding: the quotient carries 70 bits before it is cut.</summary>
    public double ToDouble()
    {
        if (Numerator.IsZero)
        {
            return 0;
        }

        int shift = 70 - (int)(BigInteger.Abs(Numerator).GetBitLength() - Denominator.GetBitLength());
        BigInteger quotient = shift >= 0 ? (Numerator << shift) / Denominator : Numerator / (Denominator << -shift);
        return Math.ScaleB((double)quotient, -shift);
    }

    private static Rational Reduced(BigInteger numerator, BigInteger denominator)
    {
        BigInteger divisor = BigInteger.GreatestCommonDivisor(numerator, denominator);
        return divisor.IsOne ? new(numerator, denominator) : new(numerator / divisor, denominator / divisor);
    }
}
