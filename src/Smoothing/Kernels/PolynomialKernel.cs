using Smoothing.Numerics;

namespace Smoothing.Kernels;

/// <summary>A kernel on [−1, 1] that is a polynomial P(s) in the distance s = 1 − |u| to the nearer edge.</summary>
/// <remarks>
/// Method: coefficients are whole numbers times one fraction, so moments and roughness are exact fractions, rounded once. Cumulative: the edge
/// form ∫₀ˢ P, which keeps relative accuracy at the edge. Self-convolution and incomplete moments: Gauss–Legendre with enough nodes to be exact
/// on each polynomial piece; where K ≥ 0 all terms are positive and nothing cancels.
/// </remarks>
internal sealed class PolynomialKernel : Kernel
{
    private readonly Rational _factor;
    private readonly long[] _whole;
    private readonly double[] _edge;
    private readonly double[] _integral;
    private readonly bool _even;
    private readonly Func<double, double> _value;

    /// <param name="name">The kernel's name.</param>
    /// <param name="order">Its order.</param>
    /// <param name="factor">The common factor of the coefficients.</param>
    /// <param name="whole">Whole coefficients in s, lowest power first.</param>
    /// <param name="value">K at a = |u| ≤ 1, in a factored form that does not cancel.</param>
    public PolynomialKernel(string name, int order, Rational factor, long[] whole, Func<double, double> value)
    {
        Name = name;
        Order = order;
        _factor = factor;
        _whole = whole;
        _value = value;
        _edge = [.. whole.Select(c => (factor * Rational.Of(c)).ToDouble())];
        _integral = [.. whole.Select((c, k) => (factor * Rational.Of(c, k + 1)).ToDouble())];

        // P(1 − u) has no odd powers of u exactly when its odd derivatives vanish at s = 1.
        _even = Enumerable.Range(0, whole.Length).Where(j => j % 2 == 1).All(j => DerivativeSum(j, one: true) == 0);
    }

    public override string Name { get; }

    public override int Order { get; }

    public override double SupportRadius => 1;

    internal override ReadOnlySpan<double> EdgePolynomial => _edge;

    internal override double ValueCore(double u)
    {
        double a = Math.Abs(u);
        return a > 1 ? 0 : _value(a);
    }

    internal override double DerivativeCore(double u, int order)
    {
        double a = Math.Abs(u);
        if (a > 1)
        {
            return 0;
        }

        if (a == 1)
        {
            for (int j = 0; j < order; j++)
            {
                if (DerivativeSum(j, one: false) != 0)
                {
                    throw NoDerivative(order, "at the ends of the support");
                }
            }
        }

        if (a == 0)
        {
            for (int j = 1; j < order; j += 2)
            {
                if (DerivativeSum(j, one: true) != 0)
                {
                    throw NoDerivative(order, "at 0");
                }
            }

            if (order % 2 == 1)
            {
                return 0;
            }
        }

        double s = 1 - a;
        double value = 0;
        for (int k = _whole.Length - 1; k >= order; k--)
        {
            value = (value * s) + (_edge[k] * Falling(k, order));
        }

        value = order % 2 == 1 && u > 0 ? -value : value;
        return a == 1 ? value / 2 : value;
    }

    internal override double CumulativeCore(double u)
    {
        if (u <= -1)
        {
            return 0;
        }

        if (u >= 1)
        {
            return 1;
        }

        double s = 1 - Math.Abs(u);
        double tail = 0;
        for (int k = _integral.Length - 1; k >= 0; k--)
        {
            tail = (tail * s) + _integral[k];
        }

        tail *= s;
        return u <= 0 ? tail : 1 - tail;
    }

    internal override double EvenMoment(int order)
    {
        // 2 Σ c_k ∫ (1 − s)^j s^k ds, the integral j! k!/(j + k + 1)! as an exact fraction.
        Rational sum = Rational.Zero;
        for (int k = 0; k < _whole.Length; k++)
        {
            sum += Rational.Of(2 * _whole[k]) * Beta(k, order);
        }

        return (_factor * sum).ToDouble();
    }

