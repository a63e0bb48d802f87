using Smoothing.Numerics;

namespace Smoothing.Estimation;

/// <content>From frequencies back to a curve.</content>
internal sealed partial class EmpiricalSpectrum
{
    /// <summary>(1/2π)∫ w(t) φ_n(t) exp(−itx) dt at <paramref name="size"/> equal steps round the circle, starting from <see cref="Origin"/> in closed places.</summary>
    /// <param name="multiplier">w(t_k) by index; frequencies beyond its length count as 0.</param>
    /// <param name="size">A power of two, above twice the length of <paramref name="multiplier"/>.</param>
    public double[] Curve(ReadOnlySpan<double> multiplier, int size)
    {
        var real = new double[size];
        var imaginary = new double[size];
        int end = Math.Min(Math.Min(multiplier.Length, Count), size / 2);
        for (int k = 0; k < end; k++)
        {
            double w = multiplier[k] * (k == 0 ? 1 : 2) / Length;
            real[k] = w * _real[k];
            imaginary[k] = w * _imaginary[k];
        }

        FourierPlan.Forward(real, imaginary);
        return real;
    }

    /// <summary>A power of two whose nodes lie closer than <paramref name="spacing"/>, and which holds twice <paramref name="frequencies"/>.</summary>
    public int SizeFor(double spacing, int frequencies)
    {
        int size = 256;
        while (size < MaximumGrid && (Length / size > spacing || size < (2 * frequencies) + 2))
        {
            size *= 2;
        }

        return size;
    }

    /// <summary>Index of the first frequency beyond <paramref name="t"/>, at most <see cref="Count"/>.</summary>
    public int IndexOf(double t) => (int)Math.Min(Count, Math.Max(1, Math.Ceiling(t / Step)));
}
