using Smoothing.Numerics;
using Smoothing.Samples;

namespace Smoothing.Tests.Hostile;

/// <summary>Readers of bytes and JSON under mutation: an answer or an ArgumentException (InvalidDataException for bytes), and memory in proportion to the input.</summary>
public class MutatedBytesTests
{
    // Each accepted input may allocate this many bytes for each byte it has, and a fixed start-up share.
    private const long AllowedPerByte = 4096;
    private const long AllowedFixed = 1 << 20;

    [Fact]
    public void FromBytes_MutatedInput_NeverCrashesNorHoards()
    {
        byte[][] corpus =
        [
            CondensedSample.Of([1.0, 2, 3, 4.5]).ToBytes(),
            CondensedSample.Of([1e300, -1e300, 0]).ToBytes(),
            CondensedSample.Of([0.25], new CondensingOptions { Limits = [0.2, 0.3] }).ToBytes(),
            CondensedSample.Of([1.0, 2, 3], new CondensingOptions { Moments = 2, Weights = new double[] { 1, 2, 3 } }).ToBytes(),
        ];
        var random = new RandomStream(20);
        int refused = 0;
        for (int round = 0; round < 20_000; round++)
        {
            byte[] bytes = Mutate(corpus[random.NextIndex(corpus.Length)], ref random);
            long before = GC.GetAllocatedBytesForCurrentThread();
            try
            {
                CondensedSample sample = CondensedSample.FromBytes(bytes);
                Assert.True(sample.Count >= 0);
                sample.ToBytes();
            }
            catch (Exception error) when (error is ArgumentException or InvalidDataException or FormatException)
            {
                refused++;
            }

            long used = GC.GetAllocatedBytesForCurrentThread() - before;
            Assert.True(used <= AllowedFixed + (AllowedPerByte * bytes.Length), $"{used} bytes for an input of {bytes.Length}");
        }

        Assert.True(refused > 10_000, $"only {refused} refused: the mutations are too tame");
    }

    // Found by coverage-guided fuzzing: a total weight of 1e-310 beside cells of weight 1 made every density NaN.
    [Theory]
    [InlineData(64, 1e-310)]
    [InlineData(64, 5)]
    [InlineData(72, 17)]
    [InlineData(72, 3)]
    public void FromBytes_TotalsThatContradictTheCells_AreRefused(int offset, double total)
    {
        byte[] bytes = CondensedSample.Of([1.0, 2, 3, 4.5]).ToBytes();
        BitConverter.TryWriteBytes(bytes.AsSpan(offset), total);
        ulong hash = 14695981039346656037;
        foreach (byte b in bytes.AsSpan(0, bytes.Length - 8))
        {
            hash = (hash ^ b) * 1099511628211;
        }

        BitConverter.TryWriteBytes(bytes.AsSpan(bytes.Length - 8), hash);
        Assert.Throws<ArgumentException>(() => CondensedSample.FromBytes(bytes));
    }

    [Fact]
    public void FromJson_MutatedInput_NeverCrashesNorHoards()
    {
        string json = DensityStudy.Of([1.0, 2, 2.5, 4, 7, 7.5, 9], new StudyOptions { Points = 51, Bandwidth = 1, Limits = [3] }).ToJson();
        byte[] corpus = System.Text.Encoding.UTF8.GetBytes(json);
        var random = new RandomStream(21);
        for (int round = 0; round < 2_000; round++)
        {
            byte[] bytes = Mutate(corpus, ref random);
            string text = System.Text.Encoding.UTF8.GetString(bytes);
            long before = GC.GetAllocatedBytesForCurrentThread();
            try
            {
                Assert.Equal(StudyDocument.CurrentSchema, StudyDocument.FromJson(text).SchemaVersion);
            }
            catch (ArgumentException)
            {
            }

            Assert.True(GC.GetAllocatedBytesForCurrentThread() - before <= AllowedFixed + (AllowedPerByte * bytes.Length));
        }
    }

    [Fact]
    public void FromJson_DeepNesting_IsRefused() => Assert.ThrowsAny<ArgumentException>(() => StudyDocument.FromJson(string.Concat(Enumerable.Repeat("{\"data\":", 20_000))));

    private static byte[] Mutate(byte[] source, ref RandomStream random)
    {
        byte[] bytes = (byte[])source.Clone();
        int changes = 1 + random.NextIndex(4);
        for (int c = 0; c < changes; c++)
        {
            switch (random.NextIndex(5))
            {
                case 0:
                    bytes[random.NextIndex(bytes.Length)] ^= (byte)(1 << random.NextIndex(8));
                    break;
                case 1:
                    bytes[random.NextIndex(bytes.Length)] = (byte)random.NextIndex(256);
                    break;
                case 2:
                    bytes = bytes[..Math.Max(1, random.NextIndex(bytes.Length))];
                    break;
                case 3:
                    bytes = [.. bytes, .. bytes[random.NextIndex(bytes.Length)..]];
                    break;
                default:
                    // Eight bytes that mean much as a number: all ones, the largest length, infinity, NaN.
                    ulong[] loud = [ulong.MaxValue, 0x7FFFFFFF, 0x7FFFFFFFFFFFFFFF, 0x7FF0000000000000, 0xFFF8000000000001, 0];
                    int at = random.NextIndex(Math.Max(1, bytes.Length - 8));
                    byte[] word = BitConverter.GetBytes(loud[random.NextIndex(loud.Length)]);
                    for (int i = 0; i < 8 && at + i < bytes.Length; i++)
                    {
                        bytes[at + i] = word[i];
                    }

                    break;
            }
        }

        return bytes;
    }
}