    internal override double RoughnessCore(int derivative)
    {
        for (int j = 0; j < derivative; j++)
        {
            if (DerivativeSum(j, one: false) != 0 || (j % 2 == 1 && DerivativeSum(j, one: true) != 0))
            {
                throw NoRoughness(derivative);
            }
        }

        Rational sum = Rational.Zero;
        for (int k = derivative; k < _whole.Length; k++)
        {
            for (int l = derivative; l < _whole.Length; l++)
            {
                sum += Rational.Of(2 * _whole[k] * _whole[l], k + l - (2 * derivative) + 1) * new Rational(Whole(k, derivative) * Whole(l, derivative), 1);
            }
        }

        return (_factor * _factor * sum).ToDouble();
    }

    internal override double TransformCore(double t)
    {
        // Up to t = 24 a 32-point rule on [0, 1] is exact to rounding (cos(24u) has converged); beyond, integration by parts, whose terms then fall.
        if (t <= 24)
        {
            return 2 * GaussLegendre.Integrate(u => _value(u) * Math.Cos(t * u), 0, 1, 32);
        }

        // ∫₀¹ K cos(tu) du = Σ_r [K^(r)(1−) sin(t + rπ/2) − K^(r)(0+) sin(rπ/2)] / t^(r+1), in derivatives of one side.
        CompensatedSum sum = default;
        double power = 1 / t;
        (double sin, double cos) = Math.SinCos(t);
        for (int r = 0; r < _whole.Length; r++)
        {
            double sign = r % 2 == 0 ? 1 : -1;
            double atEnd = sign * DerivativeSum(r, one: false);
            double atZero = sign * DerivativeSum(r, one: true);
            double phaseEnd = (r % 4) switch { 0 => sin, 1 => cos, 2 => -sin, _ => -cos };
            double phaseZero = (r % 4) switch { 1 => 1, 3 => -1, _ => 0 };
            sum.Add(((atEnd * phaseEnd) - (atZero * phaseZero)) * power);
            power /= t;
        }

        return 2 * _factor.ToDouble() * sum.Value;
    }

    internal override double SelfConvolutionCore(double u)
    {
        // Polynomial pieces in v: [u − 1, 0], [0, u], [u, 1] where P has odd powers of |v|, one piece where it has none. By symmetry about u/2
        // only the right half is summed. The product has at most twice the degree: degree + 1 nodes are exact.
        int nodes = _whole.Length;
        double Product(double v) => Even(v) * Even(u - v);
        if (_even || u >= 1)
        {
            return GaussLegendre.Integrate(Product, u - 1, 1, nodes);
        }

        return (2 * GaussLegendre.Integrate(Product, u, 1, nodes)) + GaussLegendre.Integrate(Product, 0, u, nodes);
    }

    internal override double IncompleteMomentCore(int order, double upper)
    {
        int nodes = ((_whole.Length + order) / 2) + 1;
        double Term(double u) => Math.Pow(u, order) * Even(u);
        if (upper <= 0)
        {
            return GaussLegendre.Integrate(Term, -1, upper, nodes);
        }

        double mirrored = GaussLegendre.Integrate(Term, -1, -upper, nodes);
        return order % 2 == 0 ? EvenMoment(order) - mirrored : mirrored;
    }

    private static Rational Beta(int k, int j)
    {
        // k! j! / (k + j + 1)! = 1 / {(k + j + 1) C(k + j, k)}
        System.Numerics.BigInteger binomial = 1;
        for (int i = 1; i <= k; i++)
        {
            binomial = binomial * (j + i) / i;
        }

        return new Rational(1, binomial * (k + j + 1));
    }

    private static double Falling(int k, int order) => (double)Whole(k, order);

    // k (k − 1) … (k − r + 1)
    private static System.Numerics.BigInteger Whole(int k, int order)
    {
        System.Numerics.BigInteger product = 1;
        for (int i = 0; i < order; i++)
        {
            product *= k - i;
        }

        return product;
    }

    private double Even(double v) => _value(Math.Min(1, Math.Abs(v)));

    // P^(j) without the factor, at s = 1 (the centre) or s = 0 (the edge): whole numbers, so zero is exact.
    private double DerivativeSum(int j, bool one)
    {
        if (!one)
        {
            return j < _whole.Length ? _whole[j] * Falling(j, j) : 0;
        }

        double sum = 0;
        for (int k = j; k < _whole.Length; k++)
        {
            sum += _whole[k] * Falling(k, j);
        }

        return sum;
    }
}
