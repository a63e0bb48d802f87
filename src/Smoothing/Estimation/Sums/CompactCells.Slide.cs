using System.Runtime.CompilerServices;

namespace Smoothing.Estimation;

internal sealed unsafe partial class CompactCells
{
    private void Slide(double bandwidth, double* polynomial, double factor, Span<double> destination)
    {
        int stride = _degree + 1;
        long cells = (3L * _points) + 1;
        double* front = _front.Of(2 * cells * stride);
        double* room = stackalloc double[4 * stride];
        double* cut = Breakpoints;
        double* records = _records.Pointer;
        var left = new SlidingMoments(front, room, records, 2 * _side, 0, _degree, _inverse, cut, upper: false);
        var right = new SlidingMoments(front + (cells * stride), room + (2 * stride), records, 2 * _side, _side, _degree, _inverse, cut, upper: true);
        for (int j = 0; j < _points; j++)
        {
            double x = _sortedPoints[j];
            double sum = left.Sum(_lower[j] + 1, _middle[j] + 1, WindowEnd.Of(x, -bandwidth), polynomial)
                + right.Sum(_middle[j] + 1, _upper[j] + 1, WindowEnd.Of(x, bandwidth), polynomial);
            destination[_order[j]] = sum * factor;
        }
    }
}
