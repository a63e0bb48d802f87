using System.Runtime.CompilerServices;

namespace Smoothing.Estimation;

/// <summary>Moments of a window that slides over cells, by two stacks: nothing is ever taken away, so nothing cancels.</summary>
/// <remarks>
/// Method: the window is a front, for which sums from every cell to the front's end were laid down when it was made, and a
/// back that grows cell by cell. When the front is used up, the back becomes the next front. Half windows left of x refer to
/// lower ends of cells, half windows right of x to upper ends. Each cell is touched twice. Source: common practice.
/// </remarks>
internal unsafe struct SlidingMoments
{
    private readonly double* _front;
    private readonly double* _records;
    private readonly double* _cut;
    private readonly long _record;
    private readonly int _offset;
    private readonly int _degree;
    private readonly double _inverse;
    private readonly bool _upper;
    private readonly RunningMoments _back;
    private int _frontEnd;   // the front reaches up to here, the back from here on
    private int _backEnd;
    private double _frontReference; // upper form: the end that the whole front refers to
    private double _backReference;

    public SlidingMoments(
        double* front, double* room, double* records, long record, int offset, int degree, double inverse, double* cut, bool upper)
    {
        _front = front;
        _records = records;
        _record = record;
        _offset = offset;
        _degree = degree;
        _inverse = inverse;
        _cut = cut;
        _upper = upper;
        _back = new RunningMoments(room, degree);
    }

    /// <summary>Σ w P over cells [from, to); neither end ever falls from call to call.</summary>
    [SkipLocalsInit]
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public double Sum(int from, int to, WindowEnd end, double* polynomial)
    {
        if (from >= _frontEnd)
        {
            Rebuild(from, Math.Max(from, to));
        }

        while (_backEnd < to)
        {
            Push(_backEnd++);
        }

        double* moments = stackalloc double[EdgeMoments.MaximumDegree + 1];
        double sum = 0;
        if (from < _frontEnd)
        {
            double reference = _upper ? _frontReference : _cut[from - 1];
            sum = EdgeMoments.Evaluate(_front + ((long)from * (_degree + 1)), Distance(reference, end), polynomial, _degree);
        }

        if (_backEnd > _frontEnd)
        {
            _back.Store(moments);
            sum += EdgeMoments.Evaluate(moments, Distance(_backReference, end), polynomial, _degree);
        }

        return sum;
    }

    private readonly double Distance(double reference, WindowEnd end) =>
        _upper ? (end.High - reference + end.Low) * _inverse : (reference - end.High - end.Low) * _inverse;

    // The largest double inside cell k, to which upper moments refer; cells never reach their upper breakpoint.
    private readonly double Upper(int k) => Math.BitDecrement(_cut[k]);

    [SkipLocalsInit]
    private void Push(int k)
    {
        double* block = stackalloc double[EdgeMoments.MaximumDegree + 1];
        Copy(k, block);
        bool first = k == _frontEnd;
        if (_upper)
        {
            double reference = Upper(k);
            _back.Shift(first ? 0 : (reference - _backReference) * _inverse);
            _backReference = reference;
        }
        else
        {
            _backReference = first ? _cut[k - 1] : _backReference;
            if (!first && block[0] != 0)
            {
                EdgeMoments.Shift(block, _degree, (_cut[k - 1] - _backReference) * _inverse);
            }
        }

        _back.Add(block);
    }

    [SkipLocalsInit]
    private void Rebuild(int from, int to)
    {
        double* block = stackalloc double[EdgeMoments.MaximumDegree + 1];
        _back.Clear();
        _frontReference = to > from ? Upper(to - 1) : 0;
        for (int k = to - 1; k >= from; k--)
        {
            Copy(k, block);
            if (_upper)
            {
                if (block[0] != 0)
                {
                    EdgeMoments.Shift(block, _degree, (_frontReference - Upper(k)) * _inverse);
                }
            }
            else
            {
                _back.Shift(k == to - 1 ? 0 : (_cut[k] - _cut[k - 1]) * _inverse);
            }

            _back.Add(block);
            _back.Store(_front + ((long)k * (_degree + 1)));
        }

        _back.Clear();
        _frontEnd = to;
        _backEnd = to;
    }

    private readonly void Copy(int k, double* block)
    {
        double* source = _records + (k * _record) + _offset;
        for (int r = 0; r <= _degree; r++)
        {
            block[r] = source[r];
        }
    }
}
