using System.Buffers.Binary;
using System.Text;

namespace Smoothing.Charts.Tests.Support;

/// <summary>A TrueType font made here, every sign a filled block: figures can be drawn and measured on a machine that has no font at all.</summary>
internal static class BlockFont
{
    private const int Units = 1000;

    // Basic Latin, Latin-1, dashes and dots, minus, infinity, ring operators.
    private static readonly (int From, int To)[] s_ranges = [(0x20, 0x7E), (0xA0, 0xFF), (0x2010, 0x2040), (0x2212, 0x2212), (0x221E, 0x221E)];

    private static readonly Lazy<string> s_path = new(() =>
    {
        string path = Path.Combine(Path.GetTempPath(), $"block-font-{Guid.NewGuid():N}.ttf");
        File.WriteAllBytes(path, Bytes(s_ranges));
        AppDomain.CurrentDomain.ProcessExit += (_, _) => File.Delete(path);
        return path;
    });

    /// <summary>Path of the font.</summary>
    public static string Name => s_path.Value;

    /// <summary>The bytes of a font with a block for each code in the ranges.</summary>
    public static byte[] Bytes((int From, int To)[] ranges)
    {
        int glyphs = 1 + ranges.Sum(r => r.To - r.From + 1);
        byte[] block = Glyph();
        var loca = new Writer();
        var glyf = new Writer();
        for (int g = 0; g < glyphs; g++)
        {
            loca.U32(glyf.Length);

            // The space is blank.
            if (g != 1)
            {
                glyf.Bytes(block);
            }
        }

        loca.U32(glyf.Length);
        var hmtx = new Writer();
        for (int g = 0; g < glyphs; g++)
        {
            hmtx.U16(600).U16(60);
        }

        return Assemble(new SortedDictionary<string, Writer>(StringComparer.Ordinal)
        {
            ["cmap"] = Map(ranges),
            ["glyf"] = glyf,
            ["head"] = new Writer().U32(0x00010000).U32(0x00010000).U32(0).U32(0x5F0F3CF5).U16(0).U16(Units).U32(0).U32(0).U32(0).U32(0).U16(0).U16(-200).U16(600).U16(800).U16(0).U16(8).U16(2).U16(1).U16(0),
            ["hhea"] = new Writer().U32(0x00010000).U16(800).U16(-200).U16(0).U16(600).U16(0).U16(0).U16(600).U16(1).U16(0).U16(0).U16(0).U16(0).U16(0).U16(0).U16(0).U16(glyphs),
            ["hmtx"] = hmtx,
            ["loca"] = loca,
            ["maxp"] = new Writer().U32(0x00010000).U16(glyphs).U16(4).U16(1).U16(0).U16(0).U16(1).U16(0).U16(0).U16(0).U16(0).U16(0).U16(0).U16(0).U16(0),
            ["name"] = Names("Blocks"),
            ["post"] = new Writer().U32(0x00030000).U32(0).U16(-100).U16(50).U32(1).U32(0).U32(0).U32(0).U32(0),
        });
    }

    // One contour of four points, 480 wide and 700 high.
    private static byte[] Glyph() => new Writer()
        .U16(1).U16(60).U16(0).U16(540).U16(700)
        .U16(3).U16(0).Bytes([1, 1, 1, 1])
        .U16(60).U16(480).U16(0).U16(-480)
        .U16(0).U16(0).U16(700).U16(0).Padded();

    private static Writer Map((int From, int To)[] ranges)
    {
        var ends = new Writer();
        var starts = new Writer();
        var deltas = new Writer();
        var offsets = new Writer();
        int glyph = 1;
        foreach ((int from, int to) in ranges)
        {
            ends.U16(to);
            starts.U16(from);
            deltas.U16(glyph - from);
            offsets.U16(0);
            glyph += to - from + 1;
        }

        ends.U16(0xFFFF);
        starts.U16(0xFFFF);
        deltas.U16(1);
        offsets.U16(0);
        int segments = ranges.Length + 1;
        int length = 16 + (8 * segments);
        return new Writer().U16(0).U16(1).U16(3).U16(1).U32(12)
            .U16(4).U16(length).U16(0).U16(2 * segments).U16(0).U16(0).U16(0)
            .Bytes(ends.Padded(1)).U16(0).Bytes(starts.Padded(1)).Bytes(deltas.Padded(1)).Bytes(offsets.Padded(1));
    }

    private static Writer Names(string family)
    {
        byte[] text = Encoding.BigEndianUnicode.GetBytes(family);
        return new Writer().U16(0).U16(1).U16(18).U16(3).U16(1).U16(0x409).U16(1).U16(text.Length).U16(0).Bytes(text);
    }

    private static byte[] Assemble(SortedDictionary<string, Writer> tables)
    {
        var head = new Writer().U32(0x00010000).U16(tables.Count).U16(0).U16(0).U16(0);
        var body = new Writer();
        int start = 12 + (16 * tables.Count);
        foreach ((string tag, Writer table) in tables)
        {
            head.Bytes(Encoding.ASCII.GetBytes(tag)).U32(0).U32(start + body.Length).U32(table.Length);
            body.Bytes(table.Padded());
        }

        return [.. head.Padded(1), .. body.Padded(1)];
    }

    private sealed class Writer
    {
        private readonly List<byte> _bytes = [];

        public int Length => _bytes.Count;

        public Writer U16(int value)
        {
            Span<byte> two = stackalloc byte[2];
            BinaryPrimitives.WriteUInt16BigEndian(two, unchecked((ushort)value));
            _bytes.AddRange(two);
            return this;
        }

        public Writer U32(long value)
        {
            Span<byte> four = stackalloc byte[4];
            BinaryPrimitives.WriteUInt32BigEndian(four, unchecked((uint)value));
            _bytes.AddRange(four);
            return this;
        }

        public Writer Bytes(byte[] bytes)
        {
            _bytes.AddRange(bytes);
            return this;
        }

        public byte[] Padded(int to = 4) => [.. _bytes, .. new byte[(to - (_bytes.Count % to)) % to]];
    }
}
