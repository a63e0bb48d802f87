using Smoothing.Kernels;

namespace Smoothing.Tests.Support;

/// <summary>A polynomial kernel for tests, given twice: by its coefficients in s = 1 − |u| and by its usual formula in 31-digit arithmetic.</summary>
internal sealed class EdgeKernel(string name, double[] edge, Func<DoubleDouble, DoubleDouble> formula, Func<DoubleDouble, DoubleDouble>? slope) : Kernel
{
    public static EdgeKernel Flat { get; } = new("flat", [0.5], _ => (DoubleDouble)0.5, null);

    public static EdgeKernel Tent { get; } = new("tent", [0, 1], u => (DoubleDouble)1 - u, _ => (DoubleDouble)(-1));

    /// <summary>¾(1 − u²).</summary>
    public static EdgeKernel Beta1 { get; } = Beta(1, 0.75);

    /// <summary>15/16 (1 − u²)².</summary>
    public static EdgeKernel Beta2 { get; } = Beta(2, 0.9375);

    /// <summary>35/32 (1 − u²)³.</summary>
    public static EdgeKernel Beta3 { get; } = Beta(3, 1.09375);

    /// <summary>(1 − u³)³, its factor 70/81 left out so that every coefficient is exact.</summary>
    public static EdgeKernel Cubes { get; } = new(
        "cubes",
        Expand([0, 3, -3, 1], 3, 1), // 1 − (1 − s)³ = 3s − 3s² + s³
        u => DoubleDouble.Power((DoubleDouble)1 - DoubleDouble.Power(u, 3), 3),
        u => (DoubleDouble)(-9) * u * u * DoubleDouble.Power((DoubleDouble)1 - DoubleDouble.Power(u, 3), 2));

    public static EdgeKernel[] All => [Flat, Tent, Beta1, Beta2, Beta3, Cubes];

    public override string Name => name;

    public override double SupportRadius => 1;


    internal override ReadOnlySpan<double> EdgePolynomial => edge;

    /// <summary>K at distance u ≥ 0 inside the support.</summary>
    public DoubleDouble Formula(DoubleDouble u) => formula(u);

    /// <summary>dK/du at distance u in (0, 1).</summary>
    public DoubleDouble Slope(DoubleDouble u) => slope!(u);

    internal override double ValueCore(double u) => Math.Abs(u) > 1 ? 0 : (double)formula(Math.Abs(u));

    internal override double DerivativeCore(double u, int order) =>
        u == 0 ? 0 : Math.Abs(u) > 1 ? 0 : Math.Sign(u) * (Math.Abs(u) == 1 ? 0.5 : 1) * (double)slope!(Math.Abs(u));

    internal override double CumulativeCore(double u) => throw Unasked();

    internal override double EvenMoment(int order) => throw Unasked();

    internal override double RoughnessCore(int derivative) => throw Unasked();

    // The sums under test read values, slopes and coefficients alone: asking for more is a fault of theirs.
    private static InvalidOperationException Unasked() => new("a sum over values needs no constant of the kernel");

    private static EdgeKernel Beta(int power, double factor) => new(
        "beta" + power,
        Expand([0, 2, -1], power, factor), // 1 − (1 − s)² = 2s − s²
        u => DoubleDouble.Power((DoubleDouble)1 - (u * u), power) * factor,
        u => DoubleDouble.Power((DoubleDouble)1 - (u * u), power - 1) * u * (-2 * power * factor));

    private static double[] Expand(double[] polynomial, int power, double factor)
    {
        double[] result = [factor];
        for (int i = 0; i < power; i++)
        {
            var next = new double[result.Length + polynomial.Length - 1];
            for (int a = 0; a < result.Length; a++)
            {
                for (int b = 0; b < polynomial.Length; b++)
                {
                    next[a + b] += result[a] * polynomial[b];
                }
            }

            result = next;
        }

        return result;
    }
}
