using System.Globalization;
using Smoothing.Kernels;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Kernels;

public class KernelsPageTests
{
    [Fact]
    public void KernelsPage_TableOfConstants_IsUpToDate()
    {
        string[] rows = [.. Repository.Read("docs", "kernels.md").Split('\n').SkipWhile(l => !l.StartsWith("| kernel | order", StringComparison.Ordinal)).Skip(2).TakeWhile(l => l.StartsWith('|'))];
        Kernel[] kernels = [.. Kernel.Standard, Kernel.GaussianOfOrder(4), Kernel.GaussianOfOrder(6), Kernel.GaussianOfOrder(8), Kernel.PolynomialOfOrder(4), Kernel.PolynomialOfOrder(6)];
        Assert.Equal(kernels.Length, rows.Length);
        for (int i = 0; i < kernels.Length; i++)
        {
            string[] cells = [.. rows[i].Split('|', StringSplitOptions.TrimEntries)[1..^1]];
            Kernel kernel = kernels[i];
            Assert.Equal(kernel.Name, cells[0]);
            double[] wanted = [kernel.Order, kernel.Value(0), kernel.Moment(kernel.Order), kernel.Roughness(), double.NaN, double.NaN, kernel.Efficiency, kernel.CanonicalBandwidth];
            for (int c = 0; c < wanted.Length; c++)
            {
                if (!double.IsNaN(wanted[c]))
                {
                    Near.Absolute(wanted[c], double.Parse(cells[c + 1], CultureInfo.InvariantCulture), 5.1e-11, $"{kernel.Name}, column {c + 1}");
                }
            }
        }
    }
}
