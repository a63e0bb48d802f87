using Smoothing.Bandwidths;
using Smoothing.Estimation;
using Smoothing.Kernels;
using Smoothing.Samples;
using Smoothing.Tests.Samples;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Bandwidths;

/// <summary>The criterion ∫f̂² − 2·mean of the left-out values by its definition (Rudemo 1982), summed pair by pair in the tests.</summary>
public class LeastSquaresKernelsTests
{
    public static TheoryData<string> Kernels => ["Uniform", "Triangular", "Epanechnikov", "Biweight", "Triweight", "Tricube", "Cosine", "Polynomial of order 4", "Gaussian of order 4", "Gaussian of order 6"];

    [Theory]
    [MemberData(nameof(Kernels))]
    public void LeastSquares_OwnKernel_MinimisesItsOwnCriterion(string name)
    {
        Kernel kernel = Named(name);
        double[] values = SeededColumns.Draw("two groups", 300, 4);
        BandwidthChoice choice = BandwidthRules.LeastSquaresCrossValidation(Sample.Of(values), kernel);
        Assert.Equal(BandwidthRule.LeastSquaresCrossValidation, choice.Rule);
        double best = Criterion(values, kernel, choice);

        // Around the minimum nothing is lower; kinks of kernels with an end allow a hair.
        foreach (double factor in (double[])[0.97, 0.99, 1.01, 1.03])
        {
            double other = Criterion(values, kernel, choice * factor);
            Assert.True(other >= best - (1e-9 * Math.Abs(best)), $"{name}: {other} at {factor} h is below {best}");
        }
    }

    [Theory]
    [MemberData(nameof(Kernels))]
    public void LeastSquares_Objective_IsTheDefinition(string name)
    {
        Kernel kernel = Named(name);
        double[] values = SeededColumns.Draw("normal", 120, 9);
        values[7] = values[8] = values[9];
        BandwidthChoice choice = BandwidthRules.LeastSquaresCrossValidation(Sample.Of(values), kernel, new BandwidthOptions { KeepObjective = true });
        var curve = choice.Objective!;
        double last = 0, lastExpected = 0;
        for (int i = 0; i < curve.X.Count; i += 10)
        {
            // Compared as differences between bandwidths and in the criterion's own unit: the choice keeps it in units of a scale.
            double expected = Criterion(values, kernel, curve.X[i]);
            if (i > 0)
            {
                double unit = (lastExpected - expected) / (last - curve.Y[i]);
                Assert.InRange(Math.Log2(unit) - Math.Round(Math.Log2(unit)), -1e-5, 1e-5);
            }

            (last, lastExpected) = (curve.Y[i], expected);
        }
    }

    [Fact]
    public void LeastSquares_CountsAsWeights_EqualRepetitions()
    {
        double[] values = SeededColumns.Draw("normal", 80, 5);
        double[] repeated = [.. values, .. values[..40]], counts = [.. values.Select((_, i) => i < 40 ? 2.0 : 1.0)];
        foreach (Kernel kernel in (Kernel[])[Kernel.Epanechnikov, Kernel.Triangular, Kernel.GaussianOfOrder(4)])
        {
            double weighted = BandwidthRules.LeastSquaresCrossValidation(Sample.Of(values, new SampleOptions { Weights = counts, WeightMeaning = WeightMeaning.Counts }), kernel);
            Near.Relative(BandwidthRules.LeastSquaresCrossValidation(Sample.Of(repeated), kernel), weighted, 1e-6, kernel.Name);
        }
    }

    [Fact]
    public void Automatic_KernelOfHigherOrder_IsTheBlockSpectrum()
    {
        Sample sample = Sample.Of(SeededColumns.Draw("normal", 500, 2));
        foreach (Kernel kernel in (Kernel[])[Kernel.GaussianOfOrder(4), Kernel.GaussianOfOrder(8), Kernel.PolynomialOfOrder(4)])
        {
            BandwidthChoice choice = BandwidthRules.Automatic(sample, kernel);
            Assert.Equal((BandwidthRule.Automatic, BandwidthRule.BlockSpectrum), (choice.Rule, choice.ReplacedBy!.Value));
            Near.Relative(BandwidthRules.BlockSpectrum(sample, kernel), choice, 1e-12, kernel.Name);
        }
    }

    [Fact]
    public void LeastSquares_LargeSample_ScannedMinimumIsTheExactCriterions()
    {
        Sample sample = Sample.Of(SeededColumns.Draw("normal", 21_000, 6));
        BandwidthChoice choice = BandwidthRules.LeastSquaresCrossValidation(sample, Kernel.Epanechnikov, new BandwidthOptions { RoundingUnit = 0 });
        var pairs = new CompactPairs(sample, Kernel.Epanechnikov);
        double best = pairs.LeastSquares(choice);
        foreach (double factor in (double[])[0.98, 0.995, 1.005, 1.02])
        {
            double other = pairs.LeastSquares(choice * factor);
            Assert.True(other >= best - (1e-9 * Math.Abs(best)), $"{other} at {factor} h is below {best}");
        }
    }

    private static Kernel Named(string name) => name switch
    {
        "Polynomial of order 4" => Kernel.PolynomialOfOrder(4),
        "Gaussian of order 4" => Kernel.GaussianOfOrder(4),
        "Gaussian of order 6" => Kernel.GaussianOfOrder(6),
        _ => Kernel.Standard.Single(k => k.Name == name),
    };

    private static double Criterion(double[] values, Kernel kernel, double h)
    {
        double n = values.Length, squares = 0, others = 0;
        for (int i = 0; i < values.Length; i++)
        {
            for (int j = 0; j < values.Length; j++)
            {
                double u = (values[i] - values[j]) / h;
                squares += kernel.SelfConvolution(u);
                others += i == j ? 0 : kernel.Value(u);
            }
        }

        return (squares / (n * n * h)) - (2 * others / (n * (n - 1) * h));
    }
}
