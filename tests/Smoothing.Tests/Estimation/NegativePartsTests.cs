using Smoothing.Estimation;
using Smoothing.Numerics;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Estimation;

/// <summary>Curves with negative parts, on one whose integral is elementary: φ(x)(3 − x²)/2, F = Φ(x) + xφ(x)/2, zero at ±√3.</summary>
public class NegativePartsTests
{
    private static readonly double s_zero = Math.Sqrt(3);

    [Fact]
    public void SignChanges_FourthOrderBump_AreTheRootsOfThree()
    {
        double[] found = SignChanges.Of(new Bump());
        Assert.Equal(2, found.Length);
        Near.Absolute(-s_zero, found[0], 1e-12);
        Near.Absolute(s_zero, found[1], 1e-12);
    }

    [Fact]
    public void CutForm_FourthOrderBump_IsThePositivePartOverItsMass()
    {
        var bump = new Bump();
        var cut = new CutForm(bump);
        double total = (2 * Bump.Lower(s_zero)) - 1;
        Assert.False(cut.MayBeNegative);
        foreach (double x in new[] { -3, -1.8, -1.7, 0, 0.5, 1.7, 1.8, 5 })
        {
            double inside = Math.Clamp(x, -s_zero, s_zero);
            Near.Absolute(Math.Max(bump.Value(x), 0) / total, cut.Value(x), 1e-14);
            Near.Absolute((Bump.Lower(inside) - Bump.Lower(-s_zero)) / total, cut.Tail(x, upper: false), 1e-13);
            Near.Absolute(1, cut.Tail(x, upper: false) + cut.Tail(x, upper: true), 1e-13);
        }

        Near.Absolute(1, cut.Tail(double.PositiveInfinity, upper: false), 1e-15);
        Near.Absolute(bump.Derivative(1, 1) / total, cut.Derivative(1, 1), 1e-14);
        Assert.Equal(0.0, cut.Derivative(2, 1));
    }

    // F dips below 0 before −√3 and climbs above 1 up to √3: the quantile is the first place where F reaches p.
    [Theory]
    [InlineData(0.001)]
    [InlineData(0.3)]
    [InlineData(0.9)]
    [InlineData(0.999)]
    public void QuantileSearch_DippingDistribution_IsTheFirstClimb(double p)
    {
        var bump = new Bump();
        IReadOnlyList<double> changes = SignChanges.Of(bump);
        double found = p <= 0.5 ? QuantileSearch.Find(bump, p, upper: false, changes) : QuantileSearch.Find(bump, 1 - p, upper: true, changes);
        Near.Absolute(p, Bump.Lower(found), 1e-13);
        for (double x = -8; x < found - 1e-9; x += 0.001)
        {
            Assert.True(Bump.Lower(x) < p);
        }
    }

    private sealed class Bump : CurveForm
    {
        public override Interval Ends => Interval.WholeLine;

        public override Interval Core => new(0, 0);

        public override double Scale => 1;

        public override bool MayBeNegative => true;

        public static double Lower(double x) => double.IsInfinity(x) ? (x > 0 ? 1 : 0) : NormalLaw.Cumulative(x) + (x * NormalLaw.Density(x) / 2);

        public override void Derivatives(ReadOnlySpan<double> x, int order, Span<double> destination)
        {
            for (int i = 0; i < x.Length; i++)
            {
                double phi = NormalLaw.Density(x[i]);
                destination[i] = double.IsInfinity(x[i]) ? 0 : order == 0 ? phi * (3 - (x[i] * x[i])) / 2 : phi * ((x[i] * x[i] * x[i]) - (5 * x[i])) / 2;
            }
        }

        public override void Cumulatives(ReadOnlySpan<double> x, bool upper, Span<double> destination)
        {
            for (int i = 0; i < x.Length; i++)
            {
                destination[i] = Lower(upper ? -x[i] : x[i]);
            }
        }
    }
}
