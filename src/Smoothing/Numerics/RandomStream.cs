using System.Numerics;

namespace Smoothing.Numerics;

/// <summary>A small generator of uniform and normal numbers, the same bits on every machine, that splits into streams.</summary>
/// <remarks>
/// Method: xoshiro256** (Blackman &amp; Vigna 2018) seeded through splitmix64 (Steele, Lea &amp; Flood 2014). A stream is a
/// pair (seed, index): index i starts from a state that splitmix64 derives from both, so streams can be handed to threads.
/// </remarks>
internal struct RandomStream
{
    private ulong _s0, _s1, _s2, _s3;
    private double _spare;
    private bool _hasSpare;

    public RandomStream(ulong seed, ulong stream = 0)
    {
        ulong state = seed ^ Mix(stream + 0x632BE59BD9B4E019UL);
        _s0 = Next(ref state);
        _s1 = Next(ref state);
        _s2 = Next(ref state);
        _s3 = Next(ref state);
        _spare = 0;
        _hasSpare = false;
    }

    public ulong NextBits()
    {
        ulong result = BitOperations.RotateLeft(_s1 * 5, 7) * 9;
        ulong t = _s1 << 17;
        _s2 ^= _s0;
        _s3 ^= _s1;
        _s1 ^= _s2;
        _s0 ^= _s3;
        _s2 ^= t;
        _s3 = BitOperations.RotateLeft(_s3, 45);
        return result;
    }

    /// <summary>Uniform on the open interval (0, 1): 53 bits, moved by half a step off the ends.</summary>
    public double NextUniform() => ((NextBits() >> 11) + 0.5) * (1.0 / (1UL << 53));

    /// <summary>Uniform on 0 … count − 1, without bias (rejection of the incomplete last round).</summary>
    public int NextIndex(int count)
    {
        ulong range = (ulong)count;
        ulong limit = ulong.MaxValue - (ulong.MaxValue % range);
        ulong bits;
        do
        {
            bits = NextBits();
        }
        while (bits >= limit);

        return (int)(bits % range);
    }

    /// <summary>Standard normal, by Marsaglia's polar method (1964).</summary>
    public double NextNormal()
    {
        if (_hasSpare)
        {
            _hasSpare = false;
            return _spare;
        }

        double u, v, s;
        do
        {
            u = (2 * NextUniform()) - 1;
            v = (2 * NextUniform()) - 1;
            s = (u * u) + (v * v);
        }
        while (s >= 1 || s == 0);

        double factor = Math.Sqrt(-2 * Math.Log(s) / s);
        _spare = v * factor;
        _hasSpare = true;
        return u * factor;
    }

    private static ulong Next(ref ulong state)
    {
        state += 0x9E3779B97F4A7C15UL;
        return Mix(state);
    }

    private static ulong Mix(ulong z)
    {
        z = (z ^ (z >> 30)) * 0xBF58476D1CE4E5B9UL;
        z = (z ^ (z >> 27)) * 0x94D049BB133111EBUL;
        return z ^ (z >> 31);
    }
}
