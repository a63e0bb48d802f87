using System.Globalization;
using System.Text;
using Smoothing.Kernels;

namespace Smoothing.Benchmarks.Kernels;

/// <summary>Writes the table of constants in docs/kernels.md and the figure of the ten shapes: <c>-- kernels</c> from the top folder.</summary>
internal static class KernelsDocument
{
    private const string Begin = "<!-- table: written by the kernels command -->";
    private const string End = "<!-- end of table -->";

    public static int Run()
    {
        string page = Path.Combine("docs", "kernels.md");
        if (!File.Exists(page))
        {
            Console.Error.WriteLine("docs/kernels.md not found: run this from the top folder of the repository.");
            return 2;
        }

        string text = File.ReadAllText(page);
        int from = text.IndexOf(Begin, StringComparison.Ordinal) + Begin.Length;
        int to = text.IndexOf(End, StringComparison.Ordinal);
        File.WriteAllText(page, text[..from] + "\n" + Table() + text[to..]);
        File.WriteAllText(Path.Combine("docs", "figures", "kernels.svg"), Figure());
        Console.WriteLine("docs/kernels.md and docs/figures/kernels.svg written.");
        return 0;
    }

    public static string Table()
    {
        var table = new StringBuilder("| kernel | order | K(0) | μ_k | R(K) | R(K') | R(K'') | efficiency | δ₀ |\n|---|---|---|---|---|---|---|---|---|\n");
        foreach (Kernel kernel in Kernel.Standard.Concat([Kernel.GaussianOfOrder(4), Kernel.GaussianOfOrder(6), Kernel.GaussianOfOrder(8), Kernel.PolynomialOfOrder(4), Kernel.PolynomialOfOrder(6)]))
        {
            table.Append("| ").Append(kernel.Name).Append(" | ").Append(kernel.Order).Append(" | ").Append(Number(kernel.Value(0))).Append(" | ").Append(Number(kernel.Moment(kernel.Order)))
                .Append(" | ").Append(Number(kernel.Roughness())).Append(" | ").Append(Roughness(kernel, 1)).Append(" | ").Append(Roughness(kernel, 2))
                .Append(" | ").Append(Number(kernel.Efficiency)).Append(" | ").Append(Number(kernel.CanonicalBandwidth)).Append(" |\n");
        }

        return table.ToString();
    }

    private static string Roughness(Kernel kernel, int derivative)
    {
        try
        {
            return Number(kernel.Roughness(derivative));
        }
        catch (InvalidOperationException)
        {
            return "–";
        }
    }

    private static string Number(double value) => value.ToString("0.##########", CultureInfo.InvariantCulture);

    // Ten small panels, each kernel at its canonical bandwidth, so that all smooth alike and only the shape differs.
    private static string Figure()
    {
        var svg = new StringBuilder("<svg xmlns=\"http://www.w3.org/2000/svg\" viewBox=\"0 0 800 300\" role=\"img\" aria-label=\"The ten standard kernels, each at its canonical bandwidth\">\n");
        svg.Append("<rect width=\"800\" height=\"300\" fill=\"#ffffff\"/><g font-family=\"DejaVu Sans, sans-serif\" font-size=\"13\" fill=\"#20303c\">\n");
        for (int k = 0; k < Kernel.Standard.Count; k++)
        {
            Kernel kernel = Kernel.Standard[k];
            double left = 8 + (160 * (k % 5));
            double top = 8 + (148 * (k / 5));
            double scale = kernel.CanonicalBandwidth;
            var path = new StringBuilder();
            for (int i = 0; i <= 288; i++)
            {
                double x = -3.2 + (6.4 * i / 288);
                path.Append(i == 0 ? 'M' : 'L').Append(F(left + (144.0 * i / 288))).Append(' ').Append(F(top + 126 - (118 * kernel.Value(x / scale) / scale)));
            }

            svg.Append("<text x=\"").Append(F(left)).Append("\" y=\"").Append(F(top + 14)).Append("\">").Append(kernel.Name).Append("</text>");
            svg.Append("<line x1=\"").Append(F(left)).Append("\" x2=\"").Append(F(left + 144)).Append("\" y1=\"").Append(F(top + 126)).Append("\" y2=\"").Append(F(top + 126)).Append("\" stroke=\"#8a99a5\"/>");
            svg.Append("<path d=\"").Append(path).Append("\" fill=\"none\" stroke=\"#17476f\" stroke-width=\"2\"/>\n");
        }

        return svg.Append("</g></svg>\n").ToString();
    }

    private static string F(double value) => value.ToString("0.#", CultureInfo.InvariantCulture);
}
