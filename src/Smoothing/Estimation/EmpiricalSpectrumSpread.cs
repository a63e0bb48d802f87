using Smoothing.Numerics;

namespace Smoothing.Estimation;

/// <content>From values to frequencies.</content>
internal sealed partial class EmpiricalSpectrum
{
    /// <summary>Nodes on either side that a value is spread over: 12 give 1e-12 at twofold oversampling (Greengard &amp; Lee 2004, Table 3.1).</summary>
    private const int Spreading = 12;

    /// <summary>Distinct values beyond which rounding to the nearest node is exact enough and ten times cheaper.</summary>
    private const int NearestNodeFrom = 200_000;

    private static EmpiricalSpectrum Spread(
        ReadOnlySpan<double> values, ReadOnlySpan<double> masses, double effectiveCount, GapMap map, double origin, double length, int grid)
    {
        var nodes = new double[grid];
        int kept = grid / 4;
        bool nearest = values.Length > NearestNodeFrom;
        // τ of the spreading Gaussian exp(−θ²/(4τ)), for 2·kept modes and twofold oversampling: π·12/((2·kept)²·2·(2 − ½)).
        double tau = Math.PI * Spreading / (4.0 * kept * kept * 3.0);
        Span<double> steps = stackalloc double[Spreading + 1];
        double node = 2 * Math.PI / grid;
        for (int l = 0; l <= Spreading; l++)
        {
            steps[l] = Math.Exp(-node * node * l * l / (4 * tau));
        }

        int segment = 0;
        for (int j = 0; j < values.Length; j++)
        {
            double position = (map.Close(values[j], ref segment) - origin) / length;
            position -= Math.Floor(position);
            double place = position * grid;
            if (nearest)
            {
                nodes[(int)(place + 0.5) & (grid - 1)] += masses[j];
                continue;
            }

            int at = (int)place;
            double offset = (place - at) * node;
            double centre = masses[j] * Math.Exp(-offset * offset / (4 * tau));
            double ratio = Math.Exp(offset * node / (2 * tau));
            double up = centre, down = centre, inverse = 1 / ratio;
            nodes[at & (grid - 1)] += centre;
            for (int l = 1; l <= Spreading; l++)
            {
                up *= ratio;
                down *= inverse;
                nodes[(at + l) & (grid - 1)] += up * steps[l];
                nodes[(at - l) & (grid - 1)] += l < Spreading ? down * steps[l] : 0;
            }
        }

        var imaginary = new double[grid];
        FourierPlan.Forward(nodes, imaginary);
        var re = new double[kept];
        var im = new double[kept];
        double factor = Math.Sqrt(Math.PI / tau) / grid;
        for (int k = 0; k < kept; k++)
        {
            double undo = nearest ? 1 : factor * Math.Exp((double)k * k * tau);
            re[k] = nodes[k] * undo;
            im[k] = -imaginary[k] * undo;
        }

        return new EmpiricalSpectrum(re, im, length, origin, effectiveCount, map);
    }
}
