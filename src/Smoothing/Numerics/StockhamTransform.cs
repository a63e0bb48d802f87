using System.Buffers;
using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;

namespace Smoothing.Numerics;

/// <summary>Complex discrete Fourier transform of a power-of-two length on separate real and imaginary parts.</summary>
/// <remarks>
/// Method: Stockham's autosort in radix 4, a last pass in radix 2 where needed; every pass reads one pair of arrays and writes the other, so nothing is
/// permuted. Own code because the library's managed transform takes about ten times as long (the benchmark command "targets" shows the ratio).
/// Dominant error: rounding, about log₂ N · 1e-16 of the largest result in the mean.
/// </remarks>
internal static unsafe class StockhamTransform
{
    private const int LargestLog = 30;

    private static readonly double[]?[] s_cosines = new double[LargestLog + 1][];
    private static readonly double[]?[] s_sines = new double[LargestLog + 1][];

    /// <summary>X_k = Σ_j x_j exp(−2πi jk/N). Exchanging the two parts on the way in and out gives the conjugate sum.</summary>
    public static void Forward(Span<double> real, Span<double> imaginary)
    {
        int n = real.Length, log = int.Log2(n);
        if (n < 2)
        {
            return;
        }

        (double[] cosines, double[] sines) = Table(log);
        double[] room = ArrayPool<double>.Shared.Rent(2 * n);
        fixed (double* re = real, im = imaginary, work = room, cos = cosines, sin = sines)
        {
            double* xr = re, xi = im, yr = work, yi = work + n;
            int left = n, stride = 1;
            for (; left >= 4; left /= 4, stride *= 4)
            {
                if (stride == 1)
                {
                    First(xr, xi, yr, yi, n, cos, sin);
                }
                else
                {
                    Four(xr, xi, yr, yi, left, stride, cos, sin, n / left);
                }

                double* written = yr;
                yr = xr;
                xr = written;
                written = yi;
                yi = xi;
                xi = written;
            }

            if (left == 2)
            {
                for (int q = 0; q < stride; q++)
                {
                    (double a, double b) = (xr[q], xr[q + stride]);
                    (yr[q], yr[q + stride]) = (a + b, a - b);
                    (a, b) = (xi[q], xi[q + stride]);
                    (yi[q], yi[q + stride]) = (a + b, a - b);
                }

                xr = yr;
                xi = yi;
            }

            if (xr != re)
            {
                new Span<double>(xr, n).CopyTo(real);
                new Span<double>(xi, n).CopyTo(imaginary);
            }
        }

        ArrayPool<double>.Shared.Return(room);
    }

