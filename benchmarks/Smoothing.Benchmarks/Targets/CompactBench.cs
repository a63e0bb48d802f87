using BenchmarkDotNet.Attributes;
using Smoothing.Estimation;
using Smoothing.Kernels;
using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Benchmarks.Targets;

/// <summary>Parts of the exact sums of polynomial kernels: bytes and nanoseconds of each, beside the library's sort.</summary>
[MemoryDiagnoser]
public class CompactBench
{
    private double[] _values = [];
    private double[] _work = [];
    private double[] _points = [];
    private double[] _results = [];
    private Density? _unsorted;
    private Density? _sorted;

    /// <summary>Number of values.</summary>
    [Params(10_000, 1_000_000)]
    public int Count { get; set; }

    /// <summary>Makes the data.</summary>
    [GlobalSetup]
    public void Prepare()
    {
        var random = new RandomStream(1);
        _values = new double[Count];
        for (int i = 0; i < Count; i++)
        {
            _values[i] = random.NextNormal();
        }

        _work = new double[Count];
        _points = [.. Enumerable.Range(0, 1024).Select(j => -5 + (10 * j / 1023.0))];
        _results = new double[_points.Length];
        double width = 2.34 * Math.Pow(Count, -0.2);
        _unsorted = Density.Of(Sample.Of(_values), Kernel.Epanechnikov, width);
        Sample sample = Sample.Of(_values);
        _ = sample.SortedValues.Length;
        _sorted = Density.Of(sample, Kernel.Epanechnikov, width);
    }

    /// <summary>The yardstick: a copy and the library's sort.</summary>
    [Benchmark(Baseline = true)]
    public void Sort()
    {
        _values.CopyTo(_work, 0);
        _work.AsSpan().Sort();
    }

    /// <summary>The same by digits.</summary>
    [Benchmark]
    public void SortByDigits()
    {
        _values.CopyTo(_work, 0);
        RadixSort.Sort(_work);
    }

    /// <summary>1,024 points over unsorted values.</summary>
    [Benchmark]
    public void UnsortedGrid() => _unsorted!.Values(_points, _results);

    /// <summary>1,024 points over sorted values, tables laid out before.</summary>
    [Benchmark]
    public void SortedGrid() => _sorted!.Values(_points, _results);

    /// <summary>One point over sorted values.</summary>
    [Benchmark]
    public double SortedPoint() => _sorted!.Value(0.3);
}
