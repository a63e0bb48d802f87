namespace Smoothing.Estimation;

internal sealed unsafe partial class CompactCells
{
    private void Slide(double bandwidth, double* polynomial, double factor, Span<double> destination)
    {
        int stride = _degree + 1;
        int cells = (3 * _points) + 1;
        double* moments = Settle(cells);
        double* front = _front.Of(2L * cells * stride);
        double* room = stackalloc double[4 * stride];
        double* cut = Breakpoints;
        var left = new SlidingMoments(front, room, moments, 2 * stride, 0, _degree, _inverse, cut, upper: false);
        var right = new SlidingMoments(front + ((long)cells * stride), room + (2 * stride), moments, 2 * stride, stride, _degree, _inverse, cut, upper: true);
        for (int j = 0; j < _points; j++)
        {
            double x = _sortedPoints[j];
            double sum = left.Sum(_lower[j] + 1, _middle[j] + 1, WindowEnd.Of(x, -bandwidth), polynomial)
                + right.Sum(_middle[j] + 1, _upper[j] + 1, WindowEnd.Of(x, bandwidth), polynomial);
            destination[_order[j]] = sum * factor;
        }
    }

    // Moments about the lower end of each cell, then about its upper end, in bandwidths. b + c = 1, so bʲ = Σ_p C(D − j, p) bᴰ⁻ᵖcᵖ: neighbours added up D − j times.
    private double* Settle(int cells)
    {
        int degree = (4 * _vectors) - 2;
        int stride = _degree + 1;
        double* moments = _moments.Of(2L * cells * stride);
        double* terms = stackalloc double[EdgeMoments.MaximumDegree + 2];
        for (int k = 1; k < cells - 1; k++)
        {
            double* lower = moments + (2L * stride * k);
            double* upper = lower + stride;
            double count = Terms(k, terms);
            double* ends = _records.Pointer + ((long)_stride * k) + (4 * _vectors);
            double width = count == 0 ? 0 : (ends[1] - ends[0]) * _inverse;
            for (int j = degree; j >= 1; j--)
            {
                if (j <= _degree)
                {
                    double scale = 1;
                    for (int q = 0; q < j; q++)
                    {
                        scale *= width;
                    }

                    lower[j] = scale * terms[0];
                    upper[j] = scale * terms[j];
                }

                for (int p = 0; p < j; p++)
                {
                    terms[p] += terms[p + 1];
                }
            }

            lower[0] = count;
            upper[0] = count;
        }

        return moments;
    }

    // terms[p] = Σ w bᴰ⁻ᵖcᵖ of one cell with what was carried; returns Σ w.
    private double Terms(int cell, double* terms)
    {
        int width = 4 * _vectors;
        if (_places[cell] > 0)
        {
            Carry(_records.Pointer, cell);
            double* sums = _carried.Pointer + (2L * width * (_places[cell] - 1));
            double* settled = _records.Pointer + ((long)_stride * cell);
            for (int t = 0; t < width; t++)
            {
                settled[t] = sums[t] + sums[width + t];
            }
        }

        double* record = _records.Pointer + ((long)_stride * cell);
        for (int r = 1; r < _vectors; r++)
        {
            for (int t = 0; t < 4; t++)
            {
                terms[(4 * (_vectors - 1 - r)) + t] = record[(4 * r) + t];
            }
        }

        for (int t = 0; t < 3; t++)
        {
            terms[width - 4 + t] = record[1 + t];
        }

        return record[0];
    }
}