    // The first pass: neighbours go four places apart.
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private static void First(double* xr, double* xi, double* yr, double* yi, int n, double* cos, double* sin)
    {
        int quarter = n / 4;
        double* lanes = stackalloc double[32];
        int p = 0;
        for (; p + 4 <= quarter; p += 4)
        {
            Butterfly(
                Vector256.Load(xr + p), Vector256.Load(xi + p), Vector256.Load(xr + p + quarter), Vector256.Load(xi + p + quarter),
                Vector256.Load(xr + p + (2 * quarter)), Vector256.Load(xi + p + (2 * quarter)), Vector256.Load(xr + p + (3 * quarter)), Vector256.Load(xi + p + (3 * quarter)),
                Vector256.Load(cos + p), Vector256.Load(sin + p),
                Vector256.Create(cos[2 * p], cos[(2 * p) + 2], cos[(2 * p) + 4], cos[(2 * p) + 6]), Vector256.Create(sin[2 * p], sin[(2 * p) + 2], sin[(2 * p) + 4], sin[(2 * p) + 6]),
                Vector256.Create(cos[3 * p], cos[(3 * p) + 3], cos[(3 * p) + 6], cos[(3 * p) + 9]), Vector256.Create(sin[3 * p], sin[(3 * p) + 3], sin[(3 * p) + 6], sin[(3 * p) + 9]),
                lanes, lanes + 16, 4);
            for (int k = 0; k < 4; k++)
            {
                Vector256.Create(lanes[k], lanes[4 + k], lanes[8 + k], lanes[12 + k]).Store(yr + (4 * (p + k)));
                Vector256.Create(lanes[16 + k], lanes[20 + k], lanes[24 + k], lanes[28 + k]).Store(yi + (4 * (p + k)));
            }
        }

        for (; p < quarter; p++)
        {
            double ar = xr[p], ai = xi[p], br = xr[p + quarter], bi = xi[p + quarter];
            double cr = xr[p + (2 * quarter)], ci = xi[p + (2 * quarter)], dr = xr[p + (3 * quarter)], di = xi[p + (3 * quarter)];
            double sr = ar - cr + (bi - di), si = ai - ci - (br - dr), tr = ar - cr - (bi - di), ti = ai - ci + (br - dr);
            (double ur, double ui) = (ar + cr - (br + dr), ai + ci - (bi + di));
            (yr[4 * p], yi[4 * p]) = (ar + cr + (br + dr), ai + ci + (bi + di));
            (yr[(4 * p) + 1], yi[(4 * p) + 1]) = ((sr * cos[p]) - (si * sin[p]), (sr * sin[p]) + (si * cos[p]));
            (yr[(4 * p) + 2], yi[(4 * p) + 2]) = ((ur * cos[2 * p]) - (ui * sin[2 * p]), (ur * sin[2 * p]) + (ui * cos[2 * p]));
            (yr[(4 * p) + 3], yi[(4 * p) + 3]) = ((tr * cos[3 * p]) - (ti * sin[3 * p]), (tr * sin[3 * p]) + (ti * cos[3 * p]));
        }
    }

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private static void Four(double* xr, double* xi, double* yr, double* yi, int n, int stride, double* cos, double* sin, int pace)
    {
        int quarter = n / 4, block = quarter * stride;
        for (int p = 0; p < quarter; p++)
        {
            Vector256<double> c1 = Vector256.Create(cos[p * pace]), s1 = Vector256.Create(sin[p * pace]);
            Vector256<double> c2 = Vector256.Create(cos[2 * p * pace]), s2 = Vector256.Create(sin[2 * p * pace]);
            Vector256<double> c3 = Vector256.Create(cos[3 * p * pace]), s3 = Vector256.Create(sin[3 * p * pace]);
            double* r = xr + (p * stride), i = xi + (p * stride), tr = yr + (4L * p * stride), ti = yi + (4L * p * stride);
            for (int q = 0; q < stride; q += 4)
            {
                Butterfly(
                    Vector256.Load(r + q), Vector256.Load(i + q), Vector256.Load(r + q + block), Vector256.Load(i + q + block),
                    Vector256.Load(r + q + (2 * block)), Vector256.Load(i + q + (2 * block)), Vector256.Load(r + q + (3 * block)), Vector256.Load(i + q + (3 * block)),
                    c1, s1, c2, s2, c3, s3, tr + q, ti + q, stride);
            }
        }
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static void Butterfly(
        Vector256<double> ar, Vector256<double> ai, Vector256<double> br, Vector256<double> bi, Vector256<double> cr, Vector256<double> ci, Vector256<double> dr, Vector256<double> di,
        Vector256<double> c1, Vector256<double> s1, Vector256<double> c2, Vector256<double> s2, Vector256<double> c3, Vector256<double> s3, double* real, double* imaginary, int stride)
    {
        Vector256<double> pr = ar + cr, pi = ai + ci, mr = ar - cr, mi = ai - ci, qr = br + dr, qi = bi + di, nr = br - dr, ni = bi - di;
        (pr + qr).Store(real);
        (pi + qi).Store(imaginary);

        // Times −i and i: (a − c) ∓ i(b − d).
        Vector256<double> er = mr + ni, ei = mi - nr, fr = mr - ni, fi = mi + nr, gr = pr - qr, gi = pi - qi;
        ((er * c1) - (ei * s1)).Store(real + stride);
        ((er * s1) + (ei * c1)).Store(imaginary + stride);
        ((gr * c2) - (gi * s2)).Store(real + (2 * stride));
        ((gr * s2) + (gi * c2)).Store(imaginary + (2 * stride));
        ((fr * c3) - (fi * s3)).Store(real + (3 * stride));
        ((fr * s3) + (fi * c3)).Store(imaginary + (3 * stride));
    }

    // cos and sin of −2πk/N for k < N, each from an angle within an eighth of a turn. Kept: a second thread at most makes the same table again.
    private static (double[] Cosines, double[] Sines) Table(int log)
    {
        double[]? cosines = Volatile.Read(ref s_cosines[log]), sines = Volatile.Read(ref s_sines[log]);
        if (cosines is not null && sines is not null)
        {
            return (cosines, sines);
        }

        int n = 1 << log;
        (cosines, sines) = (new double[n], new double[n]);
        for (int k = 0; k < n; k++)
        {
            int octant = (int)(8L * k / n);
            double angle = 2 * Math.PI * (k - (octant * (n / 8.0))) / n;
            (double s, double c) = Math.SinCos((octant & 1) == 0 ? angle : (Math.PI / 4) - angle);
            (double x, double y) = octant switch { 0 => (c, s), 1 => (s, c), 2 => (-s, c), 3 => (-c, s), 4 => (-c, -s), 5 => (-s, -c), 6 => (s, -c), _ => (c, -s) };
            (cosines[k], sines[k]) = (x, -y);
        }

        Volatile.Write(ref s_cosines[log], cosines);
        Volatile.Write(ref s_sines[log], sines);
        return (cosines, sines);
    }
}
