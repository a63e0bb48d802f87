using System.Runtime.CompilerServices;

namespace Smoothing.Estimation;

/// <summary>A curve as one polynomial of degree 15 for each wide cell: for far more points than cells, such as all values of the sample.</summary>
/// <remarks>
/// Method: interpolation at the sixteen Chebyshev points of a cell of width w ≤ h/2, coefficients by the discrete cosine sum, then powers. The error is at most
/// 2(a*w/4)¹⁶/16! of the curve where a value of the whole weight at a distance of a* could matter, so a cell is used while a*w ≤ 3.6 (2e-14); powers lose
/// nothing then, since the coefficients fall like (a*w/2)ᵏ/k!. Cells beyond that are evaluated point by point.
/// </remarks>
internal sealed unsafe class MomentPanels
{
    /// <summary>Coefficients of a panel.</summary>
    public const int Terms = 16;

    /// <summary>Largest a*w.</summary>
    public const double Reach = 3.6;

    private static readonly double[] s_nodes = Nodes();
    private static readonly double[] s_cosines = Cosines();
    private static readonly double[] s_powers = Powers();

    private readonly double[] _coefficients;
    private readonly double _inverse;
    private readonly double _first;
    private readonly int _count;

    /// <param name="inverse">1/width of a panel.</param>
    /// <param name="first">Number of the first panel on the lattice of its width.</param>
    /// <param name="count">How many.</param>
    /// <param name="serves">Whether a panel can be used.</param>
    /// <param name="curve">The curve at points of one panel.</param>
    public MomentPanels(double inverse, double first, int count, Func<int, bool> serves, Action<double[], double[]> curve)
    {
        (_inverse, _first, _count) = (inverse, first, count);
        _coefficients = new double[(long)count * Terms];
        double[] x = new double[Terms], y = new double[Terms];
        for (int c = 0; c < count; c++)
        {
            Span<double> panel = _coefficients.AsSpan(c * Terms, Terms);
            if (!serves(c))
            {
                panel[0] = double.NaN;
                continue;
            }

            for (int i = 0; i < Terms; i++)
            {
                x[i] = (first + c + 0.5 + (0.5 * s_nodes[i])) / inverse;
            }

            curve(x, y);
            for (int i = 0; i < Terms; i++)
            {
                // Where the point really is: rounding of x matters far from 0.
                double rest = ((x[i] * inverse) - (first + c) - 0.5) * 2;
                x[i] = rest;
            }

            Fit(x, y, panel);
        }
    }

    /// <summary>destination[j] = factor · curve(x_j); returns false for points that need another way and leaves NaN there.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public bool Evaluate(ReadOnlySpan<double> x, double factor, Span<double> destination)
    {
        bool all = true;
        fixed (double* points = x, coefficients = _coefficients, to = destination)
        {
            for (int j = 0; j < x.Length; j++)
            {
                double place = (points[j] * _inverse) - _first;
                if (!(place >= 0 && place < _count))
                {
                    to[j] = double.NaN;
                    all = false;
                    continue;
                }

                int cell = (int)place;
                double s = (place - cell - 0.5) * 2;
                double* c = coefficients + ((long)cell * Terms);
                double p = c[15];
                p = Math.FusedMultiplyAdd(p, s, c[14]);
                p = Math.FusedMultiplyAdd(p, s, c[13]);
                p = Math.FusedMultiplyAdd(p, s, c[12]);
                p = Math.FusedMultiplyAdd(p, s, c[11]);
                p = Math.FusedMultiplyAdd(p, s, c[10]);
                p = Math.FusedMultiplyAdd(p, s, c[9]);
                p = Math.FusedMultiplyAdd(p, s, c[8]);
                p = Math.FusedMultiplyAdd(p, s, c[7]);
                p = Math.FusedMultiplyAdd(p, s, c[6]);
                p = Math.FusedMultiplyAdd(p, s, c[5]);
                p = Math.FusedMultiplyAdd(p, s, c[4]);
                p = Math.FusedMultiplyAdd(p, s, c[3]);
                p = Math.FusedMultiplyAdd(p, s, c[2]);
                p = Math.FusedMultiplyAdd(p, s, c[1]);
                p = Math.FusedMultiplyAdd(p, s, c[0]);
                to[j] = p * factor;
                all &= !double.IsNaN(p);
            }
        }

        return all;
    }

    // Chebyshev coefficients from the values, then powers of s. Nodes that rounding moved are met by correcting with the interpolant's own slope.
    private static void Fit(double[] s, double[] y, Span<double> panel)
    {
        Span<double> chebyshev = stackalloc double[Terms];
        Transform(y, chebyshev);
        bool moved = false;
        for (int i = 0; i < Terms; i++)
        {
            double shift = s_nodes[i] - s[i];
            if (shift != 0)
            {
                y[i] += shift * Slope(chebyshev, s_nodes[i]);
                moved = true;
            }
        }

        if (moved)
        {
            Transform(y, chebyshev);
        }

        panel.Clear();
        for (int k = 0; k < Terms; k++)
        {
            for (int j = k & 1; j <= k; j += 2)
            {
                panel[j] += chebyshev[k] * s_powers[(k * Terms) + j];
            }
        }
    }

    private static void Transform(double[] y, Span<double> chebyshev)
    {
        for (int k = 0; k < Terms; k++)
        {
            double sum = 0;
            for (int i = 0; i < Terms; i++)
            {
                sum += y[i] * s_cosines[(k * Terms) + i];
            }

            chebyshev[k] = sum * (k == 0 ? 1.0 / Terms : 2.0 / Terms);
        }
    }

    // Σ cₖ T′ₖ(s) with T′ₖ = k Uₖ₋₁.
    private static double Slope(ReadOnlySpan<double> chebyshev, double s)
    {
        double before = 0, here = 1, sum = 0;
        for (int k = 1; k < Terms; k++)
        {
            sum += chebyshev[k] * k * here;
            (before, here) = (here, (2 * s * here) - before);
        }

        return sum;
    }

    private static double[] Nodes()
    {
        var nodes = new double[Terms];
        for (int i = 0; i < Terms; i++)
        {
            nodes[i] = Math.Cos(Math.PI * (i + 0.5) / Terms);
        }

        return nodes;
    }

    private static double[] Cosines()
    {
        var cosines = new double[Terms * Terms];
        for (int k = 0; k < Terms; k++)
        {
            for (int i = 0; i < Terms; i++)
            {
                // The angle reduced to the first turn: k(2i + 1) is whole.
                cosines[(k * Terms) + i] = Math.Cos(Math.PI * (k * ((2 * i) + 1) % (4 * Terms)) / (2.0 * Terms));
            }
        }

        return cosines;
    }

    // T₀ = 1, T₁ = s, Tₖ₊₁ = 2sTₖ − Tₖ₋₁: whole numbers.
    private static double[] Powers()
    {
        var powers = new double[Terms * Terms];
        powers[0] = 1;
        powers[Terms + 1] = 1;
        for (int k = 2; k < Terms; k++)
        {
            for (int j = 0; j < Terms; j++)
            {
                powers[(k * Terms) + j] = (j > 0 ? 2 * powers[((k - 1) * Terms) + j - 1] : 0) - powers[((k - 2) * Terms) + j];
            }
        }

        return powers;
    }
}
