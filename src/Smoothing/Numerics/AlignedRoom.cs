using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;

namespace Smoothing.Numerics;

/// <summary>A pinned array of doubles that starts on a cache line and is kept for the next call when it is long enough.</summary>
internal sealed unsafe class AlignedRoom
{
    private const int Line = 8; // doubles in a line of 64 bytes

    private double[] _array = [];
    private int _start;

    public int Length { get; private set; }

    public double* Pointer => (double*)Unsafe.AsPointer(ref MemoryMarshal.GetArrayDataReference(_array)) + _start;

    /// <summary>Makes room for at least <paramref name="length"/> numbers; what was there is lost when it grows.</summary>
    public double* Of(long length)
    {
        if (length > Length)
        {
            _array = GC.AllocateUninitializedArray<double>(checked((int)(length + Line)), pinned: true);
            Length = (int)length;
            nuint address = (nuint)Unsafe.AsPointer(ref MemoryMarshal.GetArrayDataReference(_array));
            _start = (int)((Line - (address / sizeof(double) % Line)) % Line);
        }

        return Pointer;
    }
}
