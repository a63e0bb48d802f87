namespace Smoothing.Estimation;

/// <content>Integrals over the frequencies.</content>
internal sealed partial class EmpiricalSpectrum
{
    /// <summary>Terms between two fresh exponentials; the products in between lose at most 32²/2 roundings, 1e-13.</summary>
    private const int Restart = 32;

    /// <summary>Weight of frequency k in (1/2π)∫ over the whole line: Step/π, half of it at k = 0.</summary>
    public double Weight(int k) => (k == 0 ? 0.5 : 1) * Step / Math.PI;

    /// <summary>∫ (f̂_g^(s))² = (1/2π)∫ t^{2s} |φ_n|² exp(−g²t²) dt, own terms included.</summary>
    public double Roughness(int derivative, double scale) => GaussianIntegral(_squared, 0, derivative, scale);

    /// <summary>(1/2π)∫ t^{2s} (|φ_n|² − 1/n)/(1 − 1/n) exp(−g²t²) dt: the same without own terms, times n/(n − 1).</summary>
    public double RoughnessWithoutOwn(int derivative, double scale) =>
        GaussianIntegral(_squared, 1 / EffectiveCount, derivative, scale) / (1 - (1 / EffectiveCount));

    /// <summary>(1/2π)∫ t^{2s} (values(t) − less) exp(−g²t²) dt over the kept frequencies.</summary>
    public double GaussianIntegral(ReadOnlySpan<double> values, double less, int derivative, double scale)
    {
        double step = Step;
        double unit = scale * scale * step * step;
        // e^−64 · 8^20/Γ(10.5) = 2e-16: nothing is left beyond gt = 8 even with t^20.
        double last = 8 / (scale * step);
        int end = last < values.Length ? (int)last + 1 : values.Length;
        double sum = derivative == 0 ? 0.5 * (values[0] - less) : 0;
        double square = step * step;
        double exponential = 0, ratio = 0;
        double shrink = Math.Exp(-2 * unit);
        for (int k = 1; k < end; k++)
        {
            if ((k & (Restart - 1)) == 1)
            {
                exponential = Math.Exp(-unit * k * k);
                ratio = Math.Exp(-unit * ((2 * k) + 1));
            }

            double t2 = square * k * k;
            double power = 1;
            for (int s = 0; s < derivative; s++)
            {
                power *= t2;
            }

            sum += power * exponential * (values[k] - less);
            exponential *= ratio;
            ratio *= shrink;
        }

        return sum * step / Math.PI;
    }

    /// <summary>Σ over the kept frequencies of weight · term(k, t_k).</summary>
    public double Sum(Func<int, double, double> term)
    {
        double sum = 0.5 * term(0, 0);
        double step = Step;
        for (int k = 1; k < Count; k++)
        {
            sum += term(k, k * step);
        }

        return sum * step / Math.PI;
    }
}
