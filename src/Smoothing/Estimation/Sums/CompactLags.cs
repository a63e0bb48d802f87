using System.Runtime.CompilerServices;
using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Estimation;

/// <summary>Sums over pairs of K and K∗K for a polynomial kernel from the lag table: a scan over bandwidths that costs neither a sort nor the sample's length.</summary>
/// <remarks>
/// Method: own. On every cell lag that lies wholly inside the support the kernel is one polynomial of the distance, so the table's moments give the sum without truncation.
/// Two lags are cut by the support's edge; in them the pairs' distances are modelled as a triangle times the cubic that has the lag's first four moments. In lag 0 odd powers
/// of the distance are those of a triangle scaled to the second moment. Valid for kernels that are 0 at the edge, of degree at most 3 so that K∗K has at most 7, from
/// <see cref="CellsPerBandwidth"/> cells a bandwidth on. Dominant error: the model at the edge of K, about 1e-7 of the criterion on smooth data and 1e-3 on rounded
/// ones: good for finding minima, which <see cref="CompactPairs"/> then settles.
/// </remarks>
internal sealed unsafe class CompactLags
{
    /// <summary>Cells of the table in its smallest bandwidth, at least.</summary>
    public const int CellsPerBandwidth = 4 * MomentLags.Finest;

    private const int Powers = MomentLags.Powers;
    private const int Nodes = 6; // exact to degree 11 on each side of the triangle's top: 1 + 3 + 7

    private readonly MomentLags _lags;
    private readonly double[] _kernel;
    private readonly double[] _convolution;

    private CompactLags(MomentLags lags, Kernel kernel)
    {
        _lags = lags;
        _kernel = kernel.EdgePolynomial.ToArray();
        _convolution = CompactPairs.SelfConvolution(kernel);
    }

    /// <summary>Whether a kernel can be scanned.</summary>
    public static bool Serves(Kernel kernel) =>
        CompactPairs.HasSelfConvolution(kernel) && kernel.EdgePolynomial[0] == 0 && 2 * kernel.EdgePolynomial.Length <= Powers;

    /// <summary>A scan for bandwidths from <paramref name="smallest"/> on; null where the range is too long for one table.</summary>
    public static CompactLags? Of(Sample sample, Kernel kernel, double smallest) =>
        MomentLags.Of(sample, smallest * MomentLags.Finest / CellsPerBandwidth) is { } lags ? new CompactLags(lags, kernel) : null;

    /// <summary>Σ_{j&lt;i} w_i w_j K((x_i − x_j)/h).</summary>
    public double Kernels(double bandwidth) => Sum(_kernel, 1, bandwidth);

    /// <summary>Σ_{j&lt;i} w_i w_j (K∗K)((x_i − x_j)/h).</summary>
    public double SelfConvolutions(double bandwidth) => Sum(_convolution, 2, bandwidth);

    // The polynomial is in t = reach − |u|.
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private double Sum(double[] polynomial, double reach, double bandwidth)
    {
        double d = _lags.Width / bandwidth, edge = reach / d, total = 0;
        int degree = polynomial.Length - 1, inside = (int)Math.Min(_lags.Count, Math.Floor(edge));
        double* c = stackalloc double[Powers];
        double* scale = stackalloc double[Powers]; // (−d)^s s!, from powers of t and the table's 1/s!
        scale[0] = 1;
        for (int s = 1; s < Powers; s++)
        {
            scale[s] = -scale[s - 1] * d * s;
        }

        fixed (double* table = _lags.Table, p = polynomial)
        {
            for (int lag = 1; lag < inside; lag++)
            {
                Taylor(p, degree, reach - (lag * d), c);
                double* q = table + (lag / 4 * 4 * Powers) + (lag & 3);
                double sum = 0;
                for (int s = degree; s >= 0; s--)
                {
                    sum += c[s] * scale[s] * q[4 * s];
                }

                total += sum;
            }

            Taylor(p, degree, reach, c);
            total += Zero(table, c, degree, d);
            for (int lag = Math.Max(1, inside); lag <= inside + 1 && lag < _lags.Count; lag++)
            {
                total += Cut(table + (lag / 4 * 4 * Powers) + (lag & 3), polynomial, reach, lag, d, edge - lag);
            }
        }

        return total;
    }

    // Coefficients about t by repeated division.
    private static void Taylor(double* polynomial, int degree, double t, double* coefficients)
    {
        for (int k = 0; k <= degree; k++)
        {
            coefficients[k] = polynomial[k];
        }

        for (int pass = 0; pass < degree; pass++)
        {
            for (int k = degree - 1; k >= pass; k--)
            {
                coefficients[k] += t * coefficients[k + 1];
            }
        }
    }

    // Pairs in one cell: the table holds both orders and each value with itself. E|y|^k of a triangle on [−1, 1] is 2/((k + 1)(k + 2)).
    private double Zero(double* table, double* c, int degree, double d)
    {
        double pairs = table[0] - _lags.SquaredWeight, spread = 2 * table[8];
        if (!(pairs > 0))
        {
            return 0;
        }

        double ratio = Math.Sqrt(Math.Max(0, 6 * spread / pairs)), sum = 0, power = 1, factorial = 1;
        for (int k = 0; k <= degree; k++)
        {
            factorial *= Math.Max(1, k);
            double moment = k == 0 ? pairs : (k & 1) == 0 ? factorial * table[4 * k] : pairs * 2 / ((k + 1.0) * (k + 2)) * Math.Pow(ratio, k);
            sum += c[k] * power * moment;
            power *= -d;
        }

        return 0.5 * sum;
    }

    // One lag of which the part y < end is inside: triangle (1 − |y|)(a₀ + a₁y + a₂y² + a₃y³) with moments 1, 1/6, 1/15, 1/28 of the triangle itself.
    private static double Cut(double* q, double[] polynomial, double reach, int lag, double d, double end)
    {
        const double T2 = 1.0 / 6, T4 = 1.0 / 15, T6 = 1.0 / 28;
        double m0 = q[0], m1 = q[4], m2 = 2 * q[8], m3 = 6 * q[12];
        end = Math.Min(1, end);
        if (!(end > -1) || !(m0 > 0))
        {
            return 0;
        }

        double even = T4 - (T2 * T2), odd = (T2 * T6) - (T4 * T4);
        double a2 = (m2 - (T2 * m0)) / even, a0 = m0 - (T2 * a2), a1 = ((m1 * T6) - (m3 * T4)) / odd, a3 = ((T2 * m3) - (T4 * m1)) / odd;
        double Term(double y)
        {
            double t = reach - ((lag + y) * d), value = 0;
            for (int k = polynomial.Length - 1; k >= 0; k--)
            {
                value = (value * t) + polynomial[k];
            }

            return value * (1 - Math.Abs(y)) * (a0 + (y * (a1 + (y * (a2 + (y * a3))))));
        }

        double low = GaussLegendre.Integrate(Term, -1, Math.Min(0, end), Nodes);
        return end > 0 ? low + GaussLegendre.Integrate(Term, 0, end, Nodes) : low;
    }
}
