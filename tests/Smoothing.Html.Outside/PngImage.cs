using System.Buffers.Binary;
using System.IO.Compression;

namespace Smoothing.Html.Outside;

/// <summary>The pixels of a PNG of eight bits a channel, RGB or RGBA, not interlaced: what a browser's screenshot is (PNG specification, third edition, sections 9 and 11).</summary>
internal sealed class PngImage
{
    private readonly byte[] _rows;
    private readonly int _channels;

    private PngImage(int width, int height, int channels, byte[] rows) => (Width, Height, _channels, _rows) = (width, height, channels, rows);

    public int Width { get; }

    public int Height { get; }

    public static PngImage Read(byte[] file)
    {
        int width = 0, height = 0, channels = 0;
        using var packed = new MemoryStream();
        for (int at = 8; at + 8 <= file.Length;)
        {
            int length = BinaryPrimitives.ReadInt32BigEndian(file.AsSpan(at));
            string kind = System.Text.Encoding.ASCII.GetString(file, at + 4, 4);
            ReadOnlySpan<byte> data = file.AsSpan(at + 8, length);
            if (kind == "IHDR")
            {
                (width, height) = (BinaryPrimitives.ReadInt32BigEndian(data), BinaryPrimitives.ReadInt32BigEndian(data[4..]));
                Assert.Equal(8, data[8]);
                Assert.Equal(0, data[12]);
                channels = data[9] switch { 2 => 3, 6 => 4, _ => throw new NotSupportedException($"colour type {data[9]}") };
            }
            else if (kind == "IDAT")
            {
                packed.Write(data);
            }

            at += length + 12;
        }

        packed.Position = 0;
        using var unpacked = new ZLibStream(packed, CompressionMode.Decompress);
        int stride = width * channels;
        var rows = new byte[stride * height];
        var line = new byte[stride + 1];
        for (int y = 0; y < height; y++)
        {
            unpacked.ReadExactly(line);
            for (int i = 0; i < stride; i++)
            {
                int left = i < channels ? 0 : rows[(y * stride) + i - channels];
                int up = y == 0 ? 0 : rows[((y - 1) * stride) + i];
                int corner = i < channels || y == 0 ? 0 : rows[((y - 1) * stride) + i - channels];
                int guess = line[0] switch { 0 => 0, 1 => left, 2 => up, 3 => (left + up) / 2, _ => Paeth(left, up, corner) };
                rows[(y * stride) + i] = (byte)(line[i + 1] + guess);
            }
        }

        return new PngImage(width, height, channels, rows);
    }

    public (int R, int G, int B) At(int x, int y)
    {
        int i = ((y * Width) + x) * _channels;
        return (_rows[i], _rows[i + 1], _rows[i + 2]);
    }

    private static int Paeth(int left, int up, int corner)
    {
        int p = left + up - corner;
        int a = Math.Abs(p - left), b = Math.Abs(p - up), c = Math.Abs(p - corner);
        return a <= b && a <= c ? left : b <= c ? up : corner;
    }
}
