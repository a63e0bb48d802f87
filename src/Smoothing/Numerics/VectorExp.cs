using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;

namespace Smoothing.Numerics;

/// <summary>eˣ for four numbers at once: at most 2 units in the last place for −708 ≤ x ≤ 700, 0 below.</summary>
/// <remarks>
/// Method: x = k ln 2 + r with |r| ≤ ln 2/2, ln 2 in two parts so that k times the first is exact (Cody &amp; Waite); the Taylor
/// polynomial of degree 13 in r misses less than 5e-18; 2ᵏ goes into the exponent bits. Own code because the library's is slow
/// until it has been compiled twice, and a one-shot program never gets there.
/// </remarks>
internal static class VectorExp
{
    private const double InverseLn2 = 1.4426950408889634074;
    private const double Ln2High = 6.93147180369123816490e-01; // the first 33 bits
    private const double Ln2Low = 1.90821492927058770002e-10;
    private const double Rounder = 6755399441055744; // 1.5·2⁵²: adding it rounds to a whole number that the low bits hold
    private const double Least = -708; // e^−708 is the last result with a full exponent

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static Vector256<double> Of(Vector256<double> x)
    {
        Vector256<double> shifted = Vector256.MultiplyAddEstimate(x, Vector256.Create(InverseLn2), Vector256.Create(Rounder));
        Vector256<double> k = shifted - Vector256.Create(Rounder);
        Vector256<double> r = Vector256.MultiplyAddEstimate(k, Vector256.Create(-Ln2High), x);
        r = Vector256.MultiplyAddEstimate(k, Vector256.Create(-Ln2Low), r);

        // 1 + r + r²(1/2! + r/3! + … + r¹¹/13!), the bracket by pairs, fours and eights (Estrin): a third of the waiting of one long chain.
        Vector256<double> r2 = r * r, r4 = r2 * r2;
        Vector256<double> p01 = Vector256.MultiplyAddEstimate(r, Vector256.Create(1 / 6.0), Vector256.Create(0.5));
        Vector256<double> p23 = Vector256.MultiplyAddEstimate(r, Vector256.Create(1 / 120.0), Vector256.Create(1 / 24.0));
        Vector256<double> p45 = Vector256.MultiplyAddEstimate(r, Vector256.Create(1 / 5040.0), Vector256.Create(1 / 720.0));
        Vector256<double> p67 = Vector256.MultiplyAddEstimate(r, Vector256.Create(1 / 362880.0), Vector256.Create(1 / 40320.0));
        Vector256<double> p89 = Vector256.MultiplyAddEstimate(r, Vector256.Create(1 / 39916800.0), Vector256.Create(1 / 3628800.0));
        Vector256<double> p1011 = Vector256.MultiplyAddEstimate(r, Vector256.Create(1 / 6227020800.0), Vector256.Create(1 / 479001600.0));
        Vector256<double> low = Vector256.MultiplyAddEstimate(r2, p23, p01), middle = Vector256.MultiplyAddEstimate(r2, p67, p45);
        Vector256<double> high = Vector256.MultiplyAddEstimate(r2, p1011, p89);
        Vector256<double> p = Vector256.MultiplyAddEstimate(r4, Vector256.MultiplyAddEstimate(r4, high, middle), low);
        p = Vector256<double>.One + Vector256.MultiplyAddEstimate(r2, p, r);
        Vector256<double> result = (p.AsInt64() + (shifted.AsInt64() << 52)).AsDouble();
        return Vector256.ConditionalSelect(Vector256.LessThan(x, Vector256.Create(Least)), Vector256<double>.Zero, result);
    }
}
