namespace Smoothing.Estimation;

/// <summary>Edge moments that grow block by block, with the rounding error of every addition carried along.</summary>
/// <remarks>
/// Method: error-free sums (Knuth) of the growing moments; their errors are moved and added like moments. What is left is
/// one rounding per product, relative to what the product adds, whatever the number of blocks.
/// </remarks>
internal readonly unsafe ref struct RunningMoments
{
    private readonly Span<double> _sums;
    private readonly Span<double> _errors;

    /// <param name="room">Twice the number of moments.</param>
    public RunningMoments(Span<double> room)
    {
        room.Clear();
        _sums = room[..(room.Length / 2)];
        _errors = room[(room.Length / 2)..];
    }

    public void Clear()
    {
        _sums.Clear();
        _errors.Clear();
    }

    /// <summary>Moves the reference outwards by <paramref name="a"/> ≥ 0 bandwidths.</summary>
    public void Shift(double a)
    {
        if (a == 0)
        {
            return;
        }

        for (int pass = 1; pass < _sums.Length; pass++)
        {
            for (int k = _sums.Length - 1; k >= pass; k--)
            {
                AddTo(k, a * _sums[k - 1]);
                _errors[k] += a * _errors[k - 1];
            }
        }
    }

    public void Add(double* block)
    {
        for (int k = 0; k < _sums.Length; k++)
        {
            AddTo(k, block[k]);
        }
    }

    public void Store(Span<double> destination)
    {
        for (int k = 0; k < destination.Length; k++)
        {
            destination[k] = _sums[k] + _errors[k];
        }
    }

    private void AddTo(int k, double term)
    {
        double sum = _sums[k] + term;
        double part = sum - _sums[k];
        _errors[k] += (_sums[k] - (sum - part)) + (term - part);
        _sums[k] = sum;
    }
}
