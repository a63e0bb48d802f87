using Smoothing.Kernels;

namespace Smoothing.Estimation;

/// <summary>What an interpolation error needs to know of a kernel: where smoothness ends, and the largest derivative below that.</summary>
/// <param name="ContinuousDerivatives">1: K′ is continuous and K″ bounded; 0: K is continuous with kinks; −1: K jumps.</param>
/// <param name="Largest">max|K″|, max|K′| or max K, in that order of the first parameter.</param>
internal readonly record struct KernelSmoothness(int ContinuousDerivatives, double Largest)
{
    // Where the tails of kernels without an end have fallen below 1e-17 of their peak: e^-39 (Laplace, logistic), and the Gaussian long before.
    private const double FarTail = 40;

    // Steps of the search for the largest derivative: the miss is about (1/1000)² of it, which the bound's own slack covers.
    private const int Steps = 2000;

    /// <summary>Half the width beyond which K is zero, or below 1e-17 of its peak.</summary>
    public static double Reach(Kernel kernel) =>
        double.IsFinite(kernel.SupportRadius) ? kernel.SupportRadius : kernel.GaussianPolynomial.IsEmpty ? FarTail : 12;

    public static KernelSmoothness Of(Kernel kernel)
    {
        int continuous = Exists(kernel, 2) ? 1 : Exists(kernel, 1) ? 0 : -1;
        return new KernelSmoothness(continuous, Search(kernel, continuous + 1));
    }

    // K^(r) is square integrable just when no lower derivative jumps.
    private static bool Exists(Kernel kernel, int derivative)
    {
        try
        {
            return kernel.Roughness(derivative) > 0;
        }
        catch (InvalidOperationException)
        {
            return false;
        }
    }

    private static double Search(Kernel kernel, int derivative)
    {
        double reach = Math.Min(Reach(kernel), 12); // all that is large lies within 12
        double largest = 0;
        for (int i = 0; i < Steps; i++)
        {
            double u = reach * (i + 0.5) / Steps; // never on a kink or an edge
            largest = Math.Max(largest, Math.Abs(kernel.Derivative(u, derivative)));
        }

        return largest;
    }
}
