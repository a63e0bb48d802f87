using System.Buffers.Binary;
using System.Runtime.InteropServices;
using Smoothing.Numerics;

namespace Smoothing.Samples;

/// <content>To bytes and back.</content>
public sealed partial class CondensedSample
{
    /// <summary>"SCS1" read as a little-endian number: format and version.</summary>
    private const uint Signature = 0x31534353;

    private const int HeaderLength = 96;

    /// <summary>The sample as bytes, for a file or a column of a table.</summary>
    /// <returns>Little-endian: signature with version, a header of 96 bytes, the arrays, a check sum. About 8 (moments + 1) bytes a cell.</returns>
    public byte[] ToBytes()
    {
        var bytes = new byte[Length(CellArray.Length, Moments, SingleArray.Length, LimitArray.Length)];
        Span<byte> rest = bytes;
        Put(ref rest, Signature | ((long)Moments << 32) | ((IsWeighted ? 1L : 0) << 40) | ((long)WeightMeaning << 48));
        Put(ref rest, Exponent);
        Put(ref rest, MaximumCells);
        Put(ref rest, Count);
        Put(ref rest, LeftOut);
        Put(ref rest, CellArray.Length);
        Put(ref rest, SingleArray.Length);
        Put(ref rest, LimitArray.Length);
        foreach (double number in new[] { TotalWeight, SquaredWeight, Minimum, Maximum })
        {
            Put(ref rest, BitConverter.DoubleToInt64Bits(number));
        }

        foreach (long cell in CellArray)
        {
            Put(ref rest, cell);
        }

        foreach (double number in SumArray.Concat(SingleArray).Concat(SingleWeightArray).Concat(LimitArray).Concat(BelowArray).Concat(AtArray))
        {
            Put(ref rest, BitConverter.DoubleToInt64Bits(number));
        }

        Put(ref rest, CheckSum(bytes.AsSpan(0, bytes.Length - 8)));
        return bytes;
    }

    /// <summary>Reads what <see cref="ToBytes"/> wrote, and trusts nothing of it.</summary>
    /// <param name="bytes">The bytes, exactly.</param>
    /// <returns>The same sample, bit for bit.</returns>
    /// <exception cref="ArgumentException">The bytes are too short or too long, of another format or version, damaged, or hold what no sample can.</exception>
    public static CondensedSample FromBytes(ReadOnlySpan<byte> bytes)
    {
        Require(bytes.Length >= HeaderLength + 8, Guard.Text($"at least {HeaderLength + 8} of them, but there are {bytes.Length}"));
        ReadOnlySpan<byte> rest = bytes;
        long head = Take(ref rest);
        Require((uint)head == Signature, "the signature SCS1 at the start: another format or version");
        int moments = (byte)(head >> 32);
        var meaning = (WeightMeaning)(byte)(head >> 48);
        long exponent = Take(ref rest), maximum = Take(ref rest), count = Take(ref rest), leftOut = Take(ref rest);
        long cells = Take(ref rest), singles = Take(ref rest), limits = Take(ref rest);
        double[] totals = Doubles(ref rest, 4);
        const long Most = int.MaxValue / 128;
        Require(cells is >= 0 and <= Most && singles is >= 0 and <= Most && limits is >= 0 and <= Most && moments is >= 2 and <= 16, "possible lengths in the header");
        Require(bytes.Length == Length(cells, moments, singles, limits), Guard.Text($"{Length(cells, moments, singles, limits)} of them, as the header says, but there are {bytes.Length}"));
        Require(CheckSum(bytes[..^8]) == BinaryPrimitives.ReadInt64LittleEndian(bytes[^8..]), "a matching check sum: they are damaged");
        var sample = new CondensedSample
        {
            Exponent = (int)Math.Clamp(exponent, int.MinValue, int.MaxValue),
            Moments = moments,
            MaximumCells = (int)Math.Clamp(maximum, 0, int.MaxValue),
            CellArray = Longs(ref rest, (int)cells),
            SumArray = Doubles(ref rest, (int)cells * moments),
            SingleArray = Doubles(ref rest, (int)singles),
            SingleWeightArray = Doubles(ref rest, (int)singles),
            Count = count,
            LeftOut = leftOut,
            TotalWeight = totals[0],
            SquaredWeight = totals[1],
            Minimum = totals[2],
            Maximum = totals[3],
            IsWeighted = ((head >> 40) & 1) == 1,
            WeightMeaning = meaning,
            LimitArray = Doubles(ref rest, (int)limits),
            BelowArray = Doubles(ref rest, (int)limits),
            AtArray = Doubles(ref rest, (int)limits),
        };
        sample.CheckRead();
        return sample;
    }

