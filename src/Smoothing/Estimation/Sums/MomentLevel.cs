using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;
using Smoothing.Numerics;

namespace Smoothing.Estimation;

/// <summary>Records of one width of a dense lattice: the cells as built, or made twice as wide a few times.</summary>
internal sealed unsafe class MomentLevel
{
    private const int Moments = MomentCells.Moments;

    private static readonly double[] s_left = ShiftColumns(-0.5);
    private static readonly double[] s_right = ShiftColumns(0.5);

    private readonly AlignedRoom? _room;
    private readonly MomentCells? _cells;

    /// <summary>The cells as they are.</summary>
    public MomentLevel(MomentCells cells)
    {
        _cells = cells;
        (First, Count, Width, Inverse) = (cells.First, cells.Count, cells.Width, cells.Inverse);
    }

    /// <summary>Cells twice as wide: b' = (b ∓ 1/2)/2, so m'ᵣ = 2⁻ʳ Σ C(r, q)(∓1/2)ʳ⁻ᵠ m_q. The bound |mᵣ| ≤ m₀ 2⁻ʳ is kept, and with it every digit.</summary>
    public MomentLevel(MomentLevel finer)
    {
        (First, Count, Width, Inverse) = (finer.First / 2, finer.Count / 2, finer.Width * 2, finer.Inverse / 2);
        _room = new AlignedRoom();
        double* to = _room.Of((long)Count * Moments);
        fixed (double* left = s_left, right = s_right)
        {
            Halve(finer.Records, to, Count, left, right);
        }
    }

    /// <summary>Number of the first cell.</summary>
    public double First { get; }

    public int Count { get; }

    public double Width { get; }

    public double Inverse { get; }

    public double* Records => _cells is null ? _room!.Pointer : _cells.Records;

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private static void Halve(double* from, double* to, int count, double* left, double* right)
    {
        for (int c = 0; c < count; c++, from += 2 * Moments, to += Moments)
        {
            if (from[0] == 0 && from[Moments] == 0)
            {
                new Span<double>(to, Moments).Clear();
                continue;
            }

            Vector256<double> s0 = default, s1 = default, s2 = default, s3 = default;
            for (int q = 0; q < Moments; q++)
            {
                Vector256<double> a = Vector256.Create(from[q]), b = Vector256.Create(from[Moments + q]);
                double* x = left + (q * Moments), y = right + (q * Moments);
                s0 += (a * Vector256.Load(x)) + (b * Vector256.Load(y));
                s1 += (a * Vector256.Load(x + 4)) + (b * Vector256.Load(y + 4));
                s2 += (a * Vector256.Load(x + 8)) + (b * Vector256.Load(y + 8));
                s3 += (a * Vector256.Load(x + 12)) + (b * Vector256.Load(y + 12));
            }

            s0.Store(to);
            s1.Store(to + 4);
            s2.Store(to + 8);
            s3.Store(to + 12);
        }
    }

    // Entry [q·16 + r] = 2⁻ʳ C(r, q) byʳ⁻ᵠ, 0 for q > r: whole numbers over powers of two, exact.
    private static double[] ShiftColumns(double by)
    {
        var columns = new double[Moments * Moments];
        for (int r = 0; r < Moments; r++)
        {
            double binomial = 1, power = 1;
            for (int q = r; q >= 0; q--)
            {
                columns[(q * Moments) + r] = Math.ScaleB(binomial * power, -r);
                power *= by;
                binomial = binomial * q / (r - q + 1);
            }
        }

        return columns;
    }
}
