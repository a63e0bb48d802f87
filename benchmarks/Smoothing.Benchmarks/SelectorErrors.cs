using System.Numerics.Tensors;
using Smoothing.Estimation;
using Smoothing.Numerics;

namespace Smoothing.Benchmarks;

/// <summary>Integrated squared errors of one sample's estimates against a known law, through the spectrum on the law's circle.</summary>
/// <remarks>
/// Method: ∫(f̂ − f)² = (1/2π)∫ {|φ_n|² w² − 2 Re(φ̄_n φ_f) w} dt + ∫f², one sum per bandwidth. Values outside the circle are left out of f̂, as
/// the law's mass is of f.
/// </remarks>
internal sealed class SelectorTruth
{
    /// <summary>Nodes of the law's table; the finest law of the set has a component of scale 0.01, which is 23 nodes.</summary>
    public const int Nodes = 1 << 15;

    private readonly double[] _real = new double[Nodes];
    private readonly double[] _imaginary = new double[Nodes];

    public SelectorTruth(SelectorTarget target)
    {
        Target = target;
        Length = target.Upper - target.Lower;
        double step = Length / Nodes;
        Density = new double[Nodes];
        CompensatedSum roughness = default;
        for (int j = 0; j < Nodes; j++)
        {
            // Cell means by 16 midpoints, so that jumps fall right.
            double sum = 0;
            for (int s = 0; s < 16; s++)
            {
                double value = target.Density(target.Lower + ((j - 0.5 + ((s + 0.5) / 16)) * step));
                sum += value;
                roughness.Add(value * value * step / 16);
            }

            Density[j] = sum / 16;
            _real[j] = Density[j] * step;
        }

        SquaredIntegral = roughness.Value;
        FourierPlan.Forward(_real, _imaginary);
        for (int k = 1; k < Nodes / 2; k++)
        {
            double half = Math.PI * k / Nodes;
            double cell = Math.Sin(half) / half;
            _real[k] /= cell;
            _imaginary[k] /= -cell;
        }
    }

    public SelectorTarget Target { get; }

    public double Length { get; }

    public double[] Density { get; }

    public double SquaredIntegral { get; }

    public SelectorErrors For(ReadOnlySpan<double> sorted, ReadOnlySpan<double> weights, double count) => new(this, sorted, weights, count, _real, _imaginary);
}

/// <inheritdoc cref="SelectorTruth"/>
internal sealed class SelectorErrors
{
    private readonly SelectorTruth _truth;
    private readonly EmpiricalSpectrum _spectrum;
    private readonly double[] _cross;

    public SelectorErrors(SelectorTruth truth, ReadOnlySpan<double> sorted, ReadOnlySpan<double> weights, double count, double[] real, double[] imaginary)
    {
        double total = weights.IsEmpty ? sorted.Length : TensorPrimitives.Sum(weights);
        _truth = truth;
        var values = new List<double>();
        var masses = new List<double>();
        for (int i = 0; i < sorted.Length; i++)
        {
            double x = sorted[i], mass = (weights.IsEmpty ? 1 : weights[i]) / total;
            if (x >= truth.Target.Lower && x < truth.Target.Upper)
            {
                if (values.Count > 0 && values[^1] == x)
                {
                    masses[^1] += mass;
                }
                else
                {
                    values.Add(x);
                    masses.Add(mass);
                }
            }
        }

        // A quarter of the nodes are kept as frequencies; finer bandwidths than they reach are none of the rules' business here.
        double smallest = EmpiricalSpectrum.GaussianReach * truth.Length / (Math.PI / 2 * SelectorTruth.Nodes) * 1.01;
        _spectrum = EmpiricalSpectrum.OnCircle([.. values], [.. masses], count, truth.Target.Lower, truth.Length, smallest);
        _cross = new double[_spectrum.Count];
        for (int k = 0; k < _cross.Length; k++)
        {
            _cross[k] = (_spectrum.Real[k] * real[k]) + (_spectrum.Imaginary[k] * imaginary[k]);
        }
    }

    public double Gaussian(double h, int order = 2)
    {
        double step = _spectrum.Step, sum = 0;
        int end = _spectrum.IndexOf(EmpiricalSpectrum.GaussianReach * 1.2 / h);
        for (int k = 0; k < end; k++)
        {
            double z = 0.5 * h * h * k * k * step * step;
            double w = (order == 4 ? 1 + z : 1) * Math.Exp(-z);
            sum += (k == 0 ? 0.5 : 1) * w * ((w * _spectrum.SquaredModulus[k]) - (2 * _cross[k]));
        }

        return (sum * step / Math.PI) + _truth.SquaredIntegral;
    }

    /// <summary>The least error over h, by a scan 1.06 apart and a golden section.</summary>
    public double Oracle(double from, double to)
    {
        double[] grid = Smoothing.Bandwidths.RootScan.Grid(from, to, (int)(Math.Log(to / from) / 0.06) + 2);
        List<(double At, double Value)> minima = Smoothing.Bandwidths.RootScan.Minima(h => Gaussian(h), grid, out double[] values);
        return Math.Min(values.Min(), minima.Count > 0 ? minima.Min(m => m.Value) : double.PositiveInfinity);
    }

    public double Sharp(double h, double sharp, double latticeStep)
    {
        double[] multiplier = SharpFilter.Multiplier(_spectrum, h, sharp, latticeStep);
        int size = Math.Min(SelectorTruth.Nodes, _spectrum.SizeFor(Math.Min(h, sharp) / 8, multiplier.Length));
        double[] curve = _spectrum.Curve(multiplier, size);
        double spacing = _truth.Length / size;
        SharpFilter.Project(curve, spacing);
        int stride = SelectorTruth.Nodes / size;
        CompensatedSum sum = default;
        for (int j = 0; j < SelectorTruth.Nodes; j++)
        {
            // Linear between nodes, against every cell of the law, so that jumps count in full.
            int node = j / stride;
            double f = (double)(j % stride) / stride;
            double d = curve[node] + (f * (curve[(node + 1) & (size - 1)] - curve[node])) - _truth.Density[j];
            sum.Add(d * d);
        }

        return sum.Value * _truth.Length / SelectorTruth.Nodes;
    }
}
