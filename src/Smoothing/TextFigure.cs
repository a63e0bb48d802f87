using System.Text;
using Smoothing.Numerics;

namespace Smoothing;

/// <summary>Draws the curve of a <see cref="FigureModel"/> with block characters, for terminals and logs.</summary>
internal static class TextFigure
{
    private const int Columns = 72;
    private const int Rows = 9;
    private const string Blocks = " ▁▂▃▄▅▆▇█";

    public static IReadOnlyList<string> Draw(FigureModel figure)
    {
        double from = figure.X[0];
        double to = figure.X[^1];
        double peak = Math.Max(Math.Max(figure.Y.Max(), figure.Second.Count > 0 ? figure.Second.Max() : 0), double.Epsilon);
        int[] limits = figure.Limits.Where(l => l.X >= from && l.X <= to).Select(l => Column(l.X, from, to)).ToArray();
        var lines = new List<string>();
        for (int row = Rows - 1; row >= 0; row--)
        {
            var line = new StringBuilder("    ");
            for (int c = 0; c < Columns; c++)
            {
                double place = from + ((c + 0.5) / Columns * (to - from));
                double eighths = (At(figure.X, figure.Y, place) / peak * Rows * 8) - (8 * row);
                int block = (int)Math.Clamp(Math.Round(eighths), 0, 8);
                bool second = figure.Second.Count > 0 && (int)Math.Min(At(figure.X, figure.Second, place) / peak * Rows, Rows - 1) == row;
                line.Append(second ? 'o' : block == 0 && limits.Contains(c) ? '¦' : Blocks[block]);
            }

            lines.Add(line.ToString().TrimEnd());
        }

        lines.Add("    " + new string('─', Columns));
        lines.Add(Ticks(from, to));
        if (figure.Different.Count > 0)
        {
            lines.Insert(lines.Count - 1, Differences(figure, from, to));
        }

        if (figure.Second.Count > 0)
        {
            lines.Add(Guard.Text($"    █ {figure.CurveWords}   o {SvgText.Fit(figure.SecondWords, 250)}{(figure.Different.Count > 0 ? "   + more now, - fewer now: beyond chance" : "")}"));
        }

        return lines;
    }

    private static string Differences(FigureModel figure, double from, double to)
    {
        var line = new StringBuilder(new string(' ', 4 + Columns));
        foreach ((double start, double end, bool higher) in figure.Different)
        {
            for (int c = Column(start, from, to); c <= Column(end, from, to); c++)
            {
                line[4 + c] = higher ? '+' : '-';
            }
        }

        return line.ToString().TrimEnd();
    }

    private static string Ticks(double from, double to)
    {
        var line = new StringBuilder(new string(' ', Columns + 12));
        (double[] ticks, int decimals) = AxisTicks.Fitting(from, to, Columns, 1.1);
        int free = 0;
        foreach (double tick in ticks)
        {
            string label = AxisTicks.Label(tick, decimals);
            int start = Math.Max(0, 4 + Column(tick, from, to) - (label.Length / 2));
            if (start >= free && start + label.Length <= line.Length)
            {
                for (int i = 0; i < label.Length; i++)
                {
                    line[start + i] = label[i];
                }

                free = start + label.Length + 1;
            }
        }

        return line.ToString().TrimEnd();
    }

    private static int Column(double x, double from, double to) => Math.Clamp((int)((x - from) / (to - from) * Columns), 0, Columns - 1);

    private static double At(IReadOnlyList<double> xs, IReadOnlyList<double> ys, double x)
    {
        int low = 0;
        int high = xs.Count - 1;
        while (high - low > 1)
        {
            int middle = (low + high) / 2;
            (low, high) = xs[middle] <= x ? (middle, high) : (low, middle);
        }

        double t = Math.Clamp((x - xs[low]) / (xs[high] - xs[low]), 0, 1);
        return ys[low] + (t * (ys[high] - ys[low]));
    }
}
