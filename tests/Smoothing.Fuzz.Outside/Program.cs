using SharpFuzz;
using Smoothing;
using Smoothing.Estimation;
using Smoothing.Kernels;
using Smoothing.Samples;

// fuzz cells | fuzz json: reads inputs that a coverage-guided fuzzer sends, and crashes where a reader breaks its promise.
// fuzz replay cells|json FILE: one input again, with the exception shown. fuzz corpus FOLDER: writes the inputs to start from.
switch (args.Length > 0 ? args[0] : "")
{
    case "cells":
        Fuzzer.Run(stream => Cells(All(stream)));
        return 0;
    case "json":
        Fuzzer.Run(stream => Json(All(stream)));
        return 0;
    case "replay" when args.Length > 2:
        (args[1] == "cells" ? (Action<byte[]>)Cells : Json)(File.ReadAllBytes(args[2]));
        return 0;
    case "corpus" when args.Length > 1:
        WriteCorpus(args[1]);
        return 0;
    default:
        Console.Error.WriteLine("fuzz cells | json | replay cells|json FILE | corpus FOLDER");
        return 2;
}

static byte[] All(Stream stream)
{
    using var memory = new MemoryStream();
    stream.CopyTo(memory);
    return memory.ToArray();
}

// The promise: a sample that works and writes itself back, or an exception that says the bytes are unusable; memory in proportion to the input.
static void Cells(byte[] bytes)
{
    // With a check sum that fits, so that mutations reach what lies behind it (FNV-1a, 64 bits, over all but the last eight bytes).
    if (bytes.Length > 8)
    {
        ulong hash = 14695981039346656037;
        foreach (byte b in bytes.AsSpan(0, bytes.Length - 8))
        {
            hash = (hash ^ b) * 1099511628211;
        }

        BitConverter.TryWriteBytes(bytes.AsSpan(bytes.Length - 8), hash);
    }

    long before = GC.GetAllocatedBytesForCurrentThread();
    try
    {
        CondensedSample sample = CondensedSample.FromBytes(bytes);
        byte[] again = CondensedSample.FromBytes(sample.ToBytes()).ToBytes();
        if (!again.AsSpan().SequenceEqual(sample.ToBytes()))
        {
            throw new NotSupportedException("bytes do not come back");
        }

        CondensedSample.Merge(sample, sample);
        if (sample.Count > 0)
        {
            double f = Density.Of(sample, Kernel.Gaussian, 64 * sample.CellWidth).Value(0);
            if (double.IsNaN(f))
            {
                throw new NotSupportedException("NaN from accepted bytes");
            }
        }
    }
    catch (Exception error) when (error is ArgumentException or InvalidDataException or InvalidOperationException)
    {
    }

    Bound(before, bytes.Length);
}

static void Json(byte[] bytes)
{
    long before = GC.GetAllocatedBytesForCurrentThread();
    try
    {
        StudyDocument document = StudyDocument.FromJson(System.Text.Encoding.UTF8.GetString(bytes));
        if (StudyDocument.FromJson(document.ToJson()).ToJson() != document.ToJson())
        {
            throw new NotSupportedException("a document does not come back");
        }
    }
    catch (ArgumentException)
    {
    }

    Bound(before, bytes.Length);
}

static void Bound(long before, int length)
{
    long used = GC.GetAllocatedBytesForCurrentThread() - before;
    if (used > (16 << 20) + (16384L * length))
    {
        throw new InsufficientMemoryException($"{used} bytes for an input of {length}");
    }
}

static void WriteCorpus(string folder)
{
    byte[][] cells =
    [
        CondensedSample.Of([1.0, 2, 3, 4.5]).ToBytes(),
        CondensedSample.Of([1e300, -1e300, 0]).ToBytes(),
        CondensedSample.Of([0.25], new CondensingOptions { Limits = [0.2, 0.3] }).ToBytes(),
        CondensedSample.Of([1.0, 2, 3], new CondensingOptions { Moments = 2, Weights = new double[] { 1, 2, 3 } }).ToBytes(),
        CondensedSample.Of([1.0, 1, 1, 5], new CondensingOptions { Moments = 8, CellWidth = 0.5 }).ToBytes(),
    ];
    Directory.CreateDirectory(Path.Combine(folder, "cells"));
    Directory.CreateDirectory(Path.Combine(folder, "json"));
    for (int i = 0; i < cells.Length; i++)
    {
        File.WriteAllBytes(Path.Combine(folder, "cells", $"start-{i}.bin"), cells[i]);
    }

    StudyOptions[] asked = [new() { Points = 51, Bandwidth = 1, Limits = [3] }, new() { Points = 51, Name = "level", Unit = "mm", Probabilities = [0.5], ReferenceValues = new double[] { 1, 3, 4, 6 } }];
    for (int i = 0; i < asked.Length; i++)
    {
        File.WriteAllText(Path.Combine(folder, "json", $"start-{i}.json"), DensityStudy.Of([1.0, 2, 2.5, 4, 7, 7.5, 9], asked[i]).ToJson());
    }
}
