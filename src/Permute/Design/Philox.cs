using System.Runtime.CompilerServices;

namespace Permute.Design;

/// <summary>
/// The counter-based generator Philox4x32-10 (Salmon, Moraes, Dror &amp; Shaw 2011, Parallel random numbers: as easy as 1, 2, 3, SC'11): the stream of
/// (seed, index) depends on nothing else, so relabeling k is the same whatever the threads, chunks or machines.
/// </summary>
public struct Philox
{
    private readonly uint key0, key1, index0, index1;
    private ulong block;
    private (uint A, uint B, uint C, uint D) words;
    private int left;

    /// <summary>The stream number <paramref name="index"/> of <paramref name="seed"/>.</summary>
    public Philox(long seed, long index)
    {
        (key0, key1) = ((uint)seed, (uint)(seed >> 32));
        (index0, index1) = ((uint)index, (uint)(index >> 32));
    }

    /// <summary>One block of the bijection: four words from a counter of four words and a key of two, ten rounds.</summary>
    public static (uint A, uint B, uint C, uint D) Block((uint A, uint B, uint C, uint D) counter, uint key0, uint key1)
    {
        var (a, b, c, d) = counter;
        for (int round = 0; round < 10; round++)
        {
            ulong p0 = 0xD2511F53UL * a, p1 = 0xCD9E8D57UL * c;
            (a, b, c, d) = ((uint)(p1 >> 32) ^ b ^ key0, (uint)p1, (uint)(p0 >> 32) ^ d ^ key1, (uint)p0);
            key0 += 0x9E3779B9;
            key1 += 0xBB67AE85;
        }
        return (a, b, c, d);
    }

    /// <summary>The next 32 random bits.</summary>
    public uint Next()
    {
        if (left == 0)
        {
            words = Block(((uint)block, (uint)(block >> 32), index0, index1), key0, key1);
            block++;
            left = 4;
        }
        return left-- switch { 4 => words.A, 3 => words.B, 2 => words.C, _ => words.D };
    }

    /// <summary>A whole number below <paramref name="bound"/>, each equally likely (Lemire 2019, Fast random integer generation in an interval).</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public int Below(int bound)
    {
        ulong product = (ulong)Next() * (uint)bound;
        if ((uint)product < (uint)bound)
        {
            uint threshold = (uint)(-bound) % (uint)bound;
            while ((uint)product < threshold) product = (ulong)Next() * (uint)bound;
        }
        return (int)(product >> 32);
    }

    /// <summary>A uniform number in (0, 1), 32 bits of it.</summary>
    public double Uniform() => (Next() + 0.5) / 4294967296.0;

    /// <summary>A standard normal number (Box &amp; Muller 1958).</summary>
    public double Normal() => Math.Sqrt(-2 * Math.Log(Uniform())) * Math.Cos(2 * Math.PI * Uniform());
}
