using Smoothing.Numerics;

namespace Smoothing.Bandwidths;

/// <summary>Roots and minima over a logarithmic scan of bandwidths.</summary>
internal static class RootScan
{
    /// <summary>Increasing bandwidths from <paramref name="from"/> to <paramref name="to"/>, equal ratios.</summary>
    public static double[] Grid(double from, double to, int points)
    {
        var grid = new double[points];
        double ratio = Math.Log(to / from) / (points - 1);
        for (int i = 0; i < points; i++)
        {
            grid[i] = i == points - 1 ? to : from * Math.Exp(ratio * i);
        }

        return grid;
    }

    /// <summary>Every crossing of zero that the grid shows, refined to 1e-13 relative; rising from − to + or falling.</summary>
    public static List<(double Root, bool Rising)> Crossings(Func<double, double> f, double[] grid, out double[] values)
    {
        values = Array.ConvertAll(grid, h => f(h));
        var found = new List<(double, bool)>();
        for (int i = 1; i < grid.Length; i++)
        {
            if (values[i - 1] < 0 != values[i] < 0)
            {
                found.Add((Roots.Between(f, grid[i - 1], grid[i], 1e-13), values[i - 1] < 0));
            }
        }

        return found;
    }

    /// <summary>Every interior local minimum that the grid shows, refined until the bracket is <paramref name="width"/> wide relative to h.</summary>
    public static List<(double At, double Value)> Minima(Func<double, double> f, double[] grid, out double[] values, double width = 1e-9)
    {
        values = Array.ConvertAll(grid, h => f(h));
        var found = new List<(double, double)>();
        for (int i = 1; i + 1 < grid.Length; i++)
        {
            if (values[i] < values[i - 1] && values[i] <= values[i + 1])
            {
                found.Add(Golden(f, grid[i - 1], grid[i + 1], width));
            }
        }

        return found;
    }

    private static (double At, double Value) Golden(Func<double, double> f, double left, double right, double width)
    {
        const double Section = 0.38196601125010515; // (3 − √5)/2
        double a = left, b = right;
        double x = a + (Section * (b - a)), y = b - (Section * (b - a));
        double fx = f(x), fy = f(y);
        // 45 steps shrink by 0.618^45 = 4e-10.
        for (int i = 0; i < 45 && b - a > width * b; i++)
        {
            if (fx <= fy)
            {
                (b, y, fy) = (y, x, fx);
                x = a + (Section * (b - a));
                fx = f(x);
            }
            else
            {
                (a, x, fx) = (x, y, fy);
                y = b - (Section * (b - a));
                fy = f(y);
            }
        }

        return fx <= fy ? (x, fx) : (y, fy);
    }
}
