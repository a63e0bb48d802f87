using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;
using Smoothing.Numerics;

namespace Smoothing.Estimation;

/// <summary>Polynomial coefficients of each cell: the curve at a = (x − centre)/h from it is e^(−a²/2) Σ gₛ tˢ, t = aD, D = δ/h.</summary>
/// <remarks>
/// Method: e^(−(a − Db)²/2) = e^(−a²/2) e^(tb) e^(−D²b²/2), so gₛ = (1/s!) Σ_q (−D²/2)^q/q! m_{s+2q}. Its derivative in a has g′ₛ = D(s + 1)gₛ₊₁ − gₛ₋₁/D.
/// For the distribution function the empirical count is integrated instead of the kernel: in a cell the count below y is a number plus a step
/// function, whose moments Lᵣ = N cᵣ + ((1/2)^{r+1} m₀ − m_{r+1})/(r + 1) go through the same formula; all parts are positive where it matters, so tails keep
/// relative accuracy. Four cells stand beside each other: lane by lane, power by power.
/// </remarks>
internal sealed unsafe class MomentTable
{
    private const int Moments = MomentCells.Moments;

    private readonly AlignedRoom _room = new();

    private MomentTable(int groups, int terms)
    {
        Groups = groups;
        Terms = terms;
        _room.Of((long)groups * terms * 4);
    }

    /// <summary>Number of groups of four cells.</summary>
    public int Groups { get; }

    /// <summary>Number of coefficients of a cell.</summary>
    public int Terms { get; }

    public double* Coefficients => _room.Pointer;

    /// <summary>Σᵢ parts[i] · i-th derivative in a of the plain Gaussian sum.</summary>
    public static MomentTable OfDerivatives(double* records, int cells, double step, ReadOnlySpan<double> parts)
    {
        var table = new MomentTable((cells + 3) / 4, Moments + parts.Length - 1);
        Span<double> coefficient = stackalloc double[Moments];
        Weights(step, coefficient);
        Vector256<double>* moments = stackalloc Vector256<double>[Moments];
        Vector256<double>* row = stackalloc Vector256<double>[table.Terms + 1];
        for (int g = 0; g < table.Groups; g++)
        {
            Load(records + (4L * g * Moments), moments);
            table.Write(g, moments, coefficient, step, parts, 1, row);
        }

        return table;
    }

    /// <summary>The count below (or, <paramref name="upper"/>, above) smoothed, plus derivatives: parts as in <see cref="OfDerivatives"/>; times D, for a factor 1/√(2π) as the others.</summary>
    public static MomentTable OfCount(double* records, int cells, int known, double step, bool upper, double[] counts, ReadOnlySpan<double> parts)
    {
        var table = new MomentTable((cells + 3) / 4, Moments + Math.Max(0, parts.Length - 1));
        Span<double> coefficient = stackalloc double[Moments];
        Weights(step, coefficient);
        Vector256<double>* moments = stackalloc Vector256<double>[Moments];
        Vector256<double>* inner = stackalloc Vector256<double>[Moments];
        Vector256<double>* row = stackalloc Vector256<double>[table.Terms + 1];
        ReadOnlySpan<double> one = [1.0];
        for (int g = 0; g < table.Groups; g++)
        {
            Load(records + (4L * g * Moments), moments);
            Vector256<double> count = Vector256.Create(counts[4 * g], counts[(4 * g) + 1], counts[(4 * g) + 2], counts[(4 * g) + 3]);
            for (int r = 0; r < Moments; r++)
            {
                double half = Math.ScaleB(1, -(r + 1));
                Vector256<double> flat = (r & 1) == 0 ? count * Vector256.Create(2 * half / (r + 1)) : default;
                Vector256<double> stepPart = r + 1 >= known ? default
                    : upper ? moments[r + 1] - (moments[0] * Vector256.Create((r & 1) == 0 ? -half : half))
                    : (moments[0] * Vector256.Create(half)) - moments[r + 1];
                inner[r] = flat + (stepPart / Vector256.Create(r + 1.0));
            }

            table.Write(g, inner, coefficient, step, one, step, row);
            if (parts.Length > 0)
            {
                table.Write(g, moments, coefficient, step, parts, 1, row, add: true);
            }
        }

        return table;
    }

