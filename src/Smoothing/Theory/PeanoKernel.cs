using MathNet.Numerics;
using Smoothing.Kernels;

namespace Smoothing.Theory;

/// <summary>L with ∫ K(u){g(x − hu) − g(x)} du = hᵏ ∫ L(v) g⁽ᵏ⁾(x − hv) dv, k the order of the kernel: the bias without a difference.</summary>
/// <remarks>
/// Method: Taylor's formula with integral remainder (Peano's theorem): L(v) = ∫ (u − v)ᵏ⁻¹/(k − 1)! K(u) du over u ≥ |v|, an even function,
/// from the incomplete moments; tabulated once, since these may cost a quadrature. Dominant error: 1e-15 of L(0).
/// </remarks>
internal sealed class PeanoKernel
{
    private readonly PiecewiseTable _table;

    public PeanoKernel(Kernel kernel, double radius)
    {
        int k = kernel.Order;
        double[] binomial = [.. Enumerable.Range(0, k).Select(j => SpecialFunctions.Binomial(k - 1, j) / SpecialFunctions.Factorial(k - 1))];
        double Tail(double v)
        {
            // ∫ uʲK over u ≥ v is the lower tail at −v, with the sign of (−1)ʲ.
            double sum = 0;
            for (int j = 0; j < k; j++)
            {
                sum += binomial[j] * Math.Pow(-v, k - 1 - j) * (j % 2 == 0 ? 1 : -1) * kernel.IncompleteMoment(j, -v);
            }

            return sum;
        }

        _table = new(Tail, PanelRule.Panels(0, radius, [], double.IsFinite(kernel.SupportRadius) ? radius / 4 : 1));
    }

    public double At(double v) => _table.At(Math.Abs(v));
}
