using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Estimation;

/// <summary>Sums over all pairs of values of the Gaussian and its derivatives, for any number of bandwidths: a few microseconds each, whatever n.</summary>
/// <remarks>
/// <para>Method: only differences count. With b the place in a cell, D_s[L] = Σ (b_i − b_j)ˢ over the pairs L cells apart is Σ_k C(s, k)(−1)^(s−k) times the
/// correlation of the k-th and the (s − k)-th cell moments, so eight moments and eight transforms give s = 0 … 7 at every lag. Then with D = δ/h and a = LD,
/// Σ φ⁽ʳ⁾((x_i − x_j)/h) = Σ_L φ(a) Σ_s (−1)^(r+s) He_{r+s}(a) Dˢ D_s[L]/s!.</para>
/// <para>Validity: h at least twelve cells, derivatives up to the fourth. Truncation at s = 7: below 1e-13 of the sum, as differences in a cell have a mean eighth power of 1/45. Dominant error: the
/// transforms', 1e-16 of the largest lag in absolute terms, so about 1e-14 of the sum; not for the tails of a kernel one by one.</para>
/// </remarks>
internal sealed unsafe class MomentLags
{
    /// <summary>Powers of the distances that the table holds, 0 included.</summary>
    public const int Powers = 8;

    // e^(−8.7²/2) is 4e-17: pairs further apart can't be seen beside those of one value with itself.
    private const double Reach = 8.7;
    private const int LargestTransform = 1 << 22;

    /// <summary>Cells in the smallest bandwidth, at least.</summary>
    public const int Finest = 12;

    private readonly double _width;
    private readonly double[] _lags; // D_s[L]/s!, lag by lag in groups of four, power by power
    private readonly int _count;

    private MomentLags(double width, double[] lags, int count, double totalWeight, double squaredWeight, double smallest)
    {
        (_width, _lags, _count, TotalWeight, SquaredWeight, Smallest) = (width, lags, count, totalWeight, squaredWeight, smallest);
    }

    /// <summary>Σw.</summary>
    public double TotalWeight { get; }

    /// <summary>Σw², what each value contributes with itself.</summary>
    public double SquaredWeight { get; }

    /// <summary>The cells' width.</summary>
    public double Width => _width;

    /// <summary>Number of lags, 0 included.</summary>
    public int Count => _count;

    /// <summary>D_s[L]/s!, lag by lag in groups of four, power by power; for L above 0 every pair once, for lag 0 in both orders and with itself.</summary>
    public ReadOnlySpan<double> Table => _lags;

    /// <summary>The smallest bandwidth that the table serves.</summary>
    public double Smallest { get; }

    /// <summary>A table for bandwidths from <paramref name="smallest"/> on; null where the range is too long for one transform.</summary>
    public static MomentLags? Of(Sample sample, double smallest)
    {
        int exponent = Math.ILogB(smallest / Finest);
        double cells = (sample.Maximum - sample.Minimum) / Math.ScaleB(1, exponent);
        if (!(cells < LargestTransform / 4) || !MomentCells.CanIndex(smallest, Math.Max(-sample.Minimum, sample.Maximum)))
        {
            return null;
        }

        MomentCells moments = MomentCells.OfWidth(sample, exponent);
        if (moments.Numbers is not null)
        {
            return null;
        }

        double squares = 0;
        foreach (double w in sample.Weights)
        {
            squares += w * w;
        }

        int length = (int)System.Numerics.BitOperations.RoundUpToPowerOf2((uint)(2 * moments.Count));
        double[] lags = Correlate(moments, length);
        return new MomentLags(moments.Width, lags, moments.Count, sample.TotalWeight, sample.IsWeighted ? squares : sample.Count, smallest);
    }

    /// <summary>Σ w_i w_j φ⁽ʳ⁾((x_i − x_j)/h) over all ordered pairs, each value with itself included; φ with its factor 1/√(2π).</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public double Sum(int derivative, double h)
    {
        double step = _width / h;
        int groups = (int)Math.Min((_count + 3) / 4, Math.Ceiling(((Reach / step) + 4) / 4));
        Vector256<double> total = default, d = Vector256.Create(step), minusHalf = Vector256.Create(-0.5);
        Vector256<double> first = default;
        fixed (double* lags = _lags)
        {
            for (int g = 0; g < groups; g++)
            {
                Vector256<double> a = Vector256.Create(4.0 * g, (4.0 * g) + 1, (4.0 * g) + 2, (4.0 * g) + 3) * d;

                // (−1)^m He_m, the factor of φ in its m-th derivative: g_{m+1} = −a g_m − m g_{m−1}.
                Vector256<double> before = default, here = Vector256<double>.One;
                for (int m = 0; m < derivative; m++)
                {
                    (before, here) = (here, -(a * here) - (Vector256.Create((double)m) * before));
                }

                double* c = lags + (g * 4 * Powers);
                Vector256<double> sum = default, power = Vector256<double>.One;
                for (int s = 0; s < Powers; s++)
                {
                    sum += power * here * Vector256.Load(c + (4 * s));
                    power *= d;
                    (before, here) = (here, -(a * here) - (Vector256.Create((double)(derivative + s)) * before));
                }

                Vector256<double> term = VectorExp.Of(a * a * minusHalf) * sum;
                total += term;
                first = g == 0 ? term : first;
            }
        }

        // Every lag stands for itself and its mirror image but for lag 0, where a pair is met in both orders already.
        return NormalLaw.InverseSqrtTwoPi * ((2 * Vector256.Sum(total)) - first.ToScalar());
    }