    /// <summary>What Φ(a − Db) differs from m₀Φ(a) by, as φ(a) Σ νₛ tˢ with νₛ = (D/s!) Σ_q (−D²/2)^q/q! m_{s+1+2q}/(s + 1 + 2q): for cells that stand far apart.</summary>
    public static MomentTable OfInside(double* records, int cells, double step)
    {
        var table = new MomentTable((cells + 3) / 4, Moments);
        Span<double> coefficient = stackalloc double[Moments];
        Weights(step, coefficient);
        Vector256<double>* moments = stackalloc Vector256<double>[Moments];
        Vector256<double>* row = stackalloc Vector256<double>[Moments + 1];
        ReadOnlySpan<double> one = [1.0];
        for (int g = 0; g < table.Groups; g++)
        {
            Load(records + (4L * g * Moments), moments);
            for (int r = 0; r < Moments; r++)
            {
                moments[r] = r + 1 < Moments ? moments[r + 1] / Vector256.Create(r + 1.0) : default;
            }

            table.Write(g, moments, coefficient, step, one, step, row);
        }

        return table;
    }

    // (−D²/2)^q/q! at q, and 1/s! at 8 + s is applied separately.
    private static void Weights(double step, Span<double> coefficient)
    {
        double weight = 1;
        for (int q = 0; q < Moments; q++)
        {
            coefficient[q] = weight;
            weight *= -0.5 * step * step / (q + 1);
        }
    }

    // Lanes are cells. Past the last cell lie empty ones: a dense table is a multiple of four long, a sparse one has room for three more.
    private static void Load(double* record, Vector256<double>* moments)
    {
        for (int r = 0; r < Moments; r++)
        {
            moments[r] = Vector256.Create(record[r], record[Moments + r], record[(2 * Moments) + r], record[(3 * Moments) + r]);
        }
    }

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private void Write(int group, Vector256<double>* moments, ReadOnlySpan<double> weights, double step, ReadOnlySpan<double> parts, double scale, Vector256<double>* row, bool add = false)
    {
        double* to = Coefficients + ((long)group * Terms * 4);
        if (!add)
        {
            new Span<double>(to, Terms * 4).Clear();
        }

        for (int s = 0; s <= Terms; s++)
        {
            row[s] = default;
        }

        double factorial = 1;
        for (int s = 0; s < Moments; s++)
        {
            factorial *= Math.Max(s, 1);
            Vector256<double> sum = default;
            for (int q = (Moments - 1 - s) / 2; q >= 0; q--)
            {
                sum += moments[s + (2 * q)] * Vector256.Create(weights[q]);
            }

            row[s] = sum * Vector256.Create(scale / factorial);
        }

        Vector256<double> up = Vector256.Create(step), down = Vector256.Create(1 / step);
        for (int i = 0; i < parts.Length; i++)
        {
            if (i > 0)
            {
                // In place: g′ₛ needs gₛ₋₁ and gₛ₊₁, so the one before is kept aside.
                Vector256<double> before = default;
                for (int s = 0; s < Moments + i; s++)
                {
                    Vector256<double> here = row[s];
                    row[s] = (up * Vector256.Create(s + 1.0) * row[s + 1]) - (before * down);
                    before = here;
                }
            }

            if (parts[i] != 0)
            {
                Vector256<double> part = Vector256.Create(parts[i]);
                for (int s = 0; s < Moments + i; s++)
                {
                    (Vector256.Load(to + (4 * s)) + (part * row[s])).Store(to + (4 * s));
                }
            }
        }
    }
}
