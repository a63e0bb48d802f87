using System.Runtime.CompilerServices;

namespace Smoothing.Estimation;

/// <summary>Edge moments that grow block by block, with the rounding error of every addition carried along.</summary>
/// <remarks>
/// Method: error-free sums (Knuth) of the growing moments; their errors are moved and added like moments. What is left is
/// one rounding per product, relative to what the product adds, whatever the number of blocks.
/// </remarks>
internal readonly unsafe struct RunningMoments
{
    private readonly double* _sums;
    private readonly double* _errors;
    private readonly int _degree;

    /// <param name="room">Twice the number of moments, on the stack of the caller.</param>
    /// <param name="degree">Highest power.</param>
    public RunningMoments(double* room, int degree)
    {
        _sums = room;
        _errors = room + degree + 1;
        _degree = degree;
        Clear();
    }

    public void Clear()
    {
        for (int k = 0; k <= _degree; k++)
        {
            _sums[k] = 0;
            _errors[k] = 0;
        }
    }

    /// <summary>Moves the reference outwards by <paramref name="a"/> ≥ 0 bandwidths.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public void Shift(double a)
    {
        for (int pass = 1; pass <= _degree; pass++)
        {
            for (int k = _degree; k >= pass; k--)
            {
                AddTo(k, a * _sums[k - 1]);
                _errors[k] += a * _errors[k - 1];
            }
        }
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public void Add(double* block)
    {
        for (int k = 0; k <= _degree; k++)
        {
            AddTo(k, block[k]);
        }
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public void Store(double* destination)
    {
        for (int k = 0; k <= _degree; k++)
        {
            destination[k] = _sums[k] + _errors[k];
        }
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private void AddTo(int k, double term)
    {
        double sum = _sums[k] + term;
        double part = sum - _sums[k];
        _errors[k] += (_sums[k] - (sum - part)) + (term - part);
        _sums[k] = sum;
    }
}
