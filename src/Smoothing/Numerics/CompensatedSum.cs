namespace Smoothing.Numerics;

/// <summary>A running sum that carries its rounding error along.</summary>
/// <remarks>
/// Method: Neumaier (1974), the branch on the larger operand of Kahan's idea. The error of the total is about one
/// rounding of the result plus n·eps² times the sum of magnitudes. Infinite terms give an infinite total.
/// </remarks>
internal struct CompensatedSum
{
    private double _sum;
    private double _carry;

    public readonly double Value => double.IsFinite(_sum) ? _sum + _carry : _sum;

    public void Add(double term)
    {
        double total = _sum + term;
        _carry += Math.Abs(_sum) >= Math.Abs(term) ? (_sum - total) + term : (term - total) + _sum;
        _sum = total;
    }
}
