using Smoothing.Numerics;

namespace Smoothing.Kernels;

/// <summary>The Gaussian-based kernel of order 2r: G = Σ_{i&lt;r} (−1)^i/(2^i i!) φ^(2i); for r = 1 the Gaussian itself.</summary>
/// <remarks>Method: every member is a finite sum of Gaussian derivatives, φ^(m)(u) = (−1)^m He_m(u) φ(u). Source: Wand &amp; Schucany (1990).</remarks>
internal sealed class GaussianKernel : Kernel
{
    private readonly double[] _terms;
    private readonly double[] _polynomial;

    public GaussianKernel(int order)
    {
        Order = order;
        _terms = new double[order / 2];
        _polynomial = new double[order / 2];
        double term = 1;
        for (int i = 0; i < _terms.Length; i++)
        {
            _terms[i] = term;
            term /= -2 * (i + 1);
            double[] hermite = Hermite(2 * i);
            for (int k = 0; k <= i; k++)
            {
                _polynomial[k] += _terms[i] * hermite[2 * k];
            }
        }
    }

    public override string Name => Order == 2 ? "Gaussian" : Guard.Text($"Gaussian of order {Order}");

    public override int Order { get; }

    public override double SupportRadius => double.PositiveInfinity;

    internal override ReadOnlySpan<double> GaussianPolynomial => _polynomial;

    // φ(39) is below the smallest double.
    private protected override double FiniteRadius => 39;

    internal override double ValueCore(double u)
    {
        double density = NormalLaw.Density(u);
        if (_polynomial.Length == 1 || density == 0)
        {
            return density;
        }

        double square = u * u;
        double sum = 0;
        for (int k = _polynomial.Length - 1; k >= 0; k--)
        {
            sum = (sum * square) + _polynomial[k];
        }

        return density * sum;
    }

    internal override double DerivativeCore(double u, int order)
    {
        double sum = 0;
        for (int i = 0; i < _terms.Length; i++)
        {
            sum += _terms[i] * GaussianDerivative(u, (2 * i) + order);
        }

        return sum;
    }

    internal override double CumulativeCore(double u)
    {
        double sum = NormalLaw.Cumulative(u);
        for (int i = 1; i < _terms.Length; i++)
        {
            sum += _terms[i] * GaussianDerivative(u, (2 * i) - 1);
        }

        return sum;
    }

    internal override double EvenMoment(int order)
    {
        // ∫ u^j φ^(2i) = j!/(j − 2i)! (j − 2i − 1)!! for j ≥ 2i, else 0: whole numbers, so the vanishing moments vanish exactly.
        double sum = 0;
        for (int i = 0; i < _terms.Length && 2 * i <= order; i++)
        {
            double term = _terms[i] * DoubleFactorial(order - (2 * i) - 1);
            for (int k = 0; k < 2 * i; k++)
            {
                term *= order - k;
            }

            sum += term;
        }

        return sum;
    }

    internal override double RoughnessCore(int derivative)
    {
        // ∫ φ^(p) φ^(q) = (−1)^{(q−p)/2} (2k − 1)!!/(2^{k+1} √π), k = (p + q)/2.
        double sum = 0;
        for (int i = 0; i < _terms.Length; i++)
        {
            for (int j = 0; j < _terms.Length; j++)
            {
                int k = i + j + derivative;
                double size = DoubleFactorial((2 * k) - 1) / Math.ScaleB(NormalLaw.SqrtPi, k + 1);
                sum += _terms[i] * _terms[j] * ((j - i) % 2 == 0 ? size : -size);
            }
        }

        return sum;
    }

    internal override double TransformCore(double t)
    {
        // e^{−z} Σ_{i<r} z^i/i!, z = t²/2
        double z = t * t / 2;
        double power = 1;
        double sum = 0;
        for (int i = 0; i < _terms.Length; i++)
        {
            sum += power;
            power *= z / (i + 1);
        }

        double decay = Math.Exp(-z);
        return decay == 0 ? 0 : decay * sum;
    }

    internal override double SelfConvolutionCore(double u)
    {
        // κ² = e^{−t²} Σ (t²/2)^{i+j}/(i! j!); t² acts as −d²/du² on φ_{√2}, and φ_{√2}^(2k)(u) = 2^{−k−1/2} φ^(2k)(u/√2).
        double scaled = u / Math.Sqrt(2);
        double sum = 0;
        for (int i = 0; i < _terms.Length; i++)
        {
            for (int j = 0; j < _terms.Length; j++)
            {
                int k = i + j;
                sum += _terms[i] * _terms[j] * GaussianDerivative(scaled, 2 * k) / Math.ScaleB(Math.Sqrt(2), k);
            }
        }

        return sum;
    }

    internal override double IncompleteMomentCore(int order, double upper)
    {
        double sum = 0;
        for (int k = 0; k < _polynomial.Length; k++)
        {
            sum += _polynomial[k] * GaussianMoment(order + (2 * k), upper);
        }

        return sum;
    }

    // M_j(p) = −p^{j−1} φ(p) + (j − 1) M_{j−2}(p), M_0 = Φ, M_1 = −φ.
    private static double GaussianMoment(int order, double upper)
    {
        double density = NormalLaw.Density(upper);
        double moment = order % 2 == 0 ? NormalLaw.Cumulative(upper) : -density;
        for (int j = order % 2 == 0 ? 2 : 3; j <= order; j += 2)
        {
            double edge = density == 0 ? 0 : Math.Pow(upper, j - 1) * density;
            moment = ((j - 1) * moment) - edge;
        }

        return moment;
    }

    private static double GaussianDerivative(double u, int order)
    {
        double density = NormalLaw.Density(u);
        if (density == 0)
        {
            return 0;
        }

        // He_{r+1} = u He_r − r He_{r−1}
        double below = 0;
        double hermite = 1;
        for (int r = 0; r < order; r++)
        {
            (below, hermite) = (hermite, (u * hermite) - (r * below));
        }

        return (order % 2 == 0 ? hermite : -hermite) * density;
    }

    private static double[] Hermite(int order)
    {
        double[] below = new double[order + 2];
        double[] current = new double[order + 2];
        current[0] = 1;
        for (int r = 0; r < order; r++)
        {
            double[] next = new double[order + 2];
            for (int k = 0; k <= r; k++)
            {
                next[k + 1] += current[k];
                next[k] -= r * below[k];
            }

            (below, current) = (current, next);
        }

        return current;
    }

    private static double DoubleFactorial(int n)
    {
        double product = 1;
        for (int k = n; k > 1; k -= 2)
        {
            product *= k;
        }

        return product;
    }
}
