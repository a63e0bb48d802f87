using Smoothing.Samples;

namespace Smoothing.Sql.Tests;

/// <summary>The Gaussian curve of cell moments by its Hermite series, written for the tests: exp(−(a − Db)²/2) = exp(−a²/2) Σ He_r(a)(Db)^r/r!.</summary>
internal static class CellCurve
{
    public static double Value(CondensedSample sample, double x, double h)
    {
        double sum = 0, step = sample.CellWidth / h;
        for (int i = 0; i < sample.Cells.Length; i++)
        {
            double a = (x - ((sample.Cells[i] + 0.5) * sample.CellWidth)) / h;
            double series = 0, factor = 1, hermite = 1, before = 0;
            for (int r = 0; r < sample.Moments; r++)
            {
                series += hermite * factor * sample.Sums[(i * sample.Moments) + r];
                (before, hermite) = (hermite, (a * hermite) - (r * before));
                factor *= step / (r + 1);
            }

            sum += Math.Exp(-a * a / 2) * series;
        }

        return sum / (sample.TotalWeight * h * Math.Sqrt(2 * Math.PI));
    }
}
