using BenchmarkDotNet.Attributes;
using Smoothing.Estimation;
using Smoothing.Kernels;
using Smoothing.Samples;

namespace Smoothing.Benchmarks.Targets;

/// <summary>Parts of the exact Gaussian curve: nanoseconds and bytes of each, beside the library's sort.</summary>
[MemoryDiagnoser]
public class GaussianBench
{
    private double[] _values = [];
    private double[] _work = [];
    private double[] _points = [];
    private double[] _results = [];
    private double[] _slopes = [];
    private double[] _shares = [];
    private double _width;
    private Sample? _sample;
    private Density? _ready;

    /// <summary>Number of values.</summary>
    [Params(1000, 100_000, 1_000_000)]
    public int Count { get; set; }

    /// <summary>Makes the data.</summary>
    [GlobalSetup]
    public void Prepare()
    {
        _values = GaussianTargets.Normal(Count, 1);
        _work = new double[Count];
        _points = GaussianTargets.Equal(-5, 5, 1024);
        (_results, _slopes, _shares) = (new double[_points.Length], new double[_points.Length], new double[_points.Length]);
        _width = 1.06 * Math.Pow(Count, -0.2);
        _sample = Sample.Of(_values);
        _ready = Density.Of(_sample, Kernel.Gaussian, _width);
        All();
        _ready.Cumulatives(_points, _shares);
    }

    /// <summary>The yardstick: a copy and the library's sort.</summary>
    [Benchmark(Baseline = true)]
    public void Sort()
    {
        _values.CopyTo(_work, 0);
        _work.AsSpan().Sort();
    }

    /// <summary>The sample alone.</summary>
    [Benchmark]
    public Sample Copy() => Sample.Of(_values);

    /// <summary>Sample, cells and 1,024 points.</summary>
    [Benchmark]
    public void Whole() => Density.Of(Sample.Of(_values), Kernel.Gaussian, _width).Values(_points, _results);

    /// <summary>Cells and 1,024 points of a sample that is there.</summary>
    [Benchmark]
    public void FirstCurve() => Density.Of(_sample!, Kernel.Gaussian, _width).Values(_points, _results);

    /// <summary>1,024 points, tables made before.</summary>
    [Benchmark]
    public void FurtherCurve() => _ready!.Values(_points, _results);

    /// <summary>One point, tables made before.</summary>
    [Benchmark]
    public double Point() => _ready!.Value(0.3);

    /// <summary>Value, slope and share of 1,024 points at once.</summary>
    [Benchmark]
    public void All() => _ready!.Evaluate(_points, _results, _slopes, _shares);
}
