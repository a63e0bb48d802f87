using Smoothing.Numerics;
using Smoothing.Tests.Support;

namespace Smoothing.Tests.Numerics;

// Against the library's comparison sort.
public class RadixSortTests
{
    public static TheoryData<string> Samples => [.. HardSamples.Names];

    [Theory]
    [MemberData(nameof(Samples))]
    public void Sort_Keys_MatchesTheLibrary(string name)
    {
        foreach (int count in new[] { 0, 1, 100, 4096, 20_001 })
        {
            double[] keys = count == 0 ? [] : HardSamples.Make(name, count);
            double[] expected = [.. keys.Order()];
            RadixSort.Sort(keys);
            Assert.Equal(expected, keys);
        }
    }

    [Fact]
    public void Sort_ExtremeKeys_MatchesTheLibrary()
    {
        var random = new RandomStream(3);
        var keys = new double[10_000];
        for (int i = 0; i < keys.Length; i++)
        {
            double any = BitConverter.UInt64BitsToDouble(random.NextBits());
            keys[i] = double.IsFinite(any) ? any : i;
        }

        keys[17] = double.MaxValue;
        keys[18] = -double.MaxValue;
        keys[19] = double.Epsilon;
        keys[20] = -double.Epsilon;
        double[] expected = [.. keys.Order()];
        RadixSort.Sort(keys);
        Assert.Equal(expected, keys);
    }

    // Keys that agree in the bits sorted by: runs short enough to insert, for the library's sort, and for another round; the last bit alone.
    [Theory]
    [InlineData(1e-12, 20)]
    [InlineData(1e-12, 500)]
    [InlineData(1e-12, 9000)]
    [InlineData(2.3e-16, 9000)]
    public void Sort_KeysThatDifferInTheLastBits_MatchesTheLibrary(double width, int run)
    {
        var random = new RandomStream(4);
        var keys = new double[50_000];
        for (int i = 0; i < keys.Length; i++)
        {
            keys[i] = (i % (keys.Length / run) * 1.7) - 3 + (width * random.NextUniform());
        }

        double[] expected = [.. keys.Order()];
        RadixSort.Sort(keys);
        Assert.Equal(expected, keys);
    }

    [Fact]
    public void Sort_KeysWithItems_KeepsThemTogetherAndEqualKeysInOrder()
    {
        double[] values = [.. HardSamples.Make("rounded", 10_000).Select(v => v + 0.0)]; // no −0, which sorts before 0
        double[] keys = [.. values];
        int[] items = [.. Enumerable.Range(0, keys.Length)];
        RadixSort.Sort(keys, items);
        for (int i = 0; i < keys.Length; i++)
        {
            Assert.Equal(values[items[i]], keys[i]);
            Assert.True(i == 0 || keys[i - 1] < keys[i] || (keys[i - 1] == keys[i] && items[i - 1] < items[i]));
        }
    }
}
