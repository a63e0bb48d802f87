using System.Text;

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
        double peak = Math.Max(figure.Y.Max(), double.Epsilon);
        int[] limits = figure.Limits.Where(l => l.X >= from && l.X <= to).Select(l => Column(l.X, from, to)).ToArray();
        var lines = new List<string>();
        for (int row = Rows - 1; row >= 0; row--)
        {
            var line = new StringBuilder("    ");
            for (int c = 0; c < Columns; c++)
            {
                double eighths = (At(figure, from + ((c + 0.5) / Columns * (to - from))) / peak * Rows * 8) - (8 * row);
                int block = (int)Math.Clamp(Math.Round(eighths), 0, 8);
                line.Append(block == 0 && limits.Contains(c) ? '¦' : Blocks[block]);
            }

            lines.Add(line.ToString().TrimEnd());
        }

        lines.Add("    " + new string('─', Columns));
        lines.Add(Ticks(from, to));
        return lines;
    }

    private static string Ticks(double from, double to)
    {
        var line = new StringBuilder(new string(' ', Columns + 12));
        (double[] ticks, int decimals) = AxisTicks.Between(from, to, 7);
        int free = 0;
        foreach (double tick in ticks)
        {
            string label = tick.ToString("F" + decimals, System.Globalization.CultureInfo.InvariantCulture);
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

    private static double At(FigureModel figure, double x)
    {
        int low = 0;
        int high = figure.X.Count - 1;
        while (high - low > 1)
        {
            int middle = (low + high) / 2;
            (low, high) = figure.X[middle] <= x ? (middle, high) : (low, middle);
        }

        double t = Math.Clamp((x - figure.X[low]) / (figure.X[high] - figure.X[low]), 0, 1);
        return figure.Y[low] + (t * (figure.Y[high] - figure.Y[low]));
    }
}
