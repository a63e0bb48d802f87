using System.Numerics.Tensors;

namespace Smoothing.Samples;

public sealed partial class Sample
{
    private readonly Lazy<(double Least, double Greatest)> _range;

    /// <summary>Whether the values have been sorted already, so that sorted paths cost nothing more.</summary>
    internal bool IsSorted => _sorted.IsValueCreated;

    // Smallest and largest value alone need no sort.
    private (double Least, double Greatest) FindRange() =>
        (TensorPrimitives.Min<double>(_values), TensorPrimitives.Max<double>(_values));
}
