using Smoothing.Numerics;

namespace Smoothing.Kernels;

/// <summary>Constants of the optimal kernels that others are measured against.</summary>
internal static class KernelConstants
{
    /// <summary>R(K*) |μ_k(K*)|^(1/k) of the polynomial kernel of Gasser, Müller &amp; Mammitzsch (1985) with (0, k).</summary>
    public static double BestSize(int order) => order switch
    {
        // R and μ_k are exact fractions: the moment conditions and K(±1) = 0 solved in rational arithmetic.
        2 => 3.0 / 5 * Math.Sqrt(1.0 / 5),
        4 => 5.0 / 4 * Math.Pow(1.0 / 21, 0.25),
        6 => 1575.0 / 832 * Math.Pow(5.0 / 429, 1.0 / 6),
        8 => 11025.0 / 4352 * Math.Pow(7.0 / 2431, 0.125),
        _ => throw new InvalidOperationException(Guard.Text($"Efficiency is defined for orders 2, 4, 6 and 8, but the order is {order}.")),
    };
}
