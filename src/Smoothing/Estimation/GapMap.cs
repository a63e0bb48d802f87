namespace Smoothing.Estimation;

/// <summary>Moves values together across gaps wider than a limit, which leaves every sum over near pairs as it was.</summary>
/// <remarks>A closed place counts from the first value of the sample; each run of values keeps its own anchor, so far values lose no digits.</remarks>
internal sealed class GapMap
{
    private readonly double[] _ends;
    private readonly double[] _anchors;
    private readonly double[] _places;
    private readonly double _gap;

    private GapMap(double[] ends, double[] anchors, double[] places, double gap, double length)
    {
        _ends = ends;
        _anchors = anchors;
        _places = places;
        _gap = gap;
        Length = length;
    }

    /// <summary>Moves nothing and counts from 0.</summary>
    public static GapMap None { get; } = new([], [0], [0], double.PositiveInfinity, 0);

    /// <summary>Distance of the outermost values after closing.</summary>
    public double Length { get; }

    /// <summary>The limit: gaps above it were closed to it.</summary>
    public double Gap => _gap;

    /// <summary>Number of gaps closed.</summary>
    public int Count => _ends.Length;

    /// <summary>Closes every gap of the increasing <paramref name="values"/> above <paramref name="gap"/> to just that.</summary>
    public static GapMap Of(ReadOnlySpan<double> values, double gap)
    {
        var ends = new List<double>();
        var anchors = new List<double> { values[0] };
        var places = new List<double> { 0 };
        for (int i = 1; i < values.Length; i++)
        {
            if (values[i] - values[i - 1] > gap)
            {
                ends.Add(values[i - 1]);
                places.Add(places[^1] + (values[i - 1] - anchors[^1]) + gap);
                anchors.Add(values[i]);
            }
        }

        return new GapMap([.. ends], [.. anchors], [.. places], gap, places[^1] + (values[^1] - anchors[^1]));
    }

    /// <summary>Where a value of the sample lies after closing; <paramref name="run"/> moves along with increasing values.</summary>
    public double Close(double value, ref int run)
    {
        while (run < _ends.Length && value > _ends[run])
        {
            run++;
        }

        return value - _anchors[run] + _places[run];
    }

    /// <summary>The point of the line behind a closed place; places inside a closed gap belong to its nearer end.</summary>
    public double Open(double place)
    {
        int run = Array.BinarySearch(_places, place + (0.5 * _gap));
        run = run < 0 ? Math.Max(0, ~run - 1) : run;
        return Count == 0 ? place + _anchors[0] : place - _places[run] + _anchors[run];
    }

    /// <summary>Where any point lies after closing; false deep inside a closed gap, farther than half of the limit from both ends.</summary>
    public bool TryClose(double x, out double closed)
    {
        int run = Array.BinarySearch(_ends, x);
        run = run < 0 ? ~run : run;
        if (run > 0 && x < _anchors[run])
        {
            bool nearLeft = x - _ends[run - 1] <= 0.5 * _gap;
            if (!nearLeft && _anchors[run] - x > 0.5 * _gap)
            {
                closed = double.NaN;
                return false;
            }

            run -= nearLeft ? 1 : 0;
        }

        closed = x - _anchors[run] + _places[run];
        return true;
    }
}
