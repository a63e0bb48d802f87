using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Estimation;

/// <summary>Brings the cells of a condensed sample to the width that a bandwidth takes, or says why they can't serve it.</summary>
internal static class CondensedWidth
{
    public static KernelSums SumsOf(CondensedSample sample, Kernel kernel, double bandwidth)
    {
        if (kernel.GaussianPolynomial.IsEmpty)
        {
            throw new ArgumentException(
                Guard.Text($"kernel must be the Gaussian or one of its higher orders for a condensed sample, but is {kernel.Name}: cell moments give a smooth kernel's curve exactly, and one with edges or kinks cuts cells in two. Use Kernel.Gaussian at the equivalent bandwidth, or pass the values."),
                nameof(kernel));
        }

        CondensedSample cells = Suited(sample, kernel, bandwidth);
        if (MomentCells.CanIndex(bandwidth, Math.Max(-sample.Minimum, sample.Maximum)) && GaussianDirectSums.Serves(kernel, bandwidth))
        {
            return new MomentSums(cells, kernel, bandwidth);
        }

        return kernel is GaussianKernel && kernel.Order == 2
            ? new GaussianCellSums(cells, bandwidth)
            : throw new ArgumentException(Guard.Text($"bandwidth = {bandwidth} is too small against values up to {Math.Max(-sample.Minimum, sample.Maximum)} for the {kernel.Name} kernel: use Kernel.Gaussian, or a larger bandwidth."), nameof(bandwidth));
    }

    private static CondensedSample Suited(CondensedSample sample, Kernel kernel, double bandwidth)
    {
        if (sample.Cells.Length == 0)
        {
            return sample;
        }

        // Eight moments are taken to mean an exact curve; fewer are an approximation asked for, held to a millionth of the peak. A kernel of higher order
        // is a sum of derivatives, each of which costs a power of the width.
        double accuracy = (sample.Moments >= 8 ? 1e-13 : 1e-6) / Math.Pow(2, kernel.Order - 2);
        double widest = Math.Min(1 / 16.0, 2 * Math.Pow(accuracy * Math.Sqrt(Factorial(sample.Moments)) / 1.09, 1.0 / sample.Moments)) * bandwidth;
        if (!(sample.CellWidth <= widest))
        {
            throw new ArgumentException(
                Guard.Text($"cells must be at most {Math.ScaleB(1, Math.ILogB(widest))} wide for a bandwidth of {bandwidth} with {sample.Moments} moments, but are {sample.CellWidth}: condense with that CellWidth, or choose a larger bandwidth."),
                nameof(sample));
        }

        // Wider cells are fewer and cost nothing in accuracy up to here.
        int room = Math.ILogB(widest) - Math.ILogB(sample.CellWidth);
        return room > 0 ? sample.Coarsen(room) : sample;
    }

    private static double Factorial(int n) => n <= 1 ? 1 : n * Factorial(n - 1);
}
