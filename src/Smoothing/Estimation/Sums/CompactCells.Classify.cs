using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;

namespace Smoothing.Estimation;

internal sealed unsafe partial class CompactCells
{
    private const double Rounder = 6755399441055744; // 1.5·2⁵²: adding it leaves the nearest whole number in the low bits

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private void Classify(double* values, int count, long* cells)
    {
        Vector256<double> origin = Vector256.Create(_origin);
        Vector256<double> scale = Vector256.Create(_scale);
        Vector256<double> last = Vector256.Create(_bucketCount - 1.0);
        Vector256<double> rounder = Vector256.Create(Rounder);
        int i = 0;
        for (; i + 4 <= count; i += 4)
        {
            Vector256<double> z = (Vector256.Load(values + i) - origin) * scale;
            (Vector256.MinNative(Vector256.MaxNative(z, Vector256<double>.Zero), last) + rounder).AsInt64().Store(cells + i);
        }

        for (; i < count; i++)
        {
            cells[i] = Bucket(values[i]);
        }

        double* cut = Breakpoints;
        fixed (int* buckets = _buckets)
        {
            if (_mostInBucket <= 1)
            {
                for (i = 0; i < count; i++)
                {
                    int k = buckets[(int)cells[i]];
                    cells[i] = k + AtLeast(values[i], cut[k]);
                }
            }
            else if (_mostInBucket <= 2)
            {
                for (i = 0; i < count; i++)
                {
                    int k = buckets[(int)cells[i]];
                    double x = values[i];
                    cells[i] = k + AtLeast(x, cut[k]) + AtLeast(x, cut[k + 1]);
                }
            }
            else if (_mostInBucket <= 4)
            {
                for (i = 0; i < count; i++)
                {
                    int k = buckets[(int)cells[i]];
                    double x = values[i];
                    cells[i] = k + AtLeast(x, cut[k]) + AtLeast(x, cut[k + 1]) + AtLeast(x, cut[k + 2]) + AtLeast(x, cut[k + 3]);
                }
            }
            else
            {
                for (i = 0; i < count; i++)
                {
                    int bucket = (int)cells[i];
                    double x = values[i];
                    int low = buckets[bucket];
                    int high = buckets[bucket + 1];
                    while (low < high)
                    {
                        int middle = (low + high) >> 1;
                        if (cut[middle] <= x)
                        {
                            low = middle + 1;
                        }
                        else
                        {
                            high = middle;
                        }
                    }

                    cells[i] = low;
                }
            }
        }
    }

    // 1 when x ≥ cut, without a branch: the sign bit of x − cut, which is exact in sign.
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static int AtLeast(double x, double cut) => 1 + (int)(BitConverter.DoubleToInt64Bits(x - cut) >> 63);
}