    /// <summary>What holds for every sample; a matching check sum proves nothing about the sender.</summary>
    private void CheckRead()
    {
        Require(Enum.IsDefined(WeightMeaning) && Exponent is >= CellStore.FinestExponent and <= 1023 && MaximumCells >= 16, "a possible width and weight meaning");
        Require(Count >= 1 && LeftOut >= 0 && CellArray.Length + SingleArray.Length >= 1 && CellArray.Length + SingleArray.Length <= Count, "possible counts");
        Require(TotalWeight > 0 && double.IsFinite(TotalWeight) && SquaredWeight > 0 && double.IsFinite(SquaredWeight), "positive weights");
        Require(Minimum <= Maximum && double.IsFinite(Minimum) && double.IsFinite(Maximum), "a possible range");
        CheckCells(CellArray, SumArray, Moments);
        for (int i = 1; i < CellArray.Length; i++)
        {
            Require(CellArray[i - 1] < CellArray[i], "rising cell numbers");
        }

        for (int i = 0; i < SingleArray.Length; i++)
        {
            Require(double.IsFinite(SingleArray[i]) && (i == 0 || SingleArray[i - 1] < SingleArray[i]) && SingleWeightArray[i] > 0 && double.IsFinite(SingleWeightArray[i]), "rising single values of positive weight");
        }

        CheckTotals();
        CondensingChecks.Limits(LimitArray);
        for (int i = 0; i < LimitArray.Length; i++)
        {
            Require(BelowArray[i] >= 0 && AtArray[i] >= 0 && BelowArray[i] + AtArray[i] <= TotalWeight * (1 + 1e-9), "possible counts at the limits");
        }
    }

    // Rounding: a total may have been added up in another order than here, so 1e-9 of it is allowed.
    private void CheckTotals()
    {
        CompensatedSum weight = default;
        for (int i = 0; i < CellArray.Length; i++)
        {
            weight.Add(SumArray[i * Moments]);
        }

        foreach (double single in SingleWeightArray)
        {
            weight.Add(single);
        }

        Require(Math.Abs(weight.Value - TotalWeight) <= 1e-9 * TotalWeight, Guard.Text($"a total weight equal to the sum over cells and single values, {weight.Value}"));

        // n values of total weight W have squares between W²/n and W².
        double root = Math.Sqrt(SquaredWeight) / TotalWeight;
        Require(root <= 1 + 1e-9 && root * root * Count >= 1 - 1e-9, "squared weights that values of this total can have");
    }

    private static void Require(bool holds, string what)
    {
        if (!holds)
        {
            throw new ArgumentException("bytes must hold " + what + ". Pass what ToBytes wrote, unchanged.");
        }
    }

    private static long Length(long cells, long moments, long singles, long limits) => HeaderLength + (8 * ((cells * (1 + moments)) + (2 * singles) + (3 * limits) + 1));

    private static void Put(ref Span<byte> rest, long value)
    {
        BinaryPrimitives.WriteInt64LittleEndian(rest, value);
        rest = rest[8..];
    }

    private static long Take(ref ReadOnlySpan<byte> rest)
    {
        long value = BinaryPrimitives.ReadInt64LittleEndian(rest);
        rest = rest[8..];
        return value;
    }

    private static long[] Longs(ref ReadOnlySpan<byte> rest, int count)
    {
        var values = new long[count];
        for (int i = 0; i < count; i++)
        {
            values[i] = Take(ref rest);
        }

        return values;
    }

    private static double[] Doubles(ref ReadOnlySpan<byte> rest, int count) => MemoryMarshal.Cast<long, double>(Longs(ref rest, count)).ToArray();

    /// <summary>Fowler–Noll–Vo hash (FNV-1a, 64 bits; RFC 9923): finds damage, not forgery.</summary>
    private static long CheckSum(ReadOnlySpan<byte> bytes)
    {
        ulong hash = 14695981039346656037;
        foreach (byte b in bytes)
        {
            hash = (hash ^ b) * 1099511628211;
        }

        return (long)hash;
    }
}
