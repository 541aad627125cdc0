namespace Permute.Design;

/// <summary>
/// A keyed bijection of 0..count−1: a balanced Feistel network whose rounds are Philox blocks, walked until it falls inside the range (Black &amp;
/// Rogaway 2002, Ciphers with arbitrary finite domains). It puts an exhaustive list in pseudo-random order without storing it.
/// </summary>
public sealed class KeyedOrder
{
    private const int Rounds = 6;
    private readonly long count, seed;
    private readonly int half;

    /// <summary>An order of <paramref name="count"/> items (at least 1) that depends on <paramref name="seed"/>.</summary>
    public KeyedOrder(long count, long seed)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(count, 1);
        (this.count, this.seed) = (count, seed);
        while (1L << (2 * half) < count) half++;
    }

    /// <summary>The item at a place of the order.</summary>
    public long At(long place)
    {
        long at = place;
        do at = Scramble(at); while (at >= count);
        return at;
    }

    private long Scramble(long value)
    {
        uint mask = (uint)((1L << half) - 1);
        uint left = (uint)(value >> half) & mask, right = (uint)value & mask;
        for (int round = 0; round < Rounds; round++)
        {
            var block = Philox.Block((right, (uint)round, 0x6F726465, 0), (uint)seed, (uint)(seed >> 32));
            (left, right) = (right, (left ^ block.A) & mask);
        }
        return ((long)left << half) | right;
    }
}