    /// <summary>The same without each value's pair with itself: Σw² φ⁽ʳ⁾(0) is taken off.</summary>
    public double SumOfOthers(int derivative, double h) => Sum(derivative, h) - (SquaredWeight * AtZero(derivative));

    // φ⁽ʳ⁾(0) = (−1)^(r/2) (r − 1)!!/√(2π) for even r.
    private static double AtZero(int derivative)
    {
        double value = (derivative & 1) == 0 ? NormalLaw.InverseSqrtTwoPi : 0;
        for (int m = derivative - 1; m > 0; m -= 2)
        {
            value *= -m;
        }

        return value;
    }

    private static double[] Correlate(MomentCells moments, int length)
    {
        // Two real sequences in one transform: F_k and F_{k+1} come apart by symmetry.
        int half = (length / 2) + 1, padded = (half + 3) / 4 * 4;
        double[] re = new double[Powers * padded], im = new double[Powers * padded], a = new double[length], b = new double[length];
        for (int k = 0; k < Powers; k += 2)
        {
            Array.Clear(a);
            Array.Clear(b);
            for (int c = 0; c < moments.Count; c++)
            {
                a[c] = moments.Records[(c * MomentCells.Moments) + k];
                b[c] = moments.Records[(c * MomentCells.Moments) + k + 1];
            }

            StockhamTransform.Forward(a, b);
            for (int w = 0; w < half; w++)
            {
                int mirror = (length - w) & (length - 1);
                re[(k * padded) + w] = 0.5 * (a[w] + a[mirror]);
                im[(k * padded) + w] = 0.5 * (b[w] - b[mirror]);
                re[((k + 1) * padded) + w] = 0.5 * (b[w] + b[mirror]);
                im[((k + 1) * padded) + w] = -0.5 * (a[w] - a[mirror]);
            }
        }

        var lags = new double[(moments.Count + 3) / 4 * 4 * Powers];
        double[] even = new double[padded], odd = new double[padded];
        double factorial = 1;
        for (int s = 0; s < Powers; s += 2)
        {
            // Even powers have a real spectrum, odd ones an imaginary one: i times it is real again and rides along.
            Spectrum(re, im, padded, s, even);
            Spectrum(re, im, padded, s + 1, odd);
            for (int w = 0; w < half; w++)
            {
                int mirror = (length - w) & (length - 1);

                // D_s + i D_{s+1}: G_s real and even, G_{s+1} = i·odd with odd antisymmetric, so i G_{s+1} = −odd.
                a[w] = even[w] - odd[w];
                a[mirror] = even[w] + odd[w];
            }

            a[0] = even[0];
            a[length / 2] = even[length / 2];
            Array.Clear(b);
            FourierPlan.Inverse(a, b);
            factorial *= Math.Max(s, 1);
            Store(a, lags, moments.Count, s, 1 / factorial);
            factorial *= s + 1;
            Store(b, lags, moments.Count, s + 1, 1 / factorial);
        }

        return lags;
    }

    private static void Store(double[] from, double[] lags, int count, int s, double factor)
    {
        for (int l = 0; l < count; l++)
        {
            lags[(((l / 4 * Powers) + s) * 4) + (l & 3)] = from[l] * factor;
        }

        if ((s & 1) == 1)
        {
            lags[s * 4] = 0; // in one cell every odd power meets its opposite
        }
    }

    // Σ_k C(s, k)(−1)^(s−k) F_k conj(F_{s−k}): its real part for even s, its imaginary part for odd s, the other being 0.
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private static void Spectrum(double[] re, double[] im, int padded, int s, double[] destination)
    {
        fixed (double* r = re, i = im, to = destination)
        {
            for (int w = 0; w < padded; w += 4)
            {
                Vector256<double> sum = default;
                double binomial = 1;
                for (int k = 0; k <= s; k++)
                {
                    int j = s - k;
                    Vector256<double> kr = Vector256.Load(r + (k * padded) + w), ki = Vector256.Load(i + (k * padded) + w), jr = Vector256.Load(r + (j * padded) + w), ji = Vector256.Load(i + (j * padded) + w);
                    Vector256<double> part = (s & 1) == 0 ? (kr * jr) + (ki * ji) : (ki * jr) - (kr * ji);
                    sum += part * Vector256.Create((j & 1) == 0 ? binomial : -binomial);
                    binomial = binomial * (s - k) / (k + 1);
                }

                sum.Store(to + w);
            }
        }
    }
}
